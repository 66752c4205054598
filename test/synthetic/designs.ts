/** Stated ways in which data are kept, from a handbook's evaluation to a chain of phases that only its crystal anchors. */
import type { Design, SourceDesign } from './design.js';
import type { Chance } from './normal.js';
import {
  type AnchorErrors,
  type CalorimetryErrors,
  calorimetryTable,
  coarseTable,
  handbookAnchors,
  handbookTable,
  handbookTransitions,
  measuredAnchors,
  measuredTransitions,
  type PressureErrors,
  type TransitionErrors,
  vapourPressureTable,
  writeCalorimetry,
  writeCoarseTable,
  writeHandbookAnchors,
  writeHandbookTable,
  writeHandbookTransitions,
  writeMeasuredAnchors,
  writeMeasuredTransitions,
  writeVapourPressures,
} from './tables.js';

/** One evaluated source: tables, anchors and transitions at printed digits. */
export function handbook(name: string, gibbs: boolean): Design {
  return {
    name,
    sources: [evaluated(name, gibbs)],
    crystals: oneOrTwo,
    fill: (task) => {
      writeHandbookTable(task, name, gibbs);
      writeHandbookAnchors(task, name);
      writeHandbookTransitions(task, name);
    },
  };
}

function evaluated(id: string, gibbs: boolean): SourceDesign {
  return {
    id,
    title: `Synthetic substances: an evaluation (${id})`,
    basis: 'evaluated',
    rank: 1,
    tables: [handbookTable(gibbs), handbookAnchors(), handbookTransitions()],
  };
}

export interface MeasuredErrors {
  readonly calorimetry: CalorimetryErrors;
  readonly anchors: AnchorErrors;
  /** T [K]; ΔH and ΔS relative. */
  readonly transitions: TransitionErrors;
  /** Null: none are written. */
  readonly pressures: PressureErrors | null;
}

export const MEASURED: MeasuredErrors = {
  calorimetry: { own: 0.002, shared: 0.003, rows: 30 },
  anchors: { enthalpy: 150, entropy: 0.15 },
  transitions: { temperatureK: 0.05, enthalpy: 0.004, entropy: 0.004 },
  pressures: null,
};

/** Calorimetry with stated u; anchors of the crystal and the gas from one other source, transitions from a third. */
export function measured(name: string, errors: MeasuredErrors = MEASURED): Design {
  const { calorimetry, anchors, transitions, pressures } = errors;
  const [heat, formation, changes] = [`${name}-calorimetry`, `${name}-anchors`, `${name}-transitions`];
  const pressure = `${name}-pressures`;
  return {
    name,
    sources: [
      laboratory(heat, [calorimetryTable(calorimetry)]),
      laboratory(formation, [measuredAnchors()]),
      laboratory(changes, [measuredTransitions(true)]),
      ...(pressures === null ? [] : [laboratory(pressure, [vapourPressureTable(pressures)])]),
    ],
    crystals: oneOrTwo,
    fill: (task) => {
      const first = task.truth.phases[0];
      writeCalorimetry(task, heat, calorimetry);
      writeMeasuredAnchors(task, formation, anchors, (phase) => phase === first || phase.label === 'g');
      writeMeasuredTransitions(task, changes, true, relativeErrors(transitions));
      if (pressures !== null) writeVapourPressures(task, pressure, pressures);
    },
  };
}

/** An evaluation, transitions that others measured, and a second set of anchors. */
export function manySources(name: string): Design {
  const [tables, changes, formation] = [`${name}-tables`, `${name}-transitions`, `${name}-anchors`];
  return {
    name,
    sources: [
      evaluated(tables, true),
      laboratory(changes, [measuredTransitions(false)]),
      laboratory(formation, [measuredAnchors()]),
    ],
    crystals: oneOrTwo,
    fill: (task) => {
      writeHandbookTable(task, tables, true);
      writeHandbookAnchors(task, tables);
      writeHandbookTransitions(task, tables);
      writeMeasuredTransitions(task, changes, false, relativeErrors(MEASURED.transitions));
      writeMeasuredAnchors(task, formation, MEASURED.anchors);
    },
  };
}

/** A thousand times what three printed decimals leave open. */
export const COARSE = { perKelvin: 0.289, molar: 289, temperatureK: 0.289 };

/** Tables, anchors and transitions with stated uncertainties a thousand times those of printed digits. */
export function coarse(name: string): Design {
  const { perKelvin, molar, temperatureK } = COARSE;
  return {
    name,
    sources: [laboratory(name, [coarseTable(), measuredAnchors(), measuredTransitions(true)])],
    crystals: oneOrTwo,
    fill: (task) => {
      writeCoarseTable(task, name, perKelvin, molar);
      writeMeasuredAnchors(task, name, { enthalpy: molar, entropy: perKelvin });
      writeMeasuredTransitions(task, name, true, () => ({ temperatureK, enthalpy: molar, entropy: perKelvin }));
    },
  };
}

/** Five phases, of which the lowest crystal alone is anchored; the rest is carried by ΔH and ΔS. */
export function chain(name: string, { calorimetry, anchors, transitions }: MeasuredErrors = MEASURED): Design {
  return {
    name,
    sources: [laboratory(name, [calorimetryTable(calorimetry), measuredAnchors(), measuredTransitions(true)])],
    crystals: () => 3,
    fill: (task) => {
      const first = task.truth.phases[0];
      writeCalorimetry(task, name, calorimetry);
      writeMeasuredAnchors(task, name, anchors, (phase) => phase === first);
      writeMeasuredTransitions(task, name, true, relativeErrors(transitions));
    },
  };
}

function laboratory(id: string, tables: SourceDesign['tables']): SourceDesign {
  return { id, title: `Synthetic substances: measurements (${id})`, basis: 'measured', rank: 2, tables };
}

function relativeErrors({ temperatureK, enthalpy, entropy }: TransitionErrors) {
  return (dH: number, dS: number): TransitionErrors => ({
    temperatureK,
    enthalpy: enthalpy * dH,
    entropy: entropy * dS,
  });
}

function oneOrTwo(random: Chance): number {
  return random.unit() < 0.25 ? 2 : 1;
}

/** Standard uncertainties of the vapour pressures: 0.5 % of p, 0.05 K. */
export const PRESSURES: PressureErrors = { pressure: 0.005, temperatureK: 0.05 };

export const DESIGN_NAMES = [
  'handbook',
  'handbook-cp-s-h',
  'measured',
  'many-sources',
  'vapour-pressures',
  'coarse',
  'chain',
] as const;
export type DesignName = (typeof DESIGN_NAMES)[number];

/** @param pressures false: `vapour-pressures` is written without its table of pressures. */
export function designNamed(name: DesignName, pressures: boolean): Design {
  switch (name) {
    case 'handbook':
      return handbook(name, true);
    case 'handbook-cp-s-h':
      return handbook(name, false);
    case 'measured':
      return measured(name);
    case 'many-sources':
      return manySources(name);
    case 'vapour-pressures':
      return measured(name, { ...MEASURED, pressures: pressures ? PRESSURES : null });
    case 'coarse':
      return coarse(name);
    case 'chain':
      return chain(name);
  }
}
