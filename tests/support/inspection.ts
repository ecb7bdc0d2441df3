import { PartCriteria } from '../../shared/contract/parts';
import { Bench, Lot, Part, PartRevision } from '../../server/models';
import { type Api } from './api';

/** Criteria of an invented 16 MHz part; `changes` replace members. */
export function someCriteria(changes: Partial<PartCriteria> = {}): PartCriteria {
  return PartCriteria.parse({
    nominalFrequencyHz: '16000000',
    toleranceLowPpm: -10,
    toleranceHighPpm: 10,
    samplingRule: { kind: 'everyUnit' },
    decisionRule: { kind: 'simple' },
    ...changes,
  });
}

let counter = 0;

/** A lot of an approved part, ready to take readings. */
export async function someLot(
  api: Pick<Api, 'people' | 'suppliers'>,
  options: { criteria?: Partial<PartCriteria>; lot?: Partial<Lot['_creationAttributes']> } = {},
): Promise<Lot> {
  counter += 1;
  const mark = `${process.pid}-${counter}`;
  const criteria = someCriteria(options.criteria);
  const part = await Part.create({ partNumber: `QX-${mark}`, deviceKind: 'crystal' });
  const revision = await PartRevision.create({
    partId: part.id,
    revision: 'A',
    state: 'approved',
    effectiveFrom: '2026-01-01',
    nominalFrequencyHz: criteria.nominalFrequencyHz,
    criteria,
    createdBy: api.people.admin.id,
  });
  return Lot.create({
    lotNumber: `L-${mark}`,
    supplierId: api.suppliers.first.id,
    partId: part.id,
    partRevisionId: revision.id,
    lotSize: 1000,
    receivedOn: '2026-11-30',
    unitsPlanned: 1000,
    registeredBy: api.people.technician.id,
    ...options.lot,
  });
}

export function someBench(changes: Partial<Bench['_creationAttributes']> = {}): Promise<Bench> {
  counter += 1;
  return Bench.create({
    name: `Bench ${process.pid}-${counter}`,
    counter: 'reciprocal counter',
    expandedUncertaintyPpm: 0.02,
    calibrationDue: '2099-12-31',
    ...changes,
  });
}
