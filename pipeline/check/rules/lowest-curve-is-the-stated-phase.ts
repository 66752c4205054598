import type { PhaseCurve } from '../../../schemas/curves.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import type { Policy } from '../../../schemas/policy.js';
import { gibbsInDiagram } from '../../core/physics/diagram.js';
import { gapUncertainty, type PlacedPhase } from '../../core/physics/placed-phase.js';
import { isFirstOrder, type Judgement } from '../curve/judgement.js';
import type { Thresholds } from '../curve/significance.js';
import type { TransitionView } from '../curve/transition-view.js';
import { outcome } from '../place.js';

/**
 * Where the gap exceeds its uncertainty, the phase of lowest G is the one that the stated transitions say. Only phases that
 * stated transitions join are asked; a metastable polymorph or a vapour without one says nothing. Near a stated transition
 * (3 % of T) the crossing's own rules speak.
 */
export function lowestCurveIsTheStatedPhase(
  substance: string,
  views: readonly TransitionView[],
  policy: Policy,
  limits: Thresholds,
): Judgement {
  const rule = 'lowest-curve-is-the-stated-phase';
  const joined = views.filter((v) => isFirstOrder(v) && v.pair !== null && v.pair.from.source.family.isobarPa === null);
  const family = joined.length > 0 ? joined : views.filter((v) => isFirstOrder(v) && v.pair !== null);
  const testable = family.filter((v) => !v.byConstruction);
  if (testable.length === 0) {
    return {
      outcome: outcome(substance, rule, '', 'untestable', null, {
        missing:
          family.length === 0
            ? 'a stated transition between two phases that have curves'
            : 'levels of the phases that do not rest on the transitions themselves',
      }),
      findings: [],
    };
  }
  const steps = sequenceOf(family);
  const placed = new Map<string, PlacedPhase<PhaseCurve>>();
  for (const v of family) {
    if (v.pair === null) continue;
    placed.set(v.stated.from, placed.get(v.stated.from) ?? v.pair.from);
    placed.set(v.stated.to, placed.get(v.stated.to) ?? v.pair.to);
  }
  let worst: {
    ratio: number;
    atK: number;
    gap: number;
    tolerance: number;
    lower: string;
    stated: string;
    lowK: number;
    highK: number;
  } | null = null;
  for (const [name, phase] of placed) {
    for (const t of phase.curve.knotK) {
      if (!(t > 0) || t < phase.source.measuredFromK || t > phase.source.measuredToK) continue;
      if (family.some((v) => Math.abs(t - v.stated.temperature.value) < 0.03 * t)) continue;
      const stated = statedAt(steps, t);
      if (stated === null || stated === name) continue;
      const other = placed.get(stated);
      if (other === undefined || t < other.source.measuredFromK || t > other.source.measuredToK) continue;
      const gap = gibbsInDiagram(other, t) - gibbsInDiagram(phase, t);
      if (gap <= 0) continue;
      const u = gapUncertainty(other, phase, t, policy.pressurePa);
      const tolerance = limits.fault * u;
      if (gap <= tolerance + policy.material.transitionTemperatureK) continue;
      const ratio = gap / tolerance;
      if (worst === null || ratio > worst.ratio) {
        worst = { ratio, atK: t, gap, tolerance, lower: name, stated, lowK: t, highK: t };
      }
    }
  }
  const evidence = testable.every((v) => v.evidence === 'arithmetic') ? 'arithmetic' : 'independent';
  if (worst === null) return { outcome: outcome(substance, rule, '', 'agrees', evidence), findings: [] };
  const step = steps.find((s) => s.from === worst.stated || s.to === worst.stated);
  const about = step?.view.stated.temperature;
  return {
    outcome: outcome(substance, rule, '', 'disagrees', evidence),
    findings: [
      makeFinding({
        rule,
        severity: 'fault',
        substance,
        fromPhase: worst.stated,
        toPhase: worst.lower,
        temperatureK: worst.atK,
        observed: worst.gap,
        expected: 0,
        difference: worst.gap,
        tolerance: worst.tolerance,
        unit: 'J/mol',
        address: about?.address ?? null,
        evidence: about === undefined ? [] : [{ ...about.address, printed: about.printed }],
        detail: { code: 'phase-order', lower: worst.lower, stated: worst.stated, lowK: worst.lowK, highK: worst.highK },
      }),
    ],
  };
}

interface Step {
  readonly atK: number;
  readonly from: string;
  readonly to: string;
  readonly view: TransitionView;
}

/** The stated transitions in rising temperature, one for each that several sources state. */
function sequenceOf(views: readonly TransitionView[]): Step[] {
  const steps: Step[] = [];
  for (const v of [...views].sort((a, b) => a.stated.temperature.value - b.stated.temperature.value)) {
    const { from, to, temperature } = v.stated;
    const again = steps.some(
      (s) => s.from === from && s.to === to && Math.abs(s.atK - temperature.value) < 0.05 * s.atK,
    );
    if (!again) steps.push({ atK: temperature.value, from, to, view: v });
  }
  return steps;
}

/** The phase that the sequence says at T; null where it does not hang together (a gap between `to` and the next `from`). */
function statedAt(steps: readonly Step[], temperatureK: number): string | null {
  let below: Step | null = null;
  let above: Step | null = null;
  for (const s of steps) {
    if (s.atK <= temperatureK) below = s;
    else if (above === null) above = s;
  }
  if (below === null) return above === null ? null : above.from;
  if (above === null) return below.to;
  return below.to === above.from ? below.to : null;
}
