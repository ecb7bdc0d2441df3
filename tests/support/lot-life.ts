import { randomBytes } from 'node:crypto';
import { type BodyInput } from '../../shared/contract/endpoint';
import { type signDisposition } from '../../shared/contract/dispositions';
import { type PartCriteria } from '../../shared/contract/parts';
import { type ReceiverCriteria } from '../../shared/contract/receivers';
import { normalQuantile } from '../../shared/statistics/distributions/normal';
import { loadUpload } from '../../server/services/uploads/load-upload';
import { passphrase, type Agent, type Api } from './api';
import { someBench } from './inspection';
import { plainHeader, uploadText } from './readings';

/*
 * A lot's life by the product's own interface: parts and receivers are drafted by the administrator and approved by a
 * quality engineer, lots registered and measured by the technician. Loading an upload, which a worker does, is called
 * directly, so that a test says when it happens.
 */
export interface House {
  api: Api;
  technician: Agent;
  quality: Agent;
  quality2: Agent;
  admin: Agent;
  auditor: Agent;
  supplier: Agent;
}

export async function openHouse(api: Api): Promise<House> {
  await someBench({ usual: true });
  const [technician, quality, quality2, admin, auditor, supplier] = await Promise.all(
    (['technician', 'quality', 'quality2', 'admin', 'auditor', 'supplier'] as const).map((who) =>
      api.agentFor(who),
    ),
  );
  return {
    api,
    technician: technician!,
    quality: quality!,
    quality2: quality2!,
    admin: admin!,
    auditor: auditor!,
    supplier: supplier!,
  };
}

/** Zero acceptance at 16 MHz, ±10 ppm, no guard band; `changes` replace members. */
export const criteriaOf = (changes: Partial<PartCriteria> = {}) => ({
  nominalFrequencyHz: '16000000',
  toleranceLowPpm: -10,
  toleranceHighPpm: 10,
  samplingRule: { kind: 'zeroAcceptance', limitingQualityPercent: 20, consumersRisk: 0.1 },
  decisionRule: { kind: 'simple' },
  ...changes,
});

export const receiverOf = (changes: Partial<ReceiverCriteria> = {}) => ({
  carrierHz: '868300000',
  symbolRateHz: '300000',
  pulse: 'root_raised_cosine',
  rollOff: 0.35,
  frontEndBandwidthHz: '500000',
  farEndTolerancePpm: 12,
  greatestSpeedMps: 30,
  ...changes,
});

export const mark = () => randomBytes(4).toString('hex');
export const today = () => new Date().toISOString().slice(0, 10);
export const inDays = (days: number) =>
  new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10);

/** A part whose revision A is approved from `effectiveFrom`. */
export async function approvedPart(
  { admin, quality }: House,
  options: {
    criteria?: Partial<PartCriteria>;
    effectiveFrom?: string;
    receiverIds?: string[];
    partNumber?: string;
  } = {},
): Promise<{ id: string; partNumber: string; revisionId: string }> {
  const made = await admin
    .post('/api/parts')
    .send({
      partNumber: options.partNumber ?? `TX-${mark()}`,
      deviceKind: 'TCXO',
      criteria: criteriaOf(options.criteria),
      receiverIds: options.receiverIds ?? [],
    })
    .expect(201);
  const [revision] = made.body.revisions;
  await quality
    .post(`/api/parts/${made.body.id}/revisions/${revision.id}/approval`)
    .send({
      password: passphrase,
      reason: 'Agreed with design.',
      effectiveFrom: options.effectiveFrom ?? '2026-01-01',
    })
    .expect(200);
  return { id: made.body.id, partNumber: made.body.partNumber, revisionId: revision.id };
}

/** Drafts and approves another revision; answers its id. */
export async function nextRevision(
  { admin, quality }: House,
  partId: string,
  revision: string,
  effectiveFrom: string,
  criteria: Partial<PartCriteria> = {},
): Promise<string> {
  const drafted = await admin
    .post(`/api/parts/${partId}/revisions`)
    .send({ revision, changeNote: 'Changed.', criteria: criteriaOf(criteria) })
    .expect(201);
  const { id } = (drafted.body.revisions as { id: string; revision: string }[]).find(
    (r) => r.revision === revision,
  )!;
  await quality
    .post(`/api/parts/${partId}/revisions/${id}/approval`)
    .send({ password: passphrase, reason: 'Agreed with design.', effectiveFrom })
    .expect(200);
  return id;
}

export async function approvedReceiver(
  { admin, quality }: House,
  criteria: Partial<ReceiverCriteria> = {},
): Promise<{ id: string; revisionId: string; name: string }> {
  const made = await admin
    .post('/api/receivers')
    .send({ name: `Gate link ${mark()}`, criteria: receiverOf(criteria) })
    .expect(201);
  const [revision] = made.body.revisions;
  await quality
    .post(`/api/receivers/${made.body.id}/revisions/${revision.id}/approval`)
    .send({ password: passphrase, reason: 'Agreed.', effectiveFrom: '2026-01-01' })
    .expect(200);
  return { id: made.body.id, revisionId: revision.id, name: made.body.name };
}

export interface LotWishes {
  partId: string;
  lotNumber?: string;
  lotSize?: number;
  dateCode?: string;
  receivedOn?: string;
  supplierId?: string;
}

/** Registers a lot of 40 units, of which the usual plan asks for 10. */
export async function registeredLot(house: House, wishes: LotWishes) {
  const answer = await house.technician
    .post('/api/lots')
    .send({
      lotNumber: `L-${mark()}`,
      supplierId: house.api.suppliers.first.id,
      lotSize: 40,
      dateCode: '2644',
      receivedOn: today(),
      ...wishes,
    })
    .expect(201);
  return answer.body as LotAnswer;
}

export interface LotAnswer {
  id: string;
  lotNumber: string;
  state: string;
  version: number;
  unitsPlanned: number;
  unitsMeasured: number;
  owed: { kind: string; text: string }[];
  may: { upload: boolean; decide: string[]; countersign: boolean; rejudge: boolean };
  currentAnalysisId: string | null;
  openHoldId: string | null;
  finding: string | null;
  partRevision: { id: string; revision: string };
  receivers: { id: string; revision: string; name: string }[];
  subLots: { id: string }[];
  parent: { id: string } | null;
  [key: string]: unknown;
}

export const lotOf = async (agent: Agent, id: string) =>
  (await agent.get(`/api/lots/${id}`).expect(200)).body as LotAnswer;

let serial = 0;
/** Readings at 16 MHz: these offsets in ppm, each a unit of its own. */
export function offsetsCsv(offsetsPpm: readonly number[], prefix = 'U'): string {
  const rows = offsetsPpm.map((ppm) => {
    serial += 1;
    return `${prefix}${String(serial).padStart(6, '0')},25,${(16_000_000 + ppm * 16).toFixed(4)},`;
  });
  return `${plainHeader}\n${rows.join('\n')}\n`;
}

/** Normal scores instead of random numbers: the same units in every run. */
export const spread = (count: number, meanPpm = 0.5, sdPpm = 1.5) =>
  Array.from({ length: count }, (_, i) => meanPpm + sdPpm * normalQuantile((i + 0.5) / count));

/** Uploads readings by the interface and loads them as a worker would. */
export async function measured(
  house: House,
  lotId: string,
  offsetsPpm: readonly number[],
): Promise<string> {
  const id = await uploadText(house.technician, lotId, offsetsCsv(offsetsPpm));
  await loadUpload(id);
  return id;
}

/** A registered lot whose sample is complete; every unit within limits unless told otherwise. */
export async function inspectedLot(
  house: House,
  wishes: LotWishes & { offsetsPpm?: readonly number[] },
): Promise<LotAnswer> {
  const { offsetsPpm, ...registration } = wishes;
  const lot = await registeredLot(house, registration);
  await measured(house, lot.id, offsetsPpm ?? spread(lot.unitsPlanned));
  return lotOf(house.technician, lot.id);
}

type Decision = Partial<BodyInput<typeof signDisposition>> & {
  decision: BodyInput<typeof signDisposition>['decision'];
};

/** What each decision asks for besides reason and password. */
export const evidenceFor = {
  accept: { correction: 'Sorted at the supplier; new sample measured.' },
  hold: {},
  accept_under_concession: {
    concession: {
      greatestQuantity: 40,
      until: inDays(30),
      nonconformity: 'Spread wider than agreed.',
      customerReference: 'note 14',
    },
  },
  reject: { treatment: 'return_to_supplier' },
  inspect_all: {},
} as const;

/** Sends a decision on the analysis that the lot has now; the test says what it expects. */
export async function decide(agent: Agent, lotId: string, decision: Decision) {
  const { currentAnalysisId } = await lotOf(agent, lotId);
  return agent.post(`/api/lots/${lotId}/dispositions`).send({
    reason: 'Judged on the finding.',
    password: passphrase,
    analysisId: currentAnalysisId ?? '11111111-1111-4111-8111-111111111111',
    ...evidenceFor[decision.decision],
    ...decision,
  });
}

export async function decided(agent: Agent, lotId: string, decision: Decision) {
  const answer = await decide(agent, lotId, decision);
  if (answer.status !== 201)
    throw new Error(`Signing answered ${answer.status}: ${JSON.stringify(answer.body)}`);
  return answer.body as {
    id: string;
    number: number;
    state: string;
    contentHash: string;
    analysisId: string;
    analysisVersion: number;
    current: boolean;
    holdId: string | null;
    signatures: { contentHash: string; meaning: string; person: { id: string; name: string } }[];
  };
}

export const countersigned = (agent: Agent, dispositionId: string, password = passphrase) =>
  agent
    .post(`/api/dispositions/${dispositionId}/countersignature`)
    .send({ password, reason: 'Agreed: the use bears it.' });
