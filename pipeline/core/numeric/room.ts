/**
 * Room for the many short arrays of a batch: views into large blocks, and one shared array where all rows say the same.
 * Thirty rows at a time, separate arrays cost more in garbage collection than all arithmetic on them; and fresh memory costs
 * more than used memory, so the blocks of one batch serve the next.
 */
const BLOCK = 1 << 15;
const MOST_KEPT = 32;

/** Blocks of one kind of array, used from the first on; those below `dirty` have been written to before. */
class Blocks<A extends Float64Array | Int32Array> {
  private readonly blocks: A[] = [];
  private at = -1;
  private used = BLOCK;
  private dirty = 0;

  constructor(private readonly make: (length: number) => A) {}

  take(length: number): A {
    if (length === 0 || length > BLOCK / 8) return this.make(length);
    if (this.used + length > BLOCK) {
      this.at++;
      this.used = 0;
      if (this.at === this.blocks.length) this.blocks.push(this.make(BLOCK));
    }
    const view = this.blocks[this.at].subarray(this.used, this.used + length) as A;
    this.used += length;
    if (this.at < this.dirty) view.fill(0);
    return view;
  }

  empty(): void {
    this.dirty = Math.max(this.dirty, this.at + 1);
    this.at = -1;
    this.used = BLOCK;
  }
}

const doubles = new Blocks((length) => new Float64Array(length));
const whole = new Blocks((length) => new Int32Array(length));
const same = new Map<number, Map<number, Float64Array>>();
const one = new Map<number, Uint8Array>();

/** `length` zeros that belong to the caller until `emptyRoom`. */
export function numbers(length: number): Float64Array {
  return doubles.take(length);
}

/** The same for whole numbers. */
export function integers(length: number): Int32Array {
  return whole.take(length);
}

/** `value`, `length` times, shared by many: never to be written to. */
export function constant(length: number, value: number): Float64Array {
  let sameLength = same.get(length);
  if (sameLength === undefined) {
    sameLength = new Map();
    same.set(length, sameLength);
  }
  let shared = sameLength.get(value);
  if (shared === undefined) {
    // By mass, each substance has a value of its own; keeping those would only hold memory.
    if (sameLength.size >= MOST_KEPT) sameLength.clear();
    shared = numbers(length).fill(value);
    sameLength.set(value, shared);
  }
  return shared;
}

/** `length` ones that many share: never to be written to. */
export function ones(length: number): Uint8Array {
  let shared = one.get(length);
  if (shared === undefined) {
    shared = new Uint8Array(length).fill(1);
    one.set(length, shared);
  }
  return shared;
}

/** Takes all of it back. Only for whoever has let go of every array of the batch: they are handed out again. */
export function emptyRoom(): void {
  doubles.empty();
  whole.empty();
  same.clear();
}
