import { describe, expect, it } from 'vitest';
import { sketch } from '../../pipeline/shell/sketch.js';

/** Straight lines of G: slope −S, equal at the crossing temperature. */
function line(phase: string, lowK: number, highK: number, gibbs: (temperatureK: number) => number) {
  const temperatureK = Array.from({ length: 21 }, (_, i) => lowK + ((highK - lowK) * i) / 20);
  return { phase, temperatureK, gibbsEnergyJPerMol: temperatureK.map(gibbs) };
}

const solid = line('cr', 200, 600, (T) => -40 * T);
const liquid = line('l', 300, 900, (T) => -40 * 400 - 60 * (T - 400));
const gas = line('g', 200, 900, (T) => -40 * 400 - 60 * 300 - 150 * (T - 700));

describe('the sketch of G against T', () => {
  const lines = sketch([solid, liquid, gas]);
  const floor = lines.findLast((text) => text.includes('┤'))!.split('┤')[1]!;

  it('fits 80 columns', () => {
    for (const text of lines) expect(text.length).toBeLessThanOrEqual(80);
    expect(Math.max(...lines.map((text) => text.length))).toBeGreaterThan(70);
  });

  it('shows the stable phase on the bottom line, changing at the crossings', () => {
    const temperatureAt = (column: number) => 200 + (700 * column) / (floor.length - 1);
    expect(floor).toMatch(/^a+l+g+$/);
    expect(Math.abs(temperatureAt(floor.indexOf('l')) - 400)).toBeLessThan(20);
    expect(Math.abs(temperatureAt(floor.indexOf('g')) - 700)).toBeLessThan(20);
  });

  it('names each letter and the ends of the range', () => {
    expect(lines.at(-1)).toContain('a cr   l l   g g');
    expect(lines.at(-2)).toMatch(/^\s+200 .* K$/);
  });

  it('draws one phase alone and nothing without data', () => {
    expect(sketch([solid]).length).toBeGreaterThan(10);
    expect(sketch([])).toEqual([]);
    expect(sketch([{ phase: 'cr', temperatureK: [300], gibbsEnergyJPerMol: [0] }])).toEqual([]);
  });
});
