import { readFileSync } from 'node:fs';
import { createInterface } from 'node:readline';
import { analyseLot } from '../../../shared/analysis/analyse-lot';
import { tryLimits } from '../../../shared/analysis/what-if';
import { UnitCollector } from '../../../shared/analysis/units';
import { type AnalysisResult } from '../../../shared/contract/analysis';
import { type AnalysisJob } from './analysis-job';

/*
 * The product's side of tests/bench/analysis.bench.ts, in a process of its own so that its memory is its own: one job on the
 * first line of standard input, then one answer a line, as tests/bench/analysis_reference.py does.
 */
const lines = createInterface({ input: process.stdin })[Symbol.asyncIterator]();
const job = JSON.parse((await lines.next()).value as string) as AnalysisJob;
const bytes = readFileSync(job.file);
const offsets = new Float64Array(bytes.buffer, bytes.byteOffset, bytes.byteLength / 8);
const collector = new UnitCollector(job.criteria.part.criteria.referenceTemperatureC);
offsets.forEach((offsetPpm, i) => collector.addSingle(offsetPpm, 1, i + 2));
const units = collector.finish();
const beforeMiB = peakMiB();
let sorted: Float64Array = offsets;
answer({ ready: true });

for (;;) {
  const { value: order, done } = await lines.next();
  if (done) break;
  const begin = performance.now();
  const cpuBefore = process.cpuUsage();
  if (order === 'try') {
    const { count } = tryLimits(sorted, { lowPpm: -9 - Math.random(), highPpm: 9.5 });
    const ms = performance.now() - begin;
    answer({ ms, cpuMs: cpuSince(cpuBefore), beforeMiB, peakMiB: peakMiB(), figures: { count } });
    continue;
  }
  const { result, sortedPpm } = analyseLot({
    units,
    criteria: job.criteria,
    refusedRows: 0,
    identify: () => ({ serial: '', uploadId: '' }),
  });
  const ms = performance.now() - begin;
  const cpuMs = cpuSince(cpuBefore);
  sorted = sortedPpm;
  answer({ ms, cpuMs, beforeMiB, peakMiB: peakMiB(), figures: figuresOf(result) });
}

function figuresOf(result: AnalysisResult): Record<string, number | null> {
  const { offset, shape, beyond, shareBeyond, capability, tolerance } = result;
  const method = (name: string) => shareBeyond.find((each) => each.method === name);
  const figures: Record<string, number | null> = {
    mean: offset.meanPpm,
    'standard deviation': offset.sdPpm,
    skewness: shape.skewness,
    'excess kurtosis': shape.excessKurtosis,
    '0.1 % quantile': result.quantiles[0]!.ppm,
    median: offset.medianPpm,
    'Anderson-Darling': shape.andersonDarling?.a2 ?? null,
    'its p': shape.andersonDarling?.p ?? null,
    outliers: result.outliers.count,
    "Ashman's D": result.clusters.criterion,
    'beyond, counted': beyond.limits.count,
    'beyond, upper bound': beyond.limits.upperBound,
    'beyond, plug-in': method('normal_plug_in')?.estimate ?? null,
    'beyond, unbiased': method('normal_unbiased')?.estimate ?? null,
    'beyond, normal upper bound': method('normal_unbiased')?.upperBound ?? null,
    Pp: capability.pp,
    Ppk: capability.ppk,
    'Ppk, lower bound': capability.ppkLowerBound,
    'tolerance interval, high': tolerance?.highPpm ?? null,
  };
  for (const link of result.links) {
    const of = (name: string) => `${link.receiverName}: ${name}`;
    figures[of('left')] = link.beyondSymbolRate.share;
    figures[of('left, bound')] = link.beyondSymbolRate.upperBound;
    figures[of('several')] = link.severalSamples.share;
    figures[of('several, bound')] = link.severalSamples.upperBound;
    figures[of('outside')] = link.outsideFrontEnd.share;
    figures[of('outside, bound')] = link.outsideFrontEnd.upperBound;
  }
  return figures;
}

/** Greatest resident memory so far, in MiB. */
function peakMiB(): number {
  const status = readFileSync('/proc/self/status', 'utf8');
  return Number(/VmHWM:\s+(\d+)/.exec(status)?.[1] ?? NaN) / 1024;
}

function cpuSince(before: NodeJS.CpuUsage): number {
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1000;
}

function answer(value: object): void {
  process.stdout.write(`${JSON.stringify(value)}\n`);
}
