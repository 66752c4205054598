import { describe, expect, it } from 'vitest';
import { H, medium, moved, S } from '../check/medium.js';
import { reconciled, rootsOf } from './reconciled.js';

describe('causes', () => {
  it.each([
    [
      'the formation enthalpy of the liquid',
      (p: ReturnType<typeof medium>) => (p.anchors[1]!.H = moved(p.anchors[1]!.H, 3)),
      8,
    ],
    [
      'the formation enthalpy of the gas',
      (p: ReturnType<typeof medium>) => (p.anchors[2]!.H = moved(p.anchors[2]!.H, 3)),
      4,
    ],
    ['a melting point in degrees Celsius', (p: ReturnType<typeof medium>) => (p.transitions[0]!.T = '226.850'), 4],
    ['a boiling point in degrees Celsius', (p: ReturnType<typeof medium>) => (p.transitions[1]!.T = '626.850'), 5],
    ['a lost sign', (p: ReturnType<typeof medium>) => (p.transitions[0]!.dH = '-9.000'), 3],
  ])('%s has one root, and every other finding follows from it', (_, change, findings) => {
    const printed = medium();
    change(printed);
    const found = reconciled(printed);
    expect(found.findings).toHaveLength(findings);
    const [root, ...more] = rootsOf(found);
    expect(more).toEqual([]);
    for (const one of found.findings) if (one !== root) expect(one.cause, one.rule).toBe(root!.id);
  });

  it('a cell named inside a table is a root of its own, apart from the transitions', () => {
    const printed = medium();
    printed.tables.cr![8]![S] = moved(printed.tables.cr![8]![S]!, 5);
    printed.anchors[1]!.H = moved(printed.anchors[1]!.H, 3);
    const roots = rootsOf(reconciled(printed));
    expect(roots.map(({ rule }) => rule).sort()).toEqual(['entropy-follows-heat-capacity', 'gibbs-continuous']);
  });

  it('a named cell is the cause of what its table shows beside it', () => {
    const printed = medium();
    printed.tables.cr![8]![S] = '-93.270';
    const found = reconciled(printed);
    const rules = found.findings.map(({ rule }) => rule);
    expect(rules).toContain('value-possible');
    const [root, ...more] = rootsOf(found);
    expect(more).toEqual([]);
    expect(root!.rule).toBe('entropy-follows-heat-capacity');
  });

  it('two slips have two roots, and each finding follows from the one that can bring it about', () => {
    const printed = medium();
    printed.anchors[1]!.H = moved(printed.anchors[1]!.H, 3);
    printed.transitions[1]!.dS = '21.033';
    const found = reconciled(printed);
    const roots = rootsOf(found);
    expect(roots).toHaveLength(2);
    const gap = roots.find(({ rule }) => rule === 'gibbs-continuous')!;
    const closure = roots.find(({ rule }) => rule === 'transition-entropy-closes')!;
    expect([closure.fromPhase, closure.toPhase]).toEqual(['l', 'g']);
    // A stated entropy moves no Gibbs energy.
    const followers = found.findings.filter(({ rule }) => rule === 'crossing-agrees' || rule.startsWith('lowest'));
    expect(followers.length).toBeGreaterThan(0);
    expect(followers.map(({ cause }) => cause)).toEqual(followers.map(() => gap.id));
    // What the adjustment says of a number follows from the rule that shows it most directly.
    const adjusted = found.findings.filter(({ rule }) => rule === 'adjustment-closes');
    expect(adjusted.map(({ detail, cause }) => [detail.code === 'adjustment' && detail.place, cause]).sort()).toEqual([
      ['dS l>g', closure.id],
      ['dfH l', gap.id],
    ]);
  });

  it('what measured data are too uncertain to decide is no finding', () => {
    const printed = medium('measured');
    printed.transitions[0]!.T = '503.000';
    const { findings, suspects, verdict } = reconciled(printed);
    expect([findings, suspects, verdict]).toEqual([[], [], 'cleared']);
  });

  it('leaves no finding with a cause that is none of the substance', () => {
    const printed = medium();
    printed.tables.l![12]![H] = moved(printed.tables.l![12]![H]!, 1);
    printed.transitions[0]!.T = '226.850';
    const { findings } = reconciled(printed);
    const ids = new Set(findings.map(({ id }) => id));
    for (const { cause, id } of findings) if (cause !== null) expect(ids.has(cause) && cause !== id).toBe(true);
  });
});
