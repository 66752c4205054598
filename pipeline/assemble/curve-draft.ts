import type { ChainResult } from '../core/numeric/gaussian-chain.js';
import { numbers } from '../core/numeric/room.js';
import type { Stretch } from './stretch.js';

const CONTINUED = 2;
const FRONT = 2;
const BACK = 1;

/** What a knot carries, and the interval that begins at it. */
export interface DraftKnot {
  readonly knotK: number;
  readonly c0: number;
  readonly c1: number;
  readonly c2: number;
  readonly c3: number;
  readonly h: number;
  readonly s: number;
  readonly varH: number;
  readonly covHS: number;
  readonly varS: number;
  readonly kind: number;
  readonly uCp: number;
}

/** A curve that grows at its ends: the tail to 0 K, a split interval, the continuations. At most two in front, one behind. */
export class CurveDraft {
  private start = FRONT;
  private end: number;
  private readonly a: Record<
    'knotK' | 'c0' | 'c1' | 'c2' | 'c3' | 'h' | 's' | 'varH' | 'covHS' | 'varS' | 'uCp' | 'uBend',
    Float64Array
  >;
  private readonly kind: Uint8Array;
  private readonly gain: Float64Array;

  /** @param uBend of each interval [J/mol] */
  constructor(stretch: Stretch, chain: ChainResult, uBend: Float64Array) {
    const n = stretch.n;
    this.end = FRONT + n;
    const size = n + FRONT + BACK;
    const from = (x: Float64Array): Float64Array => {
      const out = numbers(size);
      out.set(x, FRONT);
      return out;
    };
    this.a = {
      knotK: from(stretch.temperatureK),
      c0: from(stretch.c0),
      c1: from(stretch.c1),
      c2: from(stretch.c2),
      c3: from(stretch.c3),
      h: from(chain.h),
      s: from(chain.s),
      varH: from(chain.varH),
      covHS: from(chain.covHS),
      varS: from(chain.varS),
      uCp: from(stretch.uHeatCapacity),
      uBend: from(uBend),
    };
    this.kind = new Uint8Array(size);
    this.kind.set(stretch.kind, FRONT);
    this.gain = numbers(4 * size);
    this.gain.set(chain.gain, 4 * FRONT);
  }

  get n(): number {
    return this.end - this.start;
  }

  /** The array `name`, from the first knot on; for c0..c3 the last entry is no interval. */
  view(name: keyof CurveDraft['a']): Float64Array {
    return this.a[name].subarray(this.start, this.end);
  }

  intervals(name: 'c0' | 'c1' | 'c2' | 'c3' | 'uBend'): Float64Array {
    return this.a[name].subarray(this.start, this.end - 1);
  }

  kinds(): Uint8Array {
    return this.kind.subarray(this.start, this.end);
  }

  gains(): Float64Array {
    return this.gain.subarray(4 * this.start, 4 * this.end);
  }

  /** A knot before the first one, with the interval between them. Its state follows the first one's. */
  addFront(knot: DraftKnot): void {
    this.start--;
    this.write(this.start, knot);
    this.follow(this.start);
  }

  /** The first knot's S is exact: it covaries with nothing above. */
  freeFrontEntropy(): void {
    this.gain[4 * this.start + 3] = 0;
  }

  /** The last Cp held up to `share` of the end temperatures beyond both ends, never towards 0 K. */
  addContinuations(share: number): void {
    const { knotK, c0, c1, c2, c3, h, s } = this.a;
    const first = this.start;
    if (knotK[first] > 0) {
      const low = knotK[first] * (1 - share);
      this.start--;
      this.copyState(first, this.start);
      knotK[this.start] = low;
      c0[this.start] = c0[first];
      h[this.start] = h[first] - c0[first] * (knotK[first] - low);
      s[this.start] = s[first] - c0[first] * Math.log(knotK[first] / low);
      this.follow(this.start);
    }
    const last = this.end - 1;
    const x = knotK[last] - knotK[last - 1];
    const cp = c0[last - 1] + x * (c1[last - 1] + x * (c2[last - 1] + x * c3[last - 1]));
    const high = knotK[last] * (1 + share);
    c0[last] = cp;
    c1[last] = 0;
    c2[last] = 0;
    c3[last] = 0;
    this.follow(last);
    this.copyState(last, this.end);
    knotK[this.end] = high;
    h[this.end] = h[last] + cp * (high - knotK[last]);
    s[this.end] = s[last] + cp * Math.log(high / knotK[last]);
    this.end++;
  }

  private copyState(from: number, to: number): void {
    const { varH, covHS, varS, uCp } = this.a;
    varH[to] = varH[from];
    covHS[to] = covHS[from];
    varS[to] = varS[from];
    uCp[to] = uCp[from];
    this.kind[to] = CONTINUED;
  }

  /** Moves the first knot one place down and puts a knot between it and the second. */
  splitFirst(first: { c0: number; c1: number; c2: number; c3: number }, knot: DraftKnot): void {
    const old = this.start;
    this.start--;
    for (const name of Object.keys(this.a) as (keyof CurveDraft['a'])[]) this.a[name][this.start] = this.a[name][old];
    this.kind[this.start] = this.kind[old];
    this.a.c0[this.start] = first.c0;
    this.a.c1[this.start] = first.c1;
    this.a.c2[this.start] = first.c2;
    this.a.c3[this.start] = first.c3;
    this.follow(this.start);
    this.write(old, knot);
  }

  private write(at: number, knot: DraftKnot): void {
    this.a.knotK[at] = knot.knotK;
    this.a.c0[at] = knot.c0;
    this.a.c1[at] = knot.c1;
    this.a.c2[at] = knot.c2;
    this.a.c3[at] = knot.c3;
    this.a.h[at] = knot.h;
    this.a.s[at] = knot.s;
    this.a.varH[at] = knot.varH;
    this.a.covHS[at] = knot.covHS;
    this.a.varS[at] = knot.varS;
    this.a.uCp[at] = knot.uCp;
    this.kind[at] = knot.kind;
  }

  private follow(at: number): void {
    this.gain[4 * at] = 1;
    this.gain[4 * at + 1] = 0;
    this.gain[4 * at + 2] = 0;
    this.gain[4 * at + 3] = 1;
  }
}
