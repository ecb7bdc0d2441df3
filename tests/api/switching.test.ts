import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startApi, type Api } from '../support/api';
import {
  approvedPart,
  decided,
  inspectedLot,
  lotOf,
  measured,
  openHouse,
  registeredLot,
  spread,
  type House,
} from '../support/lot-life';

/*
 * The record of supplier and part, from registration to registration: how hard the next lot is inspected.
 * MIL-STD-105E 4.5 to 4.7; the rules themselves are proven in tests/unit/sampling/switching.test.ts.
 */
let api: Api;
let house: House;
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
});
afterAll(() => api.close());

/** Level II, AQL 1 %, lots of 40: 13 units, accept on none. */
const newPart = async () =>
  (
    await approvedPart(house, {
      criteria: { samplingRule: { kind: 'attribute', level: 'II', aqlPercent: 1 } },
    })
  ).id;

const good = (units: number) => spread(units);
const bad = (units: number) => [...spread(units - 1), 20];

async function refusedLot(partId: string, decision: 'hold' | 'reject' = 'reject') {
  const lot = await registeredLot(house, { partId });
  await measured(house, lot.id, bad(lot.unitsPlanned));
  await decided(house.quality, lot.id, { decision });
  return lot;
}

async function acceptedLot(partId: string) {
  const lot = await inspectedLot(house, { partId });
  await decided(house.quality, lot.id, { decision: 'accept', correction: '' });
  return lot;
}

describe('the record of supplier and part', () => {
  it('tightens the next lot after two refused, names them, and asks for more units', async () => {
    const partId = await newPart();
    const first = await refusedLot(partId);
    await acceptedLot(partId);
    const second = await refusedLot(partId, 'hold');
    const next = await registeredLot(house, { partId });
    expect(next.severity).toBe('tightened');
    expect((next.severityReasons as string[])[0]).toContain(first.lotNumber);
    expect((next.severityReasons as string[])[0]).toContain(second.lotNumber);
    expect(next.unitsPlanned).toBeGreaterThan(second.unitsPlanned);
  });

  it('keeps suppliers and parts apart, and counts no lot before it is decided', async () => {
    const partId = await newPart();
    await refusedLot(partId);
    const waiting = await registeredLot(house, { partId });
    await measured(house, waiting.id, bad(waiting.unitsPlanned));
    expect((await registeredLot(house, { partId })).severity).toBe('normal');
    await decided(house.quality, waiting.id, { decision: 'reject' });
    expect((await registeredLot(house, { partId })).severity).toBe('tightened');
    const other = { partId, supplierId: api.suppliers.second.id };
    expect((await registeredLot(house, other)).severity).toBe('normal');
    expect((await registeredLot(house, { partId: await newPart() })).severity).toBe('normal');
  });

  it('goes by the first sample: what a correction made of a lot later does not mend the record', async () => {
    const partId = await newPart();
    const first = await refusedLot(partId, 'hold');
    await measured(house, first.id, good(13));
    expect((await lotOf(house.quality, first.id)).state).toBe('on_hold');
    await decided(house.quality, first.id, { decision: 'accept' });
    await refusedLot(partId);
    expect((await registeredLot(house, { partId })).severity).toBe('tightened');
  });

  it('discontinues after five refused while tightened, and resumes tightened once action is agreed', async () => {
    const partId = await newPart();
    await refusedLot(partId);
    await refusedLot(partId);
    for (let i = 0; i < 4; i += 1) await refusedLot(partId);
    const last = await refusedLot(partId, 'hold');
    const stopped = await registeredLot(house, { partId });
    expect(stopped.severity).toBe('discontinued');
    expect((stopped.severityReasons as string[]).join(' ')).toContain('corrective action');

    await measured(house, last.id, good(20));
    await decided(house.quality, last.id, {
      decision: 'accept',
      correction: 'Blanks of the second saw are kept apart since week 46.',
    });
    const resumed = await registeredLot(house, { partId });
    expect(resumed.severity).toBe('tightened');
    expect((resumed.severityReasons as string[])[0]).toContain('corrective action was agreed');

    // The lot after it finds the same record: the resumed lot counts as the first tightened one.
    await measured(house, resumed.id, good(resumed.unitsPlanned));
    await decided(house.quality, resumed.id, { decision: 'accept', correction: '' });
    const following = await registeredLot(house, { partId });
    expect(following.severity).toBe('tightened');
    expect((following.severityReasons as string[]).join(' ')).toContain('so far one lot');
  });
});
