import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { UnitTable, hashWhole } from '../../../server/ingest/unit-table';

vi.setConfig({ testTimeout: 60_000 });

describe('the table of units', () => {
  it('knows exactly what a set of strings knows, ascending or not', () => {
    const serial = fc.oneof(
      fc.integer({ min: 0, max: 60 }).map((n) => `S${n}`),
      fc.string({ minLength: 1, maxLength: 6 }),
    );
    fc.assert(
      fc.property(
        fc.array(fc.tuple(serial, fc.integer({ min: 0, max: 3 })), { maxLength: 300 }),
        fc.boolean(),
        (readings, sorted) => {
          if (sorted) readings.sort(([a], [b]) => a.length - b.length || (a < b ? -1 : 1));
          const table = new UnitTable();
          const units = new Set<string>();
          const seen = new Set<string>();
          for (const [name, condition] of readings) {
            const bytes = Buffer.from(name, 'utf8');
            const expected = !units.has(name)
              ? 'new_unit'
              : seen.has(`${condition} ${name}`)
                ? 'known'
                : 'new_condition';
            expect(table.see(bytes, 0, bytes.length, hashWhole(condition))).toBe(expected);
            units.add(name);
            seen.add(`${condition} ${name}`);
          }
          expect(table.unitsCount).toBe(units.size);
        },
      ),
      { numRuns: 500 },
    );
  });

  it('tells how many units an earlier upload had too', () => {
    const table = new UnitTable();
    const see = (name: string, earlier = false) =>
      table.see(Buffer.from(name), 0, name.length, 1, earlier);
    ['A', 'B', 'C'].forEach((name) => see(name, true));
    expect(['B', 'D', 'B'].map((name) => see(name))).toEqual(['known', 'new_unit', 'known']);
    expect([table.unitsCount, table.overlapCount]).toEqual([2, 1]);
  });
});
