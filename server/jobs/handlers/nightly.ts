import { database } from '../../database/connection';
import { makeCheckpoint } from '../../history/checkpoint';
import { keepVerification } from '../../history/verifications';
import { verifyHistory } from '../../history/verify';
import { system } from '../../http/actor';
import { reconcileReadings } from '../../ingest/reconcile';
import { checkSignatures } from '../../services/history/check-signatures';
import { raiseAlarm } from '../../services/history/raise-alarm';

/** The night's work begins at 2 h UTC; a worker that was down then makes up for it when it comes back. */
const beginsAtHour = 2;

export interface NightlyOutcome {
  ok: boolean;
  entriesChecked: number;
  signaturesChecked: number;
  faults: string[];
  checkpoint: number | null;
}

/**
 * Queue `nightly`, once a day over all workers: checks the chain, every signature and that readings and uploads agree, keeps the result, signs a
 * checkpoint if all holds together and raises the alarm if not, and clears what has expired. Null when another worker
 * did or does it.
 */
export async function handleNightly(now = new Date()): Promise<NightlyOutcome | null> {
  const day = new Date(now.getTime() - beginsAtHour * 3_600_000).toISOString().slice(0, 10);
  if (!(await claim(day))) return null;
  const outcome = await nightlyWork();
  await prune();
  await database().pool.query(
    'UPDATE nightly_runs SET finished_at = now(), outcome = $2 WHERE day = $1',
    [day, JSON.stringify(outcome)],
  );
  return outcome;
}

/** The day's row is written by one; a run that broke off is taken up by another after an hour. */
async function claim(day: string): Promise<boolean> {
  const { rowCount } = await database().pool.query(
    `INSERT INTO nightly_runs (day) VALUES ($1)
     ON CONFLICT (day) DO UPDATE SET started_at = now()
       WHERE nightly_runs.finished_at IS NULL AND nightly_runs.started_at < now() - interval '1 hour'`,
    [day],
  );
  return rowCount === 1;
}

async function nightlyWork(): Promise<NightlyOutcome> {
  const chain = await keepVerification(await verifyHistory());
  const { signaturesChecked, faults: misfits } = await checkSignatures();
  const faults = [
    ...(chain.firstBroken
      ? [`History entry ${chain.firstBroken.sequence}: ${chain.firstBroken.reason}.`]
      : []),
    ...misfits,
    ...(await reconcileReadings(database().pool)).map(
      ({ uploadNumber, reason }) => `Readings of upload ${uploadNumber}: ${reason}.`,
    ),
  ];
  const ok = faults.length === 0;
  if (!ok) await raiseAlarm(faults);
  // A checkpoint vouches for the chain below it, so none is made of a broken one; nor of an empty one.
  const checkpoint = ok && chain.count > 0 ? Number((await makeCheckpoint(system)).count) : null;
  return { ok, entriesChecked: chain.entriesChecked, signaturesChecked, faults, checkpoint };
}

async function prune(): Promise<void> {
  const { pool } = database();
  await pool.query('DELETE FROM sessions WHERE expire < now()');
  await pool.query('DELETE FROM rate_limits WHERE expire < $1', [Date.now()]);
}
