/** Writes true values as people print them: rounded to so many decimals, or with a normal error of a stated uncertainty. */
import type { Chance } from './normal.js';

/** Figures kept of a number with an uncertainty: a unit of the last place is at most this share of u, whose rounding is then nothing. */
const UNIT_SHARE = 0.05;

export class Pen {
  /** @param errors null: every value is the true one, rounded. */
  constructor(private readonly errors: Chance | null) {}

  /** Rounded to the decimals. */
  printed(value: number, decimals: number): string {
    return fixed(value, decimals);
  }

  /** With an error of standard deviation u (k = 1), times `factor`, the error of its series. */
  measured(value: number, u: number, factor = 1): string {
    const error = this.errors === null ? 0 : u * this.errors.normal();
    return fixed(value * factor + error, decimalsOf(u));
  }

  /** The error that a series shares: a factor with the relative standard deviation u. */
  calibration(u: number): number {
    return this.errors === null ? 1 : 1 + u * this.errors.normal();
  }
}

/** An uncertainty itself, to four figures. */
export function uncertaintyText(u: number): string {
  return u === 0 ? '0' : fixed(u, Math.max(0, 3 - Math.floor(Math.log10(u))));
}

function decimalsOf(u: number): number {
  return Math.min(12, Math.max(0, Math.ceil(-Math.log10(UNIT_SHARE * u) - 1e-9)));
}

function fixed(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? text.replace('-', '') : text;
}
