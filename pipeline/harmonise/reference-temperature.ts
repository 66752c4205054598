/** Enthalpy increments, and -[G - H(Tr)]/T with them, made to count from 298.15 K. */
import type { Finding } from '../../schemas/finding.js';
import type { Anchor } from '../../schemas/harmonised.js';
import { REFERENCE_TEMPERATURE_K } from '../core/constants.js';
import { toIts90 } from '../core/units/temperature-scale.js';
import { type Draft, writable } from './draft.js';
import { heatCapacityNear } from './heat-capacity-near.js';
import { readingFinding } from './reading-finding.js';

/** A row this near is the row at 298.15 K, whatever the scale [K]. */
const SAME_K = 0.02;
/** The farthest that increments are moved with one heat capacity [K]. */
const LONGEST_MOVE_K = 30;
/** Share of a move that its heat capacity may be off by. */
const MOVE_DOUBT = 0.005;

/** H(298.15 K) minus H where the increments count from [J/mol], a bound and a standard uncertainty for it. */
interface Move {
  readonly enthalpy: number;
  readonly bound: number;
  readonly u: number;
}

/** Works on the drafts in place. Increments for which no way is found are taken out, with a finding. */
export function countFromReference(
  drafts: readonly Draft[],
  anchors: readonly Anchor[],
  substance: string,
  findings: Finding[],
): void {
  // All moves first: one series may be the way of another.
  const moves = drafts.map((draft) => moveOf(draft, drafts, anchors));
  for (const [index, draft] of drafts.entries()) {
    const move = moves[index];
    if (move === 'none') continue;
    if (move !== 'unknown') {
      apply(draft, move);
      continue;
    }
    findings.push(noWay(draft, substance));
    delete draft.quantities['enthalpy-increment'];
    delete draft.quantities['gibbs-function'];
  }
}

function moveOf(draft: Draft, drafts: readonly Draft[], anchors: readonly Anchor[]): Move | 'none' | 'unknown' {
  const { table } = draft.raw;
  if (draft.quantities['enthalpy-increment'] === undefined && draft.quantities['gibbs-function'] === undefined) {
    return 'none';
  }
  const fromK = table.incrementsFromZeroK
    ? 0
    : toIts90(table.referenceTemperatureK, table.temperatureScale).temperatureK;
  if (fromK === REFERENCE_TEMPERATURE_K) return 'none';
  const phase = draft.raw.incrementsFrom ?? draft.raw.phase;
  const way = REFERENCE_TEMPERATURE_K - fromK;
  if (Math.abs(way) <= SAME_K) {
    const heatCapacity = heatCapacityNear(drafts, phase, table.source, REFERENCE_TEMPERATURE_K);
    return heatCapacity === null ? 'none' : { enthalpy: heatCapacity * way, bound: 0, u: 0 };
  }
  return (
    fromOwnRow(draft, phase, drafts) ??
    (fromK === 0 ? fromAnchor(draft, phase, anchors) : fromHeatCapacity(draft, phase, fromK, drafts)) ??
    'unknown'
  );
}

/** The row at 298.15 K of the phase that the increments count from, in the same table. */
function fromOwnRow(draft: Draft, phase: string, drafts: readonly Draft[]): Move | null {
  for (const other of [draft, ...drafts]) {
    if (other.raw.table !== draft.raw.table || other.raw.phase !== phase) continue;
    if (other.raw.incrementsFrom !== draft.raw.incrementsFrom) continue;
    const increments = other.quantities['enthalpy-increment'];
    if (increments === undefined) continue;
    for (let row = 0; row < other.temperatureK.length; row++) {
      const way = REFERENCE_TEMPERATURE_K - other.temperatureK[row];
      if (Math.abs(way) > SAME_K || increments.present[row] === 0) continue;
      const heatCapacity = heatCapacityNear(drafts, phase, draft.raw.table.source, REFERENCE_TEMPERATURE_K) ?? 0;
      return { enthalpy: increments.values[row] + heatCapacity * way, bound: increments.halfUnit[row], u: 0 };
    }
  }
  return null;
}

/** H(298.15 K) - H(0) of an anchor, the same source's first, then by rank. */
function fromAnchor(draft: Draft, phase: string, anchors: readonly Anchor[]): Move | null {
  const { source } = draft.raw.table;
  const [anchor] = anchors
    .filter((entry) => entry.phase === phase && entry.referenceTemperatureK === REFERENCE_TEMPERATURE_K)
    .filter((entry) => entry.enthalpyFromZero !== null)
    .sort(
      (a, b) => Number(b.table.source === source) - Number(a.table.source === source) || a.table.rank - b.table.rank,
    );
  const datum = anchor?.enthalpyFromZero ?? null;
  if (datum === null) return null;
  const own = Math.sqrt(Math.max(datum.u ** 2 - datum.uRounding ** 2, 0));
  return { enthalpy: datum.value, bound: datum.halfUnit, u: own };
}

/** Cp in the middle times the way, where that is short. */
function fromHeatCapacity(draft: Draft, phase: string, fromK: number, drafts: readonly Draft[]): Move | null {
  const way = REFERENCE_TEMPERATURE_K - fromK;
  if (Math.abs(way) > LONGEST_MOVE_K) return null;
  const heatCapacity = heatCapacityNear(drafts, phase, draft.raw.table.source, fromK + way / 2);
  if (heatCapacity === null) return null;
  const enthalpy = heatCapacity * way;
  return { enthalpy, bound: MOVE_DOUBT * Math.abs(enthalpy), u: 0 };
}

/** What is taken off is the same for every row; its own rounding adds to each row's bound. A row at 0 K has no -[G - H]/T. */
function apply(draft: Draft, { enthalpy, bound, u }: Move): void {
  const { temperatureK } = draft;
  const increments = draft.quantities['enthalpy-increment'];
  if (increments !== undefined) {
    const values = writable(increments);
    for (let i = 0; i < values.length; i++) {
      if (increments.present[i] === 0) continue;
      values[i] -= enthalpy;
    }
    if (bound > 0) increments.halfUnit = increments.halfUnit.map((half) => half + bound);
    if (u > 0) increments.uOwn = increments.uOwn.map((own) => Math.hypot(own, u));
  }
  const gibbs = draft.quantities['gibbs-function'];
  if (gibbs === undefined) return;
  const values = writable(gibbs);
  const present = gibbs.present.slice();
  for (let i = 0; i < values.length; i++) {
    if (gibbs.present[i] === 0) continue;
    if (!(temperatureK[i] > 0)) {
      values[i] = 0;
      present[i] = 0;
      continue;
    }
    values[i] += enthalpy / temperatureK[i];
  }
  gibbs.present = present;
  if (bound > 0) {
    gibbs.halfUnit = gibbs.halfUnit.map((half, i) => (present[i] === 1 ? half + bound / temperatureK[i] : half));
  }
  if (u > 0) gibbs.uOwn = gibbs.uOwn.map((own, i) => (present[i] === 1 ? Math.hypot(own, u / temperatureK[i]) : own));
}

function noWay(draft: Draft, substance: string): Finding {
  const { raw } = draft;
  const { table } = raw;
  const phase = raw.incrementsFrom ?? raw.phase;
  const from = table.incrementsFromZeroK ? 0 : table.referenceTemperatureK;
  const column = draft.quantities['enthalpy-increment']?.column ?? draft.quantities['gibbs-function']?.column ?? -1;
  const wanted = table.incrementsFromZeroK
    ? `a row of ${phase} at 298.15 K in this table, or an anchor of ${phase} with "enthalpy-from-zero"`
    : `a row of ${phase} at 298.15 K in this table, or its heat capacity between there and ${from} K (at most ${LONGEST_MOVE_K} K)`;
  return readingFinding({
    substance,
    table,
    problem: 'required-missing',
    read: `The enthalpy of ${phase} from ${from} K to 298.15 K`,
    wanted,
    remedy: 'Give it; until then these increments and what was computed from them are not used.',
    line: raw.line[0] ?? 0,
    column: table.columns[column]?.header ?? '',
    fromPhase: raw.phase,
  });
}
