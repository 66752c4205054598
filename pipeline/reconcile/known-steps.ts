/** Differences that are stated about a substance and that a cell may be off by: from 0 K, between scales, at transitions. */
import type { Anchor, Datum, HarmonisedCase, StatedTransition } from '../../schemas/harmonised.js';
import type { KnownStep, SuspectContext } from './slips/slip.js';

interface Place {
  readonly phase: string;
  readonly source: string;
  /** Index of the transition that the cell belongs to. */
  readonly transition?: number;
}

type Steps = Required<
  Pick<SuspectContext, 'enthalpiesFromZero' | 'enthalpyScaleSteps' | 'transitionEnthalpies' | 'transitionEntropies'>
>;

export function knownSteps(substance: HarmonisedCase, place: Place): Steps {
  const others = substance.transitions.filter((_, index) => index !== place.transition);
  return {
    enthalpiesFromZero: distinct(fromZero(substance, place.phase)),
    enthalpyScaleSteps: distinct(betweenScales(substance.anchors, place)),
    transitionEnthalpies: distinct(others.flatMap(enthalpyOf)),
    transitionEntropies: distinct(others.flatMap(entropyOf)),
  };
}

/** H(Tr) - H(0): as an anchor states it, or by the row at 0 K of a table that counts from Tr. */
function fromZero({ anchors, series }: HarmonisedCase, phase: string): KnownStep[] {
  const steps = anchors.flatMap((a) =>
    a.phase === phase && a.enthalpyFromZero !== null ? [stepOf(a.enthalpyFromZero)] : [],
  );
  for (const { phase: other, enthalpyIncrement: q, temperatureK } of series) {
    const row = other === phase && q !== null ? temperatureK.indexOf(0) : -1;
    if (q === null || row < 0 || q.present[row] === 0) continue;
    steps.push({ value: -q.values[row], u: q.halfUnit[row] / Math.sqrt(3) });
  }
  return steps;
}

/**
 * A phase counted from another one (by that one's formation enthalpy), and a source that counts otherwise than another (by
 * what both say of one phase).
 */
function betweenScales(anchors: readonly Anchor[], { phase, source }: Place): KnownStep[] {
  const steps: KnownStep[] = [];
  for (const a of anchors) {
    const own = a.enthalpyOfFormation;
    if (own === null || a.phase === phase) continue;
    steps.push(stepOf(own));
    if (a.table.source !== source) continue;
    for (const b of anchors) {
      const other = b.enthalpyOfFormation;
      if (other === null || b.phase !== a.phase || b.table.source === source) continue;
      steps.push({ value: other.value - own.value, u: Math.hypot(own.u, other.u) });
    }
  }
  return steps;
}

function enthalpyOf({ enthalpy, entropy, temperature }: StatedTransition): KnownStep[] {
  if (enthalpy !== null) return [stepOf(enthalpy)];
  if (entropy === null) return [];
  return [{ value: entropy.value * temperature.value, u: entropy.u * temperature.value }];
}

function entropyOf({ enthalpy, entropy, temperature }: StatedTransition): KnownStep[] {
  if (entropy !== null) return [stepOf(entropy)];
  if (enthalpy === null) return [];
  return [{ value: enthalpy.value / temperature.value, u: enthalpy.u / temperature.value }];
}

const stepOf = ({ value, u }: Datum): KnownStep => ({ value, u });

/** Zero moves nothing, and what two sources say alike is one step. */
function distinct(steps: readonly KnownStep[]): readonly KnownStep[] {
  const kept: KnownStep[] = [];
  for (const step of steps) {
    if (step.value !== 0 && !kept.some((k) => Math.abs(k.value - step.value) <= Math.max(k.u, step.u))) kept.push(step);
  }
  return kept;
}
