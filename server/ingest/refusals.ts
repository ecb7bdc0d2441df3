import { limits } from './limits';

export interface Refusal {
  fileLine: number;
  column: string;
  text: string;
  rule: string;
  reason: string;
  rawLine: string;
}

/** PostgreSQL's text holds no NUL; its picture stands for it. */
export function storable(text: string): string {
  const kept = text.length > limits.keptCharacters ? text.slice(0, limits.keptCharacters) : text;
  return kept.replaceAll('\0', '\u2400').replace(/[\ud800-\udfff]/gu, '\ufffd');
}

/** One record as CSV, quoted where it must be, so that refused rows can be repaired and uploaded again. */
export function asRecord(fields: string[], delimiter: string): string {
  return fields.map((field) => asField(field, delimiter)).join(delimiter);
}

export function asField(field: string, delimiter: string): string {
  return /["\r\n]/.test(field) || field.includes(delimiter) || field !== field.trim()
    ? `"${field.replaceAll('"', '""')}"`
    : field;
}
