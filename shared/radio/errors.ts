export type RadioErrorCode =
  | 'not_a_decimal'
  | 'not_positive'
  | 'not_finite'
  | 'out_of_range'
  | 'too_few'
  | 'too_many'
  | 'missing';

/**
 * Bad input to a function of shared/radio.
 * `argument` names the argument as the caller wrote it, `rule` completes the sentence "argument rule".
 */
export class RadioError extends Error {
  constructor(
    readonly code: RadioErrorCode,
    readonly argument: string,
    readonly rule: string,
  ) {
    super(`${argument} ${rule}`);
    this.name = 'RadioError';
  }
}

/** Returns `value` when it is finite, else throws a RadioError naming `argument`. */
export function requireFinite(value: number, argument: string): number {
  if (!Number.isFinite(value)) {
    throw new RadioError('not_finite', argument, 'must be a finite number');
  }
  return value;
}

/** Returns `value` when it is finite and above zero, else throws a RadioError naming `argument`. */
export function requirePositive(value: number, argument: string): number {
  requireFinite(value, argument);
  if (value <= 0) throw new RadioError('not_positive', argument, 'must be above zero');
  return value;
}

/** Returns `value` when it is finite and zero or above, else throws a RadioError naming `argument`. */
export function requireNonNegative(value: number, argument: string): number {
  requireFinite(value, argument);
  if (value < 0) throw new RadioError('out_of_range', argument, 'must be zero or above');
  return value;
}

/** Returns `value` when `low <= value <= high`, else throws a RadioError naming `argument`. */
export function requireWithin(value: number, low: number, high: number, argument: string): number {
  requireFinite(value, argument);
  if (value < low || value > high) {
    throw new RadioError('out_of_range', argument, `must lie from ${low} to ${high}`);
  }
  return value;
}
