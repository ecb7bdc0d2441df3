export { RadioError, type RadioErrorCode } from './errors';
export { fractionalOffset, hzToPpm, offsetPpb, offsetPpm, offsetPpmText, ppmToHz } from './offset';
export { makeOffsetPpm, type OffsetReader } from './offset-reader';
export { makeReadingToPpm } from './reading';
export {
  fromHzText,
  toHzText,
  type FrequencyUnit,
  type OffsetUnit,
  type ReadingUnit,
} from './units';
export { dopplerPpm, dopplerShift, SPEED_OF_LIGHT_MPS, type DopplerShift } from './doppler';
export { carrierOffset, timingSlipSymbols, type CarrierOffset } from './carrier-offset';
export {
  CONTRIBUTION_KINDS,
  frequencyBudget,
  type Contribution,
  type ContributionKind,
  type FrequencyBudget,
} from './budget';
export { rectangularSumBeyond } from './rectangular-sum';
export { measuredPairs, normalPair, type MeasuredPairs, type NormalPair } from './lot-pairs';
export { occupiedSymbolRates, rootRaisedCosineSpectrum, type Pulse } from './pulse';
export {
  matchedFilterCurve,
  matchedFilterLoss,
  offsetForLoss,
  symbolRateSinr,
  type MatchedFilterLoss,
  type MatchedFilterPoint,
  type SymbolRateSinr,
} from './matched-filter';
export {
  DEFAULT_SHARE_OF_SYMBOL_RATE,
  regimeBounds,
  regimeBoundsPpm,
  regimeOf,
  samplesPerSymbol,
  type ReceiverBands,
  type Regime,
  type RegimeBounds,
  type RegimeDetail,
  type RegimeOfOffset,
} from './regimes';
export {
  receiverAllowance,
  serviceDrift,
  type Allowance,
  type AllowedRegion,
  type PartDrift,
  type Receiver,
} from './allowance';
export {
  governingReceiver,
  type GoverningReceiver,
  type NamedReceiver,
  type ReceiverDemand,
} from './receivers';
export { type FarEnd, type LinkDoppler } from './far-end';
export { linkShares, type LinkQuestion, type LinkShares, type RegionShare } from './links';
export { linkLoss, type LinkLoss, type LinkLossQuestion, type LossAtShare } from './link-loss';
export { shareUpperBound, type ShareBound, type ShareBoundMethod } from './share-bound';
export {
  airInterfaces,
  CERTAINTY_TEXT,
  startReceiver,
  type AirInterface,
  type AirInterfaceTolerance,
  type Certainty,
  type ReceiverStart,
} from './air-interfaces';
