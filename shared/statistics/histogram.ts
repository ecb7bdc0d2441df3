import { requireCount, requirePositive, requireWhole } from './checks';
import { type Limits, requireLimits } from './limits';
import { moments } from './moments';
import { interquartileRange } from './quantiles';
import { countBelow, countUpTo } from './sorted';

export type BinRule = 'freedman-diaconis' | 'scott' | { width: number };

/** Bin i holds the values between edges[i] and edges[i + 1]; counts add up to the number of values. */
export interface Histogram {
  edges: number[];
  counts: number[];
}

export interface HistogramOptions {
  rule?: BinRule;
  /** Each limit becomes a bin edge: no bin mixes values inside and beyond. */
  limits?: Limits[];
  /** Most bins wanted, at least 20; 400 unless told. */
  maxBins?: number;
}

/**
 * Freedman-Diaconis bin width 2 IQR n^(-1/3), IQR by type 7 quantiles, in the unit of the values.
 * Zero when half of the values agree. @param sorted ascending
 * @throws StatisticsError when fewer than two values
 * Source: D. Freedman and P. Diaconis 1981.
 */
export function freedmanDiaconisWidth(sorted: Float64Array): number {
  requireCount(sorted.length, 'sorted', 2);
  return 2 * interquartileRange(sorted) * Math.cbrt(1 / sorted.length);
}

/**
 * Scott's bin width (24 sqrt(pi)/n)^(1/3) sd, in the unit of the values.
 * @param sd sample standard deviation @param n number of values
 * @throws StatisticsError when n is below two
 * Source: D. W. Scott, On optimal and data-based histograms, 1979.
 */
export function scottWidth(sd: number, n: number): number {
  requireCount(n, 'n', 2);
  return sd * Math.cbrt((24 * Math.sqrt(Math.PI)) / n);
}

/**
 * Histogram in which no bin mixes values inside and beyond a limit: every limit near the values is a bin edge.
 * Bins are open above except that a high limit belongs to the bin below it (a value on a limit conforms) and the last bin
 * holds the maximum. Between limits the width by rule is fitted so that a whole number of bins fills the stretch.
 * Far values do not coarsen the middle: what lies further out than `maxBins` allows shares one wide bin a side, cut at the
 * limits. Freedman-Diaconis falls back to Scott when half of the values agree; values that all agree fill one bin.
 * @param sorted ascending, finite, at least one value
 * @throws StatisticsError when empty, a fixed width is not above zero, or limits are crossed
 */
export function histogram(sorted: Float64Array, options: HistogramOptions = {}): Histogram {
  requireCount(sorted.length, 'sorted', 1);
  const { rule = 'freedman-diaconis', limits = [], maxBins = 400 } = options;
  limits.forEach(requireLimits);
  requireWhole(maxBins, 'maxBins', 20);
  const min = sorted[0]!;
  const max = sorted[sorted.length - 1]!;
  const highs = new Set(limits.map(({ high }) => high));
  const marks = ascendingUnique(
    limits.flatMap(({ low, high }) => [low, high].filter((value) => value !== null)),
  );
  const width = ruleWidth(sorted, rule) || fallbackWidth(min, marks);
  const budget = maxBins - marks.length - 6;
  const middle = sorted[sorted.length >> 1]!;
  const from = Math.max(min, middle - (budget / 3) * width);
  const to = Math.min(max, middle + (budget / 3) * width);
  const isNear = (mark: number) => mark > from - width && mark < to + width;
  const core = layEdges(from, to, marks.filter(isNear), width);
  const lowest = Math.min(min, core[0]!);
  const highest = Math.max(max, core[core.length - 1]!);
  const edges = ascendingUnique([
    lowest,
    ...core,
    // The last core bin may reach past a limit that was too far off to be laid out for.
    ...marks.filter((mark) => mark > lowest && mark < highest),
    highest,
  ]);
  // A conforming value on the outermost edge needs a bin on the conforming side.
  if (highs.has(edges[0]!) && min === edges[0]) edges.unshift(min - width);
  const top = edges[edges.length - 1]!;
  if (max === top && marks.includes(top) && !highs.has(top)) edges.push(top + width);

  const filled = edges.map((edge) =>
    highs.has(edge) ? countUpTo(sorted, edge) : countBelow(sorted, edge),
  );
  filled[filled.length - 1] = sorted.length;
  return { edges, counts: filled.slice(1).map((count, i) => count - filled[i]!) };
}

function ruleWidth(sorted: Float64Array, rule: BinRule): number {
  if (typeof rule === 'object') {
    requirePositive(rule.width, 'rule.width');
    return rule.width;
  }
  if (sorted.length < 2) return 0;
  const width = rule === 'scott' ? 0 : freedmanDiaconisWidth(sorted);
  return width > 0 ? width : scottWidth(moments(sorted).sd, sorted.length);
}

/** A width for values that all agree: a fraction of the limits' span, else of the value itself, else one. */
function fallbackWidth(value: number, marks: number[]): number {
  if (marks.length > 1) return (marks[marks.length - 1]! - marks[0]!) / 20;
  return value === 0 ? 1 : Math.abs(value) * 1e-3;
}

/** Edges covering [from, to] with every mark among them. */
function layEdges(from: number, to: number, marks: number[], width: number): number[] {
  if (marks.length === 0) {
    if (from === to) return [from - width / 2, from + width / 2];
    return divide(from, to, Math.max(1, Math.ceil((to - from) / width)));
  }
  const first = marks[0]!;
  const last = marks[marks.length - 1]!;
  const gaps = marks.slice(1).map((mark, i) => mark - marks[i]!);
  const longest = Math.max(0, ...gaps);
  const fitted = longest > width ? longest / Math.round(longest / width) : width;
  const below = Math.ceil((first - from) / fitted);
  const above = Math.ceil((to - last) / fitted);
  const edges: number[] = [];
  for (let k = below; k > 0; k -= 1) edges.push(first - k * fitted);
  if (below > 0) edges[0] = Math.min(edges[0]!, from);
  edges.push(first);
  gaps.forEach((gap, i) => {
    const bins = Math.max(1, Math.round(gap / fitted));
    edges.push(...divide(marks[i]!, marks[i + 1]!, bins).slice(1));
  });
  for (let k = 1; k <= above; k += 1) edges.push(last + k * fitted);
  if (above > 0) edges[edges.length - 1] = Math.max(edges[edges.length - 1]!, to);
  return edges.length > 1 ? edges : [first - fitted, first, first + fitted];
}

function divide(from: number, to: number, bins: number): number[] {
  const edges = Array.from({ length: bins }, (_, i) => from + (i * (to - from)) / bins);
  edges.push(to);
  return edges;
}

function ascendingUnique(values: number[]): number[] {
  return [...new Set(values)].sort((a, b) => a - b);
}
