import { describe, expect, it } from 'vitest';
import { attributePlanForLetter } from '@shared/sampling/attribute-plan';
import { codeLetterFor } from '@shared/sampling/code-letter';
import { INSPECTION_LEVELS, SEVERITIES, type CodeLetter } from '@shared/sampling/rule';
import { AQL_PERCENTS, MASTER_TABLES } from '@shared/sampling/tables/attribute-master';
import { binomialCdf } from '@shared/statistics/distributions/binomial';
import reference from '../data/sampling/attribute-plans.json';

// Source: MIL-STD-105E (1989), tables I, II-A, II-B, II-C, from memory; see the note in the data file.

type Row = { letter: string; n: number; aql: number; plan: string | number[] };
const rowsOf = (severity: 'normal' | 'tightened' | 'reduced') => reference[severity] as Row[];

/** Cells whose arrow in the data file points off the table; the tables here turn it round, or add letter S. */
const offTheTable = new Map([
  ['normal A 10', 'down'],
  ['reduced A 10', 'down'],
  ['normal R 0.015', 'up'],
  ['reduced R 0.015', 'up'],
]);

describe('code letters', () => {
  it.each(reference.letters)('lots of $lot_from to $lot_to', (row) => {
    for (const level of INSPECTION_LEVELS) {
      expect(codeLetterFor(row.lot_from, level), level).toBe(row[level]);
      expect(codeLetterFor(row.lot_to ?? 10_000_000, level), level).toBe(row[level]);
    }
  });
});

describe.each(SEVERITIES)('single sampling plans, %s inspection', (severity) => {
  it('has the AQL columns of the reference', () => {
    expect(AQL_PERCENTS).toEqual(reference.aql);
    expect(rowsOf(severity)).toHaveLength(256);
  });

  it.each(rowsOf(severity))('letter $letter at AQL $aql %', ({ letter, n, aql, plan }) => {
    const row = MASTER_TABLES[severity].find((each) => each.letter === letter)!;
    const cell = row.cells[AQL_PERCENTS.indexOf(aql)]!;
    expect(row.sampleSize).toBe(n);
    if (typeof plan === 'string') {
      expect(cell).toBe(offTheTable.get(`${severity} ${letter} ${aql}`) ?? plan);
      return;
    }
    expect(cell).toEqual({ acceptanceNumber: plan[0], rejectionNumber: plan[1] });
    expect(attributePlanForLetter(letter as CodeLetter, aql, severity)).toEqual({
      codeLetter: letter,
      sampleSize: n,
      acceptanceNumber: plan[0],
      rejectionNumber: plan[1],
    });
  });

  it('leads every arrow to the nearest plan of the column on the side it points to', () => {
    const column = (aql: number) => rowsOf(severity).filter((row) => row.aql === aql);
    for (const aql of AQL_PERCENTS) {
      const rows = column(aql);
      rows.forEach((row, index) => {
        if (typeof row.plan !== 'string') return;
        const direction = offTheTable.get(`${severity} ${row.letter} ${aql}`) ?? row.plan;
        const candidates =
          direction === 'down' ? rows.slice(index + 1) : rows.slice(0, index).reverse();
        const target = candidates.find((each) => typeof each.plan !== 'string');
        const found = attributePlanForLetter(row.letter as CodeLetter, aql, severity);
        // Only the tightened plan below letter R at AQL 0.025 lies outside the data file: letter S.
        expect(found.codeLetter).toBe(target?.letter ?? 'S');
        expect(found.sampleSize).toBe(target?.n ?? 3150);
      });
    }
  });

  it('keeps the acceptance numbers along the diagonals', () => {
    const rows = MASTER_TABLES[severity].filter(({ letter }) => letter !== 'S');
    for (let row = 0; row + 1 < rows.length; row += 1)
      for (let column = 1; column < AQL_PERCENTS.length; column += 1) {
        const here = rows[row]!.cells[column]!;
        const below = rows[row + 1]!.cells[column - 1]!;
        if (typeof here !== 'string' && typeof below !== 'string') expect(below).toEqual(here);
      }
  });

  it('accepts more in looser columns of a row and never fewer in larger samples of a column', () => {
    for (const { cells } of MASTER_TABLES[severity]) {
      const numbers = cells
        .filter((cell) => typeof cell !== 'string')
        .map((cell) => cell.acceptanceNumber * 100 + cell.rejectionNumber);
      expect(numbers).toEqual([...new Set(numbers)].sort((a, b) => a - b));
    }
    AQL_PERCENTS.forEach((_, column) => {
      const numbers = MASTER_TABLES[severity]
        .map(({ cells }) => cells[column]!)
        .filter((cell) => typeof cell !== 'string')
        .map((cell) => cell.acceptanceNumber);
      expect(numbers).toEqual([...numbers].sort((a, b) => a - b));
    });
  });
});

describe('what the plans do', () => {
  const acceptance = (
    letter: CodeLetter,
    aql: number,
    severity: 'normal' | 'tightened' | 'reduced',
  ) => {
    const plan = attributePlanForLetter(letter, aql, severity);
    return binomialCdf(plan.rejectionNumber - 1, plan.sampleSize, aql / 100);
  };
  const own = rowsOf('normal').filter((row) => typeof row.plan !== 'string');

  it.each(own)(
    'normal, letter $letter: a lot at AQL $aql % passes 85 to 99.9 times in a hundred',
    ({ letter, aql }) => {
      const probability = acceptance(letter as CodeLetter, aql, 'normal');
      expect(probability).toBeGreaterThan(0.85);
      expect(probability).toBeLessThan(0.999);
    },
  );

  it('tightened inspection accepts a lot at the AQL less often than normal, reduced at least as often', () => {
    const standing = (letter: string, aql: number, severity: 'tightened' | 'reduced') =>
      typeof rowsOf(severity).find((row) => row.letter === letter && row.aql === aql)!.plan !==
      'string';
    for (const { letter, aql } of own) {
      const normal = acceptance(letter as CodeLetter, aql, 'normal');
      if (standing(letter, aql, 'tightened'))
        expect(acceptance(letter as CodeLetter, aql, 'tightened')).toBeLessThan(normal);
      if (standing(letter, aql, 'reduced'))
        expect(acceptance(letter as CodeLetter, aql, 'reduced')).toBeGreaterThanOrEqual(normal);
    }
  });
});
