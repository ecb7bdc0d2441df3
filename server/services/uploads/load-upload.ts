import { type z } from 'zod';
import { type Mapping, type UploadWarning } from '@shared/contract/uploads';
import { type Transaction } from 'sequelize';
import { config } from '../../config';
import { connectionOf, database, inTransaction, longTransaction } from '../../database/connection';
import { record } from '../../history/act';
import { system } from '../../http/actor';
import { FileRefused, LeaseLost } from '../../ingest/errors';
import { claimUpload, mostAttempts, uploadsChannel } from '../../ingest/lease';
import { limits } from '../../ingest/limits';
import { type Loaded, loadFile } from '../../ingest/load-file';
import { Progress } from '../../ingest/progress';
import { FalseSuspicion } from '../../ingest/prove-duplicates';
import { type RowJudge } from '../../ingest/row-judge';
import { warningsOf } from '../../ingest/warnings';
import { enqueue } from '../../jobs/boss';
import { queues } from '../../jobs/queues';
import { Bench, Lot, Part, PartRevision, Upload } from '../../models';
import { analyseLot } from '../analysis/analyse-lot';
import { lockLot } from '../lots/find-lot';
import { type LotReadings } from '../analysis/read-readings';
import { rememberMapping } from './saved-mappings';

type Warning = z.infer<typeof UploadWarning>;

/**
 * Loads an upload: claims it, reads its bytes into readings and refused rows, and ends it, all in one transaction with
 * its history entry and the lot's new analysis. Whatever happens, nothing of it is ever half there.
 */
export async function loadUpload(uploadId: string): Promise<void> {
  const { pool } = database();
  const token = await claimUpload(pool, uploadId);
  if (!token) return;
  const upload = await Upload.findByPk(uploadId, {
    include: [
      {
        model: Lot,
        as: 'lot',
        include: [
          { model: PartRevision, as: 'partRevision' },
          { model: Part, as: 'part' },
        ],
      },
      { model: Bench, as: 'bench' },
    ],
  });
  if (!upload) return;
  if (upload.attempts > mostAttempts) {
    await failUpload(upload, token, {
      code: 'upload.given_up',
      message: `Loading was begun ${mostAttempts} times and broke off each time. Please tell your administrator.`,
    });
    return;
  }
  try {
    await loadOnce(upload, token).catch((error: unknown) => {
      if (error instanceof FalseSuspicion) return loadOnce(upload, token);
      throw error;
    });
  } catch (error) {
    if (error instanceof LeaseLost) return;
    if (error instanceof FileRefused) {
      await failUpload(upload, token, { code: error.code, message: error.message });
      return;
    }
    // The database went away or something unforeseen happened: the lapsed lease brings the upload back.
    await pool
      .query(
        `UPDATE uploads SET lease_until = now() + interval '3 seconds' WHERE id = $1 AND lease_token = $2`,
        [uploadId, token],
      )
      .catch(() => undefined);
    throw error;
  }
}

async function loadOnce(upload: Upload, token: string): Promise<void> {
  const { pool } = database();
  const mapping = upload.mapping!;
  let judge: RowJudge | undefined;
  let bytesRead = 0;
  const progress = new Progress(pool, upload.id, token, Number(upload.byteCount), () => ({
    bytesRead,
    rows: judge?.rows ?? 0,
    taken: judge?.taken ?? 0,
    refused: judge?.refusedCount ?? 0,
  }));
  progress.start();
  const transaction = await longTransaction();
  const client = connectionOf(transaction);
  const source = await pool.connect();
  let sourceError: Error | undefined;
  try {
    // Two files of one lot at once would not see each other's rows: they go one after the other.
    await client.query('SELECT pg_advisory_xact_lock(hashtextextended($1, 7172618))', [
      upload.lotId,
    ]);
    const { criteria } = upload.lot!.partRevision!;
    const loaded = await loadFile(
      client,
      source,
      {
        uploadId: upload.id,
        lotId: upload.lotId,
        uploadNumber: upload.number,
        mapping,
        nominalHz: criteria.nominalFrequencyHz,
        referenceTemperatureC: criteria.referenceTemperatureC,
        requiredTemperaturesC: criteria.requiredTemperaturesC,
        repeatReadings: criteria.repeatReadings,
        gather: upload.lot!.parentLotId === null,
        chamber: {
          lowC: upload.bench?.chamberLowC ?? null,
          highC: upload.bench?.chamberHighC ?? null,
        },
        greatestBytes: limits.growth * config().GREATEST_UPLOAD_BYTES,
      },
      {
        bytes: (count) => (bytesRead += count),
        judge: (made) => (judge = made),
        progress,
      },
    );
    await progress.stop('analysing');
    progress.check();
    await finishUpload(transaction, upload, token, loaded);
    await transaction.commit();
  } catch (error) {
    sourceError = error as Error;
    await progress.stop(null);
    await transaction.rollback().catch(() => undefined);
    throw error;
  } finally {
    source.release(sourceError);
  }
}

async function finishUpload(
  transaction: Transaction,
  upload: Upload,
  token: string,
  { judge, readingsSha256 }: Loaded,
): Promise<void> {
  const client = connectionOf(transaction);
  // Lot first, then its upload: the order that every act keeps, so that none waits for another in a ring.
  const lot = await lockLot(upload.lotId, transaction);
  if (lot.state === 'rejected')
    throw new FileRefused(
      'lot.closed',
      `Lot ${lot.lotNumber} was rejected while this file was being read: no readings are taken for it any more.`,
    );
  const mapping: Mapping = upload.mapping!;
  const warnings: Warning[] = [
    ...upload.warnings,
    ...warningsOf(judge, {
      shape: mapping.shape,
      startedAt: mapping.startedAt,
      hasElapsed: mapping.columns.some((column) => column.target === 'elapsedSeconds'),
    }),
  ];
  const { rowCount } = await client.query(
    `UPDATE uploads SET state = 'done', stage = 'finished', finished_at = now(), bytes_read = byte_count,
       rows_in_file = $3, rows_taken = $4, rows_refused = $5, units_count = $6, readings_sha256 = $7,
       warnings = $8::jsonb, seconds_left = 0, lease_token = NULL, lease_until = NULL
     WHERE id = $1 AND lease_token = $2 AND state = 'running'`,
    [
      upload.id,
      token,
      judge.rows,
      judge.taken,
      judge.refusedCount,
      judge.units.unitsCount,
      readingsSha256,
      JSON.stringify(warnings),
    ],
  );
  if (rowCount !== 1) throw new LeaseLost();
  const savedVersion = upload.rememberMapping ? await rememberMapping(transaction, upload) : null;
  if (judge.taken > 0) {
    await client.query(
      `UPDATE lots SET data_version = data_version + 1,
         state_since = CASE WHEN state = 'received' THEN now() ELSE state_since END,
         state = CASE WHEN state = 'received' THEN 'under_inspection' ELSE state END
       WHERE id = $1`,
      [upload.lotId],
    );
  }
  await record(transaction, system, 'upload.load', {
    recordType: 'upload',
    recordId: upload.id,
    lotId: upload.lotId,
    before: { state: 'running' },
    after: {
      state: 'done',
      rowsInFile: judge.rows,
      rowsTaken: judge.taken,
      rowsRefused: judge.refusedCount,
      unitsCount: judge.units.unitsCount,
      readingsSha256,
      warnings: warnings.map((warning) => warning.code),
      ...(savedVersion === null ? {} : { savedMappingVersion: savedVersion }),
    },
  });
  if (judge.taken > 0) await analyseOrLater(transaction, upload.lotId, gatheredBy(judge));
  await client.query('SELECT pg_notify($1, $2)', [uploadsChannel, upload.id]);
}

/** The readings are worth keeping even if they cannot be analysed now: the lot then owes its analysis, which is tried again. */
async function analyseOrLater(
  transaction: Transaction,
  lotId: string,
  gathered: LotReadings | undefined,
): Promise<void> {
  const client = connectionOf(transaction);
  await client.query('SAVEPOINT analysis');
  try {
    await analyseLot(transaction, lotId, gathered);
    await client.query('RELEASE SAVEPOINT analysis');
  } catch (error) {
    await client.query('ROLLBACK TO SAVEPOINT analysis');
    console.error('The analysis of a lot failed and is tried again later.', error);
    await enqueue(transaction, queues.analyse, { lotId });
  }
}

/** What passed by while the file was read, if that is all the analysis needs. */
function gatheredBy(judge: RowJudge): LotReadings | undefined {
  if (!judge.gathered) return undefined;
  const units = judge.gathered.finish();
  return { ...units, unitsLackingResistance: units.readings - judge.resistances };
}

/** Ends an upload that cannot be loaded: nothing of it but its bytes and the reason is kept. */
async function failUpload(
  upload: Upload,
  token: string,
  failure: { code: string; message: string },
): Promise<void> {
  await inTransaction(async (transaction) => {
    const [changed] = await Upload.update(
      {
        state: 'failed',
        stage: 'finished',
        failure,
        finishedAt: new Date(),
        rowsInFile: 0,
        rowsTaken: 0,
        rowsRefused: 0,
        leaseToken: null,
        leaseUntil: null,
      },
      { where: { id: upload.id, leaseToken: token }, transaction },
    );
    if (changed !== 1) return;
    await record(transaction, system, 'upload.fail', {
      recordType: 'upload',
      recordId: upload.id,
      lotId: upload.lotId,
      before: { state: 'running' },
      after: { state: 'failed', code: failure.code },
      reason: failure.message,
    });
    await connectionOf(transaction).query('SELECT pg_notify($1, $2)', [uploadsChannel, upload.id]);
  });
}
