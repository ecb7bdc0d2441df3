/** The likelier of the fits, beside one normal for comparison. */
export interface NormalMixture {
  groups: [MixtureGroup, MixtureGroup];
  logLikelihood: number;
  /** Log likelihood of one normal with the values' own mean and (divisor n) variance. */
  oneNormalLogLikelihood: number;
}

export interface MixtureGroup {
  mean: number;
  sd: number;
  share: number;
}

/** Neighbours in order, taken together: their mean, their count and the squares inside. */
interface Reduced {
  means: Float64Array;
  counts: Float64Array;
  squares: Float64Array;
  n: number;
}

const GROUPS = 512;
const MOST_STEPS = 200;
/** So many factors of at most 2 stay far from overflow. */
const MOST_FACTORS = 512;
const LOG_ROOT_TWO_PI = 0.5 * Math.log(2 * Math.PI);

/**
 * Two normal components fitted by expectation-maximisation, from three starts: the split that halves the spread best, and the
 * outer tenth on either side. Above 1,024 values the sorted run is first reduced to 512 equal groups of neighbours, whose
 * inner spread is kept in the variances.
 * @param sorted ascending, not all equal @param leastSd floor of a component's standard deviation, above zero
 * @returns the likelier fit, the lower mean first; null when a component runs empty from every start
 * Source: Dempster, Laird and Rubin 1977.
 */
export function fitTwoNormals(sorted: Float64Array, leastSd: number): NormalMixture | null {
  const data = reduce(sorted);
  const variance = varianceOf(data);
  const floor = Math.max(leastSd, 1e-6 * Math.sqrt(variance));
  const size = data.means.length;
  const splits = [bestSplit(data), Math.ceil(size / 10), Math.floor((9 * size) / 10)];
  let best: Climb | null = null;
  for (const split of new Set(splits)) {
    const fit = climb(data, split, floor);
    if (fit !== null && (best === null || fit.logLikelihood > best.logLikelihood)) best = fit;
  }
  if (best === null) return null;
  return {
    ...best,
    oneNormalLogLikelihood: -data.n * (LOG_ROOT_TWO_PI + 0.5 * Math.log(variance) + 0.5),
  };
}

type Climb = Pick<NormalMixture, 'groups' | 'logLikelihood'>;

function climb(data: Reduced, split: number, floor: number): Climb | null {
  const size = data.means.length;
  const firstShare = new Float64Array(size).fill(1, 0, split);
  let logLikelihood = -Infinity;
  let groups: [MixtureGroup, MixtureGroup] | null = null;
  for (let step = 0; step < MOST_STEPS; step += 1) {
    groups = maximise(data, firstShare, floor);
    if (groups === null) return null;
    const before = logLikelihood;
    logLikelihood = expect(data, groups, firstShare);
    if (logLikelihood - before < 1e-4 + 1e-9 * Math.abs(logLikelihood)) break;
  }
  if (groups === null) return null;
  const [a, b] = groups;
  return { groups: a.mean <= b.mean ? [a, b] : [b, a], logLikelihood };
}

function maximise(
  { means, counts, squares, n }: Reduced,
  firstShare: Float64Array,
  floor: number,
): [MixtureGroup, MixtureGroup] | null {
  let w1 = 0;
  let x1 = 0;
  let x2 = 0;
  for (let i = 0; i < means.length; i += 1) {
    const w = counts[i]! * firstShare[i]!;
    w1 += w;
    x1 += w * means[i]!;
    x2 += (counts[i]! - w) * means[i]!;
  }
  const w2 = n - w1;
  if (!(w1 > 1) || !(w2 > 1)) return null;
  const m1 = x1 / w1;
  const m2 = x2 / w2;
  let s1 = 0;
  let s2 = 0;
  for (let i = 0; i < means.length; i += 1) {
    const f = firstShare[i]!;
    const d1 = means[i]! - m1;
    const d2 = means[i]! - m2;
    s1 += f * (counts[i]! * d1 * d1 + squares[i]!);
    s2 += (1 - f) * (counts[i]! * d2 * d2 + squares[i]!);
  }
  return [
    { mean: m1, sd: Math.max(floor, Math.sqrt(s1 / w1)), share: w1 / n },
    { mean: m2, sd: Math.max(floor, Math.sqrt(s2 / w2)), share: w2 / n },
  ];
}

/** Fills in how far each group of neighbours belongs to the first component; returns the log likelihood. */
function expect(
  { means, counts, squares }: Reduced,
  [a, b]: [MixtureGroup, MixtureGroup],
  firstShare: Float64Array,
): number {
  const logA = Math.log(a.share / a.sd) - LOG_ROOT_TWO_PI;
  const logB = Math.log(b.share / b.sd) - LOG_ROOT_TWO_PI;
  const weightA = -0.5 / (a.sd * a.sd);
  const weightB = -0.5 / (b.sd * b.sd);
  let sum = 0;
  // Groups hold one of two counts, so the logarithms of a count can be taken of the product of its terms, each from 1 to 2.
  const fewest = counts[0]!;
  const others = counts.find((count) => count !== fewest) ?? fewest;
  let ofFewest = 1;
  let ofOthers = 1;
  for (let i = 0; i < means.length; i += 1) {
    const da = means[i]! - a.mean;
    const db = means[i]! - b.mean;
    const inner = squares[i]! / counts[i]!;
    const la = logA + weightA * (da * da + inner);
    const lb = logB + weightB * (db * db + inner);
    const top = la > lb ? la : lb;
    const rest = Math.exp(la > lb ? lb - la : la - lb);
    sum += counts[i]! * top;
    if (counts[i]! === fewest) ofFewest *= 1 + rest;
    else ofOthers *= 1 + rest;
    if (i % MOST_FACTORS === MOST_FACTORS - 1 || i === means.length - 1) {
      sum += fewest * Math.log(ofFewest) + others * Math.log(ofOthers);
      ofFewest = 1;
      ofOthers = 1;
    }
    firstShare[i] = la > lb ? 1 / (1 + rest) : rest / (1 + rest);
  }
  return sum;
}

function reduce(sorted: Float64Array): Reduced {
  const n = sorted.length;
  const size = n <= 2 * GROUPS ? n : GROUPS;
  const means = new Float64Array(size);
  const counts = new Float64Array(size);
  const squares = new Float64Array(size);
  for (let g = 0; g < size; g += 1) {
    const from = Math.floor((g * n) / size);
    const to = Math.floor(((g + 1) * n) / size);
    const first = sorted[from]!;
    let s1 = 0;
    let s2 = 0;
    for (let i = from; i < to; i += 1) {
      const d = sorted[i]! - first;
      s1 += d;
      s2 += d * d;
    }
    counts[g] = to - from;
    means[g] = first + s1 / (to - from);
    squares[g] = Math.max(0, s2 - (s1 * s1) / (to - from));
  }
  return { means, counts, squares, n };
}

/** Split index with the largest spread between the two sides (Otsu's criterion). */
function bestSplit({ means, counts, n }: Reduced): number {
  const origin = means[0]!;
  let total = 0;
  for (let i = 0; i < means.length; i += 1) total += counts[i]! * (means[i]! - origin);
  let weight = 0;
  let sum = 0;
  let best = 1;
  let largest = -1;
  for (let i = 0; i < means.length - 1; i += 1) {
    weight += counts[i]!;
    sum += counts[i]! * (means[i]! - origin);
    const gap = sum / weight - (total - sum) / (n - weight);
    const between = weight * (n - weight) * gap * gap;
    if (between > largest) {
      largest = between;
      best = i + 1;
    }
  }
  return best;
}

/** Variance of all values, divisor n. */
function varianceOf({ means, counts, squares, n }: Reduced): number {
  const origin = means[means.length >> 1]!;
  let s1 = 0;
  let s2 = 0;
  for (let i = 0; i < means.length; i += 1) {
    const d = means[i]! - origin;
    s1 += counts[i]! * d;
    s2 += counts[i]! * d * d + squares[i]!;
  }
  return (s2 - (s1 * s1) / n) / n;
}
