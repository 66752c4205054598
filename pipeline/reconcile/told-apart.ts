import type { Policy } from '../../schemas/policy.js';
import { R_J_PER_MOL_K, REFERENCE_TEMPERATURE_K } from '../core/constants.js';
import { enthalpyAt, entropyAt } from '../core/physics/curve.js';
import { ErrorSum } from '../core/physics/error-sum.js';
import { isGas } from '../core/physics/placed-phase.js';
import type { RankedDatum } from './rank-data.js';
import type { ConditionSystem } from './system/system.js';

/** A measurement that nobody stated yet: what it would read, as a combination of the curves, and how well it is usually known. */
interface Measurement {
  readonly name: string;
  readonly reads: ErrorSum;
  readonly u: number;
}

/**
 * The measurement that would tell the first suspects of a group apart, in words for the curator: the one whose reading differs
 * most, in units of its usual uncertainty, between the corrections that the two propose. Where none would by four units, the
 * numbers themselves have to be measured again. Null for a group of one.
 */
export function toldApartBy(members: readonly RankedDatum[], system: ConditionSystem, policy: Policy): string | null {
  const [one, other] = members.filter((m) => m.whole === null);
  if (one === undefined || other === undefined) return null;
  let best: { name: string; ratio: number } | null = null;
  for (const { name, reads, u } of measurements(system, policy)) {
    const ratio = Math.abs(effect(one, reads) - effect(other, reads)) / u;
    if (ratio > LEAST && (best === null || ratio > best.ratio)) best = { name, ratio };
  }
  return best?.name ?? `a second, independent value of one of them`;
}

/** In units of the usual uncertainty. */
const LEAST = 4;

/** By how much a reading would change with the suspect's correction. */
function effect({ of, proposed }: RankedDatum, { data }: ErrorSum): number {
  let by = 0;
  for (const term of data) if (term.key === of.key) by += term.by;
  return by === 0 ? 0 : by * (proposed - of.datum.value);
}

function measurements(system: ConditionSystem, { defaultUncertainty: usual }: Policy): Measurement[] {
  const found: Measurement[] = [];
  for (const { judged, from, to, atK, at } of system.joined) {
    const { stated } = judged;
    const reads = (h: number, s: number): ErrorSum =>
      new ErrorSum()
        .add(to.source, atK, h / to.formulaUnits, s / to.formulaUnits)
        .add(from.source, atK, -h / from.formulaUnits, -s / from.formulaUnits);
    if (stated.enthalpy === null && stated.entropy === null) {
      found.push({
        name: `a measured enthalpy of ${stated.from}>${stated.to}`,
        reads: reads(1, 0),
        u: usual.transitionEnthalpyRelative * Math.abs(at.enthalpyJPerMol),
      });
    }
    if (isGas(to.source.phase) && !system.saturated.some((one) => one.from.source === from.source)) {
      found.push({
        name: `vapour pressures over ${stated.from}`,
        reads: reads(1, -atK),
        u: R_J_PER_MOL_K * atK * usual.pressureRelative,
      });
    }
  }
  const t = REFERENCE_TEMPERATURE_K;
  for (const curve of system.curves) {
    if (!curve.hasEnthalpyLevel || !curve.hasEntropyLevel) continue;
    const stated = system.substance.anchors.filter((a) => a.phase === curve.phase);
    if (!stated.some((a) => a.enthalpyOfFormation !== null)) {
      found.push({
        name: `a formation enthalpy of ${curve.phase}`,
        reads: new ErrorSum().add(curve, t, 1, 0),
        u: Math.max(usual.enthalpyOfFormationJPerMol, 1e-6 * Math.abs(enthalpyAt(curve, t))),
      });
    }
    if (!stated.some((a) => a.entropy !== null)) {
      found.push({
        name: `an entropy of ${curve.phase}`,
        reads: new ErrorSum().add(curve, t, 0, 1),
        u: usual.entropyRelative * Math.max(1, Math.abs(entropyAt(curve, t))),
      });
    }
  }
  return found;
}
