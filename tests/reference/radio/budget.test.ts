import { describe, expect, it } from 'vitest';
import {
  CONTRIBUTION_KINDS,
  frequencyBudget,
  linkShares,
  measuredPairs,
  normalPair,
  ppmToHz,
} from '@shared/radio';
import { casesOf, expectCase, readData, type ReferenceCase } from './cases';

function computed(inputs: ReferenceCase['inputs']): Record<string, unknown> {
  const hz = (ppm: number) => ppmToHz(ppm, inputs.carrier_hz);
  if (inputs.half_widths_ppm) {
    const contributions = inputs.half_widths_ppm.map((halfWidthPpm: number, i: number) => ({
      kind: CONTRIBUTION_KINDS[i],
      halfWidthPpm,
    }));
    const budget = frequencyBudget(contributions, inputs.limit_ppm);
    return {
      worst_case_ppm: budget.worstCasePpm,
      worst_case_hz: hz(budget.worstCasePpm),
      root_sum_square_of_limits_ppm: budget.rootSumSquarePpm,
      standard_deviation_ppm: budget.standardUncertaintyPpm,
      expanded_k2_ppm: budget.expandedUncertaintyPpm,
      prob_exceeding_limit: budget.shareBeyondAllowance,
    };
  }
  if (inputs.tx_mean_ppm !== undefined) {
    const pair = normalPair(
      { meanPpm: inputs.tx_mean_ppm, sdPpm: inputs.tx_sd_ppm },
      { meanPpm: inputs.rx_mean_ppm, sdPpm: inputs.rx_sd_ppm },
      inputs.limit_ppm,
    );
    return {
      mean_ppm: pair.meanPpm,
      sd_ppm: pair.sdPpm,
      mean_hz: hz(pair.meanPpm),
      sd_hz: hz(pair.sdPpm),
      prob_exceeding_limit: pair.shareBeyond,
    };
  }
  const pairs = measuredPairs(inputs.tx_ppm, inputs.rx_ppm, inputs.limit_ppm);
  return {
    pairs: pairs.pairs,
    pairs_exceeding: pairs.pairsBeyond,
    fraction_exceeding: pairs.shareBeyond,
    max_abs_ppm: pairs.greatestAbsolutePpm,
    max_abs_hz: hz(pairs.greatestAbsolutePpm),
    mean_ppm: pairs.meanPpm,
    sd_population_ppm: pairs.sdPpm,
  };
}

describe('budget of carrier frequency offset', () => {
  it.each(casesOf('budget'))('$id: $name', (reference) => {
    expectCase(reference, computed(reference.inputs));
  });
});

interface PairInput {
  mean_a: number;
  sd_a: number;
  mean_b: number;
  sd_b: number;
  half_width_b?: number;
  limit: number;
  a?: number[];
  b?: number[];
}

interface PairCase {
  id: string;
  what: string;
  source: string;
  input: PairInput;
  expected: number;
  tolerance_rel: number;
}

const pairCases: PairCase[] = JSON.parse(readData('pair-exceedance.json'));

function pairShare({ a, b, limit, ...normal }: PairInput): number {
  if (a && b) return measuredPairs(a, b, limit).shareBeyond;
  if (normal.half_width_b === undefined) {
    return normalPair(
      { meanPpm: normal.mean_a, sdPpm: normal.sd_a },
      { meanPpm: normal.mean_b, sdPpm: normal.sd_b },
      limit,
    ).shareBeyond;
  }
  // A difference is symmetric in its two ends: a unit at zero, a normal far end, and the uniform as Doppler.
  return linkShares({
    unitsPpm: [0],
    farEnd: { model: 'normal', meanPpm: normal.mean_a, sdPpm: normal.sd_a },
    doppler: { model: 'uniform', halfWidthPpm: normal.half_width_b },
    symbolRateRegionPpm: limit,
    frontEndWholePpm: limit,
  }).beyondSymbolRate.share;
}

describe('share of pairs of two lots further apart than a limit', () => {
  it.each(pairCases)('$id: $what ($source)', ({ input, expected, tolerance_rel }) => {
    expect(Math.abs(pairShare(input) / expected - 1)).toBeLessThanOrEqual(tolerance_rel);
  });

  it.each(pairCases.filter(({ input }) => input.a))('$id: as links', ({ input, expected }) => {
    const shares = linkShares({
      unitsPpm: input.a!,
      farEnd: { model: 'measured', offsetsPpm: input.b! },
      symbolRateRegionPpm: input.limit,
      frontEndWholePpm: 2 * input.limit,
    });
    expect(shares.beyondSymbolRate.share).toBeCloseTo(expected, 12);
  });
});
