import { afterAll, beforeAll, expect, test } from 'vitest';
import { seedDemo } from '../../seeders/demo';
import { database, openDatabase } from '../../server/database/connection';
import { verifyHistory } from '../../server/history/verify';
import { Analysis, Lot } from '../../server/models';
import { useConfig } from '../../server/config';
import { testConfig } from '../support/api';
import { createTestDatabase, type TestDatabase } from '../support/database';

let testDatabase: TestDatabase;

beforeAll(async () => {
  testDatabase = await createTestDatabase();
  useConfig(testConfig(testDatabase.appUrl));
  openDatabase({ url: testDatabase.appUrl, poolMax: 5 });
  await seedDemo('a passphrase for this test');
}, 120_000);
afterAll(async () => {
  await database().close();
  await testDatabase.drop();
});

test('the demo fills every state a lot can be in but the sorted one', async () => {
  const states = await Lot.findAll({ attributes: ['state'], group: ['state'] });
  expect(states.map((row) => row.state).sort()).toEqual([
    'accepted',
    'accepted_under_concession',
    'awaiting_disposition',
    'on_hold',
    'received',
    'rejected',
    'under_inspection',
  ]);
});

test('the demo’s history holds together', async () => {
  const result = await verifyHistory();
  expect(result).toMatchObject({ ok: true, firstBroken: null });
  expect(result.entriesChecked).toBeGreaterThan(60);
});

test('every analysis says something of every unit that was measured', async () => {
  const analyses = await Analysis.findAll();
  expect(analyses.length).toBeGreaterThan(8);
  for (const analysis of analyses) {
    const result = JSON.parse(analysis.resultText) as {
      units: number;
      histogram: { counts: number[] };
    };
    expect(result.histogram.counts.reduce((sum, count) => sum + count, 0)).toBe(result.units);
  }
  const { rows } = await database().pool.query('SELECT count(*)::int AS count FROM readings');
  expect(rows[0].count).toBeGreaterThan(1500);
});
