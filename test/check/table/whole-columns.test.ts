/** Whole columns of the published tables rewritten as people do, each in at least three sets. */
import { join } from 'node:path';
import { describe, expect, it, vi } from 'vitest';
import type { ReconciledCase } from '../../../schemas/checked.js';
import { runPipeline } from '../../slips/run-pipeline.js';
import { plus, type Rewrite, type SpoiltTable, spoilt, times } from './spoil-column.js';

vi.setConfig({ testTimeout: 60_000 });

const PUBLISHED = 'test/published';
const R = 8.31446261815324;

type Columns = SpoiltTable['columns'];
const table = (substance: string, file: string, phase: string | null, columns: Columns): SpoiltTable => ({
  substance,
  source: `handbook-${substance}`,
  file,
  phase,
  columns,
});
const LEAD: Columns = { T: 'T_K', Cp: 'Cp', S: 'S', F: '-[G-H(Tr)]/T', H: 'H-H(Tr)' };
const COPPER: Columns = { T: 'T', Cp: 'Cp', S: 'S', F: '-(G-H298)/T', H: 'H-H298' };
const SALT: Columns = {
  T: 'T [K]',
  Cp: 'Cp [J/(mol K)]',
  S: 'S [J/(mol K)]',
  F: '-[G-H(Tr)]/T [J/(mol K)]',
  H: 'H-H(Tr) [kJ/mol]',
};
const CRYSTALS = [
  table('lead', 'pb-002.tsv', null, LEAD),
  table('copper', 'cr.csv', null, COPPER),
  table('sodium-chloride', 'nacl-single-phases.csv', 'cr', SALT),
];
const GASES = [table('lead', 'pb-005.tsv', null, LEAD), table('copper', 'g.csv', null, COPPER)];
const LIQUIDS = [
  table('lead', 'pb-003.tsv', null, LEAD),
  table('copper', 'l.csv', null, COPPER),
  table('sodium-chloride', 'nacl-single-phases.csv', 'l', SALT),
];
const MOLAR_MASS: Readonly<Record<string, number>> = { lead: 207.2, copper: 63.546, 'sodium-chloride': 58.44 };
/** H(Tr) - H(0) [kJ/mol], by substance and phase. */
const FROM_ZERO: Readonly<Record<string, number>> = {
  'pb-002.tsv': 6.878,
  'cr.csv': 5.007,
  'nacl-single-phases.csv': 10.611,
};

const named = (one: SpoiltTable) => `${one.substance}, ${one.file}`;
const grave = ({ findings }: ReconciledCase) => findings.filter(({ severity }) => severity !== 'note');
/** What the adjustment makes of a curve that lacks the column is not looked at here. */
const roots = (one: ReconciledCase) =>
  grave(one).filter(({ cause, detail }) => cause === null && detail.code !== 'adjustment');
/** Before the causes are looked for. */
const tableFindings = (one: ReconciledCase) =>
  one.checked.assembled.examined.findings.filter(({ severity }) => severity !== 'note');
const suspectsOf = (one: ReconciledCase, id: string) =>
  one.suspects.filter(({ finding }) => finding === id).sort((a, b) => a.place - b.place);

/** The one finding that is no consequence, of a whole column, and its first suspect. */
function only(one: ReconciledCase) {
  expect(roots(one).map(({ rule, detail }) => `${rule} ${detail.code}`)).toHaveLength(1);
  const [finding] = roots(one);
  if (finding?.detail.code !== 'column') throw new Error(`${finding?.rule} ${finding?.detail.code}`);
  const [suspect] = suspectsOf(one, finding.id);
  return { finding, detail: finding.detail, suspect: suspect! };
}

interface Planted {
  readonly column: keyof Columns;
  readonly rewrite: (one: SpoiltTable) => Rewrite;
  readonly rule: string;
  readonly explanation: string | null;
  readonly factor: ((one: SpoiltTable) => number) | null;
}

const ENTROPY = 'entropy-follows-heat-capacity';
const ENTHALPY = 'enthalpy-follows-heat-capacity';
const scaled = (
  column: keyof Columns,
  rule: string,
  explanation: string | null,
  factor: (one: SpoiltTable) => number,
  decimals?: number,
): Planted => ({ column, rule, explanation, factor, rewrite: (one) => times(1 / factor(one), decimals) });

const PLANTED: readonly (readonly [string, Planted])[] = [
  ['S in thermochemical calories', scaled('S', ENTROPY, 'calorie-read-as-joule', () => 4.184)],
  ['S in calories of the International Table', scaled('S', ENTROPY, 'calorie-read-as-joule', () => 4.1868)],
  ['S brought to joules twice', scaled('S', ENTROPY, 'joule-read-as-calorie', () => 1 / 4.184)],
  ['H in kilocalories', scaled('H', ENTHALPY, 'calorie-read-as-joule', () => 4.184)],
  ['-[G - H]/T in calories', scaled('F', 'functions-close', 'calorie-read-as-joule', () => 4.184)],
  ['Cp in calories', scaled('Cp', 'heat-capacity-smooth', 'calorie-read-as-joule', () => 4.184)],
  ['H in joules', scaled('H', ENTHALPY, 'kilo-added', () => 1e-3, 0)],
  ['Cp in kilojoules', scaled('Cp', 'heat-capacity-smooth', 'kilo-dropped', () => 1000, 6)],
  ['S per gram', scaled('S', ENTROPY, 'per-gram-read-as-per-mole', ({ substance }) => MOLAR_MASS[substance]!, 5)],
  [
    'Cp per gram',
    scaled('Cp', 'heat-capacity-smooth', 'per-gram-read-as-per-mole', ({ substance }) => MOLAR_MASS[substance]!, 5),
  ],
  ['S in units of R', scaled('S', ENTROPY, 'in-units-of-r', () => R)],
  ['Cp in units of R', scaled('Cp', 'heat-capacity-smooth', 'in-units-of-r', () => R)],
  ['(G - H)/T without its minus', scaled('F', 'functions-close', 'sign-lost', () => -1)],
  [
    'H of the dihydrate',
    scaled(
      'H',
      ENTHALPY,
      'other-formula-molar-mass',
      ({ substance }) => MOLAR_MASS[substance]! / (MOLAR_MASS[substance]! + 2 * 18.015),
    ),
  ],
  ['H of two formula units', scaled('H', ENTHALPY, 'other-formula-molar-mass', () => 0.5)],
  ['S by a factor that nobody knows', scaled('S', ENTROPY, null, () => 1 / 1.3)],
];

describe.each(PLANTED)('%s', (_, { column, rewrite, rule, explanation, factor }) => {
  it.each(CRYSTALS.map((one) => [named(one), one] as const))(
    'is one finding with one first suspect in %s',
    (_name, one) => {
      const { finding, detail, suspect } = only(spoilt(PUBLISHED, one, { [one.columns[column]]: rewrite(one) }));
      expect(finding).toMatchObject({ rule, severity: 'fault', substance: one.substance });
      expect(detail.explanation).toBe(explanation);
      expect(detail.factor! / factor!(one)).toBeCloseTo(1, 3);
      expect(detail.shift).toBeNull();
      expect(suspect).toMatchObject({ place: 1, group: 1, explanation, cells: detail.cells });
      expect(suspect.address).toMatchObject({ file: one.file, column: one.columns[column] });
      expect(suspect.proposed / suspect.observed).toBeCloseTo(detail.factor!, 6);
      expect(finding.evidence).toHaveLength(detail.cells);
    },
  );
});

it('a column is a fault where any of its cells matters, though the first may be near zero', () => {
  const [one] = LIQUIDS as [SpoiltTable];
  const { finding } = only(spoilt(PUBLISHED, one, { [one.columns.H]: times(1 / 4.184) }));
  expect(Math.abs(finding.difference!)).toBeLessThan(50);
  expect(finding.severity).toBe('fault');
});

describe('several columns by one factor', () => {
  const cause = { S: 'calorie-read-as-joule', F: 'calorie-read-as-joule', Cp: 'calorie-read-as-joule' };
  it.each([...CRYSTALS, ...GASES].map((one) => [named(one), one] as const))(
    'S, -[G - H]/T and Cp in calories are one cause in %s, where H is not',
    (_, one) => {
      const { S, F, Cp } = one.columns;
      const seen = spoilt(PUBLISHED, one, { [S]: times(1 / 4.184), [F]: times(1 / 4.184), [Cp]: times(1 / 4.184) });
      const { finding } = only(seen);
      const columns = grave(seen).flatMap(({ detail }) => (detail.code === 'column' ? [detail] : []));
      expect(columns.map(({ quantity }) => quantity).sort()).toEqual(['entropy', 'gibbs-function', 'heat-capacity']);
      expect(columns.map(({ explanation }) => explanation)).toEqual(Object.values(cause));
      expect(grave(seen).every((other) => other === finding || other.cause !== null)).toBe(true);
    },
  );

  it.each(LIQUIDS.map((one) => [named(one), one] as const))(
    'S in calories and H in joules are two causes in %s',
    (_, one) => {
      const { S, H } = one.columns;
      const seen = spoilt(PUBLISHED, one, { [S]: times(1 / 4.184), [H]: times(1000, 0) });
      const columns = roots(seen).flatMap(({ detail }) => (detail.code === 'column' ? [detail] : []));
      expect(columns.map(({ quantity, explanation }) => `${quantity} ${explanation}`).sort()).toEqual([
        'enthalpy-increment kilo-added',
        'entropy calorie-read-as-joule',
      ]);
    },
  );
});

describe('the temperatures of a table', () => {
  const SCALES: readonly (readonly [string, string, Rewrite])[] = [
    ['in degrees Celsius', 'celsius-read-as-kelvin', plus(-273.15, 2)],
    ['in degrees Fahrenheit', 'fahrenheit-not-converted', (value) => (value * 1.8 - 459.67).toFixed(2)],
    ['with 273.15 added twice', 'kelvin-read-as-celsius', plus(273.15, 2)],
  ];
  describe.each(SCALES)('%s', (_, explanation, rewrite) => {
    it.each([...CRYSTALS, ...GASES, ...LIQUIDS].map((one) => [named(one), one] as const))(
      'are named in %s',
      (_name, one) => {
        const { finding, detail, suspect } = only(spoilt(PUBLISHED, one, { [one.columns.T]: rewrite }));
        expect(finding.rule).toBe(ENTROPY);
        expect(detail).toMatchObject({ quantity: 'temperature', explanation });
        expect(suspect.address.column).toBe(one.columns.T);
        expect(Number(suspect.explainedPrinted)).toBeCloseTo(suspect.proposed, 2);
      },
    );
  });
});

describe('columns off by a constant', () => {
  it.each(CRYSTALS.map((one) => [named(one), one] as const))('H counted from 0 K is named in %s', (_, one) => {
    const zero = FROM_ZERO[one.file]!;
    const { finding, detail } = only(spoilt(PUBLISHED, one, { [one.columns.H]: plus(zero, 3) }));
    expect(finding.rule).toBe(ENTHALPY);
    expect(detail).toMatchObject({ factor: null, explanation: 'counted-from-zero-kelvin' });
    expect(Math.abs(detail.shift! + 1000 * zero)).toBeLessThan(2);
  });

  it.each(CRYSTALS.map((one) => [named(one), one] as const))(
    'H and -[G - H]/T both counted from 0 K are one cause in %s, by H at Tr alone',
    (_, one) => {
      const zero = FROM_ZERO[one.file]!;
      const { T, H, F } = one.columns;
      const lower: Rewrite = (value, decimals, row) => (value - (1000 * zero) / row.get(T)!).toFixed(decimals);
      const seen = spoilt(PUBLISHED, one, { [H]: plus(zero, 3), [F]: lower });
      const { detail } = only(seen);
      expect(detail).toMatchObject({ quantity: 'enthalpy-increment', explanation: 'counted-from-zero-kelvin' });
      expect(grave(seen).some((other) => other.rule === 'functions-close' && other.cause !== null)).toBe(true);
    },
  );

  it.each(CRYSTALS.map((one) => [named(one), one] as const))(
    '-[G - H]/T alone counted from 0 K is named in %s, since H is 0 at Tr',
    (_, one) => {
      const zero = FROM_ZERO[one.file]!;
      const { T, F } = one.columns;
      const lower: Rewrite = (value, decimals, row) => (value - (1000 * zero) / row.get(T)!).toFixed(decimals);
      const { finding, detail } = only(spoilt(PUBLISHED, one, { [F]: lower }));
      expect(finding.rule).toBe('functions-close');
      expect(detail).toMatchObject({ factor: null, shift: null, explanation: 'counted-from-zero-kelvin' });
    },
  );

  const atOneAtmosphere: Rewrite = (value, decimals) => (value === 0 ? value : value - 0.10944).toFixed(decimals);
  it.each(GASES.map((one) => [named(one), one] as const))(
    'S at 1 atm beside -[G - H]/T at 1 bar is named in %s',
    (_, one) => {
      const { detail } = only(spoilt(PUBLISHED, one, { [one.columns.S]: atOneAtmosphere }));
      expect(detail).toMatchObject({ quantity: 'entropy', factor: null, explanation: 'atmosphere-for-bar' });
      expect(detail.shift).toBeCloseTo(0.10944, 4);
    },
  );

  it.each(LIQUIDS.map((one) => [named(one), one] as const))(
    'the same step in a liquid has no explanation in %s',
    (_, one) => {
      const { detail } = only(spoilt(PUBLISHED, one, { [one.columns.S]: atOneAtmosphere }));
      expect(detail).toMatchObject({ quantity: 'entropy', explanation: null });
    },
  );
});

describe('beside a wrong column', () => {
  it('a single wrong cell of another column is still named, and one of the same column in its own unit', () => {
    const [one] = CRYSTALS as [SpoiltTable];
    const { S, H } = one.columns;
    const off: Rewrite = (value, decimals) => (value === 8.481 ? 8.881 : value).toFixed(decimals);
    const seen = spoilt(PUBLISHED, one, { [S]: times(1 / 4.184), [H]: off });
    expect(tableFindings(seen).map(({ detail }) => detail.code)).toEqual(['column', 'cell']);
    const [, second] = tableFindings(seen);
    expect(suspectsOf(seen, second!.id)[0]).toMatchObject({ cells: 1, printed: '8.881', proposedPrinted: '8.481' });

    const twice: Rewrite = (value, decimals) => (value === 84.336 ? 21.157 : value / 4.184).toFixed(decimals);
    const same = spoilt(PUBLISHED, one, { [S]: twice });
    const cell = tableFindings(same).find(({ detail }) => detail.code === 'cell');
    const [suspect] = suspectsOf(same, cell!.id);
    expect(suspect).toMatchObject({ cells: 1, printed: '21.157' });
    expect(Number(suspect!.proposedPrinted)).toBeCloseTo(84.336 / 4.184, 2);
  });

  it('the curve is made without it, and where Cp is the wrong one there is none', () => {
    const [one] = CRYSTALS as [SpoiltTable];
    const phasesOf = (seen: ReconciledCase) => seen.checked.assembled.curves.map(({ phase }) => phase);
    const without = (column: string) => spoilt(PUBLISHED, one, { [column]: times(1 / 4.184) });
    expect(phasesOf(without(one.columns.S))).toContain('cr');
    expect(phasesOf(without(one.columns.H))).toContain('cr');
    expect(phasesOf(without(one.columns.Cp))).not.toContain('cr');
    const judged = without(one.columns.S).checked.judged.find(({ stated }) => stated.to === 'l')!;
    expect(Math.abs(judged.computedK! - 600.6)).toBeLessThan(0.2);
  });
});

describe('without a slip', () => {
  it.each([PUBLISHED, 'test/held-out'])('no table of %s is said to hold a wrong column', async (folder) => {
    const { findings } = await runPipeline(join(folder));
    const said = findings.filter(({ severity }) => severity !== 'note') as readonly { detail?: { code: string } }[];
    expect(said.filter(({ detail }) => detail?.code === 'column')).toEqual([]);
  });
});
