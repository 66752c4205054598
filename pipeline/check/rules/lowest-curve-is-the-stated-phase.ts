import type { PhaseCurve } from '../../../schemas/curves.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import type { Policy } from '../../../schemas/policy.js';
import { gibbsInDiagram, walk } from '../../core/physics/diagram.js';
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
  const spared = Float64Array.from(family, (v) => v.stated.temperature.value);
  let worst: (Lower & { readonly lower: string; readonly stated: string; readonly ratio: number }) | null = null;
  for (const { stated, lowK, highK } of rangesOf(steps)) {
    const other = placed.get(stated);
    if (other === undefined) continue;
    for (const [name, phase] of placed) {
      if (name === stated) continue;
      const found = lowestBelow(phase, other, lowK, highK, spared, policy.material.transitionTemperatureK);
      if (found === null) continue;
      const tolerance = limits.fault * gapUncertainty(other, phase, found.atK, policy.pressurePa);
      if (found.gap <= tolerance + policy.material.transitionTemperatureK) continue;
      const ratio = found.gap / tolerance;
      if (worst === null || ratio > worst.ratio) worst = { ...found, lower: name, stated, ratio };
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
        tolerance: worst.gap / worst.ratio,
        unit: 'J/mol',
        address: about?.address ?? null,
        evidence: about === undefined ? [] : [{ ...about.address, printed: about.printed }],
        detail: { code: 'phase-order', lower: worst.lower, stated: worst.stated, lowK: worst.fromK, highK: worst.toK },
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

interface Range {
  readonly stated: string;
  readonly lowK: number;
  readonly highK: number;
}

/** Where the sequence says which phase is stable; nowhere between two steps that do not hang together. */
function rangesOf(steps: readonly Step[]): Range[] {
  const ranges: Range[] = [];
  for (let k = 0; k <= steps.length; k++) {
    const below = k > 0 ? steps[k - 1] : null;
    const above = k < steps.length ? steps[k] : null;
    const stated = below?.to ?? above?.from;
    if (stated === undefined || (below !== null && above !== null && below.to !== above.from)) continue;
    ranges.push({ stated, lowK: below?.atK ?? 0, highK: above?.atK ?? Number.POSITIVE_INFINITY });
  }
  return ranges;
}

interface Lower {
  readonly atK: number;
  /** G(stated) - G(phase) there [J/mol]. */
  readonly gap: number;
  /** From the first to the last row at which the phase lies lower. */
  readonly fromK: number;
  readonly toK: number;
}

/** Where `phase` lies furthest below the stated one, at its own knots, both within their data, away from the transitions. */
function lowestBelow(
  phase: PlacedPhase<PhaseCurve>,
  stated: PlacedPhase<PhaseCurve>,
  lowK: number,
  highK: number,
  spared: Float64Array,
  least: number,
): Lower | null {
  const knots = phase.curve.knotK;
  const low = Math.max(lowK, phase.source.measuredFromK, stated.source.measuredFromK);
  const high = Math.min(highK, phase.source.measuredToK, stated.source.measuredToK);
  let at = 0;
  let atK = 0;
  let most = least;
  let fromK = 0;
  let toK = 0;
  for (let k = 0; k < knots.length; k++) {
    const t = knots[k];
    if (!(t > 0) || t < low || t > high) continue;
    let near = false;
    for (let j = 0; j < spared.length; j++) if (Math.abs(t - spared[j]) < 0.03 * t) near = true;
    if (near) continue;
    at = walk(stated.curve, at, t);
    const gap = gibbsInDiagram(stated, t, at) - gibbsInDiagram(phase, t, Math.min(k, knots.length - 2));
    if (gap <= least) continue;
    if (fromK === 0) fromK = t;
    toK = t;
    if (gap > most) {
      most = gap;
      atK = t;
    }
  }
  return atK === 0 ? null : { atK, gap: most, fromK, toK };
}
