export { ResonatorError, type ResonatorErrorCode } from './errors';
export {
  cubicOffsetPpm,
  fitCubic,
  inflectionC,
  offsetExtremes,
  REFERENCE_TEMPERATURE_C,
  turningPointsC,
  type CubicFit,
  type OffsetExtremes,
  type TemperatureCubic,
} from './cubic';
export {
  A1_SENSITIVITY_PPM_PER_K_PER_DEGREE,
  atCutCurve,
  equalRippleAngle,
  type EqualRippleAngle,
} from './angle';
export {
  curveStability,
  readingStability,
  type TemperatureStability,
} from './temperature-stability';
export {
  findActivityDips,
  type ActivityDipFinding,
  type ActivityDipRule,
  type SuspectReading,
} from './activity-dips';
export {
  FORK_CURVATURE_PPM_PER_K2,
  FORK_TURNING_POINT_C,
  forkOffsetPpm,
  secondsPerDay,
} from './fork';
export {
  crystalQuality,
  loadResonance,
  offsetAtLoadPpm,
  offsetByTrimSensitivityPpm,
  oscillatorLoadPf,
  pullingPpm,
  type CrystalCircuit,
  type CrystalQuality,
  type LoadResonance,
} from './load';
export { driveDependence, driveLevel, type DriveDependence, type DriveLevel } from './drive';
export { fitLinearDrift, YEAR_DAYS, type LinearDrift } from './ageing/linear';
export { fitLogLinearAgeing, type LogLinearAgeing } from './ageing/log-linear';
export {
  fitLogarithmicAgeing,
  logarithmicOffsetPpm,
  logarithmicRatePpmPerDay,
  type AgeingNotDetermined,
  type LogarithmicAgeing,
  type LogarithmicLaw,
  type NotDeterminedReason,
} from './ageing/logarithmic';
export {
  ageingOffsetPpm,
  MODEL_ERROR_WARNING,
  projectAgeing,
  projectAgeingYears,
  type AgeingFit,
  type AgeingProjection,
} from './ageing/projection';
export { assessAgeing, type AgeingAssessment } from './ageing/assessment';
export {
  allanDeviation,
  octaveFactors,
  phaseFromFrequency,
  timeDeviation,
  type AllanDeviation,
  type AllanKind,
} from './stability';
