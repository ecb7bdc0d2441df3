import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, IdParams, Instant, ListQuery, PersonRef, houseRoles, listOf } from './common';

export const UploadState = z.enum(['queued', 'running', 'done', 'failed', 'withdrawn']);
export const Encoding = z.enum(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252']);
export const Delimiter = z.enum([',', ';', '\t']);
export const FrequencyUnit = z.enum(['Hz', 'kHz', 'MHz', 'ppm', 'ppb']);

/** What a column of the file is for. */
export const ColumnTarget = z.discriminatedUnion('target', [
  z.object({ target: z.literal('ignore') }),
  z.object({ target: z.literal('serial') }),
  z.object({
    target: z.literal('frequency'),
    unit: FrequencyUnit,
    /** For one column per temperature. */ temperatureC: z.number().nullable().default(null),
  }),
  z.object({ target: z.literal('temperature') }),
  z.object({ target: z.literal('measuredAt') }),
  z.object({ target: z.literal('elapsedSeconds') }),
  z.object({ target: z.literal('resistance') }),
  z.object({ target: z.literal('loadCapacitance') }),
  z.object({ target: z.literal('supplyVoltage') }),
  z.object({ target: z.literal('driveLevel') }),
]);
export const Mapping = z.object({
  encoding: Encoding.default('utf-8'),
  delimiter: Delimiter.default(','),
  decimalSign: z.enum(['.', ',']).default('.'),
  headerRow: z.boolean().default(true),
  shape: z.enum(['reading_per_row', 'unit_per_row', 'time_series']).default('reading_per_row'),
  /** In file order, one entry a column. */
  columns: z.array(ColumnTarget).min(1).max(1000),
  /** Names the unit of a time series, or numbers units from this prefix where the file has no serial column. */
  serial: z.string().max(80).default(''),
  /** Start of a time series whose times are elapsed seconds. */
  startedAt: z.string().max(40).nullable().default(null),
  /** Temperature of every row when the file has no such column; null: the part's reference temperature. */
  temperatureC: z.number().nullable().default(null),
});
export type Mapping = z.infer<typeof Mapping>;

export const UploadWarning = z.object({
  code: z.string(),
  text: z.string(),
  column: z.string().nullable(),
  /** Signed off, so that it blocks nothing. */ cleared: z.boolean().default(false),
});

export const Upload = z.object({
  id: Id,
  lotId: Id,
  lotNumber: z.string(),
  fileName: z.string(),
  byteCount: z.number().int(),
  sha256: z.string(),
  state: UploadState,
  bench: z.object({ id: Id, name: z.string() }).nullable(),
  mapping: Mapping.nullable(),
  rowsInFile: z.number().int(),
  rowsTaken: z.number().int(),
  rowsRefused: z.number().int(),
  unitsCount: z.number().int(),
  progress: z.object({
    bytesRead: z.number().int(),
    rowsPerSecond: z.number().nullable(),
    secondsLeft: z.number().nullable(),
    stage: z.enum(['waiting', 'reading', 'analysing', 'finished']),
  }),
  failure: z.object({ code: z.string(), message: z.string() }).nullable(),
  warnings: z.array(UploadWarning),
  uploadedBy: PersonRef.nullable(),
  createdAt: Instant,
  startedAt: Instant.nullable(),
  finishedAt: Instant.nullable(),
  withdrawnAt: Instant.nullable(),
  withdrawnReason: z.string().nullable(),
});
export type Upload = z.infer<typeof Upload>;

export const ColumnProposal = z.object({
  index: z.number().int(),
  header: z.string(),
  target: ColumnTarget,
  samples: z.array(z.string()),
  /** Of the first usable value, e.g. "9.999987 MHz = −1.3 ppm". */
  example: z.string(),
});
export const UploadCheck = z.object({
  fileName: z.string(),
  compression: z.enum(['none', 'gzip']),
  mapping: Mapping,
  columns: z.array(ColumnProposal),
  rows: z.array(z.array(z.string())),
  firstLine: z.number().int(),
  /** Nothing can be loaded while a question is open. */
  questions: z.array(
    z.object({
      field: z.enum([
        'encoding',
        'delimiter',
        'decimalSign',
        'headerRow',
        'shape',
        'columns',
        'unit',
      ]),
      text: z.string(),
      choices: z.array(z.object({ value: z.string(), label: z.string() })),
    }),
  ),
  warnings: z.array(UploadWarning),
  savedMapping: z
    .object({ version: z.number().int(), savedAt: Instant, savedBy: z.string() })
    .nullable(),
  sameFile: z
    .object({ uploadId: Id, lotNumber: z.string(), uploadedAt: Instant, uploadedBy: z.string() })
    .nullable(),
});
export type UploadCheck = z.infer<typeof UploadCheck>;

const mappingText = z
  .string()
  .max(100_000)
  .optional()
  .describe('Mapping as JSON; left out, it is recognised from the header');

export const checkUpload = endpoint({
  method: 'post',
  path: '/api/lots/:id/upload-checks',
  roles: ['technician', 'quality_engineer'],
  params: IdParams,
  summary: 'Look at the first part of a file (256 KiB is plenty); nothing is written',
  files: ['file'],
  body: z.object({
    mapping: mappingText,
    sha256: z.string().max(64).optional(),
    fileName: z.string().max(300).optional(),
  }),
  answer: UploadCheck,
});
export const uploadFile = endpoint({
  method: 'post',
  path: '/api/lots/:id/uploads',
  roles: ['technician', 'quality_engineer'],
  params: IdParams,
  summary: 'Upload a file of readings',
  files: ['file'],
  body: z.object({
    benchId: Id.optional(),
    mapping: mappingText,
    rememberMapping: z.enum(['true', 'false']).optional(),
    acceptWarnings: z.enum(['true', 'false']).optional(),
  }),
  answer: z.object({ id: Id }),
  status: 202,
});
export const uploadByMachine = endpoint({
  method: 'post',
  path: '/api/machine/lots/:lotNumber/uploads',
  roles: 'anyone',
  params: z.object({ lotNumber: z.string().min(1).max(80) }),
  summary: 'Upload by a bench: `Authorization: Bearer <token>`',
  files: ['file'],
  body: z.object({ mapping: mappingText }),
  answer: z.object({ id: Id }),
  status: 202,
});
export const listUploads = endpoint({
  method: 'get',
  path: '/api/lots/:id/uploads',
  roles: houseRoles,
  params: IdParams,
  summary: 'Uploads of a lot',
  query: ListQuery,
  answer: listOf(Upload),
});
export const readUpload = endpoint({
  method: 'get',
  path: '/api/uploads/:id',
  roles: houseRoles,
  params: IdParams,
  summary: 'An upload and how far it is',
  answer: Upload,
});
export const streamUpload = endpoint({
  method: 'get',
  path: '/api/uploads/:id/events',
  roles: houseRoles,
  params: IdParams,
  summary: 'Progress as server-sent events',
  produces: 'text/event-stream',
});
export const RefusedRow = z.object({
  fileLine: z.number().int(),
  column: z.string(),
  text: z.string(),
  rule: z.string(),
  reason: z.string(),
});
export const listRefusedRows = endpoint({
  method: 'get',
  path: '/api/uploads/:id/refused',
  roles: houseRoles,
  params: IdParams,
  summary: 'Refused rows',
  query: ListQuery,
  answer: listOf(RefusedRow),
});
export const exportRefusedRows = endpoint({
  method: 'get',
  path: '/api/uploads/:id/refused.csv',
  roles: houseRoles,
  params: IdParams,
  summary: 'Refused rows with the original columns and a reason; uploads again as is',
  produces: 'text/csv',
});
export const downloadOriginal = endpoint({
  method: 'get',
  path: '/api/uploads/:id/original',
  roles: houseRoles,
  params: IdParams,
  summary: 'The file as it came, byte for byte',
  produces: 'application/octet-stream',
});
export const clearWarnings = endpoint({
  method: 'post',
  path: '/api/uploads/:id/warnings/clearance',
  roles: ['quality_engineer'],
  params: IdParams,
  summary: 'Clear the warnings of an upload, with a reason',
  body: z.object({ reason: z.string().trim().min(3, 'Say why.').max(2000) }),
  answer: Upload,
});
export const WithdrawalPreview = z.object({
  rowsGoing: z.number().int(),
  unitsGoing: z.number().int(),
  staysBecause: z.array(z.string()),
  allowed: z.boolean(),
});
export const previewWithdrawal = endpoint({
  method: 'get',
  path: '/api/uploads/:id/withdrawal',
  roles: ['technician', 'quality_engineer'],
  params: IdParams,
  summary: 'What goes and what stays',
  answer: WithdrawalPreview,
});
export const withdrawUpload = endpoint({
  method: 'post',
  path: '/api/uploads/:id/withdrawal',
  roles: ['technician', 'quality_engineer'],
  params: IdParams,
  summary: 'Withdraw an upload',
  body: z.object({ reason: z.string().trim().min(3, 'Say why.').max(2000) }),
  answer: Upload,
});
export const UploadLimits = z.object({
  greatestBytes: z.number().int(),
  types: z.array(z.string()),
});
