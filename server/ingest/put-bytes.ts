/** Big-endian writes without the range checks of Buffer's own: called some ten million times for a large file. */
export function putInt16(out: Buffer, at: number, value: number): number {
  out[at] = value >> 8;
  out[at + 1] = value & 255;
  return at + 2;
}

export function putInt32(out: Buffer, at: number, value: number): number {
  out[at] = value >>> 24;
  out[at + 1] = (value >>> 16) & 255;
  out[at + 2] = (value >>> 8) & 255;
  out[at + 3] = value & 255;
  return at + 4;
}

/** A whole number of up to 53 bits as int64. */
export function putInt64(out: Buffer, at: number, value: number): number {
  const high = Math.floor(value / 4_294_967_296);
  putInt32(out, at, high | 0);
  return putInt32(out, at + 4, (value - high * 4_294_967_296) | 0);
}
