/** Cp of a phase near a temperature, for small moves between reference temperatures. */
import type { Draft } from './draft.js';

/** Two rows farther apart than this are no neighbourhood [K]. */
const WIDEST_GAP_K = 120;
/** A single row stands for this much around it [K]. */
const REACH_K = 10;

/**
 * Cp [J/(mol K)] of `phase` at `temperatureK`, on a line between the printed rows around it, or that of a row within
 * 10 K; series of `source` first, then by rank. Null where no series has it.
 */
export function heatCapacityNear(
  drafts: readonly Draft[],
  phase: string,
  source: string,
  temperatureK: number,
): number | null {
  const candidates = drafts
    .filter((draft) => draft.raw.phase === phase && draft.quantities['heat-capacity'] !== undefined)
    .sort((a, b) => Number(b.raw.table.source === source) - Number(a.raw.table.source === source) || a.rank - b.rank);
  for (const draft of candidates) {
    const value = within(draft, temperatureK);
    if (value !== null) return value;
  }
  return null;
}

function within(draft: Draft, temperatureK: number): number | null {
  const heatCapacity = draft.quantities['heat-capacity'];
  if (heatCapacity === undefined) return null;
  let below = -1;
  let above = -1;
  for (let i = 0; i < draft.temperatureK.length; i++) {
    if (heatCapacity.present[i] === 0) continue;
    const t = draft.temperatureK[i];
    if (t <= temperatureK && (below < 0 || t > draft.temperatureK[below])) below = i;
    if (t >= temperatureK && (above < 0 || t < draft.temperatureK[above])) above = i;
  }
  const near = (row: number): number | null =>
    row >= 0 && Math.abs(draft.temperatureK[row] - temperatureK) <= REACH_K ? heatCapacity.values[row] : null;
  if (below < 0 || above < 0) return near(below) ?? near(above);
  const width = draft.temperatureK[above] - draft.temperatureK[below];
  if (width === 0) return heatCapacity.values[below];
  if (width > WIDEST_GAP_K) return near(below) ?? near(above);
  const share = (temperatureK - draft.temperatureK[below]) / width;
  return heatCapacity.values[below] * (1 - share) + heatCapacity.values[above] * share;
}
