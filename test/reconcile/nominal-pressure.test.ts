/** The pressure of a boiling point as a number under suspicion, in the invented medium. */
import { describe, expect, it } from 'vitest';
import { adjusted } from '../../pipeline/reconcile/adjustment-closes.js';
import { systemOf } from '../../pipeline/reconcile/system/system.js';
import { checked, medium, type Printed, settings } from '../check/medium.js';
import { groupOf, reconciled, rootsOf, suspectsOf } from './reconciled.js';

const BOILING = 1;
const R = 8.31446261815324;

function boilingAt(p: string, basis: 'evaluated' | 'measured' = 'evaluated', changes: object = {}): Printed {
  const printed = medium(basis);
  Object.assign(printed.transitions[BOILING]!, { p, ...changes });
  return printed;
}

const named = (printed: Printed) => {
  const found = reconciled(printed);
  const roots = rootsOf(found);
  const suspects = suspectsOf(found.suspects, roots[0]!);
  return { roots: roots.length, suspects, group: groupOf(found, roots[0]!), first: suspects[0]! };
};
const adjustmentOf = (printed: Printed) => reconciled(printed).outcomes.filter((o) => o.rule === 'adjustment-closes');

describe('the pressure of a boiling point', () => {
  it('is tested as RT d(ln p) in G and -R d(ln p) in the entropy of the gas', () => {
    const { data, conditions, joined } = systemOf(checked(medium()), null);
    const pressure = data.find(({ kind }) => kind === 'transition-pressure')!;
    expect([pressure.place, pressure.datum.value, pressure.u]).toEqual(['p l>g', 1e5, 0]);
    const by = (kind: string) =>
      pressure.direction[conditions.findIndex((c) => c.kind === kind && c.transition === BOILING)]!;
    expect(by('gap')).toBeCloseTo(R * joined[BOILING]!.atK, 9);
    expect(by('entropy')).toBeCloseTo(-R, 12);
    expect(by('enthalpy')).toBe(0);
  });

  it('has the direction the other way where the gas condenses', () => {
    const printed = medium();
    const boiling = printed.transitions[BOILING]!;
    Object.assign(boiling, { from: 'g', to: 'l', dH: `-${boiling.dH}`, dS: `-${boiling.dS}` });
    const { data, conditions } = systemOf(checked(printed), null);
    const { direction, place } = data.find(({ kind }) => kind === 'transition-pressure')!;
    expect(place).toBe('p g>l');
    expect(direction[conditions.findIndex((c) => c.kind === 'gap' && c.transition === BOILING)]).toBeLessThan(0);
  });

  it('is covered with its smallest detectable error; that of a melting point is not listed', () => {
    const [row, ...more] = adjustmentOf(medium('measured')).filter(({ place }) => place.startsWith('p '));
    expect(more).toEqual([]);
    expect(row).toMatchObject({ place: 'p l>g', outcome: 'agrees', missing: null });
    // An error of ln p moves G by RT d(ln p), which the other numbers know to some per cent of RT.
    expect(row!.smallestDetectable! / 1e5).toBeGreaterThan(0.01);
    expect(row!.smallestDetectable! / 1e5).toBeLessThan(1);
  });

  it.each([
    ['750.062', 'torr-read-as-pascal'],
    ['100', 'pascal-read-as-bar-or-atmosphere'],
    ['1000', 'kilo-added'],
    ['0.001', 'kilo-dropped'],
    ['10', 'decimal-point-moved'],
    ['8', 'one-digit-wrong'],
  ])('printed as %s bar is the one suspect, by %s', (p, code) => {
    const { roots, suspects, group, first } = named(boilingAt(p));
    expect(roots).toBe(1);
    expect(group).toEqual(['transitions.csv:3 p']);
    expect(suspects).toHaveLength(1);
    expect(first.explanation).toBe(code);
    expect(Number(first.explainedPrinted)).toBeCloseTo(1, 6);
    expect(first.proposed / 1e5).toBeCloseTo(1, 3);
    expect(first.cells).toBe(1);
  });

  it.each(['ideal', 'real'] as const)('comes first of what the gap alone cannot tell apart (gas: %s)', (gas) => {
    for (const p of ['750.062', '760', '100', '0.001']) {
      const { first, group } = named(boilingAt(p, 'measured', { gas, dH: '', dS: '' }));
      expect(`${first.address.line} ${first.address.column}`, p).toBe('3 p');
      expect(Number(first.explainedPrinted), p).toBeCloseTo(1, 1);
      expect(group.length).toBeGreaterThan(1);
    }
  });

  it('is no suspect where something else is wrong by no usual step of a pressure', () => {
    for (const basis of ['evaluated', 'measured'] as const) {
      const spoilt: ((printed: Printed) => void)[] = [
        (x) => Object.assign(x.transitions[BOILING]!, { T: '1000.000', dH: '', dS: '' }),
        (x) => Object.assign(x.anchors[2]!, { H: '-307.193' }),
        (x) => Object.assign(x.transitions[BOILING]!, { dS: '108.000' }),
      ];
      for (const spoil of spoilt) {
        const printed = medium(basis);
        spoil(printed);
        const { suspects } = named(printed);
        expect(suspects.length).toBeGreaterThan(0);
        expect(suspects.map(({ address }) => address.column)).not.toContain('p');
      }
    }
  });

  it('of 1 atm for 1 bar accuses nobody of a unit: the entropies of the gas may be at 1 atm just as well', () => {
    const found = reconciled(boilingAt('1.01325'));
    expect(found.suspects.map(({ address }) => address.column)).not.toContain('p');
  });

  it('opens nothing by itself', () => {
    for (const basis of ['evaluated', 'measured'] as const) expect(reconciled(medium(basis)).verdict).toBe('cleared');
    const system = systemOf(checked(medium()), null);
    const pressure = system.data.findIndex(({ kind }) => kind === 'transition-pressure');
    // Misclosures along the pressure's own direction: a little beyond what is usual for it, and so for nothing else.
    const { direction } = system.data[pressure]!;
    const of = (scale: number) => adjusted({ ...system, y: direction.map((v) => v * scale) }, 22, settings.policy);
    const { tests, critical } = of(1);
    const little = of((1.02 * critical.doubt) / Math.abs(tests[pressure]!.w));
    const beyond = little.tests.flatMap((t, i) => (t !== null && Math.abs(t.w) > critical.doubt ? [i] : []));
    expect(beyond).toEqual([pressure]);
    expect(little.open).toBe(false);
    expect(of((100 * critical.doubt) / Math.abs(tests[pressure]!.w)).open).toBe(true);
  });
});
