import { describe, expect, it } from 'vitest';
import { Stop } from '../../pipeline/shell/exit-status.js';
import { readPressure } from '../../pipeline/shell/pressure.js';

describe('a pressure on the command line', () => {
  it.each([
    ['101325', 101325],
    ['1 atm', 101325],
    ['1atm', 101325],
    ['50 kPa', 50000],
    ['1e5', 100000],
    ['0.5 bar', 50000],
  ])('"%s" is %f Pa', (text, pascal) => {
    expect(readPressure(text)).toBeCloseTo(pascal, 6);
  });

  it.each(['high', '', '0', '-1 atm', '1 furlong', '1 J/mol', 'NaN'])('"%s" is refused as wrong use', (text) => {
    expect(() => readPressure(text)).toThrow(Stop);
    try {
      readPressure(text);
    } catch (error) {
      expect((error as Stop).status).toBe(2);
      expect((error as Stop).next).toMatch(/Write/);
    }
  });
});
