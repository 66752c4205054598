/** The table of transitions: each stated one beside its crossing, then the crossings that nobody stated at that pressure. */
import type { JudgedTransition, ReconciledCase } from '../../schemas/checked.js';
import type { Crossing, PhaseCurve } from '../../schemas/curves.js';
import type { RELEASE_TABLES } from '../../schemas/release-tables.js';
import type { Builders } from './builders.js';

type Transitions = Builders<typeof RELEASE_TABLES.transitions>;

/** Adds one substance that is published. */
export function addTransitions(to: Transitions, reconciled: ReconciledCase): void {
  const { assembled, judged } = reconciled.checked;
  const substance = assembled.examined.harmonised.substance.id;
  const published = new Set<Crossing>();
  const condensed = new Set<string>();
  let place = 0;
  for (const one of judged) {
    const crossing = crossingOf(one, assembled.crossings);
    if (crossing !== null) published.add(crossing);
    if (crossing?.gas === null) condensed.add(condensedKey(crossing));
    addStated(to, substance, ++place, one, crossing, isobarOf(one, crossing, assembled.curves));
  }
  for (const crossing of assembled.crossings) {
    if (published.has(crossing)) continue;
    if (crossing.gas === null) {
      // Without volumes a crossing of condensed phases is the same at every pressure that the diagram was drawn for.
      const key = condensedKey(crossing);
      if (condensed.has(key)) continue;
      condensed.add(key);
    }
    addUnstated(to, substance, ++place, crossing);
  }
}

function condensedKey({ from, to, temperatureK, family }: Crossing): string {
  return [...[from, to].sort(), temperatureK, family.isobarPa].join(' ');
}

function isobarOf(judged: JudgedTransition, crossing: Crossing | null, curves: readonly PhaseCurve[]): number | null {
  if (crossing !== null) return crossing.family.isobarPa;
  const curve = curves[judged.fromCurve] ?? curves[judged.toCurve];
  return curve === undefined ? judged.stated.table.isobarPa : curve.family.isobarPa;
}

/** The crossing that the judgement speaks of: same phases, pressure and gas, and its very temperature. */
function crossingOf(judged: JudgedTransition, crossings: readonly Crossing[]): Crossing | null {
  const { stated, computedK } = judged;
  if (computedK === null) return null;
  for (const crossing of crossings) {
    const samePhases =
      (crossing.from === stated.from && crossing.to === stated.to) ||
      (crossing.from === stated.to && crossing.to === stated.from);
    if (
      samePhases &&
      crossing.pressurePa === stated.pressurePa &&
      (crossing.gas === null || crossing.gas === (stated.gas ?? 'real')) &&
      crossing.temperatureK === computedK
    ) {
      return crossing;
    }
  }
  return null;
}

function addStated(
  to: Transitions,
  substance: string,
  place: number,
  judged: JudgedTransition,
  crossing: Crossing | null,
  isobarPa: number | null,
): void {
  const { stated, computedK } = judged;
  const statedK = stated.temperature.value;
  // A crossing names its phases by which is lower below it; a transition stated the other way round turns the signs.
  const sign = crossing !== null && crossing.from !== stated.from ? -1 : 1;
  const enthalpy = crossing === null ? judged.curveEnthalpyJPerMol : sign * crossing.enthalpyJPerMol;
  const entropy = crossing === null ? judged.curveEntropyJPerMolK : sign * crossing.entropyJPerMolK;
  to.substance.push(substance);
  to.transition.push(place);
  to.isobar_Pa.push(isobarPa);
  to.from_phase.push(stated.from);
  to.to_phase.push(stated.to);
  to.order.push(stated.order);
  to.gas.push(stated.gas);
  to.pressure_Pa.push(stated.pressurePa);
  to.stated_temperature_K.push(statedK);
  to.u_stated_temperature_K.push(stated.temperature.u);
  to.computed_temperature_K.push(computedK);
  to.u_computed_temperature_K.push(judged.uComputedK);
  to.difference_K.push(computedK === null ? null : computedK - statedK);
  to.transition_enthalpy_J_per_mol.push(enthalpy);
  to.transition_entropy_J_per_mol_K.push(entropy);
  to.gibbs_gap_J_per_mol.push(judged.gapJPerMol);
  to.u_gibbs_gap_J_per_mol.push(judged.uGapJPerMol);
  to.slope_jump_J_per_mol_K.push(entropy === null ? null : -entropy);
  to.stable.pushFlag(judged.stable);
  to.outcome.push(judged.outcome);
  to.evidence.push(judged.evidence);
}

function addUnstated(to: Transitions, substance: string, place: number, crossing: Crossing): void {
  to.substance.push(substance);
  to.transition.push(place);
  to.isobar_Pa.push(crossing.family.isobarPa);
  to.from_phase.push(crossing.from);
  to.to_phase.push(crossing.to);
  to.order.push(null);
  to.gas.push(crossing.gas);
  to.pressure_Pa.push(crossing.pressurePa);
  to.stated_temperature_K.push(null);
  to.u_stated_temperature_K.push(null);
  to.computed_temperature_K.push(crossing.temperatureK);
  to.u_computed_temperature_K.push(crossing.uK);
  to.difference_K.push(null);
  to.transition_enthalpy_J_per_mol.push(crossing.enthalpyJPerMol);
  to.transition_entropy_J_per_mol_K.push(crossing.entropyJPerMolK);
  to.gibbs_gap_J_per_mol.push(null);
  to.u_gibbs_gap_J_per_mol.push(null);
  to.slope_jump_J_per_mol_K.push(-crossing.entropyJPerMolK);
  to.stable.pushFlag(crossing.stable);
  to.outcome.push(null);
  to.evidence.push(null);
}
