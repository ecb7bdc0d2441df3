import { randomBytes } from 'node:crypto';
import { act } from '../../history/act';
import { sha256Hex } from '../../history/canonical';
import { type Actor } from '../../http/actor';
import { Conflict, NotFound } from '../../http/errors';
import { Bench, BenchToken } from '../../models';
import { presentBenchToken } from '../../presenters/bench';

/** All tokens of a bench, newest first; revoked ones stay in sight. */
export async function readBenchTokens(benchId: string) {
  if (!(await Bench.findByPk(benchId))) throw new NotFound('This bench');
  const tokens = await BenchToken.findAll({
    where: { benchId },
    order: [['createdAt', 'DESC'], 'id'],
  });
  return { items: tokens.map(presentBenchToken), next: null };
}

/** Act `bench.token.issue`: 256 random bits, told once; only the hash is kept. */
export function issueBenchToken(actor: Actor, benchId: string, label: string) {
  return act(actor, 'bench.token.issue', async (transaction) => {
    const bench = await Bench.findByPk(benchId, { transaction });
    if (!bench) throw new NotFound('This bench');
    if (!bench.active)
      throw new Conflict('bench.out_of_use', 'This bench is out of use. Take it into use first.');
    const secret = `bench_${randomBytes(32).toString('base64url')}`;
    const token = await BenchToken.create(
      { benchId, label, tokenHash: sha256Hex(secret), createdBy: actor.id, createdAt: new Date() },
      { transaction },
    );
    return {
      result: { ...presentBenchToken(token), secret },
      entry: { recordType: 'bench', recordId: benchId, after: { tokenId: token.id, label } },
    };
  });
}

/** Act `bench.token.revoke`: counts from the next request on. */
export function revokeBenchToken(actor: Actor, benchId: string, tokenId: string): Promise<void> {
  return act(actor, 'bench.token.revoke', async (transaction) => {
    const token = await BenchToken.findOne({
      where: { id: tokenId, benchId },
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (!token) throw new NotFound('This token');
    if (token.revokedAt)
      throw new Conflict('bench.token.revoked', 'This token is revoked already.');
    await token.update({ revokedAt: new Date() }, { transaction });
    return {
      result: undefined,
      entry: {
        recordType: 'bench',
        recordId: benchId,
        before: { tokenId, revoked: false },
        after: { tokenId, revoked: true },
      },
    };
  });
}
