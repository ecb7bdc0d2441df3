import { describe, expect, it } from 'vitest';
import { makeOffsetPpm } from '@shared/radio';
import { allanDeviation, phaseFromFrequency, timeDeviation } from '@shared/resonator';
import { casesOf, expectCase, groupsOfCases, readTable, type ReferenceCase } from '../radio/cases';

/** The 1000-value congruential set of NIST SP 1065 (2008) section 12.4. */
function congruentialSet(): number[] {
  const values: number[] = [];
  let n = 1234567890;
  for (let i = 0; i < 1000; i += 1) {
    values.push(n / 2147483647);
    n = (16807 * n) % 2147483647;
  }
  return values;
}

function frequencies({ inputs }: ReferenceCase): number[] {
  if (inputs.frequency) return inputs.frequency;
  if (inputs.generator) {
    const values = congruentialSet();
    expect(values.slice(1, 4).map((v) => Math.round(v * 2147483647))).toEqual(
      inputs.check_n1_n2_n3,
    );
    return values;
  }
  if (inputs.drift_per_s) {
    const step = inputs.drift_per_s * inputs.tau0_s;
    return Array.from({ length: 200 }, (_, k) => k * step);
  }
  const reader = makeOffsetPpm(String(inputs.nominal_hz));
  return readTable(inputs.file).map((row) => reader.ofText(row.frequency_hz!) * 1e-6);
}

function deviations(reference: ReferenceCase) {
  const { tau0_s, averaging_factor } = reference.inputs;
  const phase = phaseFromFrequency(frequencies(reference), tau0_s);
  const plain = allanDeviation(phase, tau0_s, averaging_factor, 'plain');
  const overlapping = allanDeviation(phase, tau0_s, averaging_factor, 'overlapping');
  const modified = allanDeviation(phase, tau0_s, averaging_factor, 'modified');
  return {
    adev: plain.deviation,
    oadev: overlapping.deviation,
    mdev: modified.deviation,
    tdev: timeDeviation(phase, tau0_s, averaging_factor),
    adev_terms: plain.terms,
    oadev_terms: overlapping.terms,
    published_adev: plain.deviation,
    published_oadev: overlapping.deviation,
    published_mdev: modified.deviation,
  };
}

describe('Allan deviation of published sets', () => {
  it.each(casesOf('allan'))('$id: $name, m = $inputs.averaging_factor', (reference) => {
    expectCase(reference, deviations(reference));
  });
});

describe('Allan deviation of a real oven oscillator', () => {
  it.each(casesOf('allan-real'))('$id: m = $inputs.averaging_factor', (reference) => {
    expectCase(reference, deviations(reference));
  });
});

// NIST SP 1065 (2008) tables 29 to 32, seven printed digits.
describe('NIST SP 1065 printed tables', () => {
  const nine = phaseFromFrequency([892, 809, 823, 798, 671, 644, 883, 903, 677], 1);
  const thousand = phaseFromFrequency(congruentialSet(), 1);

  it.each([
    ['nine frequencies', nine, 1, 91.22945, 91.22945, 91.22945],
    ['nine frequencies', nine, 2, 115.8082, 85.95287, 74.78849],
    ['thousand frequencies', thousand, 1, 2.922319e-1, 2.922319e-1, 2.922319e-1],
    ['thousand frequencies', thousand, 10, 9.965736e-2, 9.159953e-2, 6.172376e-2],
    ['thousand frequencies', thousand, 100, 3.897804e-2, 3.241343e-2, 2.170921e-2],
  ])('%s', (_name, phase, m, plain, overlapping, modified) => {
    expect(allanDeviation(phase, 1, m, 'plain').deviation / plain).toBeCloseTo(1, 6);
    expect(allanDeviation(phase, 1, m, 'overlapping').deviation / overlapping).toBeCloseTo(1, 6);
    expect(allanDeviation(phase, 1, m, 'modified').deviation / modified).toBeCloseTo(1, 6);
  });

  it.each([
    [1, 1.687202e-1],
    [10, 3.563623e-1],
    [100, 1.253382],
  ])('time deviation at m = %d', (m, published) => {
    expect(timeDeviation(thousand, 1, m) / published).toBeCloseTo(1, 6);
  });
});

describe('reference cases', () => {
  it('every group has a test', () => {
    const inRadio = ['offset', 'cfo', 'doppler', 'budget', 'mf', 'mf-rect', 'mf-sinr', 'regime'];
    const here = ['at-cut', 'fork', 'load', 'dld', 'ageing', 'allan', 'allan-real', 'record-real'];
    expect(groupsOfCases().sort()).toEqual([...inRadio, ...here].sort());
  });
});
