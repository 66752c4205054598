/** Spoilt cells taken through the explainer: how often the right slip comes first. */
import { type Explanation, explain } from '../../../pipeline/reconcile/explain.js';
import type { SuspectContext } from '../../../pipeline/reconcile/slips/slip.js';
import { type Random, seededRandom } from '../../slips/random.js';
import { type SpoiltCell, spoilCell } from './spoil-cell.js';

export interface Tally {
  readonly kind: string;
  /** Shares of all cells: the right slip first, and with it the value that was meant; another slip first; none at all. */
  readonly first: number;
  readonly valueRight: number;
  readonly wrong: number;
  readonly none: number;
  /** The slip that is most often taken for this one, with its share. */
  readonly takenFor: string;
}

/** `cells` cells of one kind that are suspected, u being `timesDigits` times what the printed digits say. */
export function study(kind: string, timesDigits: number, seed: number, cells: number): Tally {
  return studyMix(new Map([[kind, 1]]), timesDigits, seed, cells, kind);
}

/** Kinds drawn by their weights; a cell that cannot hold the kind, or that nobody would suspect, is drawn again. */
export function studyMix(
  weights: ReadonlyMap<string, number>,
  timesDigits: number,
  seed: number,
  cells: number,
  name = 'mix',
): Tally {
  const random = seededRandom(seed);
  const total = [...weights.values()].reduce((a, b) => a + b, 0);
  const others = new Map<string, number>();
  let [first, valueRight, none] = [0, 0, 0];
  for (let i = 0; i < cells; i++) {
    const kind = drawn(weights, random.unit() * total);
    const [cell, [best]] = suspectedCell(kind, timesDigits, random);
    if (best === undefined) none++;
    else if (best.slip === kind) {
      first++;
      const near = Math.max(0.01 * Math.abs(cell.truth - numberOf(cell)), 3 * cell.lastPlace);
      if (Math.abs(best.corrected - cell.truth) <= near) valueRight++;
    } else others.set(best.slip, (others.get(best.slip) ?? 0) + 1);
  }
  const [most] = [...others].sort((a, b) => b[1] - a[1]);
  const wrong = [...others.values()].reduce((a, b) => a + b, 0);
  return {
    kind: name,
    ...{ first: first / cells, valueRight: valueRight / cells, wrong: wrong / cells, none: none / cells },
    takenFor: most === undefined ? '' : `${most[0]} ${((100 * most[1]) / cells).toFixed(1)}`,
  };
}

function drawn(weights: ReadonlyMap<string, number>, at: number): string {
  let [sum, last] = [0, ''];
  for (const [kind, weight] of weights) {
    [sum, last] = [sum + weight, kind];
    if (at < sum) break;
  }
  return last;
}

function suspectedCell(kind: string, timesDigits: number, random: Random): [SpoiltCell, readonly Explanation[]] {
  for (let draws = 0; draws < 20_000; draws++) {
    const cell = spoilCell(kind, random);
    const result = cell === null ? null : explained(cell, timesDigits, random);
    if (cell !== null && result !== null) return [cell, result];
  }
  throw new Error(`no cell can hold ${kind}`);
}

/** Above this many u a slip has to lie: 1.5 times the smallest detectable error (4.13 u; Baarda 1968). */
const SUSPECTED = 1.5 * 4.13;

/** null where the slip is too small to be asked for, or the cell itself is off by less than five units of its last place. */
export function explained(cell: SpoiltCell, timesDigits: number, random: Random): readonly Explanation[] | null {
  const u = (timesDigits * cell.lastPlace) / Math.sqrt(12);
  const observed = numberOf(cell);
  if (Math.abs(observed - cell.truth) < Math.max(SUSPECTED * u, 5 * cell.lastPlace)) return null;
  return explain(contextOf(cell, observed), cell.truth + u * normal(random), u, materialOf(cell));
}

function contextOf(cell: SpoiltCell, observed: number): SuspectContext {
  const si = (text: string) => Number(text) * cell.factor + cell.offset;
  const { fromZero, otherFormation, transitions } = cell.around;
  const rounding = 1 / Math.sqrt(12);
  return {
    ...{ quantity: cell.quantity, printed: cell.printed, observed, factor: cell.factor, offset: cell.offset },
    ...{ unit: cell.unit, molarMassGPerMol: cell.molarMassGPerMol, temperatureK: cell.meltingK, gas: cell.gas },
    rowAbove: { printed: cell.above, observed: si(cell.above) },
    partner:
      cell.partner === null ? null : { printed: cell.partner, observed: Number(cell.partner) * cell.partnerFactor },
    enthalpiesFromZero: [{ value: fromZero, u: rounding }],
    enthalpyScaleSteps: [{ value: otherFormation, u: rounding }],
    transitionEnthalpies: transitions.map(({ enthalpy }) => ({ value: enthalpy, u: rounding })),
    transitionEntropies: transitions.map(({ entropy }) => ({ value: entropy, u: rounding / 1000 })),
  };
}

const numberOf = (cell: SpoiltCell): number => Number(cell.printed) * cell.factor + cell.offset;

/** What a user would notice, as the policy has it by default. */
function materialOf({ quantity, truth }: SpoiltCell): number {
  switch (quantity) {
    case 'entropy':
    case 'gibbs-function':
    case 'transition-entropy':
      return Math.max(0.05, 0.001 * Math.abs(truth));
    case 'heat-capacity':
    case 'pressure':
      return 0.01 * Math.abs(truth);
    case 'temperature':
    case 'transition-temperature':
      return 0.5;
    default:
      return 50;
  }
}

/** Box and Muller (1958). */
function normal(random: Random): number {
  return Math.sqrt(-2 * Math.log(1 - random.unit())) * Math.cos(2 * Math.PI * random.unit());
}
