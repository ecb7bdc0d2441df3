/** How measurement uncertainty enters a decision; fixed with the part revision, before measuring. */
export type DecisionRule =
  /** The measured value against the limits themselves; uncertainty must be small and is shared by both sides. */
  | { kind: 'simple' }
  /** Limits drawn in by w = factor x U: accepted only where conformity is proven. */
  | { kind: 'guardedAcceptance'; factor: number }
  /** Limits let out by w = factor x U: refused only where nonconformity is proven. */
  | { kind: 'guardedRejection'; factor: number };

export interface Limits {
  /** Null: no limit on that side. */
  lowPpm: number | null;
  highPpm: number | null;
}

/**
 * A value on a limit lies within it: the limits belong to the permitted range (JCGM 106:2012, 3.3.5, from memory).
 * Offsets come from a division and carry rounding of some 1e-14 of their size; so a value this close to a limit,
 * far below what any counter resolves, is on it.
 */
export const ON_LIMIT_PPM = 1e-9;

export const isBelow = (valuePpm: number, lowPpm: number | null) =>
  lowPpm !== null && valuePpm < lowPpm - ON_LIMIT_PPM;
export const isAbove = (valuePpm: number, highPpm: number | null) =>
  highPpm !== null && valuePpm > highPpm + ON_LIMIT_PPM;

/** Is a value beyond the limits, as counted everywhere? */
export function isBeyond(valuePpm: number, { lowPpm, highPpm }: Limits): boolean {
  return isBelow(valuePpm, lowPpm) || isAbove(valuePpm, highPpm);
}
