import * as contract from '@shared/contract/benches';
import { route } from '../http/route';
import {
  issueBenchToken,
  readBenchTokens,
  revokeBenchToken,
} from '../services/benches/bench-tokens';
import { addBench, changeBench } from '../services/benches/keep-benches';
import { readBench, readBenches } from '../services/benches/read-benches';

export const benchRoutes = [
  route(contract.listBenches, ({ query }) => readBenches(query)),
  route(contract.addBench, async ({ actor, body }) => readBench(await addBench(actor, body))),
  route(contract.readBench, ({ params }) => readBench(params.id)),
  route(contract.changeBench, async ({ actor, params, body }) => {
    await changeBench(actor, params.id, body);
    return readBench(params.id);
  }),
  route(contract.listBenchTokens, ({ params }) => readBenchTokens(params.id)),
  route(contract.issueBenchToken, ({ actor, params, body }) =>
    issueBenchToken(actor, params.id, body.label),
  ),
  route(contract.revokeBenchToken, async ({ actor, params }) => {
    await revokeBenchToken(actor, params.id, params.tokenId);
    return { ok: true as const };
  }),
];
