import { randomBytes } from 'node:crypto';
import { AscendingRun } from './ascending-run';
import { KeyTable } from './key-table';

/** What is already known of a reading's serial and condition. */
export type Sighting = 'new_unit' | 'new_condition' | 'known';

const FROM_EARLIER = 1;
const SEEN_HERE = 2;

/**
 * Remembers which units were seen, and at which conditions (temperature, or moment of a series), as 64-bit keys in
 * typed arrays: thirteen bytes a slot instead of some hundred for a Map of strings, so that five million units fit.
 *
 * A unit's first condition lies beside its key; only further conditions go to a second table. Keys are seeded per
 * table, so nobody can aim for a collision; a hit is proved in SQL afterwards all the same (see prove-duplicates.ts).
 */
export class UnitTable {
  /** Units of this upload, and those of them that earlier uploads of the lot had already. */
  unitsCount = 0;
  overlapCount = 0;
  /** As long as serials only ascend, none can repeat and no table is needed. */
  private run: AscendingRun | null = new AscendingRun();
  private readonly units = new KeyTable(true);
  private readonly pairs = new KeyTable(false);
  private readonly seed = randomBytes(8);
  private readonly seedHigh = this.seed.readInt32LE(0);
  private readonly seedLow = this.seed.readInt32LE(4);

  /** @param condition 32-bit hash of what must differ between two readings of a unit */
  see(bytes: Uint8Array, start: number, end: number, condition: number, earlier = false): Sighting {
    this.hash(bytes, start, end);
    if (this.run) {
      if (!earlier && this.run.take(bytes, start, end, this.high, this.low, condition)) {
        this.unitsCount += 1;
        return 'new_unit';
      }
      this.leaveRun();
      this.hash(bytes, start, end);
    }
    const { units } = this;
    const isNewUnit = units.add(this.high, this.low);
    const slot = units.slot;
    if (isNewUnit) {
      units.conditions[slot] = condition;
      units.marks[slot] = earlier ? FROM_EARLIER : SEEN_HERE;
      if (!earlier) this.unitsCount += 1;
      return 'new_unit';
    }
    if (!earlier && units.marks[slot] === FROM_EARLIER) {
      units.marks[slot] = SEEN_HERE;
      this.unitsCount += 1;
      this.overlapCount += 1;
    }
    if (units.conditions[slot] === condition) return 'known';
    return this.pairs.add(this.pairHigh(condition), this.pairLow(condition))
      ? 'new_condition'
      : 'known';
  }

  /** Whether the unit was read at this condition, without remembering anything. */
  knows(bytes: Uint8Array, start: number, end: number, condition: number): boolean {
    if (this.run) {
      if (this.run.isBeyond(bytes, start, end)) return false;
      this.leaveRun();
    }
    this.hash(bytes, start, end);
    if (!this.units.has(this.high, this.low)) return false;
    if (this.units.conditions[this.units.slot] === condition) return true;
    return this.pairs.has(this.pairHigh(condition), this.pairLow(condition));
  }

  /** Forgets the keys and keeps the counts: the analysis needs the memory. */
  release(): void {
    this.run = null;
    this.units.clear();
    this.pairs.clear();
  }

  private leaveRun(): void {
    const { units } = this;
    units.reserve(this.run!.count);
    this.run!.each((high, low, condition) => {
      units.add(high, low);
      units.conditions[units.slot] = condition;
      units.marks[units.slot] = SEEN_HERE;
    });
    this.run = null;
  }

  private high = 0;
  private low = 0;

  private hash(bytes: Uint8Array, start: number, end: number): void {
    let high = this.seedHigh;
    let low = this.seedLow;
    for (let p = start; p < end; p += 1) {
      const byte = bytes[p]!;
      high = Math.imul(high ^ byte, 0x9e3779b1);
      low = Math.imul(low ^ byte, 0x85ebca6b);
      high ^= low >>> 15;
      low ^= high >>> 13;
    }
    this.high = mix(high ^ (end - start));
    this.low = mix(low + Math.imul(this.high, 0x27d4eb2f));
  }

  private pairHigh(condition: number): number {
    return mix(this.high ^ Math.imul(condition, 0xc2b2ae35));
  }

  private pairLow(condition: number): number {
    return mix(this.low + Math.imul(condition, 0x165667b1));
  }
}

/** Final avalanche of a 32-bit hash: xor-shift and multiply, as published with MurmurHash3 (public domain). */
function mix(value: number): number {
  let h = value | 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return h ^ (h >>> 16);
}

/** 32-bit hash of a condition given as bytes. */
export function hashBytes(bytes: Uint8Array, start: number, end: number): number {
  let h = 0x811c9dc5 | 0;
  for (let p = start; p < end; p += 1) h = Math.imul(h ^ bytes[p]!, 0x01000193);
  return mix(h);
}

/** 32-bit hash of a condition given as a whole number of up to 53 bits. */
export function hashWhole(value: number): number {
  const high = Math.floor(value / 4_294_967_296);
  return mix((value - high * 4_294_967_296) ^ Math.imul(mix(high), 0x9e3779b1));
}
