import { expect, it } from 'vitest';
import { ratioTable } from '../../bench/ratio-table';

it('compares the median of every way with the first', () => {
  const table = ratioTable([
    { name: 'plain', runsMs: [10, 30, 20], items: { count: 1000, unit: 'rows' } },
    { name: 'other', runsMs: [10, 8, 12, 10] },
  ]);
  const [, plain, other] = table.split('\n').map((line) => line.split(/ {2,}/));
  expect(plain).toEqual(['plain', '20.00 ms', '10.00 to 30.00', '1.00', '50,000 rows/s']);
  expect(other).toEqual(['other', '10.00 ms', '8.00 to 12.00', '0.50']);
});
