/** Clean experiments are accused as seldom as the policy says: of a fault in 0.1 % of cases, of a doubt in 1 %. */
import { describe, expect, it } from 'vitest';
import { MEASURED, type MeasuredErrors, measured } from '../synthetic/designs.js';
import type { Kind } from '../synthetic/kinds.js';
import { drawTruth } from '../synthetic/truth.js';
import { reconcileDraws } from './draws.js';

const DRAWS = 500;

interface Experiment {
  readonly what: string;
  readonly kind: Kind;
  readonly seed: number;
  readonly errors: MeasuredErrors;
}

const exactAnchors = {
  anchors: { enthalpy: 1, entropy: 0.001 },
  transitions: { temperatureK: 0.001, enthalpy: 1e-5, entropy: 1e-5 },
  pressures: null,
};

const EXPERIMENTS: readonly Experiment[] = [
  { what: 'everything is as uncertain as usual', kind: 'ionic', seed: 31, errors: MEASURED },
  {
    what: 'the scatter of Cp is all there is',
    kind: 'molecular',
    seed: 17,
    errors: { ...exactAnchors, calorimetry: { own: 0.005, shared: 0, rows: 30 } },
  },
  {
    what: 'the calibration of Cp is all there is',
    kind: 'ionic',
    seed: 17,
    errors: { ...exactAnchors, calorimetry: { own: 0, shared: 0.005, rows: 24 } },
  },
];

describe.each(EXPERIMENTS)('500 clean draws where $what', ({ kind, seed, errors }) => {
  it('are accused no more often than chance allows', () => {
    const truth = drawTruth(seed, kind);
    let faults = 0;
    let accused = 0;
    reconcileDraws({ design: measured('draws', errors), truth, draws: DRAWS, seed: 6 }, ({ verdict }) => {
      if (verdict === 'withheld') faults++;
      if (verdict !== 'cleared') accused++;
    });
    // 0.5 and 5 are expected; 5 or more, and 15 or more, come in 2 of 10 000 libraries.
    expect(faults).toBeLessThan(5);
    expect(accused).toBeLessThan(15);
  }, 60_000);
});
