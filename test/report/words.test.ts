import { describe, expect, it } from 'vitest';
import { SLIP_CODES } from '../../pipeline/reconcile/explain.js';
import { EXPLANATIONS } from '../../pipeline/report/explanations.js';
import { figure, plusMinus, unitInWords } from '../../pipeline/report/figures.js';
import { sayReason, saySuspect, saySuspects } from '../../pipeline/report/suspect-words.js';
import { sayAddress, sayFinding, sayPlace } from '../../pipeline/report/words.js';
import type { FindingDetail, ReadingProblem, Suspect } from '../../schemas/finding.js';
import { makeFinding, type PartialFinding } from '../../schemas/make-finding.js';

const address = { source: 'mill-lab', file: 'points.csv', line: 412, column: 'S' };

function say(partial: Partial<PartialFinding> & { detail: FindingDetail }): string {
  return sayFinding(
    makeFinding({ rule: 'entropy-follows-heat-capacity', severity: 'fault', substance: 'lead', address, ...partial }),
  );
}

const interval = { code: 'interval', quantity: 'entropy', lowK: 1800, highK: 1900, named: true } as const;
const transition = { code: 'transition', statedK: 600.6, computedK: 622.31, smallestDetectable: null } as const;
const melting = { fromPhase: 'cr', toPhase: 'l', rule: 'gibbs-continuous', unit: 'J/mol' } as const;

const column = { code: 'column', quantity: 'entropy', cells: 22, factor: 4.184, shift: null } as const;

/** One finding of each kind, and words that its sentence must hold: found, expected, where, what next. */
const SENTENCES: readonly (readonly [string, Parameters<typeof say>[0], readonly RegExp[]])[] = [
  [
    'reading',
    {
      rule: 'row-readable',
      detail: { code: 'reading', problem: 'cell-not-a-number', read: '12,4O', wanted: 'a number', remedy: 'Mend it' },
    },
    [/^“12,4O” is not a number; expected was a number\. Mend it\./, /mill-lab\/points\.csv line 412, column S\.$/],
  ],
  [
    'rows-disagree',
    {
      rule: 'rows-distinct',
      temperatureK: 300,
      detail: { code: 'rows-disagree', otherLine: 17, quantity: 'heat-capacity', first: '24.5', second: '26.4' },
    },
    [/Two rows at 300 K disagree: Cp is 24\.5 here and 26\.4 on line 17/, /by a correction/, /line 412/],
  ],
  [
    'temperatures-fall',
    { rule: 'rows-distinct', temperatureK: 310, detail: { code: 'temperatures-fall', previousK: 400 } },
    [/from 400 K to 310 K where it should rise/, /wrong digit/],
  ],
  [
    'impossible',
    {
      rule: 'value-possible',
      temperatureK: 300,
      detail: { code: 'impossible', quantity: 'heat-capacity', read: '-24.5', wanted: 'Cp > 0' },
    },
    [/^Cp is -24\.5 at 300 K, which cannot be; expected was Cp > 0\./],
  ],
  [
    'impossible, a quantity of one letter',
    {
      rule: 'value-possible',
      fromPhase: 'l',
      toPhase: null,
      detail: { code: 'impossible', quantity: 'pressure', read: '-1', wanted: 'a pressure above 0' },
    },
    [/^p of l is -1/],
  ],
  [
    'interval',
    { detail: interval, observed: 3.2, expected: 2.198, difference: 1.002, tolerance: 0.01, unit: 'J/(mol.K)' },
    [
      /^From 1800 K to 1900 K S rises by 3\.200 J\/\(mol K\); ∫\(Cp\/T\) dT of the printed heat capacities gives 2\.198 ± 0\.010 J\/\(mol K\)\./,
      /see the suspects/,
      /and large enough to matter: 1\.002 against 0\.010 J\/\(mol K\)\.$/,
    ],
  ],
  [
    'interval of a row that does not close',
    {
      rule: 'functions-close',
      detail: { ...interval, lowK: 1900, named: false },
      observed: 40,
      expected: 41,
      difference: -1,
      tolerance: 0.02,
      unit: 'J/(mol.K)',
    },
    [
      /^S at 1900 K is 40\.000 J\/\(mol K\); the row’s other functions put it at 41\.000 ± 0\.020/,
      /No single cell/,
      /−1\.000/,
    ],
  ],
  [
    'interval in which the entropy falls',
    {
      rule: 'entropy-rises',
      detail: { ...interval, named: false },
      fromPhase: 'cr',
      observed: 70,
      expected: 71.5,
      difference: -1.5,
      tolerance: 0.001,
      unit: 'J/(mol.K)',
    },
    [/^S of cr falls from 71\.5000 J\/\(mol K\) at 1800 K to 70\.0000 J\/\(mol K\) at 1900 K, where it should rise/],
  ],
  [
    'cell',
    {
      detail: { code: 'cell', quantity: 'entropy', proposed: 889.11, uProposed: 0.01, explanation: 'one-digit-wrong' },
      temperatureK: 1900,
      fromPhase: 'cr',
      observed: 888.108,
      unit: 'J/(mol.K)',
      evidence: [{ ...address, printed: '212.263' }],
    },
    [
      /^S of cr at 1900 K is 888\.108 J\/\(mol K\) \(printed 212\.263\); the heat capacity and the neighbouring rows put it at 889\.110 ± 0\.010\. One digit wrong\?/,
    ],
  ],
  [
    'column',
    {
      fromPhase: 'cr',
      temperatureK: 100,
      observed: 8.802,
      expected: 36.8276,
      difference: -28.0256,
      tolerance: 0.007,
      unit: 'J/(mol.K)',
      evidence: [{ ...address, printed: '8.802' }],
      detail: { ...column, explanation: 'calorie-read-as-joule' },
    },
    [
      /^S of cr at 100 K is 8\.802 J\/\(mol K\): this and 21 more cells of the column do not agree with the rest of the table; × 4\.184 puts all of them right, this one at 36\.8276 J\/\(mol K\)\./,
      /Calories where joules are declared\?/,
    ],
  ],
  [
    'column of temperatures',
    {
      fromPhase: 'l',
      temperatureK: 77,
      observed: 77,
      expected: 298.15,
      difference: -221.15,
      unit: 'K',
      evidence: [{ ...address, printed: '77' }],
      detail: {
        ...column,
        quantity: 'temperature',
        factor: 5 / 9,
        shift: 255.372222,
        explanation: 'fahrenheit-not-converted',
      },
    },
    [/^T of l is 77 K: this and 21 more/, /× 0\.555556 \+ 255\.372 K puts all of them right, this one at 298\.15 K\./],
  ],
  [
    'column of increments',
    {
      rule: 'enthalpy-follows-heat-capacity',
      temperatureK: 0,
      observed: 0,
      expected: -6878,
      difference: 6878,
      tolerance: 6,
      unit: 'J/mol',
      evidence: [{ ...address, printed: '0.000' }],
      detail: { ...column, quantity: 'enthalpy-increment', factor: null, shift: -6878, explanation: null },
    },
    [
      /; − 6878 J\/mol puts all of them right, this one at −6878\.0 J\/mol\. Compare the heading and the unit of the column/,
    ],
  ],
  [
    'column that goes with 1/T',
    {
      rule: 'functions-close',
      temperatureK: 100,
      observed: 20,
      expected: 88,
      difference: -68,
      tolerance: 0.01,
      unit: 'J/(mol.K)',
      detail: { ...column, quantity: 'gibbs-function', factor: null, explanation: 'counted-from-zero-kelvin' },
    },
    [/; a change that goes with 1\/T puts all of them right/, /Counted from 0 K instead of 298\.15 K/],
  ],
  [
    'anomaly',
    {
      rule: 'heat-capacity-smooth',
      severity: 'note',
      detail: { code: 'anomaly', quantity: 'heat-capacity', lowK: 500, highK: 600 },
      difference: -2.5,
      unit: 'J/(mol.K)',
    },
    [/^Between 500 K and 600 K Cp stands off its neighbours by 2\.5 J\/\(mol K\)/, /a step or an anomaly/],
  ],
  [
    'transition gap',
    { ...melting, detail: { ...transition, what: 'gap' }, observed: 812.4, difference: 812.4, tolerance: 12 },
    [
      /stated cr → l temperature of 600\.6 K G of cr lies 812 J\/mol above G of l; expected was 0 ± 12 J\/mol, and the two curves cross at 622\.31 K/,
    ],
  ],
  [
    'transition crossing',
    {
      ...melting,
      rule: 'crossing-agrees',
      unit: 'K',
      detail: { ...transition, what: 'crossing' },
      observed: 600.6,
      expected: 622.31,
      difference: -21.71,
      tolerance: 0.4,
    },
    [/The cr → l transition is stated at 600\.6 K; the two curves cross at 622\.31 K, where ± 0\.40 K is allowed/],
  ],
  [
    'transition that nothing crosses',
    { ...melting, rule: 'crossing-agrees', detail: { ...transition, what: 'not-crossed', computedK: null } },
    [/of cr and l cross nowhere in the range of the data/],
  ],
  [
    'transition closure',
    {
      ...melting,
      rule: 'transition-entropy-closes',
      detail: { ...transition, what: 'closure', of: 'stated' },
      observed: 4770,
      expected: 4810,
    },
    [/the stated ΔH is 4770 J\/mol; T times the stated ΔS gives 4810 J\/mol\. Look at ΔH, ΔS and the temperature/],
  ],
  [
    'stated enthalpy of a transition beside the curves',
    {
      ...melting,
      rule: 'transition-entropy-closes',
      detail: { ...transition, what: 'closure', of: 'enthalpy' },
      observed: 4770,
      expected: 4810,
    },
    [/the stated ΔH is 4770 J\/mol; the curves of both phases give 4810 J\/mol\. Look at ΔH, and/],
  ],
  [
    'stated entropy of a transition beside the curves',
    {
      ...melting,
      rule: 'transition-entropy-closes',
      detail: { ...transition, what: 'closure', of: 'entropy' },
      evidence: [{ ...address, printed: '7.942' }],
      observed: 4770,
      expected: 4810,
    },
    [
      /T times the stated ΔS \(printed 7\.942\) is 4770 J\/mol; T times the ΔS of the curves of both phases gives 4810 J\/mol\. Look at ΔS, and/,
    ],
  ],
  [
    'transition that jumps though continuous',
    {
      ...melting,
      rule: 'stated-transition-jumps',
      unit: 'J/(mol.K)',
      detail: { ...transition, what: 'jump' },
      observed: 3.1,
      expected: 0,
      tolerance: 0.02,
    },
    [
      /stated as a transition without latent heat, and the entropy jumps by 3\.100 J\/\(mol K\); expected was 0\.000 ± 0\.020/,
      /state the order "first"/,
    ],
  ],
  [
    'transition without the jump that is stated',
    {
      ...melting,
      rule: 'stated-transition-jumps',
      severity: 'doubt',
      unit: 'J/(mol.K)',
      detail: { ...transition, what: 'no-jump' },
      observed: 0.01,
    },
    [/stated as a first-order transition, and its jump of entropy, 0\.01 J\/\(mol K\), cannot be told from none\./],
  ],
  [
    'transition that falls',
    { ...melting, rule: 'heating-raises-entropy', detail: { ...transition, what: 'falls' }, observed: -4770 },
    [/should raise enthalpy and entropy, and the change is −4770 J\/mol/, /lost sign/],
  ],
  [
    'phase-order',
    {
      rule: 'lowest-curve-is-the-stated-phase',
      detail: { code: 'phase-order', lower: 'l', stated: 'cr', lowK: 400, highK: 500 },
      difference: 250,
      unit: 'J/mol',
    },
    [
      /Between 400 K and 500 K l has the lowest Gibbs energy by 250 J\/mol, where the transitions say that cr is stable/,
    ],
  ],
  [
    'entropy-order',
    {
      rule: 'entropy-rises',
      temperatureK: 600,
      detail: { code: 'entropy-order', above: 'l', below: 'cr' },
      observed: -4,
      unit: 'J/(mol.K)',
    },
    [/^S of l lies 4 J\/\(mol K\) below S of cr at 600 K; l is the phase of higher temperature/],
  ],
  [
    'unstated-jump',
    {
      rule: 'slope-jumps-only-at-transitions',
      temperatureK: 420,
      fromPhase: 'cr',
      detail: { code: 'unstated-jump', quantity: 'entropy' },
      observed: 3.1,
      unit: 'J/(mol.K)',
    },
    [/^S jumps by 3\.1 J\/\(mol K\) at 420 K inside cr, and no transition is stated there\./],
  ],
  [
    'unstated-jump with dH = T dS',
    {
      rule: 'slope-jumps-only-at-transitions',
      temperatureK: 420,
      fromPhase: 'cr',
      detail: { code: 'unstated-jump', quantity: 'entropy', closes: true },
      observed: 3.1,
      unit: 'J/(mol.K)',
    },
    [/no transition is stated there\. ΔH = T ΔS, as at a transition: one may have been left out\. State it, or/],
  ],
  ...(
    [
      ['p l>g', 'the pressure of l>g'],
      ['p over l', 'the vapour pressure over l'],
      ['T cr>l', 'the temperature of cr>l'],
      ['T over cr', 'the temperature over cr'],
    ] as const
  ).map(([place, words]): (typeof SENTENCES)[number] => [
    `adjustment of ${place}`,
    {
      rule: 'adjustment-closes',
      detail: { code: 'adjustment', place, cells: 1, w: -12.345, critical: 3.5, chiSquare: 152, freedom: 5 },
      observed: 75_006_200,
      expected: 100_000,
      difference: 74_906_200,
      tolerance: 300,
      unit: 'Pa',
    },
    [
      new RegExp(`^Taken together with all else that is stated, ${words} is .* Pa; the rest puts it at`),
      /residual 12\.35/,
    ],
  ]),
  [
    'adjustment of many numbers',
    {
      rule: 'adjustment-closes',
      severity: 'fault',
      detail: { code: 'adjustment', place: 'dH l>cr', cells: 2, w: -12.345, critical: 3.5, chiSquare: 152, freedom: 5 },
      observed: 4774,
      expected: 4774,
      difference: 0,
      tolerance: 1.2,
      unit: 'J/mol',
    },
    [
      /^Taken together with all else that is stated, 2 printed cells do not fit as they are, the first of them the enthalpy of l>cr; one law for all of them puts them right \(normalised residual 12\.35, at most 3\.5 is usual\): see the suspects\./,
      /Outside what the uncertainties allow, and large enough to matter\.$/,
    ],
  ],
  [
    'calculation-failed',
    { rule: 'row-readable', detail: { code: 'calculation-failed', message: 'matrix is singular' } },
    [/^The calculation broke down \(matrix is singular\)/, /a fault of the program/],
  ],
];

describe('the words of a finding', () => {
  it.each(SENTENCES)(
    'of kind %s say what was found, what was expected, where and what to do',
    (_kind, partial, wanted) => {
      const sentence = say(partial);
      for (const pattern of wanted) expect(sentence).toMatch(pattern);
      expect(sentence).toContain('mill-lab/points.csv line 412, column S.');
      expect(sentence).not.toMatch(/undefined|null|NaN|\.\.|\s\s|\n/);
    },
  );

  it('cover every code of the union', () => {
    const codes: Record<FindingDetail['code'], true> = {
      reading: true,
      'rows-disagree': true,
      'temperatures-fall': true,
      impossible: true,
      interval: true,
      cell: true,
      column: true,
      anomaly: true,
      transition: true,
      'phase-order': true,
      'entropy-order': true,
      'unstated-jump': true,
      adjustment: true,
      'calculation-failed': true,
    };
    expect(new Set(SENTENCES.map(([, { detail }]) => detail.code))).toEqual(new Set(Object.keys(codes)));
  });

  it('are different for every reading problem and hold what was read, wanted and advised', () => {
    const problems: Record<ReadingProblem, true> = {
      'cell-not-a-number': true,
      'cell-not-finite': true,
      'row-too-short': true,
      'row-too-long': true,
      'column-missing': true,
      'column-unknown': true,
      'unit-unknown': true,
      'unit-unfit': true,
      'name-unmapped': true,
      'phase-unmapped': true,
      'substance-unknown': true,
      'substance-twice': true,
      'file-missing': true,
      'file-unreadable': true,
      'encoding-converted': true,
      'descriptor-unreadable': true,
      'descriptor-invalid': true,
      'correction-out-of-date': true,
      'required-missing': true,
      'kind-not-yet-read': true,
      'key-without-row': true,
      'molar-mass-unknown': true,
      'acceptance-lapsed': true,
    };
    const sentences = Object.keys(problems).map((problem) =>
      say({
        detail: { code: 'reading', problem: problem as ReadingProblem, read: 'x y', wanted: 'z', remedy: 'do it' },
      }),
    );
    for (const sentence of sentences) expect(sentence).toMatch(/“x y”.*; expected was z\. Do it\. mill-lab/);
    expect(sentences).toContain(
      '“x y” is not a number; expected was z. Do it. mill-lab/points.csv line 412, column S.',
    );
    expect(new Set(sentences).size).toBe(sentences.length);
  });

  it('name what is missing, or show what stands in its place', () => {
    const missing = (read: string) =>
      say({ detail: { code: 'reading', problem: 'required-missing', read, wanted: '', remedy: '' } });
    expect(missing('')).toMatch(/^A value is missing\. mill-lab/);
    expect(missing('The temperature of 3 rows')).toMatch(/^The temperature of 3 rows is missing\. mill-lab/);
    expect(missing('n.a.')).toMatch(/^A value is missing where the file says n\.a\. mill-lab/);
  });

  it('say that a doubt is too small to matter and a note undecided', () => {
    const detail = { ...transition, what: 'gap', smallestDetectable: 900 } as const;
    const numbers = { ...melting, detail, observed: 40, difference: 40, tolerance: 12 };
    expect(say({ ...numbers, severity: 'doubt' })).toContain('yet too small to matter: 40 against 12 J/mol.');
    expect(say({ ...numbers, severity: 'note' })).toContain('an error below 900 J/mol would not show.');
  });

  it('name the finding that one follows from, and say what is accepted', () => {
    const finding = makeFinding({ ...melting, severity: 'fault', detail: { ...transition, what: 'gap' }, address });
    const sentence = sayFinding({ ...finding, cause: '0123456789abcdef', accepted: true });
    expect(sentence).toContain('It follows from finding 0123456789abcdef.');
    expect(sentence).toMatch(/Accepted by a curator\.$/);
  });
});

describe('places and suspects', () => {
  it('name source, file, line and column, and leave out what is not known', () => {
    expect(sayAddress(address)).toBe('mill-lab/points.csv line 412, column S');
    expect(sayPlace(address)).toBe('mill-lab/points.csv:412 S');
    expect(sayAddress({ source: 'mill-lab', file: 'source.json', line: 0, column: '' })).toBe('mill-lab/source.json');
    expect(sayAddress({ source: 'mill-lab', file: '', line: 0, column: '' })).toBe('mill-lab');
  });

  it('say what the cell says and what it should probably say, in its own unit', () => {
    const suspect: Suspect = {
      finding: '0123456789abcdef',
      substance: 'lead',
      place: 1,
      group: 1,
      cells: 1,
      address,
      printed: '212.263',
      observed: 888.108,
      unit: 'J/(mol.K)',
      normalisedResidual: 40,
      redundancy: 0.8,
      proposed: 889.11,
      uProposed: 0.01,
      proposedPrinted: '212.503',
      smallestDetectable: 0.1,
      explanation: 'one-digit-wrong',
      explainedPrinted: null,
      toldApartBy: null,
    };
    expect(saySuspect(suspect)).toBe('mill-lab/points.csv:412 S says 212.263, probably 212.503 (one digit wrong?)');
    expect(saySuspect({ ...suspect, explanation: null })).toMatch(/probably 212\.503$/);
    expect(saySuspect({ ...suspect, cells: 22, explanation: 'calorie-read-as-joule' })).toBe(
      'mill-lab/points.csv:412 S and 21 more, the first says 212.263, probably 212.503 (calories where joules are declared?)',
    );
    expect(saySuspect({ ...suspect, proposedPrinted: '212.263' })).toMatch(
      /a change below its last digit would close it$/,
    );
  });
});

describe('the usual slips', () => {
  it('have words for every code, and for no other', () => {
    const codes = [...SLIP_CODES, 'from-and-to-exchanged'];
    expect(Object.keys(EXPLANATIONS).sort()).toEqual(codes.sort());
    expect(new Set(Object.values(EXPLANATIONS)).size).toBe(codes.length);
  });
});

describe('the reason why a substance is withheld', () => {
  const detail = { ...transition, what: 'gap' } as const;
  const note = makeFinding({ ...melting, severity: 'note', detail, transition: 'a' });
  const root = makeFinding({ ...melting, severity: 'fault', detail, transition: 'b', address });
  const after = { ...makeFinding({ ...melting, severity: 'fault', detail, transition: 'c' }), cause: root.id };
  const cell = (finding: string, place: number, group: number, column: string): Suspect => ({
    finding,
    substance: 'lead',
    place,
    group,
    cells: 1,
    address: { ...address, column },
    printed: '1.0',
    observed: 1,
    unit: 'J/(mol.K)',
    normalisedResidual: 9,
    redundancy: 0.5,
    proposed: 2,
    uProposed: 0.1,
    proposedPrinted: '2.0',
    smallestDetectable: 0.3,
    explanation: null,
    explainedPrinted: null,
    toldApartBy: null,
  });

  it('is the first suspect of the finding that the others follow from, with those of its group', () => {
    const suspects = [
      cell(after.id, 1, 1, 'X'),
      cell(root.id, 2, 1, 'T'),
      cell(root.id, 1, 1, 'S'),
      cell(root.id, 101, 2, 'Y'),
    ];
    expect(sayReason([after, root, note], suspects)).toBe(
      'mill-lab/points.csv:412 S says 1.0, probably 2.0; or mill-lab/points.csv:412 T says 1.0, probably 2.0',
    );
  });

  it('is the finding itself where no cell is suspected', () => {
    expect(sayReason([after, root, note], [])).toBe(sayFinding(root));
  });

  it('lists what cannot be told apart with or, and a further error with and', () => {
    const suspects = [cell(root.id, 101, 2, 'Y'), cell(root.id, 1, 1, 'S'), cell(root.id, 2, 1, 'T')];
    expect(saySuspects(suspects).map((line) => line.slice(0, 29))).toEqual([
      'suspect: mill-lab/points.csv:',
      'or: mill-lab/points.csv:412 T',
      'and: mill-lab/points.csv:412 ',
    ]);
  });

  it('says no number of a phase that is exchanged', () => {
    const one = { ...cell(root.id, 1, 1, 'From'), cells: 2, printed: 'LIQUID', proposedPrinted: 'CRYSTAL' };
    const code = 'from-and-to-exchanged';
    const phase = { ...one, explanation: code, explainedPrinted: 'CRYSTAL', proposed: one.observed };
    expect(saySuspects([phase])).toEqual([
      `suspect: mill-lab/points.csv:412 From and 1 more, the first says LIQUID, probably CRYSTAL (${EXPLANATIONS[code]}?)`,
    ]);
  });

  it('says after a group what would tell its members apart', () => {
    const apart = (place: number, group: number, column: string) => ({
      ...cell(root.id, place, group, column),
      toldApartBy: group === 1 ? 'a measured enthalpy of l>g' : null,
    });
    const said = saySuspects([apart(1, 1, 'S'), apart(2, 1, 'T'), apart(101, 2, 'Y')]);
    expect(said[2]).toBe('told apart by: a measured enthalpy of l>g');
    // What the rest of the data put there, with its uncertainty.
    expect(said[0]).toMatch(/; the rest puts it at \S+ ± \S+ J\/\(mol K\)$/);
  });
});

describe('figures', () => {
  it('have the decimals that the uncertainty bears', () => {
    expect(figure(889.1096, 0.012)).toBe('889.110');
    expect(figure(-21.707, 0.4)).toBe('−21.71');
    expect(figure(81234.5, 120)).toBe('81235');
    expect(plusMinus(889.1096, 0.012)).toBe('889.110 ± 0.012');
  });

  it('have six significant digits where none is known', () => {
    expect(figure(0.1094321987)).toBe('0.109432');
    expect(figure(600)).toBe('600');
    expect(figure(-0)).toBe('0');
    expect(figure(1e-7)).toBe('1e−7');
  });

  it('name what is no number', () => {
    expect([Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY].map((value) => figure(value))).toEqual([
      'not a number',
      '∞',
      '−∞',
    ]);
  });

  it('write units as in a sentence', () => {
    expect(['J/(mol.K)', 'Cel', 'kJ/mol', 'cal_th/(mol.K)'].map(unitInWords)).toEqual([
      'J/(mol K)',
      '°C',
      'kJ/mol',
      'cal(th)/(mol K)',
    ]);
  });
});
