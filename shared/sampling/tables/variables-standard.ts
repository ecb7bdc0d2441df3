import { type CodeLetter } from '../rule';

/**
 * Sample sizes of variables plans, s method, by the code letter of the attribute tables.
 * Source: the letters and sample sizes common to ANSI/ASQC Z1.9-1980 and ISO 3951:1989, from memory. The standards
 * stop at 200 units; letters beyond P keep that size here. Letter A has no variables plan: B serves in its place.
 */
export const VARIABLES_SAMPLE_SIZES: Record<CodeLetter, number> = {
  A: 3,
  B: 3,
  C: 4,
  D: 5,
  E: 7,
  F: 10,
  G: 15,
  H: 20,
  J: 35,
  K: 50,
  L: 75,
  M: 100,
  N: 150,
  P: 200,
  Q: 200,
  R: 200,
  S: 200,
};

/**
 * Letter and sample size of MIL-STD-414, whose letters are not those of the attribute tables (I and O are used).
 * Source: MIL-STD-414 (1957), table B-1, from memory.
 */
export const STANDARD_414_SAMPLE_SIZES: Record<string, number> = {
  B: 3,
  C: 4,
  D: 5,
  E: 7,
  F: 10,
  G: 15,
  H: 20,
  I: 25,
  J: 30,
  K: 35,
  L: 40,
  M: 50,
  N: 75,
  O: 100,
  P: 150,
  Q: 200,
};

/**
 * Acceptability constant k by AQL (percent) and letter of MIL-STD-414: s method, form 1, normal inspection.
 * Only the values recalled with confidence; where a pair is missing nothing is known here.
 * Source: MIL-STD-414 (1957), table B-1, public domain, from memory; checked: each plan accepts a lot at its AQL
 * with a probability between 0.89 and 0.995 by the noncentral t distribution.
 */
export const STANDARD_414_K: Record<string, Record<string, number>> = {
  '0.4': { E: 1.88, G: 2.06, I: 2.14, K: 2.18, M: 2.22, O: 2.29, Q: 2.33 },
  '0.65': { E: 1.75, G: 1.91, I: 1.98, K: 2.03, M: 2.08, O: 2.14, Q: 2.18 },
  '1': { C: 1.45, E: 1.62, G: 1.79, I: 1.85, K: 1.89, M: 1.93, O: 2.0, Q: 2.04 },
  '1.5': { C: 1.34, E: 1.5, G: 1.65, I: 1.72, K: 1.76, M: 1.8, O: 1.86, Q: 1.89 },
  '2.5': { B: 1.12, D: 1.24, F: 1.41, H: 1.51, J: 1.55, L: 1.58, N: 1.65, P: 1.7 },
  '4': { B: 0.958, D: 1.07, F: 1.23, H: 1.33, J: 1.36, L: 1.39, N: 1.46, P: 1.51 },
};
