import { z } from 'zod';
import { endpoint } from './endpoint';
import { LotNumber } from './lots';
import {
  Id,
  IdParams,
  Instant,
  IsoDate,
  PersonRef,
  SignatureView,
  SigningFields,
  houseRoles,
} from './common';

export const decisions = [
  'accept',
  'hold',
  'accept_under_concession',
  'reject',
  'inspect_all',
] as const;
export const Decision = z.enum(decisions);
export type Decision = z.infer<typeof Decision>;

export const Concession = z.object({
  /** Limited by quantity, by date, or both. */
  greatestQuantity: z.number().int().min(1).nullable().default(null),
  until: IsoDate.nullable().default(null),
  nonconformity: z.string().trim().min(3, 'Describe what does not conform.').max(4000),
  customerReference: z.string().trim().max(200).default(''),
});

export const SignDisposition = SigningFields.extend({
  decision: Decision,
  analysisId: Id,
  /** reject: what happens to the units. */
  treatment: z.enum(['return_to_supplier', 'scrap']).optional(),
  concession: Concession.optional(),
  /** hold: days the supplier has for acknowledgement and for the answer. */
  acknowledgementDays: z.number().int().min(1).max(60).optional(),
  answerDays: z.number().int().min(1).max(180).optional(),
  /** hold: other lots of the same part, supplier and date code to be held too. */
  containLotIds: z.array(Id).max(200).optional(),
  /** closing a hold by acceptance needs the correction named (ISO 9001:2015 8.7.2). */
  correction: z.string().trim().max(4000).optional(),
}).superRefine((value, context) => {
  const issue = (path: string, message: string) =>
    context.addIssue({ code: 'custom', path: [path], message, input: value });
  if (value.decision === 'reject' && !value.treatment)
    issue('treatment', 'Say what happens to the units: return to supplier, or scrap.');
  if (value.decision === 'accept_under_concession') {
    if (!value.concession)
      issue(
        'concession',
        'A concession is limited by quantity or time and names the nonconformity.',
      );
    else if (value.concession.greatestQuantity === null && value.concession.until === null)
      issue('concession', 'Limit the concession by quantity, by date, or both.');
  }
});
export type SignDisposition = z.infer<typeof SignDisposition>;

/** A file that a customer sent to approve a concession. */
export const CustomerApproval = z.object({
  id: Id,
  fileName: z.string(),
  mediaType: z.string(),
  byteCount: z.number().int(),
  sha256: z.string(),
  sentBy: PersonRef,
  sentAt: Instant,
});
export type CustomerApproval = z.infer<typeof CustomerApproval>;

export const Disposition = z.object({
  id: Id,
  lotId: Id,
  number: z.number().int(),
  decision: Decision,
  reason: z.string(),
  state: z.enum(['awaiting_second', 'in_force', 'superseded', 'refused', 'overtaken']),
  treatment: z.enum(['return_to_supplier', 'scrap']).nullable(),
  concession: Concession.nullable(),
  correction: z.string(),
  analysisId: Id,
  analysisVersion: z.number().int(),
  signatures: z.array(SignatureView),
  contentHash: z.string(),
  /** False when readings or criteria changed since: the signature stays with the old version. */
  current: z.boolean(),
  signedAt: Instant,
  signedBy: PersonRef,
  holdId: Id.nullable(),
  customerApprovals: z.array(CustomerApproval),
});
export type Disposition = z.infer<typeof Disposition>;

export const listDispositions = endpoint({
  method: 'get',
  path: '/api/lots/:id/dispositions',
  roles: houseRoles,
  params: IdParams,
  summary: 'Signed dispositions of a lot, newest first',
  answer: z.object({ items: z.array(Disposition), next: z.null() }),
});
export const signDisposition = endpoint({
  method: 'post',
  path: '/api/lots/:id/dispositions',
  roles: ['quality_engineer'],
  params: IdParams,
  summary: 'Sign a disposition',
  body: SignDisposition,
  answer: Disposition,
  status: 201,
});
export const countersignDisposition = endpoint({
  method: 'post',
  path: '/api/dispositions/:id/countersignature',
  roles: ['quality_engineer'],
  params: IdParams,
  summary: 'Second signature of a concession, by another quality engineer',
  body: SigningFields,
  answer: Disposition,
  status: 201,
});
export const refuseDisposition = endpoint({
  method: 'post',
  path: '/api/dispositions/:id/refusal',
  roles: ['quality_engineer'],
  params: IdParams,
  summary: 'Refuse the second signature with a reason, or take back one’s own first one',
  body: z.object({ reason: z.string().trim().min(3, 'Say why.').max(4000) }),
  answer: Disposition,
});
export const addCustomerApproval = endpoint({
  method: 'post',
  path: '/api/dispositions/:id/customer-approval',
  roles: ['quality_engineer'],
  params: IdParams,
  summary: 'Keep with a concession what the customer sent to approve it; multipart',
  files: ['files'],
  answer: Disposition,
  status: 201,
});
export const downloadCustomerApproval = endpoint({
  method: 'get',
  path: '/api/dispositions/:id/customer-approval/:fileId',
  roles: houseRoles,
  params: z.object({ id: Id, fileId: Id }),
  summary: 'A customer’s approval, as an attachment',
  produces: 'application/octet-stream',
});
export const proposeContainment = endpoint({
  method: 'get',
  path: '/api/lots/:id/containment',
  roles: ['quality_engineer'],
  params: IdParams,
  summary: 'Other lots of the same part, supplier and date code',
  answer: z.object({
    items: z.array(
      z.object({
        id: Id,
        lotNumber: z.string(),
        state: z.string(),
        dateCode: z.string(),
        lotSize: z.number().int(),
      }),
    ),
    next: z.null(),
  }),
});
export const sortLot = endpoint({
  method: 'post',
  path: '/api/lots/:id/sorting',
  roles: ['quality_engineer'],
  params: IdParams,
  summary: 'After 100 % inspection: conforming units go on as a sub-lot, the rest is rejected',
  body: SigningFields.extend({
    analysisId: Id,
    subLotNumber: LotNumber,
    treatment: z.enum(['return_to_supplier', 'scrap']),
  }),
  answer: z.object({ subLotId: Id }),
  status: 201,
});
export const readCertificate = endpoint({
  method: 'get',
  path: '/api/lots/:id/certificate.pdf',
  roles: houseRoles,
  params: IdParams,
  query: z.object({ dispositionId: Id.optional() }),
  summary: 'Lot certificate, made from the frozen analysis',
  produces: 'application/pdf',
});
