/** A small hand-made library: figures are invented, round, and chosen so that every kind of cell occurs. */
import type { JudgedTransition, ReconciledCase } from '../../schemas/checked.js';
import type { Crossing, CurveFamily, FunctionRows, PhaseCurve } from '../../schemas/curves.js';
import type { Finding, Outcome, Suspect } from '../../schemas/finding.js';
import type { Anchor, Datum, StatedTransition } from '../../schemas/harmonised.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';

export const STANDARD: CurveFamily = { enthalpyZero: 'elements-298.15', entropyZero: 'absolute', isobarPa: null };
export const ISOBAR: CurveFamily = { enthalpyZero: 'triple-point', entropyZero: 'triple-point', isobarPa: 101325 };

const TABLE: TableMeaning = {
  source: 'desk',
  file: 'points.csv',
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
};

export function datum(value: number, line: number, column: string): Datum {
  return {
    value,
    u: 0.05,
    uRounding: 0.03,
    halfUnit: 0.05,
    origin: 'printed digits',
    address: { source: 'desk', file: 'changes.csv', line, column },
    printed: String(value),
    unit: 'K',
    factor: 1,
    offset: 0,
  };
}

export function curve(phase: string, family = STANDARD, changes: Partial<PhaseCurve> = {}): PhaseCurve {
  return {
    phase,
    family,
    knotK: Float64Array.of(200, 298.15, 400),
    c0: Float64Array.of(20.1, 25.3),
    c1: Float64Array.of(0.05, 1e-7),
    c2: Float64Array.of(1 / 3e5, 0),
    c3: Float64Array.of(-2e-9, 0),
    enthalpyJPerMol: Float64Array.of(-2203.125, 0, 2600.7),
    entropyJPerMolK: Float64Array.of(40.25, 50.5, 58.75),
    knotKind: Uint8Array.of(0, 1, 0),
    measuredFromK: 200,
    measuredToK: 400,
    hasEnthalpyLevel: true,
    hasEntropyLevel: true,
    enthalpyLevelFrom: 'anchor',
    entropyLevelFrom: 'anchor',
    uHeatCapacityJPerMolK: Float64Array.of(0.1, 0.1),
    varH: new Float64Array(3),
    covHS: new Float64Array(3),
    varS: new Float64Array(3),
    gain: new Float64Array(12),
    uEnthalpyLevelJPerMol: 0,
    uEntropyLevelJPerMolK: 0,
    uCalibrationRelative: 0,
    referenceK: 298.15,
    entropyReferenceK: 298.15,
    sources: ['desk'],
    enthalpyThrough: -1,
    entropyThrough: -1,
    continuationGrowthPerK: 0.001,
    enthalpyAnchor: 0,
    entropyAnchor: 0,
    origins: [
      {
        lowK: 200,
        highK: 400,
        source: 'desk',
        file: 'points.csv',
        firstLine: 2,
        lastLine: 9,
        corrections: 1,
        stepHeatCapacityJPerMolK: null,
      },
      {
        lowK: 400,
        highK: 500,
        source: 'bench',
        file: 'runs.tsv',
        firstLine: 4,
        lastLine: 7,
        corrections: 0,
        stepHeatCapacityJPerMolK: -0.0125,
      },
    ],
    ...changes,
  };
}

export function functionRows(phase: string, family = STANDARD, changes: Partial<FunctionRows> = {}): FunctionRows {
  return {
    phase,
    family,
    rows: 3,
    temperatureK: Float64Array.of(200, 298.15, 298.15),
    heatCapacityJPerMolK: Float64Array.of(20.1, 25.3, 25.300000000000004),
    entropyJPerMolK: Float64Array.of(40.25, 50.5, 50.5),
    enthalpyJPerMol: Float64Array.of(-2203.125, 0, 0),
    gibbsEnergyJPerMol: Float64Array.of(-10253.125, -15056.574999999999, -15056.575),
    uHeatCapacityJPerMolK: Float64Array.of(0.1, 0.1, 0.1),
    uEntropyJPerMolK: Float64Array.of(0.2, 0.1, 0.1),
    uEnthalpyJPerMol: Float64Array.of(12, 1e-9, 0),
    uGibbsEnergyJPerMol: Float64Array.of(40, 30, 30),
    stable: Uint8Array.of(1, 1, 0),
    basis: Uint8Array.of(0, 1, 2),
    side: Uint8Array.of(0, 1, 2),
    ...changes,
  };
}

export function finding(id: string, substance: string, changes: Partial<Finding> = {}): Finding {
  return {
    id,
    evidenceHash: `hash-of-${id}`,
    substance,
    rule: 'gibbs-continuous',
    severity: 'doubt',
    fromPhase: 'cr',
    toPhase: 'l',
    temperatureK: 350.25,
    observed: 12.5,
    expected: 0,
    difference: 12.5,
    tolerance: 3.25,
    unit: 'J/mol',
    address: { source: 'desk', file: 'changes.csv', line: 3, column: 'Tm, "K"' },
    evidence: [
      { source: 'desk', file: 'changes.csv', line: 3, column: 'Tm, "K"', printed: '350,25' },
      { source: 'desk', file: 'points.csv', line: 8, column: 'S', printed: '58.75\n*' },
    ],
    detail: { code: 'transition', what: 'gap', statedK: 350.25, computedK: null, smallestDetectable: 2 },
    cause: null,
    accepted: false,
    ...changes,
  };
}

export const stated: StatedTransition = {
  table: TABLE,
  from: 'cr',
  to: 'l',
  printedFrom: 'cr',
  printedTo: 'l',
  order: 'first',
  gas: null,
  pressurePa: 100000,
  pressure: null,
  temperature: datum(350.25, 3, 'Tm, "K"'),
  enthalpy: datum(7000, 3, 'dH'),
  entropy: null,
};

export const crossing: Crossing = {
  family: STANDARD,
  from: 'cr',
  to: 'l',
  pressurePa: 100000,
  gas: null,
  temperatureK: 350.375,
  uK: 0.07,
  enthalpyJPerMol: 7010,
  entropyJPerMolK: 20.0071,
  stable: true,
  measured: true,
};
export const unstatedCrossing: Crossing = {
  ...crossing,
  from: 'l',
  to: 'g',
  gas: 'real',
  temperatureK: 399.5,
  stable: false,
};

export const judged: JudgedTransition = {
  stated,
  index: 0,
  fromCurve: 0,
  toCurve: 1,
  computedK: 350.375,
  uComputedK: 0.07,
  gapJPerMol: 2.5,
  uGapJPerMol: 1.4,
  curveEnthalpyJPerMol: 7008,
  curveEntropyJPerMolK: 20.001,
  stable: true,
  outcome: 'agrees',
  evidence: 'arithmetic',
};

const anchor: Anchor = {
  table: TABLE,
  phase: 'cr',
  referenceTemperatureK: 298.15,
  enthalpyOfFormation: null,
  entropy: datum(50.5, 2, 'S298'),
  gibbsEnergyOfFormation: null,
  enthalpyFromZero: null,
  heatCapacity: null,
};

export interface Parts {
  readonly curves?: readonly PhaseCurve[];
  readonly functions?: readonly FunctionRows[];
  readonly crossings?: readonly Crossing[];
  readonly judged?: readonly JudgedTransition[];
  readonly findings?: readonly Finding[];
  readonly suspects?: readonly Suspect[];
  readonly verdict?: ReconciledCase['verdict'];
}

export function reconciled(id: string, parts: Parts = {}): ReconciledCase {
  const outcomes: Outcome[] = [
    {
      substance: id,
      rule: 'gibbs-continuous',
      place: 'cr>l',
      outcome: 'agrees',
      evidence: 'arithmetic',
      missing: null,
      smallestDetectable: 0.25,
    },
    {
      substance: id,
      rule: 'row-readable',
      place: '',
      outcome: 'untestable',
      evidence: null,
      missing: 'rows',
      smallestDetectable: null,
    },
  ];
  return {
    checked: {
      assembled: {
        examined: {
          harmonised: {
            substance: {
              id,
              name: `Medium ${id}, "grade A"`,
              formula: id === 'nameless' ? '' : 'C2H6O',
              molarMassGPerMol: 46.069,
              atomsPerFormula: 9,
              criticalTemperatureK: null,
              criticalPressurePa: null,
              acentricFactor: null,
              polarA: null,
              polarB: null,
              class: 'molecular',
              vapourSpecies: { formula: 'C4H12O2', formulaUnits: 2 },
              residualEntropyJPerMolK: 0,
            },
            series: [],
            anchors: [anchor],
            transitions: [stated],
            vapourPressures: [],
            findings: [],
          },
          named: [],
          outcomes: [],
          findings: [],
          suspects: [],
        },
        curves: parts.curves ?? [curve('cr'), curve('g')],
        crossings: parts.crossings ?? [crossing, unstatedCrossing],
        functions: parts.functions ?? [functionRows('cr'), functionRows('g')],
      },
      judged: parts.judged ?? [judged],
      outcomes: [],
      findings: [],
    },
    findings: parts.findings ?? [],
    outcomes,
    suspects: parts.suspects ?? [],
    verdict: parts.verdict ?? 'cleared',
  };
}

export function suspect(of: string, substance: string): Suspect {
  return {
    finding: of,
    substance,
    place: 1,
    group: 1,
    cells: 1,
    address: { source: 'desk', file: 'points.csv', line: 8, column: 'S' },
    printed: '58.75',
    observed: 58.75,
    unit: 'J/(mol.K)',
    normalisedResidual: -9.5,
    redundancy: 0.8,
    proposed: 57.85,
    uProposed: 0.01,
    proposedPrinted: '57.85',
    smallestDetectable: 0.05,
    explanation: 'digits-exchanged',
    explainedPrinted: '12.34',
    toldApartBy: null,
  };
}

export const sentence = (one: Finding) => `Finding ${one.id}, "${one.rule}".\nSecond line — é`;
