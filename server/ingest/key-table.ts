const FEWEST_SLOTS = 1 << 12;

/** A set of 64-bit keys: open addressing, linear probing, at most three quarters full. (0, 0) marks an empty slot. */
export class KeyTable {
  count = 0;
  /** Where the key of the last `add` lies; valid until the next one. */
  slot = 0;
  conditions: Int32Array;
  marks: Uint8Array;
  private slots = FEWEST_SLOTS;
  private keys = new Int32Array(2 * FEWEST_SLOTS);

  constructor(private readonly withMore: boolean) {
    this.conditions = new Int32Array(withMore ? FEWEST_SLOTS : 0);
    this.marks = new Uint8Array(withMore ? FEWEST_SLOTS : 0);
  }

  /** True when the key was new. */
  add(high: number, low: number): boolean {
    if (4 * (this.count + 1) > 3 * this.slots) this.grow(2 * this.slots);
    if (high === 0 && low === 0) high = 1;
    const { keys } = this;
    const mask = this.slots - 1;
    let slot = low & mask;
    for (;;) {
      const h = keys[2 * slot]!;
      const l = keys[2 * slot + 1]!;
      if (h === high && l === low) {
        this.slot = slot;
        return false;
      }
      if (h === 0 && l === 0) break;
      slot = (slot + 1) & mask;
    }
    keys[2 * slot] = high;
    keys[2 * slot + 1] = low;
    this.slot = slot;
    this.count += 1;
    return true;
  }

  /** Looks without adding; `slot` tells where. */
  has(high: number, low: number): boolean {
    if (high === 0 && low === 0) high = 1;
    const { keys } = this;
    const mask = this.slots - 1;
    for (let slot = low & mask; ; slot = (slot + 1) & mask) {
      const h = keys[2 * slot]!;
      const l = keys[2 * slot + 1]!;
      this.slot = slot;
      if (h === high && l === low) return true;
      if (h === 0 && l === 0) return false;
    }
  }

  clear(): void {
    this.count = 0;
    this.slots = FEWEST_SLOTS;
    this.keys = new Int32Array(2 * FEWEST_SLOTS);
    this.conditions = new Int32Array(this.withMore ? FEWEST_SLOTS : 0);
    this.marks = new Uint8Array(this.withMore ? FEWEST_SLOTS : 0);
  }

  /** Makes room for so many keys at once. */
  reserve(count: number): void {
    let slots = this.slots;
    while (4 * (count + 1) > 3 * slots) slots *= 2;
    if (slots > this.slots) this.grow(slots);
  }

  private grow(slots: number): void {
    const { keys, conditions, marks } = this;
    this.slots = slots;
    const mask = this.slots - 1;
    this.keys = new Int32Array(2 * this.slots);
    if (this.withMore) {
      this.conditions = new Int32Array(this.slots);
      this.marks = new Uint8Array(this.slots);
    }
    for (let old = 0; old < keys.length / 2; old += 1) {
      const high = keys[2 * old]!;
      const low = keys[2 * old + 1]!;
      if (high === 0 && low === 0) continue;
      let slot = low & mask;
      while (this.keys[2 * slot] !== 0 || this.keys[2 * slot + 1] !== 0) slot = (slot + 1) & mask;
      this.keys[2 * slot] = high;
      this.keys[2 * slot + 1] = low;
      if (this.withMore) {
        this.conditions[slot] = conditions[old]!;
        this.marks[slot] = marks[old]!;
      }
    }
  }
}
