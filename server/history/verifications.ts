import { QueryTypes } from 'sequelize';
import { type Verification } from '@shared/contract/history';
import { HistoryEntry } from '../models';

/** Outcomes are kept, so that the auditor's page can say when the chain was last checked and how far it reached. */
export async function keepVerification(result: Verification): Promise<Verification> {
  await HistoryEntry.sequelize!.query(
    'INSERT INTO history_verifications (result) VALUES (CAST(:result AS jsonb))',
    { replacements: { result: JSON.stringify(result) } },
  );
  return result;
}

export async function lastVerification(): Promise<Verification | null> {
  const [row] = await HistoryEntry.sequelize!.query<{ result: Verification }>(
    'SELECT result FROM history_verifications ORDER BY created_at DESC LIMIT 1',
    {
      type: QueryTypes.SELECT,
    },
  );
  return row?.result ?? null;
}
