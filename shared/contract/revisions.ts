import { z } from 'zod';
import { Id, Instant, IsoDate, PersonRef, SignatureView, SigningFields } from './common';

/**
 * Parts and receivers are judged by revisions. A draft can be changed; an approved one never changes again.
 * The revision in force on a day is the approved one with the latest effective date not after it.
 */
export const RevisionState = z.enum(['draft', 'approved', 'withdrawn']);

export const RevisionHead = z.object({
  id: Id,
  revision: z.string(),
  state: RevisionState,
  effectiveFrom: IsoDate.nullable(),
  changeNote: z.string(),
  createdBy: PersonRef,
  createdAt: Instant,
  approval: SignatureView.nullable(),
  inForce: z.boolean(),
  version: z.number().int(),
});

export const RevisionName = z
  .string()
  .trim()
  .regex(/^[A-Z0-9][A-Z0-9.-]{0,9}$/i, 'A letter or number, such as A or 3.');

/** Approval is a signed act of a quality engineer and fixes the day from which the revision counts. */
export const ApproveRevision = SigningFields.extend({ effectiveFrom: IsoDate });
