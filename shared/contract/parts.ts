import { z } from 'zod';
import { endpoint } from './endpoint';
import {
  Id,
  IdParams,
  ListQuery,
  OptionalLongText,
  OptionalShortText,
  PositiveDecimalText,
  ShortText,
  houseRoles,
  listOf,
} from './common';
import { ApproveRevision, RevisionHead, RevisionName } from './revisions';

export const DeviceKind = z.enum(['crystal', 'XO', 'VCXO', 'TCXO', 'OCXO']);
export type DeviceKind = z.infer<typeof DeviceKind>;

export const InspectionLevel = z.enum(['I', 'II', 'III', 'S-1', 'S-2', 'S-3', 'S-4']);

/** Mirrors the `SamplingRule` of shared/sampling; the pure code stays free of schemas. */
export const SamplingRule = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('attribute'),
    level: InspectionLevel,
    aqlPercent: z.number().positive(),
  }),
  z.object({
    kind: z.literal('zeroAcceptance'),
    limitingQualityPercent: z.number().positive().max(50),
    consumersRisk: z.number().min(0.001).max(0.5).default(0.1),
  }),
  z.object({
    kind: z.literal('variables'),
    level: InspectionLevel,
    aqlPercent: z.number().positive(),
  }),
  z.object({
    kind: z.literal('everyUnit'),
    allowedNonconforming: z.number().int().min(0).default(0),
  }),
]);
export type SamplingRule = z.infer<typeof SamplingRule>;

export const DecisionRule = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('simple') }),
  /** Guard band w = factor x U, U the bench's expanded uncertainty. */
  z.object({ kind: z.literal('guardedAcceptance'), factor: z.number().min(0).max(3).default(1) }),
  z.object({ kind: z.literal('guardedRejection'), factor: z.number().min(0).max(3).default(1) }),
]);
export type DecisionRule = z.infer<typeof DecisionRule>;

const ppm = z.number().min(-1e6).max(1e6);
const celsius = z.number().min(-273).max(500);

export const PartCriteria = z.object({
  nominalFrequencyHz: PositiveDecimalText,
  /** Frequency tolerance at the reference temperature. Null: no limit on that side. */
  toleranceLowPpm: ppm.nullable(),
  toleranceHighPpm: ppm.nullable(),
  referenceTemperatureC: celsius.default(25),
  stabilityPpm: z.number().positive().nullable().default(null),
  stabilityReference: z
    .enum(['reference_temperature', 'nominal', 'middle_of_band'])
    .default('reference_temperature'),
  temperatureLowC: celsius.nullable().default(null),
  temperatureHighC: celsius.nullable().default(null),
  ageingFirstYearPpm: z.number().min(0).nullable().default(null),
  ageingTenYearsPpm: z.number().min(0).nullable().default(null),
  supplyPpm: z.number().min(0).default(0),
  loadPpm: z.number().min(0).default(0),
  loadCapacitancePf: z.number().positive().nullable().default(null),
  /** Typical of the part, for correcting readings taken at another load. */
  motionalCapacitanceFf: z.number().positive().nullable().default(null),
  shuntCapacitancePf: z.number().positive().nullable().default(null),
  greatestResistanceOhm: z.number().positive().nullable().default(null),
  samplingRule: SamplingRule,
  decisionRule: DecisionRule,
  /** A second reading of the same serial at the same temperature. */
  repeatReadings: z.enum(['refuse', 'repeat']).default('refuse'),
  /** Temperatures at which each sampled unit must be read besides the reference one. */
  requiredTemperaturesC: z.array(celsius).max(50).default([]),
  requireBenchInCalibration: z.boolean().default(true),
});
export type PartCriteria = z.infer<typeof PartCriteria>;

function coherent(c: PartCriteria, context: z.core.$RefinementCtx<PartCriteria>) {
  const issue = (path: string, message: string) =>
    context.addIssue({ code: 'custom', path: [path], message, input: c });
  if (c.toleranceLowPpm === null && c.toleranceHighPpm === null)
    issue('toleranceHighPpm', 'Give at least one limit.');
  if (
    c.toleranceLowPpm !== null &&
    c.toleranceHighPpm !== null &&
    c.toleranceLowPpm >= c.toleranceHighPpm
  )
    issue('toleranceHighPpm', 'The upper limit must lie above the lower one.');
  if ((c.temperatureLowC === null) !== (c.temperatureHighC === null))
    issue('temperatureHighC', 'Give both ends of the temperature range, or neither.');
  if (
    c.temperatureLowC !== null &&
    c.temperatureHighC !== null &&
    c.temperatureLowC >= c.temperatureHighC
  )
    issue('temperatureHighC', 'The range must end above where it starts.');
}
export const PartCriteriaFields = PartCriteria.superRefine(coherent);

export const PartRevision = RevisionHead.extend({ partId: Id, criteria: PartCriteria });
export type PartRevision = z.infer<typeof PartRevision>;

export const Part = z.object({
  id: Id,
  partNumber: z.string(),
  deviceKind: DeviceKind,
  description: z.string(),
  active: z.boolean(),
  /** In force today, else the newest draft. */
  revision: PartRevision.nullable(),
  receivers: z.array(z.object({ id: Id, name: z.string() })),
  lotsCount: z.number().int(),
  version: z.number().int(),
});
export type Part = z.infer<typeof Part>;
export const PartWithRevisions = Part.extend({ revisions: z.array(PartRevision) });
export type PartWithRevisions = z.infer<typeof PartWithRevisions>;

export const PartFields = z.object({
  partNumber: ShortText,
  deviceKind: DeviceKind,
  description: OptionalShortText,
  active: z.boolean().default(true),
  receiverIds: z.array(Id).max(100).default([]),
});
const RevisionFields = z.object({
  revision: RevisionName,
  changeNote: OptionalLongText,
  criteria: PartCriteriaFields,
});

export const listParts = endpoint({
  method: 'get',
  path: '/api/parts',
  roles: houseRoles,
  summary: 'Parts',
  query: ListQuery.extend({
    find: z.string().max(200).optional(),
    deviceKind: DeviceKind.optional(),
  }),
  answer: listOf(Part),
});
export const addPart = endpoint({
  method: 'post',
  path: '/api/parts',
  roles: ['administrator'],
  summary: 'Add a part with its first revision as a draft',
  body: PartFields.extend({
    revision: RevisionName.default('A'),
    changeNote: OptionalLongText,
    criteria: PartCriteriaFields,
  }),
  answer: PartWithRevisions,
  status: 201,
});
export const readPart = endpoint({
  method: 'get',
  path: '/api/parts/:id',
  roles: houseRoles,
  summary: 'A part with its revisions',
  params: IdParams,
  answer: PartWithRevisions,
});
export const changePart = endpoint({
  method: 'put',
  path: '/api/parts/:id',
  roles: ['administrator'],
  summary: 'Change what a part is called and which receivers use it',
  params: IdParams,
  body: PartFields.extend({ version: z.number().int() }),
  answer: PartWithRevisions,
});
export const addPartRevision = endpoint({
  method: 'post',
  path: '/api/parts/:id/revisions',
  roles: ['administrator'],
  summary: 'Draft a new revision',
  params: IdParams,
  body: RevisionFields,
  answer: PartWithRevisions,
  status: 201,
});
const RevisionParams = z.object({ id: Id, revisionId: Id });
export const changePartRevision = endpoint({
  method: 'put',
  path: '/api/parts/:id/revisions/:revisionId',
  roles: ['administrator'],
  summary: 'Change a draft revision',
  params: RevisionParams,
  body: RevisionFields.extend({ version: z.number().int() }),
  answer: PartWithRevisions,
});
export const approvePartRevision = endpoint({
  method: 'post',
  path: '/api/parts/:id/revisions/:revisionId/approval',
  roles: ['quality_engineer'],
  summary: 'Approve a revision with a signature',
  params: RevisionParams,
  body: ApproveRevision,
  answer: PartWithRevisions,
});
