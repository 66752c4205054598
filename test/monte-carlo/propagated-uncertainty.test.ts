/** What comes out of 2 000 draws of an experiment scatters as the uncertainties say that are handed out with it. */
import { beforeAll, describe, expect, it } from 'vitest';
import { MEASURED, type MeasuredErrors, measured } from '../synthetic/designs.js';
import type { Kind } from '../synthetic/kinds.js';
import { drawTruth, type TruePhase, type Truth } from '../synthetic/truth.js';
import { assembleDraws, type Spread, Spreads } from './draws.js';

const DRAWS = 2000;
/** One standard deviation of a standard deviation of 2 000 draws is 1.6 %. */
const WITHIN = 0.05;
/** So near to 298.15 K H and S are the anchor's alone, and Cp's own error has not begun to count. */
const NEAR_REFERENCE_K = 50;

const exact = {
  anchors: { enthalpy: 1, entropy: 0.001 },
  transitions: { temperatureK: 0.001, enthalpy: 1e-5, entropy: 1e-5 },
};
const exactCalorimetry = { own: 0.0005, shared: 0.0001, rows: 24 };

interface Dominated {
  readonly what: string;
  readonly kind: Kind;
  readonly seed: number;
  readonly errors: MeasuredErrors;
}

const EXPERIMENTS: readonly Dominated[] = [
  {
    what: 'anchors dominate',
    kind: 'ionic',
    seed: 17,
    errors: { ...MEASURED, calorimetry: exactCalorimetry, anchors: { enthalpy: 300, entropy: 0.4 } },
  },
  {
    what: 'scatter of the heat capacities dominates',
    kind: 'metal',
    seed: 18,
    errors: { ...exact, calorimetry: { own: 0.005, shared: 0, rows: 30 }, pressures: null },
  },
  {
    what: 'calibration of the calorimeter dominates',
    kind: 'ionic',
    seed: 19,
    errors: { ...exact, calorimetry: { own: 0, shared: 0.005, rows: 24 }, pressures: null },
  },
  {
    what: 'the transition that the liquid is carried through dominates',
    kind: 'ionic',
    seed: 20,
    errors: {
      calorimetry: exactCalorimetry,
      anchors: exact.anchors,
      transitions: { temperatureK: 0.2, enthalpy: 0.01, entropy: 0.008 },
      pressures: null,
    },
  },
];

describe.each(EXPERIMENTS)('2 000 draws of a substance where $what', ({ kind, seed, errors }) => {
  const truth = drawTruth(seed, kind);
  const spreads = new Spreads();
  const experiment = { design: measured('draws', errors), truth, draws: DRAWS, seed: 5 };
  beforeAll(() => assembleDraws(experiment, (one) => spreads.add(one)), 60_000);

  it('cross where they truly do, on average, and scatter about that as u of the crossing says', () => {
    expect([...spreads.crossings.keys()].sort()).toEqual(truth.transitions.map(({ from, to }) => `${from} > ${to}`));
    for (const { from, to, temperatureK } of truth.transitions) {
      const name = `${from} > ${to}`;
      expectAgreement(name, spreads.crossings.get(name)!, temperatureK);
    }
  });

  it.each(['G', 'H', 'S'] as const)('have a %s that scatters as its u says, in every phase', (quantity) => {
    const seen = [...spreads.functions].filter(([name]) => name.startsWith(quantity));
    for (const { label } of truth.phases) {
      const own = seen.filter(([name]) => name.includes(` ${label} `) && far(name));
      expect(own.length).toBeGreaterThan(1);
      for (const [name, spread] of own) expectAgreement(name, spread, trueValue(truth, name));
    }
  });
});

/** Every draw gave the number; its mean lies within half of u of the truth, and its deviation is u within 5 %. */
function expectAgreement(name: string, spread: Spread, truly: number): void {
  const ratio = spread.deviation / spread.statedU;
  const bias = (spread.mean - truly) / spread.statedU;
  expect({ name, draws: spread.draws }).toEqual({ name, draws: DRAWS });
  expect(Math.abs(ratio - 1), `${name}: deviation over u is ${ratio}`).toBeLessThan(WITHIN);
  expect(Math.abs(bias), `${name}: the mean is ${bias} u off`).toBeLessThan(0.5);
}

function far(name: string): boolean {
  return Math.abs(temperatureOf(name) - 298.15) > NEAR_REFERENCE_K;
}

function temperatureOf(name: string): number {
  return Number(/at (\S+) K/.exec(name)![1]);
}

function trueValue({ phases }: Truth, name: string): number {
  const [, quantity, label] = /^(\w) of (\S+) at/.exec(name)!;
  const phase = phases.find((one) => one.label === label) as TruePhase;
  const of = { G: phase.g, H: phase.h, S: phase.s }[quantity as 'G' | 'H' | 'S'];
  return of(temperatureOf(name));
}
