const PAGE_ROWS = 64 * 1024;

/**
 * Serials that only ascend (shorter before longer, then byte by byte, so that S9 comes before S10) cannot repeat: the
 * last one is all that has to be compared. Their keys are written down one after the other, so that a table can still be
 * made of them when the order breaks; most files never break it and are spared a million random memory accesses.
 */
export class AscendingRun {
  count = 0;
  private readonly pages: Int32Array[] = [];
  private last = Buffer.alloc(512);
  private lastLength = 0;

  isBeyond(bytes: Uint8Array, start: number, end: number): boolean {
    const length = end - start;
    if (length !== this.lastLength) return length > this.lastLength;
    const { last } = this;
    for (let i = 0; i < length; i += 1) {
      const difference = bytes[start + i]! - last[i]!;
      if (difference !== 0) return difference > 0;
    }
    return false;
  }

  /** False when the order breaks: the run then holds what came before. */
  take(
    bytes: Uint8Array,
    start: number,
    end: number,
    high: number,
    low: number,
    condition: number,
  ): boolean {
    if (!this.isBeyond(bytes, start, end)) return false;
    const { last } = this;
    if (end - start > last.length) return false;
    for (let i = 0, p = start; p < end; i += 1, p += 1) last[i] = bytes[p]!;
    this.lastLength = end - start;
    const row = this.count % PAGE_ROWS;
    if (row === 0) this.pages.push(new Int32Array(3 * PAGE_ROWS));
    const page = this.pages.at(-1)!;
    page[3 * row] = high;
    page[3 * row + 1] = low;
    page[3 * row + 2] = condition;
    this.count += 1;
    return true;
  }

  each(tell: (high: number, low: number, condition: number) => void): void {
    for (let row = 0; row < this.count; row += 1) {
      const page = this.pages[Math.floor(row / PAGE_ROWS)]!;
      const at = 3 * (row % PAGE_ROWS);
      tell(page[at]!, page[at + 1]!, page[at + 2]!);
    }
  }
}
