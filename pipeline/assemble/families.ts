import type { NamedCell } from '../../schemas/checked.js';
import type { CurveFamily, PhaseCurve } from '../../schemas/curves.js';
import type { Anchor, HarmonisedCase, Series } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { levelled } from './levels.js';
import { type PhaseShape, phaseShape } from './phase-shape.js';

/**
 * The curves of a substance, family by family: the standard state first, then each isobar that the tables state. Within one
 * pressure the zeros are those of the preferred table or anchor; what counts from another zero lends its Cp only.
 */
export function curvesOf(substance: HarmonisedCase, named: readonly NamedCell[], policy: Policy): PhaseCurve[] {
  const isobars: (number | null)[] = [];
  for (const s of substance.series) if (!isobars.includes(s.table.isobarPa)) isobars.push(s.table.isobarPa);
  isobars.sort((a, b) => (a ?? -1) - (b ?? -1));
  const curves: PhaseCurve[] = [];
  for (const isobarPa of isobars) {
    const series = substance.series
      .map((s, index) => ({ series: s, named: named.length === 0 ? named : named.filter((n) => n.series === index) }))
      .filter((s) => s.series.table.isobarPa === isobarPa);
    const anchors = substance.anchors.filter((a) => a.table.isobarPa === isobarPa);
    const family = familyOf(series, anchors, isobarPa);
    const phases: string[] = [];
    for (const s of series) if (!phases.includes(s.series.phase)) phases.push(s.series.phase);
    const shapes: PhaseShape[] = [];
    const comparable = anchors.filter((a) => sameZeros(a, family));
    for (const phase of phases) {
      const own = series.filter((s) => s.series.phase === phase);
      if (own.length > 1) own.sort((a, b) => compare(a.series, b.series, policy));
      const entropyAnchorsK = comparable
        .filter((a) => a.phase === phase && a.entropy !== null)
        .map((a) => a.referenceTemperatureK);
      const shape = phaseShape(phase, own, substance.substance.class === 'metal', policy, entropyAnchorsK);
      if (shape !== null) shapes.push(shape);
    }
    if (shapes.length > 0) {
      curves.push(...levelled(shapes, { zeros: family, substance, anchors: comparable }, policy));
    }
  }
  return curves;
}

/** Preferred first: the policy's preferred sources, rank, then tables with S or H, then the longer range. */
export function compare(a: Series, b: Series, policy: Policy): number {
  const place = (s: Series): number => {
    const at = policy.preferredSources.indexOf(s.table.source);
    return at < 0 ? policy.preferredSources.length : at;
  };
  return (
    place(a) - place(b) ||
    a.rank - b.rank ||
    levelColumns(b) - levelColumns(a) ||
    b.rows - a.rows ||
    (a.table.source < b.table.source ? -1 : a.table.source > b.table.source ? 1 : 0)
  );
}

function levelColumns(s: Series): number {
  return (s.entropy === null ? 0 : 1) + (s.enthalpyIncrement === null && s.enthalpy === null ? 0 : 1);
}

function familyOf(
  series: readonly { readonly series: Series }[],
  anchors: readonly Anchor[],
  isobarPa: number | null,
): CurveFamily {
  let enthalpyZero: string | null = null;
  let entropyZero: string | null = null;
  let bestH = Number.POSITIVE_INFINITY;
  let bestS = Number.POSITIVE_INFINITY;
  for (const { series: s } of series) {
    if ((s.enthalpy !== null || s.gibbsEnergy !== null) && s.rank < bestH) {
      bestH = s.rank;
      enthalpyZero = s.table.enthalpyZero;
    }
    if (s.entropy !== null && s.rank < bestS) {
      bestS = s.rank;
      entropyZero = s.table.entropyZero;
    }
  }
  for (const a of anchors) {
    if (a.enthalpyOfFormation !== null && a.table.rank < bestH) {
      bestH = a.table.rank;
      enthalpyZero = a.table.enthalpyZero;
    }
    if (a.entropy !== null && a.table.rank < bestS) {
      bestS = a.table.rank;
      entropyZero = a.table.entropyZero;
    }
  }
  return { enthalpyZero, entropyZero, isobarPa };
}

function sameZeros(a: Anchor, family: CurveFamily): boolean {
  return (
    (a.enthalpyOfFormation === null || a.table.enthalpyZero === family.enthalpyZero) &&
    (a.entropy === null || family.entropyZero === null || a.table.entropyZero === family.entropyZero)
  );
}
