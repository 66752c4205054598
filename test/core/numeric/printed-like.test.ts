import { expect, it } from 'vitest';
import { printedLike } from '../../../pipeline/core/numeric/printed-like.js';

it.each([
  ['1.25', 2.34159, '2.34'],
  ['1,25', 2.34159, '2,34'],
  ['7', -2.6, '-3'],
  ['1.5e3', 1249.96, '1250.0'],
])('prints like %s: %d becomes %s', (printed, value, text) => {
  expect(printedLike(printed, value)).toBe(text);
});

it.each([
  ['0', -0, '0'],
  ['0', -0.4, '0'],
  ['0.00', -0.001, '0.00'],
  ['0,0', -0.01, '0,0'],
  ['0.00', -0.006, '-0.01'],
])('gives zero no sign: in the place of %s %d becomes %s', (printed, value, text) => {
  expect(printedLike(printed, value)).toBe(text);
});
