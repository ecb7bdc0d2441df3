import { createHash } from 'node:crypto';

/**
 * JSON with sorted keys and no spaces: the same content always gives the same characters, so that a hash of it can be
 * made again anywhere. Undefined members are left out; dates become ISO 8601 in UTC. (RFC 8785 in spirit; numbers are
 * written by ECMAScript's own rule, as there.)
 */
export function canonicalJson(value: unknown): string {
  if (value instanceof Date) return JSON.stringify(value.toISOString());
  if (Array.isArray(value))
    return `[${value.map((item) => canonicalJson(item === undefined ? null : item)).join(',')}]`;
  if (typeof value === 'object' && value !== null) {
    const members = Object.entries(value)
      .filter(([, member]) => member !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
      .map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`);
    return `{${members.join(',')}}`;
  }
  if (typeof value === 'number' && !Number.isFinite(value))
    throw new TypeError('Only finite numbers can be written as JSON.');
  return JSON.stringify(value);
}

export function sha256Hex(content: string | Buffer): string {
  return createHash('sha256').update(content).digest('hex');
}
