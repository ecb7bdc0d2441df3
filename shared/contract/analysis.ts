import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, IdParams, Instant, houseRoles } from './common';
import { BandStripView } from './lots';
import { DecisionRule, SamplingRule } from './parts';

const finite = z.number();
const maybe = z.number().nullable();

/** Share of units beyond something: counted, with the one-sided exact 95 % upper bound. All shares 0 to 1. */
export const BeyondCount = z.object({ count: z.number().int(), share: finite, upperBound: finite });

export const ShareMethod = z.object({
  method: z.enum(['counted', 'normal_plug_in', 'normal_unbiased', 'normal_upper_bound']),
  label: z.string(),
  estimate: maybe,
  upperBound: maybe,
  trusted: z.boolean(),
  trust: z.string(),
});

export const LinkShares = z.object({
  receiverId: Id,
  receiverRevisionId: Id,
  receiverName: z.string(),
  strictest: z.boolean(),
  allowance: z.object({ totalHz: finite, totalPpm: finite, forUnitPpm: finite }),
  /** Shares 0 to 1 of links made of a unit of this lot and a far end. */
  symbolRate: z.object({ share: finite, lossDb: maybe }),
  severalSamples: z.object({
    share: finite,
    upperBound: finite,
    samplesPerSymbol: z.number().int().nullable(),
  }),
  outsideFrontEnd: z.object({ share: finite, upperBound: finite }),
  beyondSymbolRate: z.object({ share: finite, upperBound: finite }),
  allowedShareBeyond: finite,
  withinAllowed: z.boolean(),
});

export const Finding = z.object({
  decision: z.enum(['accept', 'hold']),
  headline: z.string(),
  reasons: z.array(
    z.object({ kind: z.string(), weight: z.enum(['against', 'for', 'note']), text: z.string() }),
  ),
});

const Point = z.tuple([z.number(), z.number()]);
export const TemperatureFinding = z.object({
  unitsCount: z.number().int(),
  temperaturesC: z.array(finite),
  /** A few units drawn as curves: [temperature in C, offset in ppm]. */
  curves: z.array(z.object({ serial: z.string(), points: z.array(Point), fitted: z.array(Point) })),
  band: z.array(
    z.object({ temperatureC: finite, lowPpm: finite, medianPpm: finite, highPpm: finite }),
  ),
  stability: z.object({
    referenceTemperaturePpm: maybe,
    nominalPpm: maybe,
    middleOfBandPpm: maybe,
    limitPpm: maybe,
    unitsBeyond: z.number().int(),
  }),
  turningPointsC: z.array(finite),
  activityDips: z.array(
    z.object({ serial: z.string(), temperatureC: finite, residualPpm: finite }),
  ),
  notes: z.array(z.string()),
});
export const TimeFinding = z.object({
  serial: z.string(),
  readingsCount: z.number().int(),
  spanS: finite,
  series: z.array(Point), // [elapsed s, offset ppm], thinned by lowest and highest in each stretch
  ageing: z.object({
    model: z.enum(['logarithmic', 'log_linear', 'linear', 'not_determined']),
    oneYearPpm: maybe,
    oneYearHalfWidthPpm: maybe,
    tenYearsPpm: maybe,
    tenYearsHalfWidthPpm: maybe,
    note: z.string(),
  }),
  allanDeviation: z.array(z.object({ tauS: finite, overlapping: finite, plain: maybe })),
});

/** What the computation makes of one set of readings. Frozen as text when a disposition is signed on it. */
export const AnalysisResult = z.object({
  methodVersion: z.string(),
  units: z.number().int(),
  readings: z.number().int(),
  unitsPlanned: z.number().int(),
  /** Units not yet read at every required temperature. */
  unitsLackingTemperatures: z.number().int(),
  lotSize: z.number().int(),
  referenceTemperatureC: finite,
  nominalFrequencyHz: z.string(),
  offset: z.object({
    meanPpm: finite,
    sdPpm: finite,
    medianPpm: finite,
    minPpm: finite,
    maxPpm: finite,
  }),
  quantiles: z.array(z.object({ probability: finite, ppm: finite })),
  shape: z.object({
    skewness: maybe,
    excessKurtosis: maybe,
    andersonDarling: z.object({ a2: finite, adjusted: finite, p: finite }).nullable(),
  }),
  outliers: z.object({ method: z.string(), count: z.number().int(), valuesPpm: z.array(finite) }),
  clusters: z.object({ suspected: z.boolean(), text: z.string(), criterion: maybe }),
  capability: z.object({ pp: maybe, ppk: maybe, ppkLowerBound: maybe }),
  tolerance: z
    .object({ coverage: finite, confidence: finite, lowPpm: finite, highPpm: finite })
    .nullable(),
  limits: z.object({ lowPpm: maybe, highPpm: maybe }),
  allowance: z.object({ lowPpm: finite, highPpm: finite, receiverName: z.string() }).nullable(),
  beyond: z.object({ limits: BeyondCount, allowance: BeyondCount.nullable() }),
  shareBeyond: z.array(ShareMethod),
  guardBand: z.object({
    rule: DecisionRule,
    guardBandPpm: finite,
    expandedUncertaintyPpm: maybe,
    conforming: z.number().int(),
    notProven: z.number().int(),
    nonconforming: z.number().int(),
    text: z.string(),
  }),
  risk: z.object({ consumersGlobal: maybe, producersGlobal: maybe }),
  uncertaintyOfMeanPpm: maybe,
  sampling: z.object({
    rule: SamplingRule,
    text: z.string(),
    sampleSize: z.number().int(),
    acceptanceNumber: z.number().int().nullable(),
    rejectionNumber: z.number().int().nullable(),
    k: maybe,
    qualityIndex: maybe,
    met: z.boolean().nullable(),
    source: z.string(),
    operatingCharacteristic: z.array(Point), // [percent nonconforming, probability of acceptance]
  }),
  histogram: z.object({ edgesPpm: z.array(finite), counts: z.array(z.number().int()) }),
  /** Normal probability plot, at most 512 points: [standard normal quantile, offset in ppm]. */
  probabilityPlot: z.array(Point),
  unitsBeyond: z.array(
    z.object({
      serial: z.string(),
      offsetPpm: finite,
      beyond: z.enum(['limits', 'allowance', 'both']),
      fileLine: z.number().int(),
      uploadId: Id,
    }),
  ),
  unitsBeyondTruncated: z.boolean(),
  links: z.array(LinkShares),
  budget: z
    .object({
      contributions: z.array(z.object({ name: z.string(), ppm: finite })),
      worstCasePpm: finite,
      rootSumSquarePpm: finite,
      allowancePpm: finite,
      marginPpm: finite,
    })
    .nullable(),
  temperature: TemperatureFinding.nullable(),
  time: TimeFinding.nullable(),
  bandStrip: BandStripView,
  finding: Finding,
});
export type AnalysisResult = z.infer<typeof AnalysisResult>;

export const Analysis = AnalysisResult.extend({
  id: Id,
  lotId: Id,
  version: z.number().int(),
  createdAt: Instant,
  frozenAt: Instant.nullable(),
  superseded: z.boolean(),
  inputHash: z.string(),
  criteriaHash: z.string(),
  resultHash: z.string(),
  criteria: z.object({
    partNumber: z.string(),
    partRevision: z.string(),
    effectiveFrom: z.string().nullable(),
    receivers: z.array(z.object({ name: z.string(), revision: z.string() })),
    bench: z.string().nullable(),
  }),
});
export type Analysis = z.infer<typeof Analysis>;

export const readAnalysis = endpoint({
  method: 'get',
  path: '/api/lots/:id/analysis',
  roles: houseRoles,
  params: IdParams,
  summary: 'The analysis of a lot: the current one, or an earlier one by id',
  query: z.object({ analysisId: Id.optional() }),
  answer: Analysis,
});
export const listAnalyses = endpoint({
  method: 'get',
  path: '/api/lots/:id/analyses',
  roles: houseRoles,
  params: IdParams,
  summary: 'All analyses of a lot, newest first',
  answer: z.object({
    items: z.array(
      z.object({
        id: Id,
        version: z.number().int(),
        createdAt: Instant,
        frozenAt: Instant.nullable(),
        superseded: z.boolean(),
        inputHash: z.string(),
        resultHash: z.string(),
      }),
    ),
    next: z.null(),
  }),
});
/** Sorted offsets in ppm as little-endian Float64: what the browser recomputes from when someone tries other limits. */
export const readOffsets = endpoint({
  method: 'get',
  path: '/api/analyses/:id/offsets',
  roles: houseRoles,
  params: IdParams,
  summary: 'Sorted offsets in ppm, Float64 little endian',
  produces: 'application/octet-stream',
});
export const exportAnalysis = endpoint({
  method: 'get',
  path: '/api/analyses/:id/export',
  roles: houseRoles,
  params: IdParams,
  summary: 'The frozen analysis as stored text, with hashes and signatures',
  produces: 'application/json',
});
