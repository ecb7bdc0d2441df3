import { createReadStream, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { randomBytes } from 'node:crypto';
import { createInterface } from 'node:readline';
import { DataTypes, Sequelize } from 'sequelize';
import { runOrStop } from '../../server/launch/command';
import { checkoutFolder } from '../../server/launch/checkout';
import { useConfig } from '../../server/config';
import { openDatabase } from '../../server/database/connection';
import { migrate } from '../../server/database/migrate';
import { startCluster } from '../../server/database/cluster';
import { ensureDatabase, onDatabase, withClient } from '../../server/database/roles';
import { Person, Supplier } from '../../server/models';
import { hashPassword } from '../../server/services/sign-in/password';
import { testConfig } from '../support/api';
import { someBench, someLot } from '../support/inspection';
import { type BenchRow } from './bench-row';
import { startProduct } from './support/product';
import { writeReadingsFile } from './support/readings-file';

/*
 * How long the product takes for a file, over HTTP until the lot is analysed, beside the database's own \copy of the bare
 * file into the same table: hash, original kept, decoding, parsing, judging, duplicates, COPY, statistics, history.
 * QUARTZHOLD_BENCH_ROWS=1000000,100000 leaves out what takes long.
 */
const sizes = (process.env.QUARTZHOLD_BENCH_ROWS ?? '1000000,100000,5000000')
  .split(',')
  .map(Number);
const RUNS = 3;
const BULK_ROWS = 100_000;
const password = 'a heron waits on the weir';

export default async function ingestBench(): Promise<BenchRow[]> {
  const cluster = await startCluster({ name: 'bench-cluster', durable: true });
  const name = `bench_${randomBytes(5).toString('hex')}`;
  await ensureDatabase(cluster.adminUrl, name);
  const ownerUrl = onDatabase(cluster.ownerUrl, name);
  const appUrl = onDatabase(cluster.appUrl, name);
  await migrate(ownerUrl);
  useConfig(testConfig(appUrl));
  const database = openDatabase({ url: appUrl, poolMax: 3 });
  const people = await seed();
  await build();
  const product = await startProduct(
    {
      DATABASE_URL: appUrl,
      SMTP_URL: 'smtp://127.0.0.1:1',
      SESSION_SECRET: randomBytes(32).toString('hex'),
      LOG_LEVEL: 'error',
    },
    { email: people.technician.email, password },
  );
  const rows: BenchRow[] = [];
  try {
    await withClient(ownerUrl, (client) => client.query(bareTable));
    for (const size of sizes) {
      const file = await writeReadingsFile(size);
      const runs = size > 1_000_000 ? 1 : RUNS;
      const copyMs: number[] = [];
      const productMs: number[] = [];
      const receiptMs: number[] = [];
      for (let run = 0; run < runs; run += 1) {
        await withClient(ownerUrl, (client) => client.query('TRUNCATE bench_copy'));
        copyMs.push(await timed(() => copyBare(ownerUrl, file)));
        const lot = await someLot(
          { people: people as never, suppliers: people.suppliers },
          { lot: { lotSize: size, unitsPlanned: size } },
        );
        const begin = performance.now();
        const uploadId = await product.upload(lot.id, file);
        receiptMs.push(performance.now() - begin);
        await product.done(uploadId);
        productMs.push(performance.now() - begin);
      }
      const items = { count: size, unit: 'rows' };
      const label = size.toLocaleString('en');
      rows.push(
        { name: `psql \\copy of ${label} rows`, runsMs: copyMs, items },
        { name: `product, ${label} rows, upload to analysis`, runsMs: productMs, items },
        { name: `  of which receipt (202)`, runsMs: receiptMs, items },
      );
      const peaks = product.peaks();
      console.log(
        `${label} rows: product / \\copy = ${(median(productMs) / median(copyMs)).toFixed(2)}; greatest memory so far: web ${peaks.web} MiB, worker ${peaks.worker} MiB`,
      );
      if (size === sizes[0]) rows.push(await bulkCreate(ownerUrl, file, size));
      rmSync(dirname(file), { recursive: true });
    }
  } finally {
    await product.stop();
    await database.close();
    await withClient(cluster.adminUrl, (client) =>
      client.query(`DROP DATABASE IF EXISTS "${name}" WITH (FORCE)`),
    );
    await cluster.stop();
  }
  return rows;
}

/** The same columns, checks and indexes; what the product counts by itself stands as a default. */
const bareTable = `
  CREATE TABLE bench_copy (LIKE readings INCLUDING ALL);
  ALTER TABLE bench_copy ALTER upload_number SET DEFAULT 1, ALTER file_line SET DEFAULT 1;
`;

function copyBare(url: string, file: string): Promise<unknown> {
  return runOrStop('bench_failed', 'psql \\copy failed.', 'psql', [
    url,
    '-X',
    '-q',
    '-c',
    `\\copy bench_copy (serial, temperature_c, frequency_hz, measured_at) FROM '${file}' CSV HEADER`,
  ]);
}

/** The same table by Sequelize's bulkCreate, on a part of the file; the time is scaled to the whole. */
async function bulkCreate(url: string, file: string, size: number): Promise<BenchRow> {
  const sequelize = new Sequelize(url, { dialect: 'postgres', logging: false });
  const Reading = sequelize.define(
    'Reading',
    {
      serial: DataTypes.TEXT,
      temperature_c: DataTypes.DECIMAL,
      frequency_hz: DataTypes.DECIMAL,
      measured_at: DataTypes.DATE,
    },
    { tableName: 'bench_copy', timestamps: false },
  );
  Reading.removeAttribute('id');
  const ms = await timed(async () => {
    let batch: Record<string, string | undefined>[] = [];
    let taken = -1;
    const input = createReadStream(file);
    for await (const line of createInterface({ input })) {
      taken += 1;
      if (taken === 0) continue;
      const [serial, temperature_c, frequency_hz, measured_at] = line.split(',');
      batch.push({ serial, temperature_c, frequency_hz, measured_at });
      if (batch.length === 5000 || taken === BULK_ROWS) {
        await Reading.bulkCreate(batch, { returning: false });
        batch = [];
      }
      if (taken === BULK_ROWS) break;
    }
    input.destroy();
  });
  await sequelize.close();
  return {
    name: `Sequelize bulkCreate, scaled from ${BULK_ROWS.toLocaleString('en')} rows`,
    runsMs: [(ms * size) / Math.min(size, BULK_ROWS)],
    items: { count: size, unit: 'rows' },
  };
}

async function seed() {
  const supplier = await Supplier.create({ name: 'Bench supplier' });
  const common = { passwordHash: await hashPassword(password), state: 'active' as const };
  const technician = await Person.create({
    name: 'Tess Technician',
    email: 'technician@bench.test',
    role: 'technician',
    ...common,
  });
  const admin = await Person.create({
    name: 'Abel Admin',
    email: 'admin@bench.test',
    role: 'administrator',
    ...common,
  });
  await someBench({ usual: true });
  return { technician, admin, suppliers: { first: supplier, second: supplier } };
}

function build(): Promise<unknown> {
  return runOrStop(
    'bench_failed',
    'The server could not be built.',
    process.execPath,
    [
      join(checkoutFolder, 'node_modules/vite/bin/vite.js'),
      'build',
      '--ssr',
      'server/index.ts',
      '--outDir',
      '.local/bench-server',
    ],
    { cwd: checkoutFolder },
  );
}

async function timed(act: () => Promise<unknown>): Promise<number> {
  const begin = performance.now();
  await act();
  return performance.now() - begin;
}

function median(values: number[]): number {
  return [...values].sort((a, b) => a - b)[values.length >> 1]!;
}
