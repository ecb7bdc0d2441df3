import { existsSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { checkoutFolder } from '../../server/launch/checkout';
import { runOrStop } from '../../server/launch/command';
import { ensureDebianProgram } from '../../server/launch/debian';
import { type BenchRow } from './bench-row';
import { writeJob } from './support/analysis-job';
import { type Analysed, type LineProcess, startLineProcess } from './support/line-process';

/*
 * The full analysis of a lot by shared/analysis beside a numpy/scipy script that finds the same figures from the same
 * readings (tests/bench/analysis_reference.py): sort, moments, quantiles, normality, outliers, two groups, shares beyond
 * limits with their bounds, capability, tolerance interval, histograms, verdicts, the units farthest out, and the links of
 * two receivers. The product adds what only it has: finding, sampling plan with its curve, global risk, budget.
 * Each side is a process of its own with the machine's default threads; the two take turns, so that whatever else the
 * machine does falls on both. Then the browser's recomputation while somebody drags a limit.
 * QUARTZHOLD_BENCH_UNITS=1000000 leaves out the other sizes.
 */
const sizes = (process.env.QUARTZHOLD_BENCH_UNITS ?? '1000000,100000,10000').split(',').map(Number);
const TRIED_UNITS = 100_000;

export default async function analysisBench(): Promise<BenchRow[]> {
  const python = await scipyPython();
  const rows: BenchRow[] = [];
  for (const size of sizes) {
    const job = writeJob(size);
    const numpy = await startLineProcess(
      python.path,
      [join(checkoutFolder, 'tests/bench/analysis_reference.py')],
      job,
      python.env,
    );
    const product = await startLineProcess(
      process.execPath,
      ['--import', 'tsx', join(checkoutFolder, 'tests/bench/support/analysis-product.ts')],
      job,
    );
    try {
      rows.push(...(await compare(size, numpy, product)));
      if (size === TRIED_UNITS) rows.push(await tryLimits(product));
    } finally {
      await Promise.all([numpy.stop(), product.stop()]);
      rmSync(dirname(job.file), { recursive: true });
    }
  }
  return rows;
}

async function compare(
  size: number,
  numpy: LineProcess,
  product: LineProcess,
): Promise<BenchRow[]> {
  const label = size.toLocaleString('en');
  const firstOfNumpy = await numpy.ask('run');
  const firstOfProduct = await product.ask('run');
  const runs = size >= 1_000_000 ? 9 : 21;
  const ofNumpy: Analysed[] = [];
  const ofProduct: Analysed[] = [];
  for (let run = 0; run < runs; run += 1) {
    ofNumpy.push(await numpy.ask('run'));
    ofProduct.push(await product.ask('run'));
  }
  const ratios = ofProduct.map(({ ms }, i) => ms / ofNumpy[i]!.ms);
  const cpu = ofProduct.map(({ cpuMs }, i) => cpuMs / ofNumpy[i]!.cpuMs);
  const memory = ({ beforeMiB, peakMiB }: Analysed) =>
    `${peakMiB.toFixed(0)} MiB (${beforeMiB.toFixed(0)} before the first)`;
  console.log(
    [
      `${label} units: product / numpy+scipy = ${median(ratios).toFixed(2)}, median of ${runs} pairs, ${Math.min(...ratios).toFixed(2)} to ${Math.max(...ratios).toFixed(2)}; first, cold: ${firstOfProduct.ms.toFixed(0)} ms / ${firstOfNumpy.ms.toFixed(0)} ms`,
      `  processor time, all threads: ${median(cpu).toFixed(2)}, ${Math.min(...cpu).toFixed(2)} to ${Math.max(...cpu).toFixed(2)}`,
      `  greatest memory: product ${memory(ofProduct.at(-1)!)}, numpy+scipy ${memory(ofNumpy.at(-1)!)}`,
      `  figures: ${agreement(ofProduct.at(-1)!, ofNumpy.at(-1)!)}`,
    ].join('\n'),
  );
  const items = { count: size, unit: 'units' };
  return [
    { name: `numpy and scipy, ${label} units`, runsMs: ofNumpy.map(({ ms }) => ms), items },
    { name: `product, ${label} units`, runsMs: ofProduct.map(({ ms }) => ms), items },
  ];
}

async function tryLimits(product: LineProcess): Promise<BenchRow> {
  const tried: number[] = [];
  for (let i = 0; i < 100; i += 1) tried.push((await product.ask('try')).ms);
  const label = TRIED_UNITS.toLocaleString('en');
  console.log(
    `  other limits on ${label} sorted units: first ${tried[0]!.toFixed(2)} ms, median ${median(tried).toFixed(2)} ms, most ${Math.max(...tried).toFixed(2)} ms; the goal is 100 ms`,
  );
  return { name: `other limits tried on ${label} units`, runsMs: tried };
}

/** How far the two sides differ, at most, relative to the figure. */
function agreement({ figures: ours }: Analysed, { figures: theirs }: Analysed): string {
  const shared = Object.keys(ours).filter((name) => name in theirs);
  const apart = shared.map((name) => {
    const [a, b] = [ours[name] ?? NaN, theirs[name] ?? NaN];
    return { name, relative: a === b ? 0 : Math.abs(a - b) / Math.max(Math.abs(a), Math.abs(b)) };
  });
  apart.sort((a, b) => b.relative - a.relative || (Number.isNaN(a.relative) ? -1 : 0));
  const worst = apart[0]!;
  const missing = shared.filter((name) => ours[name] === null || theirs[name] === null);
  return `${shared.length} compared, farthest apart "${worst.name}" by ${worst.relative.toExponential(1)} of itself${missing.length ? `; not found: ${missing.join(', ')}` : ''}`;
}

/** Debian's own Python with scipy; a Python of another origin would not see it. */
async function scipyPython() {
  const interpreter = '/usr/bin/python3';
  const packages = 'usr/lib/python3/dist-packages';
  let modules = '';
  const python = await ensureDebianProgram({
    packageName: 'python3-scipy',
    title: 'scipy',
    find: (root) => {
      if (!existsSync(interpreter) || !existsSync(join(root || '/', packages, 'scipy'))) return;
      modules = join(root || '/', packages);
      return interpreter;
    },
  });
  const env = { ...python.env, PYTHONPATH: modules };
  await runOrStop('bench_failed', 'scipy cannot be used.', interpreter, ['-c', 'import scipy'], {
    env: { ...process.env, ...env },
  });
  return { path: interpreter, env };
}

function median(values: readonly number[]): number {
  return [...values].sort((a, b) => a - b)[values.length >> 1]!;
}
