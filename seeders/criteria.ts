import { PartCriteria } from '../shared/contract/parts';
import { ReceiverCriteria } from '../shared/contract/receivers';
import { type z } from 'zod';
import { type Actor } from '../server/http/actor';
import { PartRevision, ReceiverRevision } from '../server/models';
import { addPart } from '../server/services/parts/keep-parts';
import { addReceiver } from '../server/services/receivers/keep-receivers';
import { approveRevision } from '../server/services/revisions/approve-revision';
import { draftRevision } from '../server/services/revisions/draft-revision';

const inForceSince = '2026-03-02';

const receivers = {
  'Meterlink 2.4 GHz': {
    description: 'meter radio, demo',
    criteria: {
      carrierHz: '2440000000',
      symbolRateHz: '1000000',
      pulse: 'root_raised_cosine',
      rollOff: 0.35,
      frontEndBandwidthHz: '2000000',
      farEndTolerancePpm: 20,
      greatestSpeedMps: 35,
      serviceLifeYears: 10,
      allowedShareBeyond: 0.02,
    },
  },
  'Fieldnode 868 MHz': {
    description: 'field sensor, demo',
    criteria: {
      carrierHz: '868300000',
      symbolRateHz: '50000',
      pulse: 'rectangular',
      rollOff: null,
      frontEndBandwidthHz: '200000',
      farEndTolerancePpm: 2.5,
      greatestSpeedMps: 10,
      serviceLifeYears: 10,
      allowedShareBeyond: 0.03,
    },
  },
  'Harbourlink 5.8 GHz': {
    description: 'quay-side bridge, demo',
    criteria: {
      carrierHz: '5800000000',
      symbolRateHz: '5000000',
      pulse: 'root_raised_cosine',
      rollOff: 0.25,
      frontEndBandwidthHz: '10000000',
      farEndTolerancePpm: 25,
      greatestSpeedMps: 15,
      serviceLifeYears: 8,
      allowedShareBeyond: 0.04,
    },
  },
  'Ridgeline relay 3.5 GHz': {
    description: 'mountain relay, demo',
    criteria: {
      carrierHz: '3500000000',
      symbolRateHz: '100000',
      pulse: 'root_raised_cosine',
      rollOff: 0.2,
      frontEndBandwidthHz: '300000',
      farEndTolerancePpm: 0.5,
      greatestSpeedMps: 0,
      serviceLifeYears: 10,
      allowedShareBeyond: 0.001,
    },
  },
} satisfies Record<string, { description: string; criteria: z.input<typeof ReceiverCriteria> }>;

interface PartSeed {
  kind: 'crystal' | 'XO' | 'TCXO' | 'OCXO';
  description: string;
  usedBy: (keyof typeof receivers)[];
  criteria: z.input<typeof PartCriteria>;
}

const parts: Record<string, PartSeed> = {
  'TX26-16M0': {
    kind: 'crystal',
    description: '16 MHz crystal unit, AT cut, 2.5 x 2.0 mm',
    usedBy: ['Meterlink 2.4 GHz'],
    criteria: {
      nominalFrequencyHz: '16000000',
      toleranceLowPpm: -10,
      toleranceHighPpm: 10,
      stabilityPpm: 15,
      temperatureLowC: -40,
      temperatureHighC: 85,
      ageingFirstYearPpm: 2,
      ageingTenYearsPpm: 5,
      loadCapacitancePf: 8,
      motionalCapacitanceFf: 2.4,
      shuntCapacitancePf: 0.9,
      samplingRule: { kind: 'attribute', level: 'II', aqlPercent: 0.25 },
      decisionRule: { kind: 'guardedAcceptance', factor: 1 },
    },
  },
  'TC10-26M0': {
    kind: 'TCXO',
    description: '26 MHz TCXO, clipped sine',
    usedBy: ['Fieldnode 868 MHz'],
    criteria: {
      nominalFrequencyHz: '26000000',
      toleranceLowPpm: -1.5,
      toleranceHighPpm: 1.5,
      stabilityPpm: 0.5,
      temperatureLowC: -40,
      temperatureHighC: 85,
      ageingFirstYearPpm: 0.5,
      ageingTenYearsPpm: 1.5,
      supplyPpm: 0.1,
      loadPpm: 0.1,
      samplingRule: { kind: 'attribute', level: 'II', aqlPercent: 0.4 },
      decisionRule: { kind: 'guardedAcceptance', factor: 1 },
    },
  },
  'FK03-32K768': {
    kind: 'crystal',
    description: '32.768 kHz tuning-fork crystal',
    usedBy: [],
    criteria: {
      nominalFrequencyHz: '32768',
      toleranceLowPpm: -20,
      toleranceHighPpm: 20,
      temperatureLowC: -40,
      temperatureHighC: 85,
      ageingFirstYearPpm: 3,
      loadCapacitancePf: 12.5,
      samplingRule: { kind: 'attribute', level: 'II', aqlPercent: 0.065 },
      decisionRule: { kind: 'simple' },
    },
  },
  'XO33-40M0': {
    kind: 'XO',
    description: '40 MHz oscillator, 3.3 V',
    usedBy: ['Harbourlink 5.8 GHz'],
    criteria: {
      nominalFrequencyHz: '40000000',
      toleranceLowPpm: -25,
      toleranceHighPpm: 25,
      stabilityPpm: 25,
      temperatureLowC: -40,
      temperatureHighC: 85,
      ageingFirstYearPpm: 3,
      ageingTenYearsPpm: 10,
      supplyPpm: 2,
      samplingRule: { kind: 'zeroAcceptance', limitingQualityPercent: 2.8, consumersRisk: 0.1 },
      decisionRule: { kind: 'guardedAcceptance', factor: 1 },
    },
  },
  'OC20-10M0': {
    kind: 'OCXO',
    description: '10 MHz oven oscillator',
    usedBy: ['Ridgeline relay 3.5 GHz'],
    criteria: {
      nominalFrequencyHz: '10000000',
      toleranceLowPpm: -0.1,
      toleranceHighPpm: 0.1,
      stabilityPpm: 0.01,
      temperatureLowC: -20,
      temperatureHighC: 70,
      ageingFirstYearPpm: 0.05,
      ageingTenYearsPpm: 0.3,
      samplingRule: { kind: 'everyUnit', allowedNonconforming: 0 },
      decisionRule: { kind: 'simple' },
      repeatReadings: 'repeat',
    },
  },
};

/** Receivers, parts and their approved first revisions; one part has a second revision that waits for approval. */
export async function seedCriteria(
  admin: Actor,
  quality: Actor,
  passphrase: string,
): Promise<Map<string, string>> {
  const approval = {
    password: passphrase,
    reason: 'Agreed with the radio team.',
    effectiveFrom: inForceSince,
  };
  const receiverIds = new Map<string, string>();
  for (const [name, { description, criteria }] of Object.entries(receivers)) {
    const id = await addReceiver(admin, {
      name,
      description,
      active: true,
      revision: 'A',
      changeNote: 'First issue.',
      criteria: ReceiverCriteria.parse(criteria),
    });
    const revision = (await ReceiverRevision.findOne({ where: { receiverId: id } }))!;
    await approveRevision('receiver', quality, id, revision.id, approval);
    receiverIds.set(name, id);
  }
  const partIds = new Map<string, string>();
  for (const [partNumber, { kind, description, usedBy, criteria }] of Object.entries(parts)) {
    const id = await addPart(admin, {
      partNumber,
      deviceKind: kind,
      description,
      active: true,
      receiverIds: usedBy.map((name) => receiverIds.get(name)!),
      revision: 'A',
      changeNote: 'First issue.',
      criteria: PartCriteria.parse(criteria),
    });
    const revision = (await PartRevision.findOne({ where: { partId: id } }))!;
    await approveRevision('part', quality, id, revision.id, approval);
    partIds.set(partNumber, id);
  }
  const crystal = parts['TX26-16M0']!.criteria;
  await draftRevision('part', admin, partIds.get('TX26-16M0')!, {
    revision: 'B',
    changeNote: 'Tolerance drawn in to ±8 ppm for the next meter radio.',
    criteria: PartCriteria.parse({ ...crystal, toleranceLowPpm: -8, toleranceHighPpm: 8 }),
  });
  return partIds;
}
