import { describe, expect, it } from 'vitest';
import { harmonise } from '../../pipeline/harmonise/harmonise.js';
import { movable } from '../../pipeline/shell/trace-numbers.js';
import type { RawCase } from '../../schemas/raw.js';
import { columnOf, POLICY, rowOf, SUBSTANCE, tableOf } from '../harmonise/raw.js';

const settings = { policy: POLICY };

describe('the numbers that a trace moves', () => {
  it('are a vapour pressure’s two cells too, in a copy that leaves the raw rows alone', () => {
    const columns = [columnOf('t', 'temperature', 'Cel'), columnOf('p', 'pressure', 'kPa')];
    const table = tableOf(columns, { holds: 'vapour-pressures', file: 'vapours.csv' });
    const raw: RawCase = {
      substance: SUBSTANCE,
      series: [],
      anchors: [],
      transitions: [],
      vapourPressures: [rowOf(table, { phase: 'l' }, { temperature: '25.00', pressure: '3.170' }, 7)],
      findings: [],
    };
    const [before] = harmonise([raw], settings).artefact;
    const { raw: copy, numbers } = movable(raw, before!, []);
    expect(numbers.map(({ address, quantity, place, printed }) => [address, quantity, place, printed])).toEqual([
      [{ source: 'desk', file: 'vapours.csv', line: 7, column: 't' }, 'temperature', 'l', '25.00'],
      [{ source: 'desk', file: 'vapours.csv', line: 7, column: 'p' }, 'pressure', 'l', '3.170'],
    ]);
    const now = () => harmonise([copy], settings).artefact[0]!;
    const moves = [
      [298.15, 298.65],
      [3170, 3670],
    ] as const;
    for (const [i, [was, is]] of moves.entries()) {
      const { move, read, u } = numbers[i]!;
      expect(u).toBeGreaterThan(0);
      expect(read(before!)).toBeCloseTo(was, 9);
      move(0.5);
      expect(read(now())).toBeCloseTo(is, 9);
      expect(read(harmonise([raw], settings).artefact[0]!)).toBeCloseTo(was, 9);
      move(0);
      expect(read(now())).toBeCloseTo(was, 9);
    }
  });

  it('are the pressure of a transition, where it is a cell', () => {
    const columns = [columnOf('T', 'transition-temperature', 'K'), columnOf('p', 'pressure', 'bar')];
    const table = tableOf(columns, { holds: 'transitions', file: 'transitions.csv' });
    const words = { 'from-phase': 'l', 'to-phase': 'g', gas: 'ideal' };
    const raw: RawCase = {
      substance: SUBSTANCE,
      series: [],
      anchors: [],
      transitions: [rowOf(table, words, { 'transition-temperature': '900.000', pressure: '1' }, 4)],
      vapourPressures: [],
      findings: [],
    };
    const [before] = harmonise([raw], settings).artefact;
    const { raw: copy, numbers } = movable(raw, before!, []);
    const pressure = numbers.find(({ quantity }) => quantity === 'pressure')!;
    expect(pressure).toMatchObject({ place: 'l>g', printed: '1', u: 0, address: { line: 4, column: 'p' } });
    pressure.move(0.5);
    const [now] = harmonise([copy], settings).artefact;
    expect(pressure.read(now!)).toBeCloseTo(150_000, 6);
    expect(now!.transitions[0]!.pressurePa).toBeCloseTo(150_000, 6);
    expect(pressure.read(before!)).toBe(100_000);
  });
});
