import { describe, expect, it } from 'vitest';
import { type Pulse, matchedFilterLoss, offsetForLoss, symbolRateSinr } from '@shared/radio';
import { casesOf, expectCase, readTable } from './cases';

const rootRaisedCosine = (rollOff: number): Pulse => ({ shape: 'root-raised-cosine', rollOff });
const rectangular: Pulse = { shape: 'rectangular' };

const fields = (pulse: Pulse, offset: number) => {
  const loss = matchedFilterLoss(pulse, offset);
  return {
    correlation_peak_power: loss.correlationPeakPower,
    correlation_peak_db: loss.correlationPeakDb,
    output_energy_fraction: loss.outputEnergyFraction,
    output_energy_db: loss.outputEnergyDb,
    symbol_rate_sample_power: loss.symbolRatePower,
    isi_power: loss.interferencePower,
    signal_to_isi_db: loss.signalToInterferenceDb,
  };
};

describe('matched-filter loss, root raised cosine', () => {
  it.each(casesOf('mf'))('$id: $inputs', (reference) => {
    const { rolloff, offset_over_symbol_rate } = reference.inputs;
    expectCase(reference, fields(rootRaisedCosine(rolloff), offset_over_symbol_rate));
  });
});

describe('matched-filter loss, rectangular pulse', () => {
  it.each(casesOf('mf-rect'))('$id: $inputs', (reference) => {
    expectCase(reference, fields(rectangular, reference.inputs.offset_over_symbol_rate));
  });
});

describe('signal to interference and noise at the symbol rate', () => {
  it.each(casesOf('mf-sinr'))('$id: $inputs', (reference) => {
    const { rolloff, offset_over_symbol_rate, es_n0_db } = reference.inputs;
    const result = symbolRateSinr(rootRaisedCosine(rolloff), offset_over_symbol_rate, es_n0_db);
    expectCase(reference, { sinr_db: result.sinrDb, degradation_db: result.degradationDb });
  });
});

// 12 printed digits: powers to 5e-12 of 1 and of themselves, decibels to 1e-9 relative, the ratio to
// interference to 1e-6 dB. An empty cell means that the value is zero or has no meaning.
describe('matched-filter table, 9 pulses by 31 offsets (mpmath quadrature)', () => {
  const rows = readTable('matched-filter-table.csv');

  it('has every row', () => expect(rows.length).toBe(279));

  it.each(rows)('$rolloff at $offset_over_symbol_rate', (row) => {
    const isRectangular = row.rolloff === 'rectangular';
    const pulse = isRectangular ? rectangular : rootRaisedCosine(Number(row.rolloff));
    const computed = fields(pulse, Number(row.offset_over_symbol_rate));
    for (const [field, value] of Object.entries(computed)) {
      const text = row[field]!;
      if (text === '') {
        // Integrate and dump hears no neighbour, so its interference columns are empty, not zero.
        const symbolRateField = ['symbol_rate_sample_power', 'isi_power'].includes(field);
        if (!(isRectangular && symbolRateField)) expect(value, field).toBeNull();
        continue;
      }
      const wanted = Number(text);
      const allowed =
        field === 'signal_to_isi_db'
          ? 1e-6
          : field.endsWith('_db')
            ? 1e-9 * Math.abs(wanted) + 1e-10
            : 5e-12;
      expect(Math.abs(value! - wanted), `${field}: ${value} for ${wanted}`).toBeLessThanOrEqual(
        allowed,
      );
    }
  });
});

// "The offset that costs a given correlation loss", 4 digits, from the same quadrature.
describe('offset that costs a given correlation loss', () => {
  it.each([
    [0, 0.0559, 0.1087, 0.2921],
    [0.1, 0.0832, 0.1361, 0.3194],
    [0.2, 0.1078, 0.1633, 0.3467],
    [0.22, 0.1121, 0.1687, 0.3522],
    [0.25, 0.1183, 0.1765, 0.3604],
    [0.35, 0.137, 0.2008, 0.3877],
    [0.5, 0.1609, 0.2328, 0.4286],
    [1, 0.2224, 0.3171, 0.5557],
  ])('roll-off %d', (rollOff, half, one, three) => {
    const pulse = rootRaisedCosine(rollOff);
    expect(Math.abs(offsetForLoss(pulse, 0.5) - half)).toBeLessThanOrEqual(5.1e-5);
    expect(Math.abs(offsetForLoss(pulse, 1) - one)).toBeLessThanOrEqual(5.1e-5);
    expect(Math.abs(offsetForLoss(pulse, 3) - three)).toBeLessThanOrEqual(5.1e-5);
  });

  it('rectangular pulse', () => {
    expect(Math.abs(offsetForLoss(rectangular, 0.5) - 0.186)).toBeLessThanOrEqual(5.1e-5);
    expect(Math.abs(offsetForLoss(rectangular, 1) - 0.2615)).toBeLessThanOrEqual(5.1e-5);
    expect(Math.abs(offsetForLoss(rectangular, 3) - 0.4422)).toBeLessThanOrEqual(5.1e-5);
  });
});
