import { type Request } from 'express';
import { sha256Hex } from '../history/canonical';
import { Bench, BenchToken } from '../models';
import { type Actor } from './actor';
import { NotSignedIn } from './errors';

export interface BenchCaller {
  actor: Actor;
  bench: Bench;
  tokenId: string;
}

/**
 * The bench behind `Authorization: Bearer <token>`, or 401 with one answer for a token that is missing, unknown or
 * revoked and for a bench out of use. A token is 256 random bits, so its hash needs no salt and no slowness.
 */
export async function authenticateBench(request: Request): Promise<BenchCaller> {
  const secret = /^Bearer ([\w-]{20,200})$/.exec(request.get('authorization') ?? '')?.[1];
  const token =
    secret === undefined
      ? null
      : await BenchToken.findOne({ where: { tokenHash: sha256Hex(secret), revokedAt: null } });
  const bench = token && (await Bench.findByPk(token.benchId));
  if (!token || !bench?.active)
    throw new NotSignedIn(
      'This needs a token of a bench in use: Authorization: Bearer <token>.',
      'bench.not_known',
    );
  await token.update({ lastUsedAt: new Date() });
  const actor: Actor = {
    kind: 'bench',
    id: bench.id,
    name: bench.name,
    role: 'bench',
    supplierId: null,
    address: request.ip ?? '',
  };
  return { actor, bench, tokenId: token.id };
}
