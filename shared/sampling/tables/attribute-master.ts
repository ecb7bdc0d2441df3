import { type CodeLetter, type Severity } from '../rule';

/** What stands where a letter and an AQL meet: acceptance and rejection number, or an arrow to the next plan. */
export type MasterCell = { acceptanceNumber: number; rejectionNumber: number } | 'up' | 'down';

export interface MasterRow {
  letter: CodeLetter;
  sampleSize: number;
  cells: readonly MasterCell[];
}

/*
 * Single sampling plans: letter, sample size, then acceptance/rejection number for each AQL.
 * v: use the first plan below in the column, ^: the first plan above; the sample size follows the arrow.
 *
 * Source: MIL-STD-105E (1989), tables II-A, II-B and II-C, public domain, columns 0.010 to 10; recalled from the
 * standard, consistency checked: the acceptance numbers run along diagonals, and each normal plan accepts a lot at
 * its AQL with a probability between 0.85 and 0.999. Equal in use to ISO 2859-1, tables 2-A to 2-C.
 * Not certain: letter R at AQL 0.015, and letter S of tightened inspection.
 */

const NORMAL = `
AQL %    0.010 0.015 0.025 0.040 0.065  0.10  0.15  0.25  0.40  0.65   1.0   1.5   2.5   4.0   6.5    10
A     2      v     v     v     v     v     v     v     v     v     v     v     v     v     v   0/1     v
B     3      v     v     v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v
C     5      v     v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2
D     8      v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3
E    13      v     v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4
F    20      v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6
G    32      v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8
H    50      v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11
J    80      v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11 14/15
K   125      v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11 14/15 21/22
L   200      v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11 14/15 21/22     ^
M   315      v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11 14/15 21/22     ^     ^
N   500      v     v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11 14/15 21/22     ^     ^     ^
P   800      v   0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11 14/15 21/22     ^     ^     ^     ^
Q  1250    0/1     ^     v   1/2   2/3   3/4   5/6   7/8 10/11 14/15 21/22     ^     ^     ^     ^     ^
R  2000      ^     ^   1/2   2/3   3/4   5/6   7/8 10/11 14/15 21/22     ^     ^     ^     ^     ^     ^`;

const TIGHTENED = `
AQL %    0.010 0.015 0.025 0.040 0.065  0.10  0.15  0.25  0.40  0.65   1.0   1.5   2.5   4.0   6.5    10
A     2      v     v     v     v     v     v     v     v     v     v     v     v     v     v     v   0/1
B     3      v     v     v     v     v     v     v     v     v     v     v     v     v     v   0/1     ^
C     5      v     v     v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v
D     8      v     v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2
E    13      v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3
F    20      v     v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4
G    32      v     v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6
H    50      v     v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9
J    80      v     v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13
K   125      v     v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13 18/19
L   200      v     v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13 18/19     ^
M   315      v     v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13 18/19     ^     ^
N   500      v     v     v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13 18/19     ^     ^     ^
P   800      v     v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13 18/19     ^     ^     ^     ^
Q  1250      v   0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13 18/19     ^     ^     ^     ^     ^
R  2000    0/1     ^     v   1/2   2/3   3/4   5/6   8/9 12/13 18/19     ^     ^     ^     ^     ^     ^
S  3150      ^     ^   1/2     ^     ^     ^     ^     ^     ^     ^     ^     ^     ^     ^     ^     ^`;

/** Between the two numbers (more than the first, fewer than the second) the lot is accepted, but reduced inspection ends. */
const REDUCED = `
AQL %    0.010 0.015 0.025 0.040 0.065  0.10  0.15  0.25  0.40  0.65   1.0   1.5   2.5   4.0   6.5    10
A     2      v     v     v     v     v     v     v     v     v     v     v     v     v     v   0/1     v
B     2      v     v     v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v
C     2      v     v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v   0/2
D     3      v     v     v     v     v     v     v     v     v     v     v   0/1     ^     v   0/2   1/3
E     5      v     v     v     v     v     v     v     v     v     v   0/1     ^     v   0/2   1/3   1/4
F     8      v     v     v     v     v     v     v     v     v   0/1     ^     v   0/2   1/3   1/4   2/5
G    13      v     v     v     v     v     v     v     v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6
H    20      v     v     v     v     v     v     v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8
J    32      v     v     v     v     v     v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8  7/10
K    50      v     v     v     v     v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8  7/10 10/13
L    80      v     v     v     v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8  7/10 10/13     ^
M   125      v     v     v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8  7/10 10/13     ^     ^
N   200      v     v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8  7/10 10/13     ^     ^     ^
P   315      v   0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8  7/10 10/13     ^     ^     ^     ^
Q   500    0/1     ^     v   0/2   1/3   1/4   2/5   3/6   5/8  7/10 10/13     ^     ^     ^     ^     ^
R   800      ^     ^   0/2   1/3   1/4   2/5   3/6   5/8  7/10 10/13     ^     ^     ^     ^     ^     ^`;

/** Acceptable quality levels, percent nonconforming. */
export const AQL_PERCENTS: readonly number[] = head(NORMAL);

export const MASTER_TABLES: Record<Severity, readonly MasterRow[]> = {
  normal: rows(NORMAL),
  tightened: rows(TIGHTENED),
  reduced: rows(REDUCED),
};

function lines(table: string): string[][] {
  return table
    .trim()
    .split('\n')
    .map((line) => line.trim().split(/\s+/));
}

function head(table: string): number[] {
  return lines(table)[0]!.slice(2).map(Number);
}

function rows(table: string): MasterRow[] {
  return lines(table)
    .slice(1)
    .map(([letter, sampleSize, ...cells]) => ({
      letter: letter as CodeLetter,
      sampleSize: Number(sampleSize),
      cells: cells.map(cell),
    }));
}

function cell(text: string): MasterCell {
  if (text === 'v') return 'down';
  if (text === '^') return 'up';
  const [acceptanceNumber, rejectionNumber] = text.split('/').map(Number);
  return { acceptanceNumber: acceptanceNumber!, rejectionNumber: rejectionNumber! };
}
