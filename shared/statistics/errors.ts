/** What is wrong with an argument of a numeric function; the same codes choose the sentence shown in the browser. */
export type StatisticsErrorCode =
  | 'too_few_values'
  | 'zero_spread'
  | 'not_finite'
  | 'limits_crossed'
  | 'limits_missing'
  | 'out_of_range'
  | 'not_whole'
  | 'no_solution';

/**
 * Bad input to a function of shared/statistics.
 * `argument` names the argument as the caller wrote it, `rule` completes the sentence "argument rule".
 */
export class StatisticsError extends Error {
  constructor(
    readonly code: StatisticsErrorCode,
    readonly argument: string,
    readonly rule: string,
  ) {
    super(`${argument} ${rule}`);
    this.name = 'StatisticsError';
  }
}
