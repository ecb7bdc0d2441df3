export type ResonatorErrorCode =
  'not_finite' | 'out_of_range' | 'too_few' | 'lengths_differ' | 'no_spread' | 'limits_crossed';

/**
 * Bad input to a function of shared/resonator.
 * `argument` names the argument as the caller wrote it, `rule` completes the sentence "argument rule".
 */
export class ResonatorError extends Error {
  constructor(
    readonly code: ResonatorErrorCode,
    readonly argument: string,
    readonly rule: string,
  ) {
    super(`${argument} ${rule}`);
    this.name = 'ResonatorError';
  }
}

/** Returns `value` when it is finite, else throws. */
export function requireFinite(value: number, argument: string): number {
  if (!Number.isFinite(value)) {
    throw new ResonatorError('not_finite', argument, 'must be a finite number');
  }
  return value;
}

/** Returns `value` when it is finite and above zero, else throws. */
export function requirePositive(value: number, argument: string): number {
  if (requireFinite(value, argument) <= 0) {
    throw new ResonatorError('out_of_range', argument, 'must be above zero');
  }
  return value;
}

/** Returns `value` when it is finite and zero or above, else throws. */
export function requireNonNegative(value: number, argument: string): number {
  if (requireFinite(value, argument) < 0) {
    throw new ResonatorError('out_of_range', argument, 'must be zero or above');
  }
  return value;
}

/** Throws unless both series have the same length of at least `least`, and every value is finite. */
export function requireSeries(
  x: ArrayLike<number>,
  xName: string,
  y: ArrayLike<number>,
  yName: string,
  least: number,
): void {
  if (x.length !== y.length) {
    throw new ResonatorError('lengths_differ', yName, `must have as many values as ${xName}`);
  }
  if (x.length < least) {
    throw new ResonatorError('too_few', xName, `must hold at least ${least} values`);
  }
  for (let i = 0; i < x.length; i += 1) {
    requireFinite(x[i]!, `${xName}[${i}]`);
    requireFinite(y[i]!, `${yName}[${i}]`);
  }
}

/** Throws unless low < high, both finite. */
export function requireRange(low: number, high: number, argument: string): void {
  requireFinite(low, argument);
  requireFinite(high, argument);
  if (low >= high) {
    throw new ResonatorError(
      'limits_crossed',
      argument,
      'must have its low end below its high end',
    );
  }
}
