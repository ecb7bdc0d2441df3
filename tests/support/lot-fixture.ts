import { randomUUID } from 'node:crypto';
import { analyseLot } from '@shared/analysis/analyse-lot';
import { type AnalysisCriteria } from '@shared/analysis/criteria';
import { UnitCollector, type UnitReading } from '@shared/analysis/units';
import { type Analysis } from '@shared/contract/analysis';
import { type Disposition } from '@shared/contract/dispositions';
import { type HistoryEntry } from '@shared/contract/history';
import { type Lot } from '@shared/contract/lots';
import { PartCriteria } from '@shared/contract/parts';
import { ReceiverCriteria } from '@shared/contract/receivers';
import { type Upload } from '@shared/contract/uploads';
import { normalQuantile } from '@shared/statistics/distributions/normal';

/*
 * A lot as the server would answer it, its analysis made by the real computation on invented readings.
 * For tests of pieces and pages that need contract-shaped data without a server.
 */
export const at = '2026-11-30T09:12:00.000Z';
const quality = { id: randomUUID(), name: 'Quentin Quality' };
const hash = (n: number) => n.toString(16).padStart(2, '0').repeat(32);

export const partCriteria = PartCriteria.parse({
  nominalFrequencyHz: '16000000',
  toleranceLowPpm: -10,
  toleranceHighPpm: 10,
  stabilityPpm: 15,
  temperatureLowC: -40,
  temperatureHighC: 85,
  ageingFirstYearPpm: 1,
  ageingTenYearsPpm: 3,
  supplyPpm: 0.2,
  loadPpm: 0.5,
  loadCapacitancePf: 8,
  samplingRule: { kind: 'attribute', level: 'II', aqlPercent: 0.25 },
  decisionRule: { kind: 'guardedAcceptance', factor: 1 },
});
export const receiverCriteria = ReceiverCriteria.parse({
  carrierHz: '868300000',
  symbolRateHz: '300000',
  pulse: 'root_raised_cosine',
  rollOff: 0.35,
  frontEndBandwidthHz: '500000',
  farEndTolerancePpm: 12,
  greatestSpeedMps: 30,
  serviceLifeYears: 10,
});
const meter = ReceiverCriteria.parse({
  ...receiverCriteria,
  carrierHz: '433920000',
  symbolRateHz: '100000',
  frontEndBandwidthHz: '180000',
});

export interface LotFixtureOptions {
  units?: number;
  lotSize?: number;
  meanPpm?: number;
  sdPpm?: number;
  beyondPpm?: readonly number[];
  withTemperature?: boolean;
  withTime?: boolean;
  criteria?: Partial<AnalysisCriteria>;
}

/** Normal scores instead of random numbers: every run is the same lot. */
export function offsetsOf({
  units = 200,
  meanPpm = 1.9,
  sdPpm = 2.2,
  beyondPpm = [-12.9, 11, 11.6],
}: LotFixtureOptions): number[] {
  const body = units - beyondPpm.length;
  return [
    ...Array.from({ length: body }, (_, i) => meanPpm + sdPpm * normalQuantile((i + 0.5) / body)),
    ...beyondPpm,
  ];
}

export function criteriaOf(lotSize: number): AnalysisCriteria {
  return {
    part: {
      id: randomUUID(),
      partNumber: 'TX26-16M0',
      revisionId: randomUUID(),
      revision: 'C',
      effectiveFrom: '2026-03-02',
      criteria: partCriteria,
    },
    receivers: [
      {
        receiverId: randomUUID(),
        revisionId: randomUUID(),
        name: 'Gate link 868',
        revision: 'B',
        criteria: receiverCriteria,
      },
      {
        receiverId: randomUUID(),
        revisionId: randomUUID(),
        name: 'Meter link 433',
        revision: 'A',
        criteria: meter,
      },
    ],
    samplingRule: partCriteria.samplingRule,
    severity: 'normal',
    lotSize,
    bench: {
      name: 'Bench 3',
      expandedUncertaintyPpm: 1,
      coverageFactor: 2,
      calibrationDue: '2027-05-01',
      inCalibration: true,
    },
  };
}

export function analysisFixture(options: LotFixtureOptions = {}) {
  const criteria = { ...criteriaOf(options.lotSize ?? 3000), ...options.criteria };
  const collector = new UnitCollector(25);
  const reading = (offsetPpm: number, fileLine: number, more: Partial<UnitReading> = {}) => ({
    offsetPpm,
    temperatureC: 25,
    measuredAtMs: null,
    resistanceOhm: null,
    fileLine,
    uploadNumber: 1,
    ...more,
  });
  offsetsOf(options).forEach((offsetPpm, i) => {
    const line = i + 2;
    if (options.withTemperature && i < 12) {
      collector.addUnit(
        [-40, -20, 0, 25, 45, 65, 85].map((temperatureC) =>
          reading(
            offsetPpm + 1.1e-4 * (temperatureC - 25) ** 3 * 0.7 - 0.22 * (temperatureC - 25),
            line,
            { temperatureC },
          ),
        ),
      );
    } else if (options.withTime && i === 20) {
      const day = 86_400_000;
      collector.addUnit(
        Array.from({ length: 64 }, (_, k) =>
          reading(offsetPpm + 0.8 * Math.log(1 + 0.3 * k) + 0.05 * Math.sin(7 * k), line, {
            measuredAtMs: Date.parse(at) + k * day,
          }),
        ),
      );
    } else collector.addSingle(offsetPpm, 1, line);
  });
  const { result, sortedPpm } = analyseLot({
    units: collector.finish(),
    criteria,
    refusedRows: 2,
    identify: ({ fileLine }) => ({
      serial: `A${String(fileLine).padStart(5, '0')}`,
      uploadId: uploadId,
    }),
  });
  const analysis: Analysis = {
    ...result,
    id: randomUUID(),
    lotId,
    version: 2,
    createdAt: at,
    frozenAt: null,
    superseded: false,
    inputHash: hash(17),
    criteriaHash: hash(34),
    resultHash: hash(51),
    criteria: {
      partNumber: criteria.part.partNumber,
      partRevision: criteria.part.revision,
      effectiveFrom: criteria.part.effectiveFrom,
      receivers: criteria.receivers.map(({ name, revision }) => ({ name, revision })),
      bench: criteria.bench?.name ?? null,
    },
  };
  return { analysis, criteria, sortedPpm };
}

const lotId = randomUUID();
const uploadId = randomUUID();

export function lotFixture(
  options: LotFixtureOptions = {},
  changes: Partial<Lot> = {},
): { lot: Lot; analysis: Analysis; sortedPpm: Float64Array } {
  const { analysis, criteria, sortedPpm } = analysisFixture(options);
  const head = {
    effectiveFrom: '2026-03-02',
    changeNote: '',
    createdBy: quality,
    createdAt: at,
    approval: null,
    inForce: true,
    version: 1,
    state: 'approved' as const,
  };
  const lot: Lot = {
    id: lotId,
    lotNumber: 'L-2611-084',
    state: 'awaiting_disposition',
    stateSince: at,
    part: {
      id: criteria.part.id,
      partNumber: 'TX26-16M0',
      deviceKind: 'crystal',
      revision: 'C',
      nominalFrequencyHz: '16000000',
    },
    supplier: { id: randomUUID(), name: 'Marrow Bay Resonators' },
    dateCode: '2644',
    purchaseOrder: 'PO 4711',
    lotSize: criteria.lotSize,
    receivedOn: '2026-11-28',
    unitsMeasured: analysis.units,
    unitsOwed: 0,
    unitsPlanned: analysis.unitsPlanned,
    beyondCount: analysis.beyond.limits.count,
    finding: analysis.finding.decision,
    bandStrip: analysis.bandStrip,
    next: { text: 'Decide on the lot', overdue: false, mine: true },
    parentLotId: null,
    version: 3,
    createdAt: at,
    registeredBy: { id: randomUUID(), name: 'Tilda Technician' },
    partRevision: {
      ...head,
      id: criteria.part.revisionId,
      revision: 'C',
      partId: criteria.part.id,
      criteria: criteria.part.criteria,
    },
    receivers: criteria.receivers.map((r) => ({
      ...head,
      id: r.revisionId,
      revision: r.revision,
      receiverId: r.receiverId,
      criteria: r.criteria,
      name: r.name,
    })),
    newerRevision: null,
    severity: 'normal',
    severityReasons: ['Normal inspection: fewer than five lots of this part were seen so far.'],
    plan: {
      text: analysis.sampling.text,
      sampleSize: analysis.sampling.sampleSize,
      codeLetter: 'K',
      acceptanceNumber: analysis.sampling.acceptanceNumber,
      rejectionNumber: analysis.sampling.rejectionNumber,
      acceptabilityConstant: null,
    },
    owed: [],
    currentAnalysisId: analysis.id,
    openHoldId: null,
    parent: null,
    subLots: [],
    may: {
      upload: true,
      decide: ['accept', 'hold', 'accept_under_concession', 'inspect_all', 'reject'],
      countersign: false,
      rejudge: false,
      withdrawUpload: true,
      change: true,
    },
    ...changes,
  };
  return { lot, analysis, sortedPpm };
}

export function dispositionFixture(
  { lot, analysis }: { lot: Lot; analysis: Analysis },
  changes: Partial<Disposition> = {},
): Disposition {
  const id = changes.id ?? randomUUID();
  return {
    id,
    lotId: lot.id,
    number: 1,
    decision: 'hold',
    reason: 'Three units beyond ±10 ppm against an acceptance number of 1.',
    state: 'in_force',
    treatment: null,
    concession: null,
    correction: '',
    analysisId: analysis.id,
    analysisVersion: analysis.version,
    contentHash: hash(171),
    current: true,
    signedAt: at,
    signedBy: quality,
    holdId: null,
    customerApprovals: [],
    ...changes,
    signatures: changes.signatures ?? [
      {
        id: randomUUID(),
        person: quality,
        role: 'quality_engineer',
        meaning: 'hold of the lot',
        reason: 'Three units beyond ±10 ppm against an acceptance number of 1.',
        signedAt: at,
        zone: 'UTC',
        recordType: 'disposition',
        recordId: id,
        recordVersion: 1,
        contentHash: hash(171),
      },
    ],
  };
}

export function uploadFixture(lot: Lot, changes: Partial<Upload> = {}): Upload {
  return {
    id: uploadId,
    lotId: lot.id,
    lotNumber: lot.lotNumber,
    fileName: 'L-2611-084 run 1.csv',
    byteCount: 18_204,
    sha256: hash(204),
    state: 'done',
    bench: { id: randomUUID(), name: 'Bench 3' },
    mapping: null,
    rowsInFile: 202,
    rowsTaken: 200,
    rowsRefused: 2,
    unitsCount: 200,
    progress: { bytesRead: 18_204, rowsPerSecond: null, secondsLeft: null, stage: 'finished' },
    failure: null,
    warnings: [],
    uploadedBy: lot.registeredBy,
    createdAt: at,
    startedAt: at,
    finishedAt: at,
    withdrawnAt: null,
    withdrawnReason: null,
    ...changes,
  };
}

export function historyFixture(lot: Lot): HistoryEntry[] {
  const entry = (sequence: number, act: string, after: Record<string, unknown>): HistoryEntry => ({
    sequence,
    id: randomUUID(),
    at,
    act,
    actor: { id: lot.registeredBy.id, name: lot.registeredBy.name, role: 'technician' },
    recordType: 'lot',
    recordId: lot.id,
    recordLabel: lot.lotNumber,
    lotId: lot.id,
    before: null,
    after,
    reason: '',
    previousHash: hash(sequence),
    hash: hash(sequence + 1),
  });
  return [
    entry(42, 'upload.ingest', { rowsInFile: 202, rowsTaken: 200, rowsRefused: 2 }),
    entry(41, 'lot.register', { lotNumber: lot.lotNumber, lotSize: lot.lotSize }),
  ];
}
