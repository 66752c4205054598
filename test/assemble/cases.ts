/** Harmonised tables made inline, for the tests of assemble. */
import { assemble } from '../../pipeline/assemble/assemble.js';
import { phaseShape } from '../../pipeline/assemble/phase-shape.js';
import type { ExaminedCase, NamedCell } from '../../schemas/checked.js';
import type { AssembledCase, FunctionRows, PhaseCurve } from '../../schemas/curves.js';
import type {
  Anchor,
  Datum,
  HarmonisedCase,
  Series,
  SeriesQuantity,
  StatedTransition,
  VapourPressure,
} from '../../schemas/harmonised.js';
import { type Policy, policySchema } from '../../schemas/policy.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import type { Substance } from '../../schemas/substances.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';

export const POLICY: Policy = policySchema.parse({});

export const SUBSTANCE: Substance = {
  id: 'medium',
  name: 'Medium',
  formula: 'X2Y',
  molarMassGPerMol: 50,
  atomsPerFormula: 3,
  criticalTemperatureK: null,
  criticalPressurePa: null,
  acentricFactor: null,
  polarA: null,
  polarB: null,
  class: null,
  vapourSpecies: null,
  residualEntropyJPerMolK: 0,
};

export function tableOf(rest: Partial<TableMeaning> = {}): TableMeaning {
  return {
    source: 'desk',
    file: 'table.csv',
    table: '#0',
    holds: 'thermal-functions',
    basis: 'evaluated',
    restsOn: [],
    rank: 1,
    temperatureScale: 'ITS-90',
    standardPressurePa: 100000,
    referenceTemperatureK: 298.15,
    enthalpyZero: 'elements-298.15',
    entropyZero: 'absolute',
    isobarPa: null,
    incrementsFromZeroK: false,
    columns: [],
    ...rest,
  };
}

/** A printed column, given in SI: rounded to `decimals` of the printed unit, `factor` of which make one SI unit. NaN: nothing printed. */
export interface Printed {
  readonly values: readonly number[];
  readonly decimals: number;
  /** Printed unit in SI: 1000 for kJ/mol. */
  readonly factor?: number;
  /** Own relative standard uncertainty of each point. */
  readonly relative?: number;
  /** Relative calibration uncertainty common to the column. */
  readonly shared?: number;
}

function quantityOf(is: NumberQuantity, printed: Printed | undefined): SeriesQuantity | null {
  if (printed === undefined) return null;
  const { decimals, factor = 1, relative = 0, shared = 0 } = printed;
  const unit = 10 ** -decimals * factor;
  const rounded = printed.values.map((v) => (Number.isNaN(v) ? 0 : Math.round(v / unit) * unit));
  return {
    is,
    column: 0,
    values: Float64Array.from(rounded),
    present: Uint8Array.from(printed.values, (v) => (Number.isNaN(v) ? 0 : 1)),
    halfUnit: new Float64Array(rounded.length).fill(unit / 2),
    uOwn: Float64Array.from(rounded, (v) => relative * Math.abs(v)),
    uSharedRelative: shared,
    origin: relative > 0 || shared > 0 ? 'stated' : 'printed digits',
  };
}

export interface SeriesParts {
  readonly phase: string;
  readonly temperatureK: readonly number[];
  readonly cp: Printed;
  readonly s?: Printed;
  /** H - H(Tr). */
  readonly increment?: Printed;
  /** -[G - H(Tr)]/T. */
  readonly gibbsFunction?: Printed;
  /** H and G from the declared zero. */
  readonly h?: Printed;
  readonly g?: Printed;
  readonly incrementsFrom?: string;
  readonly table?: Partial<TableMeaning>;
}

export function seriesOf(parts: SeriesParts): Series {
  const table = tableOf(parts.table);
  const rows = parts.temperatureK.length;
  return {
    table,
    phase: parts.phase,
    series: '',
    rank: table.rank,
    incrementsFrom: parts.incrementsFrom ?? null,
    rows,
    line: Int32Array.from({ length: rows }, (_, i) => i + 2),
    temperatureK: Float64Array.from(parts.temperatureK),
    scaleDoubtK: 0,
    temperatureHalfUnitK: 0,
    temperatureColumn: 0,
    heatCapacity: quantityOf('heat-capacity', parts.cp),
    entropy: quantityOf('entropy', parts.s),
    enthalpyIncrement: quantityOf('enthalpy-increment', parts.increment),
    gibbsFunction: quantityOf('gibbs-function', parts.gibbsFunction),
    enthalpy: quantityOf('enthalpy', parts.h),
    gibbsEnergy: quantityOf('gibbs-energy', parts.g),
    notes: null,
    corrections: 0,
    text: () => '',
  };
}

export function datum(value: number, u = 0, halfUnit = 0): Datum {
  return {
    value,
    u: Math.hypot(u, halfUnit / Math.sqrt(3)),
    uRounding: halfUnit / Math.sqrt(3),
    halfUnit,
    origin: u > 0 ? 'stated' : 'printed digits',
    address: { source: 'desk', file: 'rows.csv', line: 2, column: 'value' },
    printed: String(value),
    unit: 'J/mol',
    factor: 1,
    offset: 0,
  };
}

export function anchorOf(
  phase: string,
  values: { h?: Datum; s?: Datum },
  table: Partial<TableMeaning> = {},
  referenceTemperatureK = 298.15,
): Anchor {
  return {
    table: tableOf({ holds: 'anchors', file: 'anchors.csv', ...table }),
    phase,
    referenceTemperatureK,
    enthalpyOfFormation: values.h ?? null,
    entropy: values.s ?? null,
    gibbsEnergyOfFormation: null,
    enthalpyFromZero: null,
    heatCapacity: null,
  };
}

export function transitionOf(
  from: string,
  to: string,
  temperature: Datum,
  values: {
    h?: Datum;
    s?: Datum;
    pressurePa?: number;
    gas?: 'real' | 'ideal';
    order?: 'first' | 'continuous' | 'glass';
  } = {},
  table: Partial<TableMeaning> = {},
): StatedTransition {
  return {
    table: tableOf({ holds: 'transitions', file: 'transitions.csv', ...table }),
    from,
    to,
    printedFrom: from,
    printedTo: to,
    order: values.order ?? 'first',
    gas: values.gas ?? null,
    pressurePa: values.pressurePa ?? 100000,
    pressure: null,
    temperature,
    enthalpy: values.h ?? null,
    entropy: values.s ?? null,
  };
}

export interface CaseParts {
  readonly series: readonly Series[];
  readonly anchors?: readonly Anchor[];
  readonly transitions?: readonly StatedTransition[];
  readonly vapourPressures?: readonly VapourPressure[];
  readonly substance?: Partial<Substance>;
  readonly named?: readonly NamedCell[];
}

export function assembled(parts: CaseParts, policy: Policy = POLICY): AssembledCase {
  const harmonised: HarmonisedCase = {
    substance: { ...SUBSTANCE, ...parts.substance },
    series: parts.series,
    anchors: parts.anchors ?? [],
    transitions: parts.transitions ?? [],
    vapourPressures: parts.vapourPressures ?? [],
    findings: [],
  };
  const examined: ExaminedCase = { harmonised, named: parts.named ?? [], outcomes: [], findings: [], suspects: [] };
  return assemble([examined], { policy }).artefact[0];
}

/** The one curve of a phase, on the standard state or the isobar. */
export function curveOfPhase(result: AssembledCase, phase: string, isobarPa: number | null = null): PhaseCurve {
  const found = result.curves.filter((c) => c.phase === phase && c.family.isobarPa === isobarPa);
  if (found.length !== 1) throw new Error(`${found.length} curves of ${phase}`);
  return found[0];
}

export function rowsOfPhase(result: AssembledCase, phase: string, isobarPa: number | null = null): FunctionRows {
  const found = result.functions.filter((c) => c.phase === phase && c.family.isobarPa === isobarPa);
  if (found.length !== 1) throw new Error(`${found.length} tables of ${phase}`);
  return found[0];
}

/** The curve that one series gives, before levels. */
export function shapeOf(series: Series, metal = false, policy: Policy = POLICY) {
  const shape = phaseShape(series.phase, [{ series, named: [] }], metal, policy);
  if (shape === null) throw new Error('no curve');
  return shape;
}
