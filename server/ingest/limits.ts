/** Bounds that keep memory flat whatever a file holds. */
export const limits = {
  /** Bytes of one record; a longer one is refused and skipped. */
  recordBytes: 64 * 1024,
  /** Columns that are looked at; a record with more is refused. */
  columns: 1000,
  serialCharacters: 80,
  /** Of a refused row, so much of its text is kept for repair. */
  keptCharacters: 8000,
  /** Bytes looked at to find out what a file is. */
  prefixBytes: 256 * 1024,
  /** Compressed files may grow to this many times the greatest upload. */
  growth: 8,
} as const;
