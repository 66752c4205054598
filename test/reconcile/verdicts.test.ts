import { describe, expect, it } from 'vitest';
import { reconcile } from '../../pipeline/reconcile/reconcile.js';
import { checked, medium, moved, S, settings } from '../check/medium.js';
import { reconciled } from './reconciled.js';

describe('the verdict', () => {
  it('is cleared where nothing disagrees', () => {
    expect(reconciled(medium()).verdict).toBe('cleared');
    expect(reconciled(medium('measured')).verdict).toBe('cleared');
  });

  it('is flagged by a doubt', () => {
    const printed = medium();
    printed.tables.cr![8]![S] = moved(printed.tables.cr![8]![S]!, 0.03);
    const { verdict, findings } = reconciled(printed);
    expect(findings.map(({ severity }) => severity)).toEqual(['doubt']);
    expect(verdict).toBe('flagged');
  });

  it('is withheld by a fault, in a table as in a transition', () => {
    const table = medium();
    table.tables.cr![8]![S] = moved(table.tables.cr![8]![S]!, 2);
    expect(reconciled(table).verdict).toBe('withheld');
    const transition = medium();
    transition.transitions[0]!.dH = '2.151';
    expect(reconciled(transition).verdict).toBe('withheld');
  });

  it('puts the worst finding first', () => {
    const printed = medium();
    printed.tables.cr![8]![S] = moved(printed.tables.cr![8]![S]!, 0.03);
    printed.transitions[0]!.dH = '2.151';
    expect(reconciled(printed).findings.map(({ severity }) => severity)).toEqual(['fault', 'fault', 'doubt']);
  });

  it('of one substance says nothing about another', () => {
    const spoilt = medium();
    spoilt.transitions[0]!.dH = '2.151';
    const both = reconcile([checked(spoilt), checked(medium())], { ...settings, accepted: [], date: '2026-01-01' });
    expect(both.artefact.map(({ verdict }) => verdict)).toEqual(['withheld', 'cleared']);
  });

  it('is the same twice, and changes nothing that it was given', () => {
    const spoilt = medium();
    spoilt.anchors[1]!.H = moved(spoilt.anchors[1]!.H, 3);
    const given = checked(spoilt);
    const before = JSON.stringify(given.findings);
    const run = () => reconcile([given], { ...settings, accepted: [], date: '2026-01-01' }).artefact[0]!;
    expect(run()).toEqual(run());
    expect(JSON.stringify(given.findings)).toBe(before);
  });
});
