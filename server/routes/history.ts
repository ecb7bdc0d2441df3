import { readFile } from 'node:fs/promises';
import { resolve } from 'node:path';
import * as contract from '@shared/contract/history';
import { openEventStream } from '../http/event-stream';
import { route } from '../http/route';
import { makeCheckpoint } from '../history/checkpoint';
import { verifyHistory } from '../history/verify';
import { keepVerification, lastVerification } from '../history/verifications';
import { presentCheckpoint } from '../presenters/checkpoint';
import { readCheckpoints } from '../services/history/read-checkpoints';
import { writeHistoryExport } from '../services/history/export-history';
import { writeHistoryCsv } from '../services/history/export-history-csv';
import { readActs, readHistory, readRecordAt } from '../services/history/read-history';

/** The file is handed out as it stands in the source, so that everybody checks with the same words. */
const verifierFile = resolve('server/history/verifier.mjs');

export const historyRoutes = [
  route(contract.listHistory, ({ query: { limit, after, ...filter } }) =>
    readHistory(filter, limit, after),
  ),
  route(contract.lotHistory, ({ params, query }) =>
    readHistory({ lotId: params.id }, query.limit, query.after),
  ),
  route(contract.listActs, () => readActs()),
  route(contract.exportHistory, ({ query, response }) => writeHistoryExport(query, response)),
  route(contract.exportHistoryCsv, ({ query, response }) => writeHistoryCsv(query, response)),
  route(contract.verifyHistory, async () => keepVerification(await verifyHistory())),
  route(contract.streamVerification, async ({ request, response }) => {
    const stream = openEventStream(request, response);
    try {
      const result = await verifyHistory((checked, total) =>
        stream.send('progress', { checked, total }),
      );
      stream.send('result', await keepVerification(result));
    } catch {
      stream.send('failed', { message: 'The check could not be finished. Try again in a moment.' });
    }
    stream.end();
  }),
  route(contract.lastVerification, async () => ({ last: await lastVerification() })),
  route(contract.listCheckpoints, ({ query }) => readCheckpoints(query.limit, query.after)),
  route(contract.makeCheckpoint, async ({ actor }) =>
    presentCheckpoint(await makeCheckpoint(actor)),
  ),
  route(contract.readVerifier, async ({ response }) => {
    response
      .type('text/javascript')
      .attachment('verifier.mjs')
      .send(await readFile(verifierFile));
  }),
  route(contract.readRecordAt, ({ params, query }) =>
    readRecordAt(params.recordType, params.recordId, query.sequence),
  ),
];
