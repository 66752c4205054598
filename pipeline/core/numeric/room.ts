/**
 * Room for the many short arrays of a run: views into large blocks, and one shared array where all rows say the same.
 * Thirty rows at a time, separate arrays cost more in garbage collection than all arithmetic on them.
 */
const BLOCK = 1 << 15;
const MOST_KEPT = 32;

export class Room {
  private block = new Float64Array(0);
  private used = 0;
  private readonly same = new Map<number, Map<number, Float64Array>>();
  private readonly one = new Map<number, Uint8Array>();

  /** `length` zeros that belong to the caller. */
  numbers(length: number): Float64Array {
    if (length > BLOCK / 8) return new Float64Array(length);
    if (this.used + length > this.block.length) {
      this.block = new Float64Array(BLOCK);
      this.used = 0;
    }
    const view = this.block.subarray(this.used, this.used + length);
    this.used += length;
    return view;
  }

  /** `value`, `length` times, shared by many: never to be written to. */
  constant(length: number, value: number): Float64Array {
    let sameLength = this.same.get(length);
    if (sameLength === undefined) {
      sameLength = new Map();
      this.same.set(length, sameLength);
    }
    let shared = sameLength.get(value);
    if (shared === undefined) {
      // By mass, each substance has a value of its own; keeping those would only hold memory.
      if (sameLength.size >= MOST_KEPT) sameLength.clear();
      shared = this.numbers(length).fill(value);
      sameLength.set(value, shared);
    }
    return shared;
  }

  /** `length` ones that many share: never to be written to. */
  ones(length: number): Uint8Array {
    let shared = this.one.get(length);
    if (shared === undefined) {
      shared = new Uint8Array(length).fill(1);
      this.one.set(length, shared);
    }
    return shared;
  }
}
