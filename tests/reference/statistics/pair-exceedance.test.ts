import { describe, expect, it } from 'vitest';
import {
  lotPairExceedance,
  normalPairExceedance,
  normalUniformExceedance,
} from '@shared/statistics/pair-exceedance';
import { sortedAscending } from '@shared/statistics/sorted';
import file from '../data/statistics/pair-exceedance.json';
import { casesOf, expectWithin } from './cases';

type Numbers = Record<string, number>;

describe('pairs beyond a limit against scipy and exact counts', () => {
  const normals = casesOf<Numbers, number>(file, 'both normal');
  const uniforms = casesOf<Numbers, number>(file, 'B uniform');
  const lots = casesOf<{ a: number[]; b: number[]; limit: number }, number>(file, 'measured lots');

  it('runs every case of the file', () => {
    expect(normals.length + uniforms.length + lots.length).toBe(file.length);
    expect(file).toHaveLength(8);
  });

  it.each(normals)('$id $what $input', ({ input, expected, tolerance_rel }) => {
    const a = { mean: input.mean_a!, sd: input.sd_a! };
    const b = { mean: input.mean_b!, sd: input.sd_b! };
    expectWithin(normalPairExceedance(a, b, input.limit!), expected, tolerance_rel);
  });

  it.each(uniforms)('$id $what $input', ({ input, expected, tolerance_rel }) => {
    const a = { mean: input.mean_a!, sd: input.sd_a! };
    const share = normalUniformExceedance(a, input.half_width_b!, input.limit!);
    expectWithin(share, expected, tolerance_rel);
  });

  it.each(lots)('$id $what', ({ input, expected, tolerance_rel }) => {
    const a = sortedAscending(Float64Array.from(input.a));
    const b = sortedAscending(Float64Array.from(input.b));
    const { share, pairs } = lotPairExceedance(a, b, input.limit);
    expect(pairs).toBe(input.a.length * input.b.length);
    expectWithin(share, expected, tolerance_rel);
  });
});
