/** The tables that designs are put together from: descriptor and rows of each kind. */
import { type TableDesign, type Task, temperatureColumn, WHICH } from './design.js';
import { uncertaintyText } from './pen.js';
import { handbookTemperatures, measuredTemperatures, pressureTemperatures } from './temperatures.js';
import { logVapourPressure, REFERENCE_K, STANDARD_PRESSURE_PA, type TruePhase } from './truth.js';

const CP = { is: 'heat-capacity', unit: 'J/(mol.K)' };
const S = { is: 'entropy', unit: 'J/(mol.K)' };
const F = { is: 'gibbs-function', unit: 'J/(mol.K)' };
const H = { is: 'enthalpy-increment', unit: 'kJ/mol' };
const u = (of: string, unit: string) => ({ is: 'uncertainty', of, unit });

/** Cp, S, -[G - H(Tr)]/T where wanted, and H - H(Tr), rounded. */
export function handbookTable(gibbs: boolean): TableDesign {
  const columns = {
    ...WHICH,
    ...temperatureColumn(),
    Cp: CP,
    S,
    ...(gibbs ? { '-[G-H(Tr)]/T': F } : {}),
    'H-H(Tr)': H,
  };
  return { file: 'functions.csv', holds: 'thermal-functions', columns };
}

export function writeHandbookTable({ id, truth, pen, write }: Task, source: string, gibbs: boolean): void {
  for (const phase of truth.phases) {
    for (const t of handbookTemperatures(truth, phase)) {
      const { increment, gibbsFunction } = functionsAt(phase, t);
      write(source, 'functions.csv', [
        ...[id, phase.label, String(t), pen.printed(phase.cp(t), 3), pen.printed(phase.s(t), 3)],
        ...(gibbs ? [pen.printed(gibbsFunction, 3)] : []),
        pen.printed(increment / 1000, 3),
      ]);
    }
  }
}

/** The same columns with an uncertainty beside each. */
export function coarseTable(): TableDesign {
  const columns = {
    ...WHICH,
    ...temperatureColumn(),
    Cp: CP,
    'u(Cp)': u('heat-capacity', 'J/(mol.K)'),
    S,
    'u(S)': u('entropy', 'J/(mol.K)'),
    '-[G-H(Tr)]/T': F,
    'u(-[G-H(Tr)]/T)': u('gibbs-function', 'J/(mol.K)'),
    'H-H(Tr)': H,
    'u(H-H(Tr))': u('enthalpy-increment', 'kJ/mol'),
  };
  return { file: 'functions.csv', holds: 'thermal-functions', columns };
}

export function writeCoarseTable({ id, truth, pen, write }: Task, source: string, uPerK: number, uH: number): void {
  for (const phase of truth.phases) {
    for (const t of handbookTemperatures(truth, phase)) {
      const { increment, gibbsFunction } = functionsAt(phase, t);
      const perKelvin = [phase.cp(t), phase.s(t), gibbsFunction].flatMap((value) => [
        pen.measured(value, uPerK),
        uncertaintyText(uPerK),
      ]);
      // H(Tr) - H(Tr) is 0 by definition, whatever else is uncertain.
      const zero = t === REFERENCE_K;
      const h = zero ? ['0', '0'] : [pen.measured(increment / 1000, uH / 1000), uncertaintyText(uH / 1000)];
      write(source, 'functions.csv', [id, phase.label, String(t), ...perKelvin, ...h]);
    }
  }
}

function functionsAt(phase: TruePhase, t: number): { increment: number; gibbsFunction: number } {
  const increment = phase.h(t) - phase.formationEnthalpy;
  return { increment, gibbsFunction: phase.s(t) - increment / t };
}

/** Scatter of each point and calibration of a series (one a phase), both relative standard uncertainties of Cp. */
export interface CalorimetryErrors {
  readonly own: number;
  readonly shared: number;
  /** Points a phase. */
  readonly rows: number;
}

export function calorimetryTable({ own, shared }: CalorimetryErrors): TableDesign {
  const uncertainty = [
    ...(own > 0 ? [{ relative: own }] : []),
    ...(shared > 0 ? [{ relative: shared, shared: true }] : []),
  ];
  return {
    file: 'heat-capacities.csv',
    holds: 'thermal-functions',
    columns: { ...WHICH, ...temperatureColumn(), Cp: { ...CP, uncertainty } },
  };
}

export function writeCalorimetry(task: Task, source: string, { own, shared, rows }: CalorimetryErrors): void {
  const { id, truth, pen, layout, write } = task;
  for (const phase of truth.phases) {
    const factor = pen.calibration(shared);
    for (const t of measuredTemperatures(truth, phase, rows, layout)) {
      const cp = phase.cp(t);
      const text = own > 0 ? pen.measured(cp, own * cp, factor) : pen.measured(cp * factor, 0.001 * shared * cp);
      write(source, 'heat-capacities.csv', [id, phase.label, String(t), text]);
    }
  }
}

export function handbookAnchors(): TableDesign {
  return {
    file: 'anchors.csv',
    holds: 'anchors',
    columns: { ...WHICH, dfH: { is: 'enthalpy-of-formation', unit: 'kJ/mol' }, S },
  };
}

export function writeHandbookAnchors({ id, truth, pen, write }: Task, source: string): void {
  for (const { label, formationEnthalpy, referenceEntropy } of truth.phases) {
    write(source, 'anchors.csv', [
      id,
      label,
      pen.printed(formationEnthalpy / 1000, 3),
      pen.printed(referenceEntropy, 3),
    ]);
  }
}

/** Standard uncertainties of a phase's ΔfH [J/mol] and S [J/(mol K)]. */
export interface AnchorErrors {
  readonly enthalpy: number;
  readonly entropy: number;
}

export function measuredAnchors(): TableDesign {
  return {
    file: 'anchors.csv',
    holds: 'anchors',
    columns: {
      ...WHICH,
      dfH: { is: 'enthalpy-of-formation', unit: 'kJ/mol' },
      'u(dfH)': u('enthalpy-of-formation', 'kJ/mol'),
      S,
      'u(S)': u('entropy', 'J/(mol.K)'),
    },
  };
}

export function writeMeasuredAnchors(
  { id, truth, pen, write }: Task,
  source: string,
  errors: AnchorErrors,
  which: (phase: TruePhase) => boolean = () => true,
): void {
  for (const phase of truth.phases.filter(which)) {
    const { label, formationEnthalpy: h, referenceEntropy } = phase;
    // An element's own reference phase has no formation enthalpy, by definition.
    const enthalpy =
      h === 0 ? ['0', '0'] : [pen.measured(h / 1000, errors.enthalpy / 1000), uncertaintyText(errors.enthalpy / 1000)];
    write(source, 'anchors.csv', [
      ...[id, label, ...enthalpy],
      ...[pen.measured(referenceEntropy, errors.entropy), uncertaintyText(errors.entropy)],
    ]);
  }
}

const TRANSITION = {
  substance: { is: 'substance' },
  from: { is: 'from-phase' },
  to: { is: 'to-phase' },
  gas: { is: 'gas' },
};
const TT = { is: 'transition-temperature', unit: 'K' };
const DH = { is: 'transition-enthalpy', unit: 'kJ/mol' };
const DS = { is: 'transition-entropy', unit: 'J/(mol.K)' };

export function handbookTransitions(): TableDesign {
  return {
    file: 'transitions.csv',
    holds: 'transitions',
    columns: { ...TRANSITION, 'T/K': TT, DH, DS },
  };
}

export function writeHandbookTransitions({ id, truth, pen, write }: Task, source: string): void {
  for (const { from, to, temperatureK, enthalpy, entropy } of truth.transitions) {
    write(source, 'transitions.csv', [
      ...[id, from, to, to === 'g' ? 'ideal' : '', pen.printed(temperatureK, 3)],
      ...[pen.printed(enthalpy / 1000, 3), pen.printed(entropy, 3)],
    ]);
  }
}

/** Standard uncertainties of T [K]; ΔH and ΔS relative. */
export interface TransitionErrors {
  readonly temperatureK: number;
  readonly enthalpy: number;
  readonly entropy: number;
}

export function measuredTransitions(entropies: boolean): TableDesign {
  return {
    file: 'transitions.csv',
    holds: 'transitions',
    columns: {
      ...TRANSITION,
      'T/K': TT,
      'u(T)': u('transition-temperature', 'K'),
      DH,
      'u(DH)': u('transition-enthalpy', 'kJ/mol'),
      ...(entropies ? { DS, 'u(DS)': u('transition-entropy', 'J/(mol.K)') } : {}),
    },
  };
}

/** Of one transition: absolute standard uncertainties of T [K], ΔH [J/mol] and ΔS [J/(mol K)]. */
export function writeMeasuredTransitions(
  { id, truth, pen, write }: Task,
  source: string,
  entropies: boolean,
  uOf: (enthalpy: number, entropy: number) => TransitionErrors,
): void {
  for (const { from, to, temperatureK, enthalpy, entropy } of truth.transitions) {
    const errors = uOf(enthalpy, entropy);
    write(source, 'transitions.csv', [
      ...[id, from, to, to === 'g' ? 'ideal' : ''],
      ...[pen.measured(temperatureK, errors.temperatureK), uncertaintyText(errors.temperatureK)],
      ...[pen.measured(enthalpy / 1000, errors.enthalpy / 1000), uncertaintyText(errors.enthalpy / 1000)],
      ...(entropies ? [pen.measured(entropy, errors.entropy), uncertaintyText(errors.entropy)] : []),
    ]);
  }
}

/** Standard uncertainties of vapour pressures: of p relative, of T [K]. */
export interface PressureErrors {
  readonly pressure: number;
  readonly temperatureK: number;
}

export function vapourPressureTable({ pressure, temperatureK }: PressureErrors): TableDesign {
  return {
    file: 'vapour-pressures.csv',
    holds: 'vapour-pressures',
    columns: {
      ...WHICH,
      ...temperatureColumn({ absolute: temperatureK }),
      'p/Pa': { is: 'pressure', unit: 'Pa', uncertainty: { relative: pressure } },
    },
  };
}

/** Over the liquid, from 0.01 bar or the melting point up to the boiling point; the vapour ideal. */
export function writeVapourPressures({ id, truth, pen, write }: Task, source: string, errors: PressureErrors): void {
  const [liquid, gas] = truth.phases.slice(-2) as [TruePhase, TruePhase];
  const boilingK = truth.transitions.at(-1)!.temperatureK;
  let low = liquid.stableK[0];
  while (logVapourPressure(liquid, gas, low) < Math.log(0.01)) low += 1;
  for (const t of pressureTemperatures(low, boilingK, 10)) {
    const p = STANDARD_PRESSURE_PA * Math.exp(logVapourPressure(liquid, gas, t));
    write(source, 'vapour-pressures.csv', [
      ...[id, liquid.label, pen.measured(t, errors.temperatureK), pen.measured(p, errors.pressure * p)],
    ]);
  }
}
