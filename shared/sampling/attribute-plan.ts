import { StatisticsError } from '../statistics/errors';
import { codeLetterFor } from './code-letter';
import { type CodeLetter, type InspectionLevel, type Severity } from './rule';
import { AQL_PERCENTS, MASTER_TABLES } from './tables/attribute-master';

export interface AttributeTablePlan {
  /** The letter whose sample size is used, after following any arrow. */
  codeLetter: CodeLetter;
  sampleSize: number;
  acceptanceNumber: number;
  /** One more than the acceptance number, except in reduced inspection. */
  rejectionNumber: number;
}

/**
 * The single sampling plan of a letter and an AQL, arrows followed.
 * An arrow leads to the first plan above or below in the same column; where none stands there, to the first on the other side.
 * @param aqlPercent one of AQL_PERCENTS
 * @throws StatisticsError when the AQL or the letter is not in the tables
 * Source: MIL-STD-105E, tables II-A to II-C.
 */
export function attributePlanForLetter(
  letter: CodeLetter,
  aqlPercent: number,
  severity: Severity,
): AttributeTablePlan {
  const column = AQL_PERCENTS.indexOf(aqlPercent);
  if (column < 0)
    throw new StatisticsError(
      'out_of_range',
      'aqlPercent',
      `must be one of ${AQL_PERCENTS.join(', ')}, got ${aqlPercent}`,
    );
  const rows = MASTER_TABLES[severity];
  const start = rows.findIndex((row) => row.letter === letter);
  if (start < 0)
    throw new StatisticsError(
      'out_of_range',
      'letter',
      `must be a code letter of ${severity} inspection, got ${letter}`,
    );
  const planAt = (index: number): AttributeTablePlan | null => {
    const row = rows[index]!;
    const cell = row.cells[column]!;
    return typeof cell === 'string'
      ? null
      : { codeLetter: row.letter, sampleSize: row.sampleSize, ...cell };
  };
  const search = (step: 1 | -1) => {
    for (let index = start; index >= 0 && index < rows.length; index += step) {
      const plan = planAt(index);
      if (plan !== null) return plan;
    }
    return null;
  };
  const first = rows[start]!.cells[column] === 'up' ? -1 : 1;
  return (search(first) ?? search(first === 1 ? -1 : 1))!;
}

/** The single sampling plan of a lot. @throws as codeLetterFor and attributePlanForLetter */
export function attributePlanForLot(
  lotSize: number,
  level: InspectionLevel,
  aqlPercent: number,
  severity: Severity,
): AttributeTablePlan {
  return attributePlanForLetter(codeLetterFor(lotSize, level), aqlPercent, severity);
}
