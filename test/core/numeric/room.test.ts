import { expect, it, vi } from 'vitest';

it('gives no numbers where none are asked for, even as the first request ever', async () => {
  vi.resetModules();
  const { numbers, integers } = await import('../../../pipeline/core/numeric/room.js');
  expect(numbers(0)).toEqual(new Float64Array(0));
  expect(integers(0)).toEqual(new Int32Array(0));
  expect(numbers(3)).toEqual(new Float64Array(3));
});
