/** Levels that a stated transition carries: what closes by construction is not asked, and all else is. */
import { describe, expect, it } from 'vitest';
import { medium, moved, type Printed } from '../check/medium.js';
import { groupOf, reconciled, rootsOf, suspectsOf } from './reconciled.js';

/** No formation enthalpy of the liquid: its H comes through the melting point, its S stands in its table. */
function withoutLiquidEnthalpy(): Printed {
  const printed = medium();
  printed.anchors[1]!.H = '';
  return printed;
}

describe('a transition that carries H alone', () => {
  it('still has G to close, and closes it on clean data', () => {
    const found = reconciled(withoutLiquidEnthalpy());
    expect(found.findings).toEqual([]);
    const gap = found.outcomes.find(({ rule, place }) => rule === 'gibbs-continuous' && place === 'cr>l')!;
    expect(gap.outcome).toBe('agrees');
  });

  it('is found where its temperature is wrong, and solved for with the level that moves with it', () => {
    const printed = withoutLiquidEnthalpy();
    printed.transitions[0]!.T = '540.000';
    const found = reconciled(printed);
    expect(found.verdict).toBe('withheld');
    const [root] = rootsOf(found);
    const suspects = suspectsOf(found.suspects, root!);
    const temperature = suspects.find(({ address }) => address.column === 'T')!;
    expect(Math.abs(temperature.proposed - 500)).toBeLessThan(1);
  });

  it('is found where the entropy of the other phase is wrong', () => {
    const printed = withoutLiquidEnthalpy();
    for (const row of printed.tables.l!) {
      row[2] = moved(row[2]!, 6);
      row[3] = moved(row[3]!, 6);
    }
    printed.anchors[1]!.S = moved(printed.anchors[1]!.S, 6);
    expect(reconciled(printed).verdict).toBe('withheld');
  });
});

describe('a transition that carries both levels', () => {
  it('closes in G whatever is stated, and is said to be untestable there', () => {
    const printed = medium();
    printed.anchors.splice(1, 1);
    printed.without = [2, 3];
    printed.anchors.splice(1);
    const found = reconciled(printed);
    expect(found.findings).toEqual([]);
    const gap = found.outcomes.find(({ rule, place }) => rule === 'gibbs-continuous' && place === 'cr>l')!;
    expect(gap.outcome).toBe('untestable');
    expect(gap.missing).toMatch(/carried through this transition/);
  });
});

describe('two evaluated sources', () => {
  it('differ by more than their digits without being accused, and are within what a measurement allows', () => {
    const printed = medium();
    // Another handbook's melting point: a tenth of a kelvin and one per cent away, by its digits exact.
    printed.transitions.push({
      ...printed.transitions[0]!,
      T: '500.150',
      dH: '9.080',
      dS: '18.155',
      source: 'another',
    });
    const found = reconciled(printed);
    expect(found.findings.filter(({ severity }) => severity !== 'note')).toEqual([]);
    // Ten kelvin are more than that.
    Object.assign(printed.transitions[2]!, { T: '510.000', dS: '17.804' });
    const spoilt = reconciled(printed);
    expect(groupOf(spoilt, rootsOf(spoilt)[0]!)[0]).toBe('transitions.csv:4 T');
  });
});
