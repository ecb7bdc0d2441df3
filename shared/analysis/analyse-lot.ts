import { type z } from 'zod';
import { type AnalysisResult, type ShareMethod } from '../contract/analysis';
import { globalRisk } from '../decision/global-risk';
import { acceptanceLimits } from '../decision/guard-band';
import { lotFinding } from '../decision/lot-finding';
import { lotMeanUncertainty } from '../decision/lot-mean-uncertainty';
import { countVerdicts } from '../decision/unit-verdict';
import { ppm } from '../format/ppm';
import { operatingCharacteristic } from '../sampling/operating-characteristic';
import { planFor, type SamplingPlan } from '../sampling/plan';
import { variablesVerdict } from '../sampling/variables-criterion';
import { widenPlan } from '../sampling/widen-plan';
import { assessLimits, type LimitAssessment } from '../statistics/assess-limits';
import { describeOffsets, offsetHistogram, type LotDescription } from '../statistics/describe';
import { normalQuantile } from '../statistics/distributions/normal';
import { clopperPearson } from '../statistics/fraction-beyond';
import { andersonDarling } from '../statistics/normality';
import { moments } from '../statistics/moments';
import { countBelow, countUpTo } from '../statistics/sorted';
import { toleranceInterval } from '../statistics/tolerance';
import { countBeyondBounds, farthestBeyond, isBeyond, type Bounds } from './beyond-units';
import { type AnalysisCriteria } from './criteria';
import { judgeLinks, partBudget } from './links';
import { settledOnLimits } from './on-limits';
import { describeTemperature } from './temperature';
import { describeTime } from './time';
import { type MeasuredUnits, type UnitPlace } from './units';

/** Raised whenever the same readings would give another result. Part of every analysis and of its hash. */
export const METHOD_VERSION = '1';

const CONFIDENCE = 0.95;
/** Marks drawn one by one on a band strip; the exact count stands beside it. */
const MOST_MARKS = 60;
const STRIP_BINS = 60;

export interface LotInput {
  units: MeasuredUnits;
  criteria: AnalysisCriteria;
  refusedRows: number;
  /** Serial and upload of a unit; asked for listed units only. */
  identify: (place: UnitPlace) => { serial: string; uploadId: string };
}

/** A lot can be analysed once one unit has an offset at the reference temperature. */
export function canAnalyse(units: MeasuredUnits): boolean {
  return units.offsetsPpm.length > 0;
}

/**
 * Everything that is said of a lot, from its readings and the criteria it is judged by. Pure: the same input gives the same
 * result, digit by digit, on the server and in the browser.
 * @throws StatisticsError | RadioError | ResonatorError naming the argument that is out of range
 */
export function analyseLot({ units, criteria, refusedRows, identify }: LotInput): {
  result: AnalysisResult;
  sortedPpm: Float64Array;
} {
  const part = criteria.part.criteria;
  const limits: Bounds = { lowPpm: part.toleranceLowPpm, highPpm: part.toleranceHighPpm };
  const offsetsPpm = settledOnLimits(units.offsetsPpm, limits);
  const lot = describeOffsets(offsetsPpm);
  const assessed = assessLimits(lot, { low: limits.lowPpm, high: limits.highPpm }, CONFIDENCE);
  const wholeLot = lot.units >= criteria.lotSize;
  const links = judgeLinks(lot.sortedPpm, part, criteria.receivers, wholeLot);
  const strictest = links[0] ?? null;
  const allowance = strictest && {
    // Nothing left is an allowance of no width; 0 less it keeps a zero from becoming minus zero.
    lowPpm: 0 - Math.max(0, strictest.allowance.forUnitPpm),
    highPpm: Math.max(0, strictest.allowance.forUnitPpm),
    receiverName: strictest.receiverName,
  };
  const severity = criteria.severity === 'discontinued' ? 'tightened' : criteria.severity;
  const plan = planFor(criteria.samplingRule, criteria.lotSize, severity);
  const guard = guardOf(lot.sortedPpm, limits, criteria);
  const sampling = samplingOf(plan, lot, limits, guard.refused);
  const body = bodyNormality(lot);
  const beyondAllowance = allowance && countBeyondBounds(lot.sortedPpm, allowance);
  const beyond = {
    limits: {
      count: assessed.observed.count,
      share: assessed.observed.share,
      upperBound: assessed.observed.upperBound,
    },
    allowance:
      beyondAllowance === null
        ? null
        : {
            count: beyondAllowance,
            share: beyondAllowance / lot.units,
            upperBound: clopperPearson(beyondAllowance, lot.units, CONFIDENCE).upperBound,
          },
  };
  const finding = lotFinding({
    units: { measured: lot.units, lotSize: criteria.lotSize },
    limits,
    beyond: { ...beyond.limits, confidence: CONFIDENCE },
    guard: {
      rule: part.decisionRule,
      guardBandPpm: guard.guardBandPpm,
      notProvenInside: guard.notProvenInside,
      notProvenOutside: guard.notProvenOutside,
    },
    plan,
    variables: sampling.variables,
    links: worstLinks(links),
    normality: body,
    outliers: lot.outliers?.outliers.length ?? 0,
    clusterCentresPpm: lot.clusters?.mixed ? lot.clusters.groups?.map((group) => group.mean) : null,
    bench: criteria.bench && {
      ...criteria.bench,
      calibrationRequired: part.requireBenchInCalibration,
    },
    refusedRows,
    inspectionState: criteria.severity,
  });
  const listed = farthestBeyond(
    offsetsPpm,
    lot.sortedPpm,
    allowance ? [limits, allowance] : [limits],
  );
  const placeOf = (i: number): UnitPlace => ({
    uploadNumber: units.uploadNumbers[i]!,
    fileLine: units.fileLines[i]!,
  });
  const unitsBeyond = listed.indices.map((i) => {
    const offsetPpm = offsetsPpm[i]!;
    const beyondLimits = isBeyond(offsetPpm, limits);
    const both = beyondLimits && allowance !== null && isBeyond(offsetPpm, allowance);
    return {
      ...identify(placeOf(i)),
      fileLine: placeOf(i).fileLine,
      offsetPpm,
      beyond: both
        ? ('both' as const)
        : beyondLimits
          ? ('limits' as const)
          : ('allowance' as const),
    };
  });
  const summary = { n: lot.units, mean: lot.meanPpm, sd: lot.sdPpm ?? 0 };
  const tolerance = summary.sd > 0 ? toleranceInterval(summary, 0.99, CONFIDENCE) : null;
  const histogramLimits = { low: limits.lowPpm, high: limits.highPpm };
  const drawn = offsetHistogram(lot, { limits: [histogramLimits] });

  const result: AnalysisResult = {
    methodVersion: METHOD_VERSION,
    units: lot.units,
    readings: units.readings,
    unitsPlanned: plan.sampleSize,
    unitsLackingTemperatures: units.unitsLackingTemperatures,
    lotSize: criteria.lotSize,
    referenceTemperatureC: part.referenceTemperatureC,
    nominalFrequencyHz: part.nominalFrequencyHz,
    offset: {
      meanPpm: lot.meanPpm,
      sdPpm: lot.sdPpm ?? 0,
      medianPpm: lot.medianPpm,
      minPpm: lot.minPpm,
      maxPpm: lot.maxPpm,
    },
    quantiles: lot.quantilesPpm.map(({ share, offsetPpm }) => ({
      probability: share,
      ppm: offsetPpm,
    })),
    shape: {
      skewness: lot.skewness,
      excessKurtosis: lot.excessKurtosis,
      andersonDarling: lot.normality && {
        a2: lot.normality.a2,
        adjusted: lot.normality.a2Adjusted,
        p: lot.normality.p,
      },
    },
    outliers: {
      method: 'generalised ESD, 5 %',
      count: lot.outliers?.outliers.length ?? 0,
      valuesPpm: lot.outliers?.outliers ?? [],
    },
    clusters: clustersOf(lot),
    capability: {
      pp: assessed.capability?.pp ?? null,
      ppk: assessed.capability?.ppk ?? null,
      ppkLowerBound: assessed.capability?.ppkLowerBound ?? null,
    },
    tolerance: tolerance && {
      coverage: 0.99,
      confidence: CONFIDENCE,
      lowPpm: tolerance.low!,
      highPpm: tolerance.high!,
    },
    limits,
    allowance,
    beyond,
    shareBeyond: shareMethods(assessed),
    guardBand: {
      rule: part.decisionRule,
      guardBandPpm: guard.guardBandPpm,
      expandedUncertaintyPpm: criteria.bench?.expandedUncertaintyPpm ?? null,
      conforming: guard.conforming,
      notProven: guard.notProvenInside + guard.notProvenOutside,
      nonconforming: guard.nonconforming,
      text: guard.text,
    },
    risk: riskOf(lot, limits, criteria),
    uncertaintyOfMeanPpm: uncertaintyOfMean(lot, criteria),
    sampling: sampling.view,
    histogram: { edgesPpm: drawn.edges, counts: drawn.counts },
    probabilityPlot: probabilityPlot(lot.sortedPpm),
    unitsBeyond,
    unitsBeyondTruncated: listed.truncated,
    links,
    budget:
      strictest &&
      partBudget(
        part,
        criteria.receivers.find((r) => r.revisionId === strictest.receiverRevisionId)!.criteria,
      ),
    temperature:
      units.temperature &&
      describeTemperature(units.temperature, part, (curve) => identify(curve.place).serial),
    time: units.series && describeTime(units.series, identify(units.series.place).serial),
    bandStrip: {
      unitsCount: lot.units,
      meanPpm: lot.meanPpm,
      sdPpm: lot.sdPpm,
      lowLimitPpm: limits.lowPpm,
      highLimitPpm: limits.highPpm,
      guardBandPpm: guard.guardBandPpm,
      allowanceLowPpm: allowance?.lowPpm ?? null,
      allowanceHighPpm: allowance?.highPpm ?? null,
      histogram: stripHistogram(lot, histogramLimits),
      beyondPpm: unitsBeyond
        .filter((u) => u.beyond !== 'allowance')
        .slice(0, MOST_MARKS)
        .map((u) => u.offsetPpm),
      beyondCount: assessed.observed.count,
    },
    finding,
  };
  return { result, sortedPpm: lot.sortedPpm };
}

function guardOf(sortedPpm: Float64Array, limits: Bounds, { part, bench }: AnalysisCriteria) {
  const rule = part.criteria.decisionRule;
  const uncertainty = bench?.expandedUncertaintyPpm ?? 0;
  const counts = countVerdicts(sortedPpm, limits, rule, uncertainty);
  const { guardBandPpm } = acceptanceLimits(limits, rule, uncertainty);
  const names = {
    simple: 'Simple acceptance',
    guardedAcceptance: 'Guarded acceptance',
    guardedRejection: 'Guarded rejection',
  } as const;
  const stated = bench
    ? `U = ${ppm(uncertainty)} (k = ${bench.coverageFactor}), ${bench.name}`
    : 'no bench named, so no uncertainty is known';
  return { ...counts, guardBandPpm, text: `${names[rule.kind]}, ${stated}.` };
}

/** The plan's outcome on what the decision rule takes. */
function samplingOf(plan: SamplingPlan, lot: LotDescription, limits: Bounds, refused: number) {
  const widened = widenPlan(plan, lot.units);
  const enough = lot.units >= plan.sampleSize;
  const variables =
    plan.kind === 'variables' && lot.units >= 3 && lot.sdPpm !== null && lot.sdPpm > 0
      ? variablesVerdict(
          { units: lot.units, meanPpm: lot.meanPpm, sdPpm: lot.sdPpm },
          limits,
          plan.k,
        )
      : null;
  const acceptanceNumber = 'acceptanceNumber' in widened ? widened.acceptanceNumber : null;
  const passed =
    plan.kind === 'variables'
      ? (variables?.met ?? null)
      : refused < ('rejectionNumber' in widened ? widened.rejectionNumber : 1);
  const curve = operatingCharacteristic(widened);
  const sources = {
    attribute:
      'MIL-STD-105E tables I and II, recalled and checked for consistency; the curve is recomputed.',
    zeroAcceptance: 'Recomputed: exact hypergeometric sample size.',
    variables:
      'k recomputed from the noncentral t to match the attribute plan; MIL-STD-414 k shown where its table is known.',
    everyUnit: 'Every unit is measured; nothing is inferred.',
  } as const;
  return {
    variables,
    view: {
      rule: ruleOf(plan),
      text: widened.description,
      sampleSize: plan.sampleSize,
      acceptanceNumber,
      rejectionNumber: 'rejectionNumber' in widened ? widened.rejectionNumber : null,
      k: plan.kind === 'variables' ? plan.k : null,
      qualityIndex: variables?.qualityIndex ?? null,
      met: enough ? passed : passed === false ? false : null,
      source: sources[plan.kind],
      operatingCharacteristic: curve.points.map((p): [number, number] => [
        p.percentNonconforming,
        p.acceptanceProbability,
      ]),
    },
  };
}

function ruleOf(plan: SamplingPlan): AnalysisResult['sampling']['rule'] {
  switch (plan.kind) {
    case 'attribute':
    case 'variables':
      return { kind: plan.kind, level: plan.level, aqlPercent: plan.aqlPercent };
    case 'zeroAcceptance':
      return {
        kind: plan.kind,
        limitingQualityPercent: plan.limitingQualityPercent,
        consumersRisk: plan.consumersRisk,
      };
    case 'everyUnit':
      return { kind: plan.kind, allowedNonconforming: plan.acceptanceNumber };
  }
}

function worstLinks(links: AnalysisResult['links']) {
  if (links.length === 0) return null;
  // The one that decides: a receiver whose bound is not within what it allows, else the strictest.
  const failing = links
    .filter((l) => !l.withinAllowed)
    .sort(
      (a, b) =>
        b.beyondSymbolRate.upperBound / b.allowedShareBeyond -
        a.beyondSymbolRate.upperBound / a.allowedShareBeyond,
    );
  const worst = failing[0] ?? links[0]!;
  return {
    receiverName: worst.receiverName,
    shareOutside: worst.beyondSymbolRate.share,
    upperBound: worst.beyondSymbolRate.upperBound,
    allowedShare: worst.allowedShareBeyond,
  };
}

/** Normality of the lot without its outliers: are the few beyond strays, or is the process wide? */
function bodyNormality(lot: LotDescription): { a2: number; p: number } | null {
  const outliers = lot.outliers?.outliers ?? [];
  if (outliers.length === 0) return lot.normality && { a2: lot.normality.a2, p: lot.normality.p };
  // Outliers stand at the ends of the sorted lot, and so does what agrees with one of them.
  const low = outliers.filter((value) => value < lot.medianPpm);
  const high = outliers.filter((value) => value >= lot.medianPpm);
  const body = lot.sortedPpm.subarray(
    low.length > 0 ? countUpTo(lot.sortedPpm, Math.max(...low)) : 0,
    high.length > 0 ? countBelow(lot.sortedPpm, Math.min(...high)) : lot.units,
  );
  if (body.length < 8) return null;
  const { mean, sd } = moments(body);
  if (!(sd > 0)) return null;
  const { a2, p } = andersonDarling(body, mean, sd);
  return { a2, p };
}

function clustersOf(lot: LotDescription): AnalysisResult['clusters'] {
  const { clusters } = lot;
  if (!clusters)
    return { suspected: false, text: 'Too few units to look for two groups.', criterion: null };
  if (!clusters.mixed || !clusters.groups)
    return { suspected: false, text: 'One group.', criterion: clusters.separation };
  const [low, high] = clusters.groups;
  return {
    suspected: true,
    text: `Two groups, about ${ppm(low.mean, { sign: 'always' })} and ${ppm(high.mean, { sign: 'always' })}: mixed blanks?`,
    criterion: clusters.separation,
  };
}

type Method = z.infer<typeof ShareMethod>;

function shareMethods({ observed, normal, trust }: LimitAssessment): Method[] {
  const trustsNormal = trust.method === 'normal';
  const doubt: Record<string, string> = {
    two_clusters: 'no: two groups',
    outliers: 'no: outliers present',
    not_normal: 'no: not normal',
    too_few_to_check: 'no: too few units to check',
    no_spread: 'no: no spread',
    count_decides: 'not needed: the count is precise',
    looks_normal: 'yes: nothing speaks against normal',
  };
  const normalTrust = doubt[trust.reasons[0] ?? 'looks_normal']!;
  const counted: Method = {
    method: 'counted',
    label: 'Counted, exact binomial',
    estimate: observed.share,
    upperBound: observed.upperBound,
    trusted: true,
    trust: 'yes: makes no assumption',
  };
  if (!normal) return [counted];
  return [
    counted,
    {
      method: 'normal_plug_in',
      label: 'Normal, plug-in',
      estimate: normal.plugIn,
      upperBound: null,
      trusted: false,
      trust: 'no: biased, for comparison only',
    },
    {
      method: 'normal_unbiased',
      label: 'Normal, unbiased',
      estimate: normal.unbiased,
      upperBound: normal.upperBound,
      trusted: trustsNormal,
      trust: normalTrust,
    },
  ];
}

function riskOf(
  lot: LotDescription,
  limits: Bounds,
  { part, bench }: AnalysisCriteria,
): AnalysisResult['risk'] {
  if (!bench || lot.sdPpm === null || lot.sdPpm === 0)
    return { consumersGlobal: null, producersGlobal: null };
  const standardPpm = bench.expandedUncertaintyPpm / bench.coverageFactor;
  // What the readings show is the process and the measurement together; the process alone is narrower.
  const processSdPpm = Math.sqrt(
    Math.max(lot.sdPpm ** 2 - standardPpm ** 2, (lot.sdPpm * 0.1) ** 2),
  );
  const acceptance = acceptanceLimits(
    limits,
    part.criteria.decisionRule,
    bench.expandedUncertaintyPpm,
  );
  if (acceptance.empty) return { consumersGlobal: null, producersGlobal: null };
  const risk = globalRisk(
    { meanPpm: lot.meanPpm, sdPpm: processSdPpm },
    standardPpm,
    limits,
    acceptance,
  );
  return { consumersGlobal: risk.consumersRisk, producersGlobal: risk.producersRisk };
}

/** Standard uncertainty of the lot mean; the time base is common to all units and does not average out. */
function uncertaintyOfMean(
  lot: LotDescription,
  { bench, lotSize }: AnalysisCriteria,
): number | null {
  if (!bench || lot.sdPpm === null || lot.units < 2) return null;
  const timeBaseStandardPpm = bench.expandedUncertaintyPpm / bench.coverageFactor;
  // A lot without spread leaves the time base alone.
  if (lot.sdPpm === 0) return timeBaseStandardPpm;
  return lotMeanUncertainty({
    sessions: [
      {
        units: lot.units,
        timeBase: bench.name,
        timeBaseStandardPpm,
      },
    ],
    spreadPpm: lot.sdPpm,
    lotSize: Math.max(lotSize, lot.units),
  }).combinedPpm;
}

/** Blom's plotting positions (i - 3/8)/(n + 1/4), common practice; thinned to 512 points with both tails kept whole. */
function probabilityPlot(sortedPpm: Float64Array): [number, number][] {
  const n = sortedPpm.length;
  const most = 512;
  const tail = 64;
  const stride = Math.max(1, Math.ceil((n - 2 * tail) / (most - 2 * tail)));
  const points: [number, number][] = [];
  for (let i = 0; i < n;) {
    points.push([normalQuantile((i + 1 - 0.375) / (n + 0.25)), sortedPpm[i]!]);
    if (n <= most || i < tail || i >= n - tail) i += 1;
    else i = Math.min(i + stride, n - tail);
  }
  return points;
}

/** Coarser bins for the strip: it is drawn in every list row. */
function stripHistogram(lot: LotDescription, limits: { low: number | null; high: number | null }) {
  const { edges, counts } = offsetHistogram(lot, { limits: [limits], maxBins: STRIP_BINS });
  return { edgesPpm: edges, counts };
}
