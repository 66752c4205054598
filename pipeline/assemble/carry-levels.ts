import type { CurveFamily, LevelError, LevelOrigin, PhaseCurve } from '../../schemas/curves.js';
import type { Anchor, Datum, HarmonisedCase, StatedTransition } from '../../schemas/harmonised.js';
import { R_J_PER_MOL_K } from '../core/constants.js';
import { type CurveArrays, enthalpyAt, entropyAt, heatCapacityAt } from '../core/physics/curve.js';
import { datumKey } from '../core/physics/datum-keys.js';
import { departure } from '../core/physics/equilibrium.js';
import { imperfection } from '../core/physics/imperfection-error.js';
import { boilingTemperature, isGas } from '../core/physics/placed-phase.js';
import { gasTerm } from '../core/physics/pressure-terms.js';
import { uStated } from '../core/physics/stated-u.js';
import type { PhaseShape } from './phase-shape.js';

/** Where a level is from, the other curve by its index among the shapes; -1 where it is a datum. */
export interface Origin extends Omit<LevelOrigin, 'from'> {
  readonly source: number;
}

/** What is to be added to a shape's H and S; null while it is not known. */
export interface Level {
  h: number | null;
  s: number | null;
  uH: number;
  uS: number;
  hFrom: PhaseCurve['enthalpyLevelFrom'];
  sFrom: PhaseCurve['entropyLevelFrom'];
  hThrough: number;
  sThrough: number;
  hAnchor: Anchor | null;
  sAnchor: Anchor | null;
  hOrigin: Origin | null;
  sOrigin: Origin | null;
}

interface Carried {
  readonly zeros: CurveFamily;
  readonly substance: HarmonisedCase;
}

/** Carries known levels through stated first-order transitions, as long as one moves. */
export function carryAll(shapes: readonly PhaseShape[], levels: readonly Level[], family: Carried): void {
  const { transitions } = family.substance;
  for (let moved = true; moved; ) {
    moved = false;
    for (let t = 0; t < transitions.length; t++) {
      const stated = transitions[t];
      if (stated.from === stated.to || stated.order !== 'first') continue;
      const from = shapes.findIndex((s) => s.phase === stated.from);
      const to = shapes.findIndex((s) => s.phase === stated.to);
      if (from < 0 || to < 0) continue;
      moved = carry(shapes, levels, family, t, from, to, 1) || moved;
      moved = carry(shapes, levels, family, t, to, from, -1) || moved;
    }
  }
}

/** From `known` to `open`, `sign` times the stated dH and dS apart, each per formula unit at the transition's own pressure. */
function carry(
  shapes: readonly PhaseShape[],
  levels: readonly Level[],
  family: Carried,
  index: number,
  known: number,
  open: number,
  sign: number,
): boolean {
  const stated = family.substance.transitions[index];
  const { value: temperatureK } = stated.temperature;
  const own = [shapes[known], shapes[open]].every((s) => s.main.table.source === stated.table.source);
  // Of its own source all that is stated counts; beside another's, digits alone do not.
  const uOf = (datum: Datum): number => (own ? datum.u : uStated(datum, false));
  const uT = uOf(stated.temperature);
  const target = levels[open];
  const source = levels[known];
  const wantsH = target.h === null && source.h !== null;
  const wantsS = target.s === null && source.s !== null;
  if (!wantsH && !wantsS) return false;
  if (stated.enthalpy === null && stated.entropy === null) return false;
  if (!reaches(shapes[known], temperatureK) || !reaches(shapes[open], temperatureK)) return false;
  const a = atPressure(shapes[known], stated, family);
  const b = atPressure(shapes[open], stated, family);
  const scale = b.units / a.units;
  const origin = { source: known, atK: temperatureK, scale };
  const by = sign * b.units;
  if (wantsH) {
    const dH = stated.enthalpy?.value ?? (stated.entropy as Datum).value * temperatureK;
    target.h = scale * (a.h + (source.h ?? 0)) + by * dH - b.h;
    const errors =
      stated.enthalpy !== null
        ? [{ key: datumKey.enthalpy(index), by, u: uOf(stated.enthalpy) }]
        : [
            { key: datumKey.entropy(index), by: by * temperatureK, u: uOf(stated.entropy as Datum) },
            { key: datumKey.temperature(index), by: by * (stated.entropy as Datum).value, u: uT },
          ];
    // The two are joined at the stated temperature: with another one by the heat capacities between.
    errors.push({ key: datumKey.temperature(index), by: scale * a.cp - b.cp, u: uT });
    errors.push(...imperfection(b.uGas - scale * a.uGas, -1, 0, temperatureK));
    target.hOrigin = { ...origin, errors };
    target.uH = Math.hypot(scale * source.uH, ...sums(errors));
    target.hFrom = 'transition';
    target.hThrough = index;
  }
  if (wantsS) {
    const dS = stated.entropy?.value ?? (stated.enthalpy as Datum).value / temperatureK;
    target.s = scale * (a.s + (source.s ?? 0)) + by * dS - b.s;
    const errors =
      stated.entropy !== null
        ? [{ key: datumKey.entropy(index), by, u: uOf(stated.entropy) }]
        : [
            { key: datumKey.enthalpy(index), by: by / temperatureK, u: uOf(stated.enthalpy as Datum) },
            { key: datumKey.temperature(index), by: (-by * dS) / temperatureK, u: uT },
          ];
    errors.push({ key: datumKey.temperature(index), by: (scale * a.cp - b.cp) / temperatureK, u: uT });
    const byPressure = b.byPressure - scale * a.byPressure;
    if (byPressure !== 0 && stated.pressure !== null && stated.pressurePa > 0) {
      const { u, value } = stated.pressure;
      errors.push({ key: datumKey.transitionPressure(index), by: -byPressure, u: u / value });
    }
    errors.push(...imperfection(b.uGas - scale * a.uGas, 0, -1, temperatureK));
    target.sOrigin = { ...origin, errors };
    target.uS = Math.hypot(scale * source.uS, ...sums(errors));
    target.sFrom = 'transition';
    target.sThrough = index;
  }
  return true;
}

interface Placed {
  readonly h: number;
  readonly s: number;
  readonly cp: number;
  readonly units: number;
  /** dS/d ln p. */
  readonly byPressure: number;
  /** Standard uncertainty of the gas term of G [J/mol]. */
  readonly uGas: number;
}

/** H and S of the shape at the transition, its level apart, with what the pressure adds to a gas; its formula units. */
function atPressure(shape: PhaseShape, stated: StatedTransition, { zeros, substance }: Carried): Placed {
  const temperatureK = stated.temperature.value;
  const gas = isGas(shape.phase);
  const term =
    gas && zeros.isobarPa === null
      ? gasTerm(substance.substance, stated.gas ?? 'real', stated.pressurePa, boilingTemperature(substance.transitions))
      : null;
  const { enthalpy, entropy } = departure(term === null ? null : term.shift, temperatureK);
  const arrays = relative(shape);
  return {
    h: enthalpyAt(arrays, temperatureK) + enthalpy,
    s: entropyAt(arrays, temperatureK) + entropy,
    cp: heatCapacityAt(arrays, temperatureK),
    units: gas ? (substance.substance.vapourSpecies?.formulaUnits ?? 1) : 1,
    byPressure: term === null ? 0 : -R_J_PER_MOL_K,
    uGas: term === null ? 0 : term.u(temperatureK),
  };
}

/** Standard errors by datum, what one datum adds twice taken together. */
function sums(errors: readonly LevelError[]): number[] {
  const by = new Map<string, number>();
  for (const { key, by: share, u } of errors) by.set(key, (by.get(key) ?? 0) + share * u);
  return [...by.values()];
}

export function relative(shape: PhaseShape): CurveArrays {
  return {
    knotK: shape.knotK,
    c0: shape.c0,
    c1: shape.c1,
    c2: shape.c2,
    c3: shape.c3,
    enthalpyJPerMol: shape.enthalpy,
    entropyJPerMolK: shape.entropy,
  };
}

function reaches(shape: PhaseShape, temperatureK: number): boolean {
  return temperatureK >= shape.knotK[0] && temperatureK <= shape.knotK[shape.knotK.length - 1];
}
