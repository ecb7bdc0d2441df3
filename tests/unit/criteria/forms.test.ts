import { expect, test } from 'vitest';
import { PartCriteria } from '@shared/contract/parts';
import { ReceiverCriteria } from '@shared/contract/receivers';
import { date } from '@shared/format/dates';
import { airInterfaces, startReceiver } from '@shared/radio/air-interfaces';
import { pairRows } from '@/components/criteria/criterion-row';
import { fieldsOfServer, fromPercent, toPercent } from '@/components/criteria/form-values';
import { nextRevisionName, revisionWord } from '@/components/criteria/revision-word';
import * as part from '@/components/parts/part-form';
import { partCriteriaRows } from '@/components/parts/part-criteria-rows';
import { saidByInterface, startValues } from '@/components/receivers/air-interface-text';
import * as receiver from '@/components/receivers/receiver-form';
import { receiverCriteriaRows } from '@/components/receivers/receiver-criteria-rows';
import { personErrors, personFields } from '@/components/people/person-form';
import { benchErrors, benchValues } from '@/components/benches/bench-form';

/** Says the key and what goes into it: enough to see that the right sentence is chosen. */
const t = (key: string, values: Record<string, unknown> = {}) =>
  [key, ...Object.values(values)].join(' ');

const partRules = [
  { kind: 'attribute', level: 'S-3', aqlPercent: 0.4 },
  { kind: 'variables', level: 'II', aqlPercent: 1 },
  { kind: 'zeroAcceptance', limitingQualityPercent: 2.8, consumersRisk: 0.07 },
  { kind: 'everyUnit', allowedNonconforming: 2 },
] as const;
const partCriteria = (changes: object = {}) =>
  PartCriteria.parse({
    nominalFrequencyHz: '10000000.126856699585915',
    toleranceLowPpm: null,
    toleranceHighPpm: 10,
    requiredTemperaturesC: [-40, 85],
    samplingRule: partRules[0],
    decisionRule: { kind: 'guardedRejection', factor: 0.5 },
    ...changes,
  });
const receiverCriteria = (changes: object = {}) =>
  ReceiverCriteria.parse({
    carrierHz: '2440000000',
    symbolRateHz: '1000000',
    pulse: 'root_raised_cosine',
    rollOff: 0.35,
    frontEndBandwidthHz: '2000000',
    shareOfSymbolRate: 0.07,
    farEndTolerancePpm: 20,
    allowedShareBeyond: 0.0029,
    ...changes,
  });

test.each(partRules)(
  'criteria of a part with a rule "$kind" come out of the form as they went in',
  (samplingRule) => {
    const criteria = partCriteria({ samplingRule });
    expect(part.criteriaOf(part.valuesOf(criteria))).toEqual(criteria);
    expect(part.criteriaErrors(part.valuesOf(criteria), t)).toEqual({});
  },
);

test('criteria of a receiver come out of the form as they went in, shares told in percent', () => {
  const criteria = receiverCriteria();
  const values = receiver.valuesOf(criteria);
  expect(values.shareOfSymbolRatePercent).toBe(7);
  expect(values.allowedShareBeyondPercent).toBe(0.29);
  expect(receiver.criteriaOf(values)).toEqual(criteria);
});

test('a rectangular pulse takes no roll-off along, though the form remembers it', () => {
  const values = { ...receiver.valuesOf(receiverCriteria()), pulse: 'rectangular' as const };
  expect(receiver.criteriaOf(values).rollOff).toBeNull();
  expect(receiver.completeCriteria(values)).not.toBeNull();
});

test('what is missing or crossed is told at its own field of the form', () => {
  const errors = part.criteriaErrors(
    {
      ...part.valuesOf(partCriteria()),
      nominalFrequencyHz: '',
      toleranceLowPpm: 12,
      samplingKind: 'zeroAcceptance',
      consumersRiskPercent: null,
      guardFactor: null,
      supplyPpm: -1,
    },
    t,
  );
  expect(Object.keys(errors).sort()).toEqual([
    'consumersRiskPercent',
    'guardFactor',
    'nominalFrequencyHz',
    'supplyPpm',
  ]);
  expect(errors.guardFactor).toBe('criteria.needed');
  expect(errors.supplyPpm).toBe('criteria.notBelowZero');
  expect(part.criteriaErrors({ ...part.valuesOf(partCriteria()), toleranceLowPpm: 12 }, t)).toEqual(
    { toleranceHighPpm: 'The upper limit must lie above the lower one.' },
  );
});

test('a refusal of the server ends at the field of the form', () => {
  expect(
    fieldsOfServer(
      { 'criteria.samplingRule.consumersRisk': 'a', 'criteria.requiredTemperaturesC.0': 'b' },
      part.renamed,
    ),
  ).toEqual({ consumersRiskPercent: 'a', requiredTemperaturesC: 'b' });
});

test('every share in steps of a hundredth of a percent survives the way to percent and back', () => {
  for (let i = 0; i <= 10_000; i += 1) {
    const share = i / 10_000;
    expect(fromPercent(toPercent(share))).toBe(share);
  }
});

test('two revisions differ in the rows whose words differ, and no criterion is left out of the rows', () => {
  const before = partCriteria();
  const after = partCriteria({ toleranceHighPpm: 8, decisionRule: { kind: 'simple' } });
  const pairs = pairRows(partCriteriaRows(before, t), partCriteriaRows(after, t));
  expect(pairs.filter(({ differs }) => differs).map(({ key }) => key)).toEqual([
    'limits',
    'decisionRule',
  ]);
  const changes: Partial<Record<keyof PartCriteria, unknown>> = {
    nominalFrequencyHz: '16000000',
    toleranceLowPpm: -3,
    toleranceHighPpm: 8,
    referenceTemperatureC: 27,
    stabilityPpm: 15,
    temperatureLowC: -40,
    ageingFirstYearPpm: 2,
    ageingTenYearsPpm: 5,
    supplyPpm: 1,
    loadPpm: 1,
    loadCapacitancePf: 8,
    motionalCapacitanceFf: 2.4,
    shuntCapacitancePf: 0.9,
    greatestResistanceOhm: 80,
    samplingRule: partRules[3],
    decisionRule: { kind: 'simple' },
    repeatReadings: 'repeat',
    requiredTemperaturesC: [25],
    requireBenchInCalibration: false,
  };
  for (const [field, value] of Object.entries(changes)) {
    const both = {
      temperatureHighC: 85,
      ...(field === 'temperatureLowC' && { temperatureLowC: -20 }),
    };
    const rows = partCriteriaRows(partCriteria(both), t);
    const changed = partCriteriaRows(partCriteria({ ...both, [field]: value }), t);
    expect(
      pairRows(rows, changed).some(({ differs }) => differs),
      field,
    ).toBe(true);
  }
  expect(
    pairRows(
      receiverCriteriaRows(receiverCriteria(), t),
      receiverCriteriaRows(receiverCriteria({ farEndModel: 'normal' }), t),
    )
      .filter(({ differs }) => differs)
      .map(({ key }) => key),
  ).toEqual(['farEndModel']);
});

test('a revision is a draft, in force, to come or followed by another', () => {
  const today = '2026-12-01';
  const approved = { state: 'approved', inForce: false } as const;
  expect(revisionWord({ state: 'draft', inForce: false, effectiveFrom: null }, today, t)).toBe(
    'criteria.draft',
  );
  expect(revisionWord({ ...approved, inForce: true, effectiveFrom: '2026-03-02' }, today, t)).toBe(
    `criteria.inForce ${date('2026-03-02')}`,
  );
  expect(revisionWord({ ...approved, effectiveFrom: '2027-01-01' }, today, t)).toBe(
    `criteria.comes ${date('2027-01-01')}`,
  );
  expect(revisionWord({ ...approved, effectiveFrom: '2025-01-01' }, today, t)).toBe(
    `criteria.superseded ${date('2025-01-01')}`,
  );
});

test('the next revision takes the next letter or number, and asks where neither says what follows', () => {
  expect(nextRevisionName([])).toBe('A');
  expect(nextRevisionName(['B', 'A'])).toBe('C');
  expect(nextRevisionName(['9', '8'])).toBe('10');
  expect(nextRevisionName(['A', 'B'])).toBe('');
  expect(nextRevisionName(['A-2'])).toBe('');
});

test.each(airInterfaces)('$id fills a form with nothing but what it says', (entry) => {
  const start = startReceiver(entry);
  const values = { ...receiver.emptyCriteria(), ...startValues(entry) };
  expect(Number(values.carrierHz)).toBe(start.carrierHz);
  expect(values.symbolRateHz === '').toBe(start.missing.includes('symbolRateHz'));
  expect(values.frontEndBandwidthHz === '').toBe(start.missing.includes('frontEndBandwidthHz'));
  expect(values.farEndTolerancePpm).toBe(start.farEndTolerancePpm);
  const said = saidByInterface(entry);
  for (const field of start.missing.filter((name) => name !== 'pulse'))
    expect(said[field]).toBeUndefined();
  expect(receiver.completeCriteria(values) === null).toBe(start.missing.length > 0);
});

test('only a supplier contact is bound to a supplier, and then must be', () => {
  const person = {
    name: 'Ada',
    email: 'ada@example.com',
    role: 'technician',
    supplierId: 'x',
  } as const;
  expect(personFields(person).supplierId).toBeNull();
  expect(personErrors(person, t)).toEqual({});
  expect(personErrors({ ...person, role: 'supplier_contact', supplierId: '' }, t)).toEqual({
    supplierId: 'people.supplierNeeded',
  });
});

test('a bench has both ends of its chamber or neither', () => {
  const bench = {
    ...benchValues(),
    name: 'Bench 3',
    counter: 'C',
    expandedUncertaintyPpm: 0.5,
    calibrationDue: '2027-01-01',
  };
  expect(benchErrors(bench, t)).toEqual({});
  expect(benchErrors({ ...bench, chamberLowC: -40 }, t)).toEqual({
    chamberHighC: 'benches.chamberBoth',
  });
  expect(benchErrors({ ...bench, chamberLowC: 85, chamberHighC: -40 }, t)).toEqual({
    chamberHighC: 'benches.chamberCrossed',
  });
});
