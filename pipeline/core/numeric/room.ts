/**
 * Room for the many short arrays of a batch: views into large blocks, and one shared array where all rows say the same.
 * Thirty rows at a time, separate arrays cost more in garbage collection than all arithmetic on them; and fresh memory costs
 * more than used memory, so the blocks of one batch serve the next.
 */
const BLOCK = 1 << 15;
const MOST_KEPT = 32;

const blocks: Float64Array[] = [];
let at = -1;
let used = BLOCK;
/** Blocks below this index have been written to before: what is taken from them is cleared first. */
let dirty = 0;
const same = new Map<number, Map<number, Float64Array>>();
const one = new Map<number, Uint8Array>();

/** `length` zeros that belong to the caller until `emptyRoom`. */
export function numbers(length: number): Float64Array {
  if (length > BLOCK / 8) return new Float64Array(length);
  if (used + length > BLOCK) {
    at++;
    used = 0;
    if (at === blocks.length) blocks.push(new Float64Array(BLOCK));
  }
  const view = blocks[at].subarray(used, used + length);
  used += length;
  if (at < dirty) view.fill(0);
  return view;
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
  dirty = Math.max(dirty, at + 1);
  at = -1;
  used = BLOCK;
  same.clear();
}
