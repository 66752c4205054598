import { expect, it } from 'vitest';
import { noticeablePressurePa } from '../../pipeline/reconcile/noticeable-pressure.js';
import { settings } from '../check/medium.js';

it('is the pressure by which water, of 40.7 kJ/mol at 373 K, boils half a kelvin off', () => {
  const { policy } = settings;
  expect(policy.material.transitionTemperatureK).toBe(0.5);
  // Clausius and Clapeyron with the measured enthalpy; Trouton's rule is 20 % below hydrogen-bonded water.
  const measured = (101325 * 40700 * 0.5) / (8.314 * 373.15 ** 2);
  const found = noticeablePressurePa(101325, 373.15, policy);
  expect(found / measured).toBeGreaterThan(0.75);
  expect(found / measured).toBeLessThan(0.85);
  expect(noticeablePressurePa(-200, 500, policy)).toBeCloseTo(2 * noticeablePressurePa(100, 500, policy), 12);
});
