import { describe, expect, it } from 'vitest';
import {
  carrierOffset,
  dopplerShift,
  fractionalOffset,
  makeOffsetPpm,
  offsetPpb,
  offsetPpm,
} from '@shared/radio';
import { casesOf, expectCase, readTable } from './cases';

describe('offset from nominal', () => {
  it.each(casesOf('offset'))('$id: $name', (reference) => {
    const measured = String(reference.inputs.measured_hz);
    const nominal = String(reference.inputs.nominal_hz);
    expectCase(reference, {
      y: fractionalOffset(measured, nominal),
      ppm: offsetPpm(measured, nominal),
      ppb: offsetPpb(measured, nominal),
    });
    expectCase(
      { ...reference, expected: { ppm: reference.expected.ppm } },
      {
        ppm: makeOffsetPpm(nominal).ofText(measured),
      },
    );
    expectCase(
      { ...reference, expected: { ppm: reference.expected.ppm } },
      {
        ppm: makeOffsetPpm(nominal).ofNumber(reference.inputs.measured_hz),
      },
    );
  });
});

describe('carrier frequency offset', () => {
  it.each(casesOf('cfo'))('$id: $name', (reference) => {
    const { carrier_hz, tx_ppm, rx_ppm } = reference.inputs;
    const result = carrierOffset(carrier_hz, tx_ppm, rx_ppm);
    expectCase(reference, {
      cfo_hz: result.offsetHz,
      abs_cfo_hz: result.absoluteOffsetHz,
      relative_ppm: result.relativePpm,
    });
  });
});

describe('Doppler shift', () => {
  it.each(casesOf('doppler'))('$id: $name', (reference) => {
    const { carrier_hz, closing_speed_m_s } = reference.inputs;
    const result = dopplerShift(carrier_hz, closing_speed_m_s);
    expectCase(reference, {
      first_order_hz: result.firstOrderHz,
      relativistic_hz: result.relativisticHz,
      difference_hz: result.differenceHz,
    });
  });
});

describe('real records', () => {
  const moments = (values: number[]) => {
    const mean = values.reduce((sum, v) => sum + v, 0) / values.length;
    const squares = values.reduce((sum, v) => sum + (v - mean) ** 2, 0);
    return { mean, sd: Math.sqrt(squares / (values.length - 1)) };
  };

  it('record-real-01: first 2000 samples of an oven oscillator', () => {
    const [reference] = casesOf('record-real');
    const reader = makeOffsetPpm('10000000');
    const ppb = readTable(reference!.inputs.file).map(
      (row) => reader.ofText(row.frequency_hz!) * 1e3,
    );
    const { mean, sd } = moments(ppb);
    expectCase(reference!, {
      samples: ppb.length,
      mean_ppb: mean,
      sd_ppb: sd,
      min_ppb: Math.min(...ppb),
      max_ppb: Math.max(...ppb),
    });
  });

  it('record-real-03: clock units against a symmetric limit', () => {
    const [, reference] = casesOf('record-real');
    const ppm = readTable(reference!.inputs.file).map((row) =>
      Number(row.initial_frequency_offset_ppm),
    );
    const { mean, sd } = moments(ppm);
    expectCase(reference!, {
      units: ppm.length,
      within_limit: ppm.filter((v) => Math.abs(v) <= reference!.inputs.limit_ppm).length,
      mean_ppm: mean,
      sd_ppm: sd,
      max_abs_ppm: Math.max(...ppm.map(Math.abs)),
    });
  });

  it('every written digit of 20 000 readings counts: the quick reader agrees with exact arithmetic', () => {
    const reader = makeOffsetPpm('10000000');
    const texts = readTable('ocxo-10MHz-1s-full.csv').map((row) => row.frequency_hz!);
    expect(texts.length).toBe(19982);
    for (const text of texts) {
      const exact = offsetPpm(text, '10000000');
      expect(Math.abs(reader.ofText(text) - exact)).toBeLessThanOrEqual(1e-15 * Math.abs(exact));
    }
  });
});
