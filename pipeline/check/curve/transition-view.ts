import type { AssembledCase, Crossing, PhaseCurve } from '../../../schemas/curves.js';
import type { EvidenceKind } from '../../../schemas/finding.js';
import type { HarmonisedCase, StatedTransition } from '../../../schemas/harmonised.js';
import { type Equilibrium, equilibrium } from '../../core/physics/equilibrium.js';
import {
  boilingTemperature,
  type DiagramSetting,
  gapUncertainty,
  isGas,
  type PlacedPhase,
  placePhase,
} from '../../core/physics/placed-phase.js';
import { uStated } from '../../core/physics/stated-u.js';

/** A stated transition beside the two curves that it joins. */
export interface TransitionView {
  readonly stated: StatedTransition;
  readonly index: number;
  /** `cr>l` */
  readonly place: string;
  readonly fromCurve: number;
  readonly toCurve: number;
  /** Null where a phase has no curve, or the stated temperature is far outside one. */
  readonly pair: {
    readonly from: PlacedPhase<PhaseCurve>;
    readonly to: PlacedPhase<PhaseCurve>;
    /** At the stated temperature, or at the computed crossing when a curve does not reach that far. */
    readonly at: Equilibrium;
    readonly atK: number;
    readonly uGapJPerMol: number;
  } | null;
  /** What is missing for a comparison, in words for the curator. */
  readonly missing: string | null;
  /** H and S of one of the phases were carried through this very transition: its G closes by construction. */
  readonly byConstruction: boolean;
  /** H, and S, of one of the phases was carried through it: the curves' dH, or dS, is the stated one. */
  readonly carriesH: boolean;
  readonly carriesS: boolean;
  readonly crossing: Crossing | null;
  readonly uStatedK: number;
  readonly evidence: EvidenceKind;
}

export function transitionViews(assembled: AssembledCase): TransitionView[] {
  const substance = assembled.examined.harmonised;
  return substance.transitions.map((stated, index) => viewOf(stated, index, assembled, substance));
}

function viewOf(
  stated: StatedTransition,
  index: number,
  assembled: AssembledCase,
  substance: HarmonisedCase,
): TransitionView {
  const { curves } = assembled;
  const [fromCurve, toCurve] = pairOf(stated, curves);
  const isobarPa = fromCurve < 0 ? null : curves[fromCurve].family.isobarPa;
  const place = `${stated.from}>${stated.to}${isobarPa === null ? '' : ` at ${isobarPa} Pa`}`;
  const temperatureK = stated.temperature.value;
  const a = curves[fromCurve];
  const b = curves[toCurve];
  const both = fromCurve >= 0 && toCurve >= 0;
  const within = both && stated.table.basis !== 'measured' && everySource(a, b, stated.table.source);
  const carriesH = both && (a.enthalpyThrough === index || b.enthalpyThrough === index);
  const carriesS = both && (a.entropyThrough === index || b.entropyThrough === index);
  // Written out once: every substance asks for a few, and copies of half an object cost more than the numbers in it.
  const view = (missing: string | null, crossing: Crossing | null, pair: TransitionView['pair']): TransitionView => ({
    stated,
    index,
    place,
    fromCurve,
    toCurve,
    pair,
    missing,
    byConstruction: carriesH && carriesS,
    carriesH,
    carriesS,
    crossing,
    uStatedK: both ? uStated(stated.temperature, within) : stated.temperature.u,
    evidence: within ? 'arithmetic' : 'independent',
  });
  if (stated.table.basis === 'estimated')
    return view('a measured or evaluated transition: an estimate witnesses nothing', null, null);
  if (!(stated.pressurePa > 0)) return view('a pressure above 0', null, null);
  if (!both) {
    const without = [fromCurve < 0 ? stated.from : null, toCurve < 0 ? stated.to : null].filter((p) => p !== null);
    return view(`a heat-capacity table of ${without.join(' and ')}`, null, null);
  }
  const unlevelled = [a, b].find((c) => !c.hasEnthalpyLevel || !c.hasEntropyLevel);
  if (unlevelled !== undefined) return view(`a formation enthalpy and an entropy of ${unlevelled.phase}`, null, null);
  const setting: DiagramSetting = { pressurePa: stated.pressurePa, gas: stated.gas ?? 'real' };
  const boiling = boilingTemperature(substance.transitions);
  const from = placePhase(a, substance.substance, setting, boiling);
  const to = placePhase(b, substance.substance, setting, boiling);
  const crossing = nearestCrossing(stated, a, assembled.crossings, temperatureK);
  const low = Math.max(from.lowK, to.lowK);
  const high = Math.min(from.highK, to.highK);
  let atK = temperatureK;
  if (temperatureK < low || temperatureK > high) {
    if (crossing === null) {
      const short = [from, to].filter((p) => temperatureK < p.lowK || temperatureK > p.highK);
      const phases = short.map((p) => p.source.phase).join(' and ');
      return view(`a heat-capacity table of ${phases} that reaches the stated temperature`, null, null);
    }
    atK = crossing.temperatureK;
  }
  const uGapJPerMol = gapUncertainty(from, to, atK, stated.pressurePa);
  return view(null, crossing, { from, to, at: equilibrium(from, to, atK), atK, uGapJPerMol });
}

/**
 * The two curves that a stated transition joins: on its own source's isobar where there is one, else on the standard state
 * with the gas term, else on any isobar of its pressure. An ideal-gas transition is a matter of the standard state only.
 */
function pairOf(stated: StatedTransition, curves: readonly PhaseCurve[]): [number, number] {
  if (stated.from === stated.to) {
    const one = curves.findIndex((c) => c.phase === stated.from && c.family.isobarPa === null);
    const any = one >= 0 ? one : curves.findIndex((c) => c.phase === stated.from);
    return [any, any];
  }
  const find = (phase: string, isobarPa: number | null): number =>
    curves.findIndex((c) => c.phase === phase && c.family.isobarPa === isobarPa);
  const isobar = stated.gas === 'ideal' ? null : onIsobar(curves, stated.pressurePa);
  const candidates: [number, number][] = [];
  if (isobar !== null) candidates.push([find(stated.from, isobar), find(stated.to, isobar)]);
  candidates.push([find(stated.from, null), find(stated.to, null)]);
  const whole = candidates.filter(([x, y]) => x >= 0 && y >= 0);
  const own = whole.find(
    ([x, y]) => curves[x].sources.includes(stated.table.source) && curves[y].sources.includes(stated.table.source),
  );
  if (own !== undefined) return own;
  const standard = whole.find(([x]) => curves[x].family.isobarPa === null);
  return standard ?? whole[0] ?? candidates[candidates.length - 1];
}

function onIsobar(curves: readonly PhaseCurve[], pressurePa: number): number | null {
  for (const c of curves) {
    const p = c.family.isobarPa;
    if (p !== null && Math.abs(p - pressurePa) <= 1e-6 * pressurePa) return p;
  }
  return null;
}

function everySource(a: PhaseCurve, b: PhaseCurve, source: string): boolean {
  return a.sources.every((s) => s === source) && b.sources.every((s) => s === source);
}

function nearestCrossing(
  stated: StatedTransition,
  curve: PhaseCurve,
  crossings: readonly Crossing[],
  temperatureK: number,
): Crossing | null {
  const kind = isGas(stated.from) || isGas(stated.to) ? (stated.gas ?? 'real') : null;
  const isobar = curve.family.isobarPa;
  let best: Crossing | null = null;
  for (const c of crossings) {
    if (c.family.isobarPa !== isobar) continue;
    const same = (c.from === stated.from && c.to === stated.to) || (c.from === stated.to && c.to === stated.from);
    if (!same) continue;
    if (isobar === null && (c.pressurePa !== stated.pressurePa || (kind !== null && c.gas !== kind))) continue;
    // The crossing with the stated sense counts before a nearer one of the other sense.
    const cost = Math.abs(c.temperatureK - temperatureK) + (c.from === stated.from ? 0 : 100);
    if (best === null || cost < Math.abs(best.temperatureK - temperatureK) + (best.from === stated.from ? 0 : 100))
      best = c;
  }
  return best;
}
