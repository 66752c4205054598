/**
 * An invented medium from analytic heat capacities, printed as an evaluated table prints them, so that a test can spoil one
 * cell. Integrals are the tests' own, by quadrature.
 */
import { assemble } from '../../pipeline/assemble/assemble.js';
import { checkCurves, examine } from '../../pipeline/check/check.js';
import type { CheckedCase, ExaminedCase } from '../../schemas/checked.js';
import type { EvidenceKind, Finding, Outcome, RuleName } from '../../schemas/finding.js';
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import type { RawCase } from '../../schemas/raw.js';
import type { Basis, TableMeaning } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, POLICY, rowOf, seriesOf, tableOf } from '../harmonise/raw.js';

export const TR = 298.15;
/** Columns of a printed table. */
export const [T, CP, S, F, H] = [0, 1, 2, 3, 4];

export type HeatCapacity = (temperatureK: number) => number;

/** A phase as it really is: Cp from each temperature on, S(Tr) and H(Tr) from the medium's zeros. */
export interface Law {
  /** Rising; the first begins at 0 K or below every row. */
  readonly parts: readonly { readonly fromK: number; readonly cp: HeatCapacity }[];
  readonly entropy: number;
  readonly enthalpy: number;
}

export interface PrintedTransition {
  from: string;
  to: string;
  T: string;
  dH: string;
  dS: string;
  p: string;
  order?: string;
  gas?: string;
  /** Another source than the tables'. */
  source?: string;
}

/** What the sources print; every text may be changed before it is read. */
export interface Printed {
  tables: Record<string, string[][]>;
  anchors: { phase: string; H: string; S: string }[];
  transitions: PrintedTransition[];
  basis: Basis;
  /** Keys of the thermal-functions tables that differ. */
  meaning: Partial<TableMeaning>;
  /** Columns left out of the tables. */
  without: number[];
}

const KNOTS = [0.04691007703066802, 0.23076534494715845, 0.5, 0.7692346550528415, 0.953089922969332];
const WEIGHTS = [
  0.11846344252809454, 0.23931433524968324, 0.28444444444444444, 0.23931433524968324, 0.11846344252809454,
];

/** Five Gauss points on each of 64 panels. */
export function integral(f: (x: number) => number, from: number, to: number): number {
  const h = (to - from) / 64;
  let sum = 0;
  for (let k = 0; k < 64; k++) for (let j = 0; j < 5; j++) sum += WEIGHTS[j]! * f(from + (k + KNOTS[j]!) * h);
  return sum * h;
}

function along(law: Law, temperatureK: number, f: (cp: HeatCapacity) => (x: number) => number): number {
  let sum = 0;
  law.parts.forEach(({ fromK, cp }, i) => {
    const endK = law.parts[i + 1]?.fromK ?? Number.POSITIVE_INFINITY;
    const clamp = (x: number): number => Math.min(Math.max(x, fromK), endK);
    const [low, high] = [clamp(TR), clamp(temperatureK)];
    if (low !== high) sum += integral(f(cp), low, high);
  });
  return sum;
}

export const entropyOf = (law: Law, t: number): number => law.entropy + along(law, t, (cp) => (x) => cp(x) / x);
export const enthalpyOf = (law: Law, t: number): number => law.enthalpy + along(law, t, (cp) => cp);

/** Rows of T, Cp, S, -[G - H(Tr)]/T and H - H(Tr) with three decimals; a temperature given twice shows both sides of a break. */
export function rowsOf(law: Law, temperatures: readonly number[]): string[][] {
  return temperatures.map((t, i) => {
    const upper = i > 0 && temperatures[i - 1] === t;
    const part = law.parts.findLast(({ fromK }) => (upper ? fromK <= t : fromK < t)) ?? law.parts[0]!;
    const s = entropyOf(law, t);
    const increment = enthalpyOf(law, t) - law.enthalpy;
    return [
      String(t),
      part.cp(t).toFixed(3),
      s.toFixed(3),
      t === 0 ? '' : (s - increment / t).toFixed(3),
      (increment / 1000).toFixed(3),
    ];
  });
}

const upTo = (to: number): number[] => {
  const rows = [TR, 300];
  for (let t = 320; t <= to; t += 20) rows.push(t);
  return rows;
};

const crystal: HeatCapacity = (t) => 42 + 0.02 * t - 3e5 / t ** 2;
const liquid: HeatCapacity = (t) => 66 - 0.006 * t + 1e5 / t ** 2;
const gas: HeatCapacity = (t) => 36 + 0.004 * t - 1e5 / t ** 2;

export const MELTING = { atK: 500, dS: 18 };
export const BOILING = { atK: 900, dS: 88 };

/** The laws: melting at 500 K with dS = 18, boiling (ideal gas, 1 bar) at 900 K with dS = 88 J/(mol K). */
export function laws(): { cr: Law; l: Law; g: Law } {
  const cr: Law = { parts: [{ fromK: 1, cp: crystal }], entropy: 75, enthalpy: -400_000 };
  const after = (from: Law, cp: HeatCapacity, { atK, dS }: typeof MELTING): Law => {
    const raw: Law = { parts: [{ fromK: 1, cp }], entropy: 0, enthalpy: 0 };
    return {
      ...raw,
      entropy: entropyOf(from, atK) + dS - entropyOf(raw, atK),
      enthalpy: enthalpyOf(from, atK) + atK * dS - enthalpyOf(raw, atK),
    };
  };
  const l = after(cr, liquid, MELTING);
  return { cr, l, g: after(l, gas, BOILING) };
}

/** All of it printed without a slip. */
export function medium(basis: Basis = 'evaluated'): Printed {
  const { cr, l, g } = laws();
  const anchor = (phase: string, { enthalpy, entropy }: Law) => ({
    phase,
    H: (enthalpy / 1000).toFixed(3),
    S: entropy.toFixed(3),
  });
  const transition = (from: string, to: string, { atK, dS }: typeof MELTING): PrintedTransition => ({
    from,
    to,
    T: atK.toFixed(3),
    dH: ((atK * dS) / 1000).toFixed(3),
    dS: dS.toFixed(3),
    p: '1',
  });
  return {
    tables: { cr: rowsOf(cr, upTo(600)), l: rowsOf(l, upTo(1000)), g: rowsOf(g, upTo(1200)) },
    anchors: [anchor('cr', cr), anchor('l', l), anchor('g', g)],
    transitions: [transition('cr', 'l', MELTING), { ...transition('l', 'g', BOILING), gas: 'ideal' }],
    basis,
    meaning: {},
    without: [],
  };
}

const COLUMNS = [
  columnOf('T', 'temperature', 'K'),
  columnOf('Cp', 'heat-capacity', 'J/(mol.K)'),
  columnOf('S', 'entropy', 'J/(mol.K)'),
  columnOf('-[G-H(Tr)]/T', 'gibbs-function', 'J/(mol.K)'),
  columnOf('H-H(Tr)', 'enthalpy-increment', 'kJ/mol'),
];

/** Read and harmonised: row i of a table stands on line i + 2 of `<phase>.csv`. */
export function caseOf(printed: Printed, extra: Partial<RawCase> = {}): HarmonisedCase {
  const { basis } = printed;
  const series = Object.entries(printed.tables).map(([phase, rows]) => {
    const left = COLUMNS.map((_, i) => i).filter((i) => !printed.without.includes(i));
    const table = tableOf(
      left.map((i) => COLUMNS[i]!),
      { file: `${phase}.csv`, basis, ...printed.meaning },
    );
    return seriesOf(
      table,
      phase,
      rows.map((row) => left.map((i) => row[i]!)),
    );
  });
  const anchorTable = tableOf(
    [columnOf('DfH', 'enthalpy-of-formation', 'kJ/mol'), columnOf('S298', 'entropy', 'J/(mol.K)')],
    { holds: 'anchors', file: 'anchors.csv', basis },
  );
  const transitionTable = tableOf(
    [
      columnOf('T', 'transition-temperature', 'K'),
      columnOf('dH', 'transition-enthalpy', 'kJ/mol'),
      columnOf('dS', 'transition-entropy', 'J/(mol.K)'),
      columnOf('p', 'pressure', 'bar'),
    ],
    { holds: 'transitions', file: 'transitions.csv', basis },
  );
  const given = (cells: Record<string, string>) =>
    Object.fromEntries(Object.entries(cells).filter(([, c]) => c !== ''));
  const { made: _, ...one } = harmonised({
    series,
    anchors: printed.anchors.map(({ phase, H, S }, i) =>
      rowOf(anchorTable, { phase }, given({ 'enthalpy-of-formation': H, entropy: S }), i + 2),
    ),
    transitions: printed.transitions.map(({ from, to, T, dH, dS, p, order, gas, source }, i) =>
      rowOf(
        source === undefined ? transitionTable : { ...transitionTable, source },
        { 'from-phase': from, 'to-phase': to, ...(order && { order }), ...(gas && { gas }) },
        given({ 'transition-temperature': T, 'transition-enthalpy': dH, 'transition-entropy': dS, pressure: p }),
        i + 2,
      ),
    ),
    ...extra,
  });
  return one;
}

export const settings = { policy: POLICY };

export function examined(printed: Printed): ExaminedCase {
  return examine([caseOf(printed)], settings).artefact[0]!;
}

export function checked(printed: Printed): CheckedCase {
  return checkCurves(assemble([examined(printed)], settings).artefact, settings).artefact[0]!;
}

interface Judged {
  readonly outcomes: readonly Outcome[];
  readonly findings: readonly Finding[];
}

/** The one outcome of a rule at a place. */
export function outcomeOf({ outcomes }: Judged, rule: RuleName, place: string): Outcome {
  const found = outcomes.filter((one) => one.rule === rule && one.place === place);
  if (found.length !== 1) throw new Error(`${found.length} outcomes of ${rule} at ${place}`);
  return found[0]!;
}

export function findingsOf({ findings }: Judged, rule: RuleName): readonly Finding[] {
  return findings.filter((one) => one.rule === rule);
}

/** What the rule says at the place, in short: outcome, kind of evidence, severities of all that it found. */
export function verdictOf(
  judged: Judged,
  rule: RuleName,
  place: string,
): { outcome: string; evidence: EvidenceKind | null; severities: string[] } {
  const { outcome, evidence } = outcomeOf(judged, rule, place);
  return { outcome, evidence, severities: findingsOf(judged, rule).map(({ severity }) => severity) };
}

export const silent = (evidence: EvidenceKind) => ({ outcome: 'agrees', evidence, severities: [] });
export const against = (severity: string, evidence: EvidenceKind) => ({
  outcome: 'disagrees',
  evidence,
  severities: [severity],
});

/** The printed number moved by so much, with its decimals. */
export function moved(text: string, by: number): string {
  return (Number(text) + by).toFixed(text.split('.')[1]?.length ?? 0);
}
