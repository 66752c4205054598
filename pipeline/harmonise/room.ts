/**
 * Room for the many short arrays of a run: views into large blocks, and one shared array where all rows say the same.
 * Thirty rows at a time, separate arrays cost more in garbage collection than all arithmetic on them.
 */
const BLOCK = 1 << 15;

export class Room {
  private block = new Float64Array(0);
  private used = 0;
  private readonly zero = new Map<number, Float64Array>();
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

  /** `length` zeros that many share: never to be written to. */
  zeros(length: number): Float64Array {
    let shared = this.zero.get(length);
    if (shared === undefined) {
      shared = new Float64Array(length);
      this.zero.set(length, shared);
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
