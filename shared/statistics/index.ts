/** The public names of the statistics: everything here is pure and runs in the browser and on the server alike. */
export { StatisticsError, type StatisticsErrorCode } from './errors';
export { type Limits, requireLimits } from './limits';
export { countBelow, countUpTo, sortedAscending } from './sorted';
export { lag1Autocorrelation, moments, type Moments } from './moments';
export {
  interquartileRange,
  median,
  quantile,
  QUANTILE_TYPES,
  type QuantileType,
} from './quantiles';
export {
  type BinRule,
  freedmanDiaconisWidth,
  histogram,
  type Histogram,
  type HistogramOptions,
  scottWidth,
} from './histogram';
export { andersonDarling, type NormalityTest } from './normality';
export { type EsdStep, type EsdTest, generalisedEsd, grubbs, type GrubbsTest } from './outliers';
export { CLUSTER_CRITERIA, type ClusterGroup, type ClusterWarning, twoClusters } from './clusters';
export {
  clopperPearson,
  countBeyond,
  type ObservedBeyond,
  plugInShare,
  shareUpperBound,
  unbiasedShare,
} from './fraction-beyond';
export {
  type Trust,
  type TrustedMethod,
  type TrustEvidence,
  type TrustReason,
  trustworthyMethod,
} from './trust';
export { oneSidedToleranceFactor, toleranceInterval, twoSidedToleranceFactor } from './tolerance';
export { type Capability, capability, type SampleSummary } from './capability';
export { type ChartConstants, chartConstants } from './control-chart';
export {
  lotNormalExceedance,
  lotPairExceedance,
  lotUniformExceedance,
  type NormalPopulation,
  normalPairExceedance,
  normalUniformExceedance,
} from './pair-exceedance';
export {
  describeOffsets,
  DESCRIBED_SHARES,
  type LotDescription,
  offsetHistogram,
} from './describe';
export { assessLimits, type LimitAssessment } from './assess-limits';
export {
  normalCdf,
  normalDensity,
  normalLogCdf,
  normalQuantile,
  normalUpperQuantile,
  normalUpperTail,
} from './distributions/normal';
export { studentTCdf, studentTQuantile, studentTUpperTail } from './distributions/student-t';
export { chiSquareCdf, chiSquareQuantile, chiSquareUpperTail } from './distributions/chi-square';
export { betaCdf, betaQuantile, betaUpperTail } from './distributions/beta';
export { binomialCdf, binomialProbability, binomialUpperTail } from './distributions/binomial';
export { hypergeometricCdf, hypergeometricProbability } from './distributions/hypergeometric';
export {
  noncentralityFor,
  noncentralTCdf,
  noncentralTQuantile,
  noncentralTUpperTail,
} from './distributions/noncentral-t';
