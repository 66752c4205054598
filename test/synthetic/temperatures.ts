/** At which temperatures tables have their rows. */
import type { Kind } from './kinds.js';
import type { Chance } from './normal.js';
import { REFERENCE_K, type TruePhase, type Truth } from './truth.js';

const UNTIL_500 = [100, 200, 250, REFERENCE_K, 300, 350, 400, 450, 500];

/** A handbook's: round steps, 298.15 K, and the transition temperatures to three decimals; metastable parts too. */
export function handbookTemperatures({ kind, phases, transitions }: Truth, phase: TruePhase): number[] {
  const first = phase === phases[0];
  const gas = phase.label === 'g';
  const step = stepOf(kind, gas);
  const low = first || gas ? (kind === 'molecular' ? 200 : 100) : REFERENCE_K;
  const last = gas ? phase.stableK[0] + 4 * step : phase.stableK[1] + step / 2;
  const round = kind === 'molecular' ? multiples(step, low, last) : [...UNTIL_500, ...multiples(step, 600, last)];
  const own = transitions
    .filter(({ from, to }) => from === phase.label || to === phase.label)
    .map(({ temperatureK }) => Number(temperatureK.toFixed(3)));
  return ordered([REFERENCE_K, ...round, ...own].filter((t) => t >= low && t <= last));
}

/**
 * A calorimeter's: from well below 298.15 K (the first crystal; the gas from 298.15 K), and between transitions, which are
 * approached but not met; uneven steps, two decimals.
 */
export function measuredTemperatures(
  { phases, transitions }: Truth,
  phase: TruePhase,
  rows: number,
  random: Chance,
): number[] {
  const [from, to] = phase.stableK;
  const last = transitions.at(-1)!.temperatureK;
  const low = phase === phases[0] ? 220 : phase.label === 'g' ? REFERENCE_K : from * 1.003;
  const high = phase.label === 'g' ? last * 1.08 : to * 0.997;
  const step = (high - low) / (rows - 1);
  const out: number[] = [];
  for (let i = 0; i < rows; i++) {
    const inner = i > 0 && i < rows - 1;
    out.push(Number((low + (i + (inner ? random.between(-0.2, 0.2) : 0)) * step).toFixed(2)));
  }
  return ordered(out);
}

/** Over the liquid, from where p is 0.01 bar or it melts up to the boiling point, even in 1/T. */
export function pressureTemperatures(low: number, boilingK: number, rows: number): number[] {
  return ordered(
    Array.from({ length: rows }, (_, i) => {
      const reciprocal = 1 / low + ((1 / boilingK - 1 / low) * i) / (rows - 1);
      return Number((1 / reciprocal).toFixed(2));
    }),
  );
}

function stepOf(kind: Kind, gas: boolean): number {
  if (kind !== 'molecular') return 100;
  return gas ? 50 : 20;
}

function multiples(step: number, low: number, high: number): number[] {
  const out: number[] = [];
  for (let k = Math.ceil(low / step); k * step <= high; k++) out.push(k * step);
  return out;
}

function ordered(temperatures: readonly number[]): number[] {
  return [...new Set(temperatures)].sort((a, b) => a - b);
}
