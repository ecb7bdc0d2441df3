import { type CodeLetter, type InspectionLevel } from '../rule';

export interface CodeLetterRow {
  lotFrom: number;
  /** Null: and above. */
  lotTo: number | null;
  letters: Record<InspectionLevel, CodeLetter>;
}

/**
 * Code letter by lot size and inspection level.
 * Source: MIL-STD-105E (1989), table I, public domain; recalled from the standard, consistency checked
 * (letters never fall with lot size nor from level I to II to III). Equal in use to ISO 2859-1, table 1.
 */
export const CODE_LETTER_ROWS: readonly CodeLetterRow[] = [
  //             I   II  III S-1 S-2 S-3 S-4
  row(2, 8, /*     */ 'A A B A A A A'),
  row(9, 15, /*    */ 'A B C A A A A'),
  row(16, 25, /*   */ 'B C D A A B B'),
  row(26, 50, /*   */ 'C D E A B B C'),
  row(51, 90, /*   */ 'C E F B B C C'),
  row(91, 150, /*  */ 'D F G B B C D'),
  row(151, 280, /* */ 'E G H B C D E'),
  row(281, 500, /* */ 'F H J B C D E'),
  row(501, 1200, /**/ 'G J K C C E F'),
  row(1201, 3200, /*    */ 'H K L C D E G'),
  row(3201, 10_000, /*  */ 'J L M C D F G'),
  row(10_001, 35_000, /**/ 'K M N C D F H'),
  row(35_001, 150_000, /**/ 'L N P D E G J'),
  row(150_001, 500_000, /**/ 'M P Q D E G J'),
  row(500_001, null, /* */ 'N Q R D E H K'),
];

function row(lotFrom: number, lotTo: number | null, letters: string): CodeLetterRow {
  const [i, ii, iii, s1, s2, s3, s4] = letters.split(' ') as CodeLetter[];
  return {
    lotFrom,
    lotTo,
    letters: { I: i!, II: ii!, III: iii!, 'S-1': s1!, 'S-2': s2!, 'S-3': s3!, 'S-4': s4! },
  };
}
