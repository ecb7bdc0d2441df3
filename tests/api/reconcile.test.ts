import { afterAll, beforeAll, expect, it } from 'vitest';
import { reconcileReadings } from '../../server/ingest/reconcile';
import { startWorker } from '../../server/jobs/worker';
import { Upload } from '../../server/models';
import { startApi, type Agent, type Api } from '../support/api';
import { someLot } from '../support/inspection';
import { asOperator } from '../support/outside';
import { ended, plainCsv, uploadText } from '../support/readings';

let api: Api;
let worker: { stop(): Promise<void> };
let technician: Agent;

beforeAll(async () => {
  api = await startApi();
  worker = await startWorker();
  technician = await api.agentFor('technician');
});
afterAll(async () => {
  await worker.stop();
  await api.close();
});

it('finds a reading that was lost, one that was added, and one of no upload', async () => {
  const lot = await someLot(api);
  const id = await uploadText(technician, lot.id, plainCsv(30));
  await ended(technician, id);
  const { number } = (await Upload.findByPk(id))!;
  expect(await reconcileReadings(api.database.pool)).toEqual([]);

  await asOperator(api, 'DELETE FROM readings WHERE upload_number = $1 AND file_line = 31', [
    number,
  ]);
  expect(await reconcileReadings(api.database.pool)).toEqual([
    { uploadNumber: number, reason: '29 rows are kept, 30 were taken' },
  ]);

  const add = (upload: number, line: number) =>
    asOperator(
      api,
      "INSERT INTO readings (upload_number, file_line, serial, frequency_hz) VALUES ($1, $2, 'X', 1)",
      [upload, line],
    );
  await add(number, 31);
  await add(number, 99);
  await add(number + 1000, 2);
  expect(await reconcileReadings(api.database.pool)).toEqual([
    { uploadNumber: number, reason: '31 rows are kept, 30 were taken' },
    { uploadNumber: number + 1000, reason: '1 rows are kept of an upload that does not exist' },
  ]);
});
