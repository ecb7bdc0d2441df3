import { readdir } from 'node:fs/promises';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { handleNightly } from '../../server/jobs/handlers/nightly';
import { HistoryEntry } from '../../server/models';
import { emailOf, startApi, type Api } from '../support/api';
import { approvedPart, decided, inspectedLot, openHouse, type House } from '../support/lot-life';
import { asOperator, mailsTo } from '../support/outside';

let api: Api;
let house: House;
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  const part = await approvedPart(house);
  const lot = await inspectedLot(house, { partId: part.id });
  await decided(house.quality, lot.id, { decision: 'accept' });
});
afterAll(() => api.close());
beforeEach(() => asOperator(api, 'DELETE FROM nightly_runs'));

const last = async () =>
  (await house.auditor.get('/api/history/verification/last').expect(200)).body.last as {
    ok: boolean;
    firstBroken: { sequence: number; reason: string } | null;
  } | null;

describe('the night’s work', () => {
  it('checks the chain, keeps the result and signs a checkpoint inside and outside the database', async () => {
    expect(await last()).toBeNull();
    const entries = await HistoryEntry.count();
    const outcome = (await handleNightly())!;
    expect(outcome).toMatchObject({
      ok: true,
      faults: [],
      entriesChecked: entries,
      checkpoint: entries,
    });
    expect(outcome.signaturesChecked).toBeGreaterThanOrEqual(2);
    expect(await last()).toMatchObject({ ok: true, firstBroken: null });
    const { body } = await house.auditor.get('/api/history/checkpoints').expect(200);
    expect(body.items).toMatchObject([{ count: entries }]);
    expect(await readdir(api.config.CHECKPOINT_FOLDER)).toHaveLength(1);
  });

  it('is done once a day, whoever asks, and by another when one broke off', async () => {
    const outcomes = await Promise.all([handleNightly(), handleNightly(), handleNightly()]);
    expect(outcomes.filter((outcome) => outcome !== null)).toHaveLength(1);
    expect(await handleNightly()).toBeNull();
    await asOperator(api, `UPDATE nightly_runs SET finished_at = NULL`);
    expect(await handleNightly()).toBeNull();
    await asOperator(api, `UPDATE nightly_runs SET started_at = now() - interval '61 minutes'`);
    expect(await handleNightly()).not.toBeNull();
  });

  it('counts the hours before two as the night before', async () => {
    expect(await handleNightly(new Date('2026-12-02T01:59:00Z'))).not.toBeNull();
    expect(await handleNightly(new Date('2026-12-01T03:00:00Z'))).toBeNull();
    expect(await handleNightly(new Date('2026-12-02T02:00:00Z'))).not.toBeNull();
  });

  it('clears sessions and counters that have expired, and no others', async () => {
    await asOperator(
      api,
      `INSERT INTO sessions (sid, sess, expire) VALUES ('old', '{}', now() - interval '1 hour');
       INSERT INTO rate_limits (key, points, expire) VALUES ('old', 1, 1), ('new', 1, 99999999999999)`,
    );
    await handleNightly();
    expect(await asOperator(api, `SELECT sid FROM sessions WHERE sid = 'old'`)).toEqual([]);
    const keys = await asOperator(api, `SELECT key FROM rate_limits WHERE key IN ('old', 'new')`);
    expect(keys).toEqual([{ key: 'new' }]);
    await house.auditor.get('/api/lots').expect(200);
  });

  it('tells auditors and administrators of a changed signature, and vouches for nothing', async () => {
    await asOperator(
      api,
      `ALTER TABLE signatures DISABLE TRIGGER USER;
       UPDATE signatures SET reason = 'Something else.' WHERE record_type = 'disposition';
       ALTER TABLE signatures ENABLE TRIGGER USER`,
    );
    const outcome = (await handleNightly())!;
    expect(outcome).toMatchObject({ ok: false, checkpoint: null });
    expect(outcome.faults).toEqual([expect.stringMatching(/^Signature .* does not fit/)]);
    for (const who of ['auditor', 'admin'] as const) {
      const [mail] = await mailsTo(emailOf(who));
      expect(mail).toMatchObject({ kind: 'history.alarm', urgency: 'at_once' });
      expect(mail!.textBody).toContain(outcome.faults[0]);
    }
    expect(await mailsTo(emailOf('quality'))).toEqual([]);
    expect(await HistoryEntry.count({ where: { act: 'history.alarm' } })).toBe(1);
  });

  it('names the first broken entry of the chain', async () => {
    await asOperator(
      api,
      `ALTER TABLE history_entries DISABLE TRIGGER USER;
       UPDATE history_entries SET payload = replace(payload, 'lot', 'log') WHERE id = (SELECT entry_id FROM history_seals WHERE sequence = 3);
       ALTER TABLE history_entries ENABLE TRIGGER USER`,
    );
    const outcome = (await handleNightly())!;
    expect(outcome.faults[0]).toBe('History entry 3: its content does not match its seal.');
    expect(await last()).toMatchObject({ ok: false, firstBroken: { sequence: 3 } });
  });
});
