import { describe, expect, it } from 'vitest';
import { CP, F, medium, moved, S } from '../check/medium.js';
import { groupOf, reconciled, rootsOf, suspectsOf, withoutGas } from './reconciled.js';

describe('suspects', () => {
  it('are none where nothing disagrees', () => {
    const found = reconciled(medium());
    expect(found.suspects).toEqual([]);
    expect(found.findings).toEqual([]);
  });

  it('are the formation enthalpies of crystal and liquid together, as long as no gas tells them apart', () => {
    for (const spoilt of [0, 1]) {
      const printed = withoutGas(medium());
      printed.anchors[spoilt]!.H = moved(printed.anchors[spoilt]!.H, 3);
      const found = reconciled(printed);
      const [root] = rootsOf(found);
      expect(groupOf(found, root!).slice(0, 2).sort()).toEqual(['anchors.csv:2 DfH', 'anchors.csv:3 DfH']);
      expect(found.suspects.every(({ group }) => group === 1)).toBe(true);
    }
  });

  it('of one group come with the measurement that would tell them apart; a lone one needs none', () => {
    const printed = withoutGas(medium());
    printed.anchors[0]!.H = moved(printed.anchors[0]!.H, 3);
    const apart = reconciled(printed).suspects.map(({ toldApartBy }) => toldApartBy);
    expect(apart.length).toBeGreaterThan(1);
    // Nothing that the two phases share, and no third phase, can tell whose formation enthalpy it is.
    expect(new Set(apart)).toEqual(new Set(['a second, independent value of one of them']));
    const bare = medium();
    bare.anchors[2]!.H = moved(bare.anchors[2]!.H, 1.5);
    Object.assign(bare.transitions[1]!, { dH: '', dS: '' });
    const [first] = reconciled(bare).suspects;
    expect(first!.toldApartBy).toBe('vapour pressures over l');
    const alone = medium();
    alone.transitions[0]!.dH = '2.151';
    expect(reconciled(alone).suspects.map(({ toldApartBy }) => toldApartBy)).toEqual([null]);
  });

  it.each([
    [0, 'anchors.csv:2 DfH'],
    [1, 'anchors.csv:3 DfH'],
    [2, 'anchors.csv:4 DfH'],
  ])('begin with the right formation enthalpy (%d) where the gas is tied in', (spoilt, first) => {
    const printed = medium();
    const clean = Number(printed.anchors[spoilt]!.H);
    printed.anchors[spoilt]!.H = moved(printed.anchors[spoilt]!.H, 3);
    const found = reconciled(printed);
    const [root] = rootsOf(found);
    expect(groupOf(found, root!)[0]).toBe(first);
    const [suspect] = suspectsOf(found.suspects, root!);
    expect(Math.abs(suspect!.proposed - 1000 * clean)).toBeLessThan(4 * suspect!.uProposed);
    expect(suspect!.place).toBe(1);
    expect(suspect!.redundancy).toBeGreaterThan(0);
    expect(suspect!.redundancy).toBeLessThanOrEqual(1);
    expect(Math.abs(suspect!.normalisedResidual)).toBeGreaterThan(3.29);
  });

  it('keep boiling point and formation enthalpy of the gas together where no dH or dS is stated', () => {
    const printed = medium();
    printed.anchors[2]!.H = moved(printed.anchors[2]!.H, 0.3);
    Object.assign(printed.transitions[1]!, { dH: '', dS: '' });
    const found = reconciled(printed);
    expect(groupOf(found, rootsOf(found)[0]!).sort()).toEqual(['anchors.csv:4 DfH', 'transitions.csv:3 T']);
  });

  it.each([
    ['melting', 0, '226.850', 500],
    ['boiling', 1, '626.850', 900],
  ] as const)('solve a %s point in degrees Celsius anew, far from where it is printed', (_, index, text, trueK) => {
    const printed = medium();
    printed.transitions[index]!.T = text;
    const found = reconciled(printed);
    const [root, ...more] = rootsOf(found);
    expect(more).toEqual([]);
    expect(groupOf(found, root!)).toEqual([`transitions.csv:${index + 2} T`]);
    const [suspect] = suspectsOf(found.suspects, root!);
    expect(suspect!.printed).toBe(text);
    expect(Math.abs(suspect!.proposed - trueK)).toBeLessThan(0.1);
    expect(suspect!.proposedPrinted).toMatch(/^\d{3}\.\d{3}$/);
    expect(suspect!.explanation).toBe('celsius-read-as-kelvin');
  });

  it.each([
    ['dH', '2.151', 9000, 'calorie-read-as-joule'],
    ['dS', '1.800', 18, 'decimal-point-moved'],
    ['dH', '-9.000', 9000, 'sign-lost'],
  ] as const)('name %s = %s', (key, text, clean, slip) => {
    const printed = medium();
    printed.transitions[0]![key] = text;
    const found = reconciled(printed);
    const [root] = rootsOf(found);
    expect(groupOf(found, root!)).toEqual([`transitions.csv:2 ${key}`]);
    const [suspect] = suspectsOf(found.suspects, root!);
    expect(Math.abs(suspect!.proposed - clean)).toBeLessThan(4 * suspect!.uProposed);
    expect(suspect!.explanation).toBe(slip);
  });

  it.each([
    [
      'a table cell and an anchor',
      (p: ReturnType<typeof medium>) => {
        p.tables.cr![8]![S] = moved(p.tables.cr![8]![S]!, 5);
        p.anchors[1]!.H = moved(p.anchors[1]!.H, 3);
      },
      ['anchors.csv:3 DfH', 'cr.csv:10 S'],
    ],
    [
      'two cells of two tables',
      (p: ReturnType<typeof medium>) => {
        p.tables.cr![8]![CP] = '52.000';
        p.tables.g![10]![F] = moved(p.tables.g![10]![F]!, 3);
      },
      ['cr.csv:10 Cp', 'g.csv:12 -[G-H(Tr)]/T'],
    ],
    [
      'two stated numbers of two transitions',
      (p: ReturnType<typeof medium>) => {
        p.transitions[0]!.dH = '2.151';
        p.transitions[1]!.T = '626.850';
      },
      ['transitions.csv:2 dH', 'transitions.csv:3 T'],
    ],
    [
      'an anchor and a stated number',
      (p: ReturnType<typeof medium>) => {
        p.anchors[1]!.H = moved(p.anchors[1]!.H, 3);
        p.transitions[1]!.dS = '21.033';
      },
      ['anchors.csv:3 DfH', 'transitions.csv:3 dS'],
    ],
    [
      'two cells of one column',
      (p: ReturnType<typeof medium>) => {
        p.tables.l![6]![S] = moved(p.tables.l![6]![S]!, 5);
        p.tables.l![25]![S] = moved(p.tables.l![25]![S]!, -5);
      },
      ['l.csv:27 S', 'l.csv:8 S'],
    ],
  ] as const)('are both cells of two slips: %s', (_, change, cells) => {
    const printed = medium();
    change(printed);
    const found = reconciled(printed);
    const firsts = found.suspects.filter((one) => {
      const rivals = found.suspects.filter(({ finding, group }) => finding === one.finding && group === one.group);
      return one.place === Math.min(...rivals.map(({ place }) => place));
    });
    expect(firsts.map(({ address }) => `${address.file}:${address.line} ${address.column}`).sort()).toEqual(cells);
  });

  it('belong to findings of the substance, one place once', () => {
    const printed = medium();
    printed.anchors[1]!.H = moved(printed.anchors[1]!.H, 3);
    printed.transitions[1]!.dS = '21.033';
    const { findings, suspects } = reconciled(printed);
    const ids = new Set(findings.map(({ id }) => id));
    for (const { finding, substance } of suspects) {
      expect(ids.has(finding)).toBe(true);
      expect(substance).toBe('medium');
    }
    const places = suspects.map(({ finding, place }) => `${finding} ${place}`);
    expect(new Set(places).size).toBe(places.length);
  });
});
