export const INSPECTION_LEVELS = ['I', 'II', 'III', 'S-1', 'S-2', 'S-3', 'S-4'] as const;
export type InspectionLevel = (typeof INSPECTION_LEVELS)[number];

/** The letters I and O are not used: they look like figures. S stands below R in tightened inspection only. */
export const CODE_LETTERS = 'A B C D E F G H J K L M N P Q R S'.split(' ') as CodeLetter[];
export type CodeLetter =
  | 'A'
  | 'B'
  | 'C'
  | 'D'
  | 'E'
  | 'F'
  | 'G'
  | 'H'
  | 'J'
  | 'K'
  | 'L'
  | 'M'
  | 'N'
  | 'P'
  | 'Q'
  | 'R'
  | 'S';

export const SEVERITIES = ['normal', 'tightened', 'reduced'] as const;
export type Severity = (typeof SEVERITIES)[number];

/** What a part revision fixes beforehand: how many units are drawn from a lot and how many may be beyond the limits. */
export type SamplingRule =
  | { kind: 'attribute'; level: InspectionLevel; aqlPercent: number }
  | {
      kind: 'zeroAcceptance';
      /** The lot quality, in percent nonconforming, that must seldom be accepted. */
      limitingQualityPercent: number;
      /** How seldom: the largest probability of accepting such a lot, e.g. 0.1. */
      consumersRisk: number;
    }
  | { kind: 'variables'; level: InspectionLevel; aqlPercent: number }
  | { kind: 'everyUnit'; allowedNonconforming: number };
