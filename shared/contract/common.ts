import { z } from 'zod';

export const roles = [
  'technician',
  'quality_engineer',
  'supplier_contact',
  'auditor',
  'administrator',
] as const;
export const Role = z.enum(roles);
export type Role = z.infer<typeof Role>;

/** Everybody who works for the receiving company: all but the supplier contact. */
export const houseRoles = ['technician', 'quality_engineer', 'auditor', 'administrator'] as const;

export const Id = z.uuid({ error: 'This is not an id of ours.' });
export const IdParams = z.object({ id: Id });

/** Exact decimal as written, e.g. `10000000.126856699585915`. Text, because a binary float would lose what the counter showed. */
export const DecimalText = z
  .union([z.string(), z.number()])
  .transform((value) => String(value).trim())
  .refine((text) => /^[+-]?\d{1,20}(\.\d{1,30})?$/.test(text), {
    error: 'Write a plain decimal number, such as 16000000 or 32768.0.',
  });
export const PositiveDecimalText = DecimalText.refine((text) => Number(text) > 0, {
  error: 'This must be greater than zero.',
});

export const IsoDate = z.iso.date({ error: 'Write a date as year-month-day, such as 2026-11-30.' });
export const Instant = z.string().describe('Server time, ISO 8601 with zone');

export const ShortText = z
  .string()
  .trim()
  .min(1, 'This is needed.')
  .max(200, 'At most 200 characters.');
export const OptionalShortText = z.string().trim().max(200, 'At most 200 characters.').default('');
export const LongText = z
  .string()
  .trim()
  .min(1, 'This is needed.')
  .max(8000, 'At most 8000 characters.');
export const OptionalLongText = z.string().trim().max(8000, 'At most 8000 characters.').default('');

export const ErrorAnswer = z.object({
  error: z.object({
    code: z.string(),
    message: z.string(),
    fields: z.record(z.string(), z.string()).optional(),
  }),
});
export type ErrorAnswer = z.infer<typeof ErrorAnswer>;

/** Lists are read by keyset: hand `next` back as `after` until it is null. */
export const ListQuery = z.object({
  after: z.string().max(500).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

export function listOf<Item extends z.ZodType>(item: Item) {
  return z.object({ items: z.array(item), next: z.string().nullable() });
}

export const PersonRef = z.object({ id: Id, name: z.string() });
export const Ok = z.object({ ok: z.literal(true) });

/** What a signature shows wherever it is shown: name, time with zone, meaning, reason, and the hash of what was signed. */
export const SignatureView = z.object({
  id: Id,
  person: PersonRef,
  role: Role,
  meaning: z.string(),
  reason: z.string(),
  signedAt: Instant,
  zone: z.string(),
  recordType: z.string(),
  recordId: Id,
  recordVersion: z.number().int(),
  contentHash: z.string(),
});
export type SignatureView = z.infer<typeof SignatureView>;

/** An act that is signed asks for the password again. */
export const SigningFields = z.object({
  password: z.string().min(1, 'Your password is needed to sign.').max(500),
  reason: z
    .string()
    .trim()
    .min(3, 'Say why, in a few words.')
    .max(4000, 'At most 4000 characters.'),
});
