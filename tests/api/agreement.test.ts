import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { makeOffsetPpm, offsetPpm } from '@shared/radio';
import { startApi, type Api } from '../support/api';
import { approvedPart, openHouse, registeredLot, type House } from '../support/lot-life';
import { plainHeader, uploadText } from '../support/readings';
import { loadUpload } from '../../server/services/uploads/load-upload';

/*
 * Where PostgreSQL and TypeScript both compute, they agree: the offset of a reading from its decimal text, and how many
 * units lie beyond the limits. Checked against whole numbers, in which nothing is rounded.
 */
const DECIMALS = 12;
const SCALE = 10n ** BigInt(DECIMALS);
/** -10 and +7.3 ppm, in units of 1e-9 ppm: the same size as what counts as on a limit. */
const LOW = -10_000_000_000n;
const HIGH = 7_300_000_000n;
const nominals = ['16000000', '32768', '433920000.5', '10000000', '12345678.901'];

let api: Api;
let house: House;
const partOf = new Map<string, string>();
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  for (const nominal of nominals) {
    const criteria = {
      nominalFrequencyHz: nominal,
      toleranceLowPpm: -10,
      toleranceHighPpm: 7.3,
      samplingRule: { kind: 'everyUnit', allowedNonconforming: 0 },
    } as const;
    partOf.set(nominal, (await approvedPart(house, { criteria })).id);
  }
});
afterAll(() => api.close());

const scaled = (text: string) => {
  const [whole, fraction = ''] = text.split('.');
  return BigInt(whole + fraction.padEnd(DECIMALS, '0'));
};
const written = (units: bigint) => {
  const text = `${units / SCALE}.${String(units % SCALE).padStart(DECIMALS, '0')}`;
  return text.replace(/\.?0+$/, '');
};
/** The frequency, in units of 1e-12 Hz, that lies so many 1e-9 ppm from nominal, towards zero where it falls between. */
const at = (nominal: bigint, nanoPpm: bigint) => nominal + (nominal * nanoPpm) / 10n ** 15n;

/** Beyond by more than 1e-9 ppm, exactly. */
function isBeyond(frequency: bigint, nominal: bigint): boolean {
  const offset = (frequency - nominal) * 10n ** 15n;
  return offset > (HIGH + 1n) * nominal || offset < (LOW - 1n) * nominal;
}

/** Anywhere within 20 ppm, on a limit, or a few of the least steps or a millionth of a ppm off it. */
const offset = fc.oneof(
  fc.record({
    from: fc.bigInt({ min: -20n * 10n ** 9n, max: 20n * 10n ** 9n }),
    steps: fc.constant(0n),
  }),
  fc.record({
    from: fc
      .tuple(fc.constantFrom(LOW, HIGH), fc.constantFrom(-1000n, 0n, 0n, 1000n))
      .map(([limit, off]) => limit + off),
    steps: fc.bigInt({ min: -3n, max: 3n }),
  }),
);

interface Row {
  frequencyHz: string;
  offsetPpm: number;
  verdict: string;
}

async function rowsOf(lotId: string, query: Record<string, string> = {}): Promise<Row[]> {
  const rows: Row[] = [];
  let after: string | null = null;
  do {
    const { body } = await house.technician
      .get(`/api/lots/${lotId}/readings`)
      .query({ limit: '200', ...query, ...(after ? { after } : {}) })
      .expect(200);
    rows.push(...(body.items as Row[]));
    after = body.next as string | null;
  } while (after);
  return rows;
}

describe('SQL and TypeScript', () => {
  it('agree on every offset and on the count beyond the limits', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom(...nominals),
        fc.array(offset, { minLength: 1, maxLength: 220 }),
        async (nominalText, offsets) => {
          const nominal = scaled(nominalText);
          const frequencies = offsets.map(({ from, steps }) => at(nominal, from) + steps);
          const lot = await registeredLot(house, {
            partId: partOf.get(nominalText)!,
            lotSize: 300,
          });
          const lines = frequencies.map((units, i) => `U${i},25,${written(units)},`);
          const uploadId = await uploadText(
            house.technician,
            lot.id,
            `${plainHeader}\n${lines.join('\n')}\n`,
          );
          await loadUpload(uploadId);

          const rows = await rowsOf(lot.id);
          expect(rows).toHaveLength(frequencies.length);
          const reader = makeOffsetPpm(nominalText);
          rows.forEach((row, i) => {
            expect(scaled(row.frequencyHz)).toBe(frequencies[i]);
            const exact = offsetPpm(written(frequencies[i]!), nominalText);
            // Four units in the last place, as the reader promises; PostgreSQL carries sixteen digits or more.
            const allowed = 4 * Number.EPSILON * Math.abs(exact) + 1e-15;
            expect(Math.abs(row.offsetPpm - exact)).toBeLessThanOrEqual(allowed);
            expect(Math.abs(reader.ofText(row.frequencyHz) - exact)).toBeLessThanOrEqual(allowed);
            expect(row.verdict, row.frequencyHz).toBe(
              isBeyond(frequencies[i]!, nominal) ? 'nonconforming' : 'conforming',
            );
          });

          const expected = frequencies.filter((units) => isBeyond(units, nominal)).length;
          const { body: analysis } = await house.technician
            .get(`/api/lots/${lot.id}/analysis`)
            .expect(200);
          expect(analysis.units).toBe(frequencies.length);
          expect(analysis.beyond.limits.count).toBe(expected);
          expect(analysis.guardBand.nonconforming).toBe(expected);
          expect(await rowsOf(lot.id, { beyond: 'limits' })).toHaveLength(expected);
        },
      ),
      { numRuns: 8 },
    );
  }, 120_000);
});
