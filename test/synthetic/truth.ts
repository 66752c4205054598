/** An invented substance whose Cp, H, S and G are known exactly in every phase, and so are its transitions. */

import { drawLaws, type Kind } from './kinds.js';
import { enthalpyBetween, entropyBetween, entropyFromZero, heatCapacity, type Law, R } from './law.js';
import { type Chance, chance, mixedSeed } from './normal.js';

export const REFERENCE_K = 298.15;
export const STANDARD_PRESSURE_PA = 100_000;

export interface TruePhase {
  readonly label: string;
  readonly law: Law;
  /** ΔfH(298.15 K) [J/mol] and S(298.15 K) [J/(mol K)], exactly. */
  readonly formationEnthalpy: number;
  readonly referenceEntropy: number;
  /** Where the phase is stable [K]; the first begins at 0, the last ends at Infinity. */
  readonly stableK: readonly [number, number];
  readonly cp: (t: number) => number;
  /** From the elements at 298.15 K [J/mol]. */
  readonly h: (t: number) => number;
  readonly s: (t: number) => number;
  readonly g: (t: number) => number;
}

export interface TrueTransition {
  readonly from: string;
  readonly to: string;
  /** Where the two G are equal at 1 bar, the gas ideal [K]. */
  readonly temperatureK: number;
  readonly enthalpy: number;
  readonly entropy: number;
}

export interface Truth {
  readonly kind: Kind;
  readonly molarMass: number;
  /** In rising temperature: the crystals, the liquid, the gas. */
  readonly phases: readonly TruePhase[];
  readonly transitions: readonly TrueTransition[];
}

/** Crystal phases asked for: 1, 2 or 3. Draws again until the phases lie in their physical order. */
export function drawTruth(seed: number, kind: Kind, crystals = 1): Truth {
  for (let attempt = 0; attempt < 500; attempt++) {
    const truth = attemptTruth(chance(mixedSeed(seed, attempt)), kind, crystals);
    if (truth !== null) return truth;
  }
  throw new Error(`seed ${seed}: no ${kind} in 500 draws has its phases in order`);
}

function attemptTruth(random: Chance, kind: Kind, crystals: number): Truth | null {
  const drawn = drawLaws(random, kind, crystals);
  const first = drawn.phases[0]!;
  const levels = [
    {
      h: kind === 'metal' ? 0 : roundTo(-random.between(100, 900) * 1000, 10),
      s: roundTo(entropyFromZero(first.law, REFERENCE_K), 0.001),
    },
  ];
  // Levels that make the phases meet where they are wanted, and then rounded: the crossings are where they come to be.
  drawn.steps.forEach(({ temperatureK: t, entropy }, i) => {
    const below = drawn.phases[i]!.law;
    const above = drawn.phases[i + 1]!.law;
    const { h, s } = levels[i]!;
    levels.push({
      h: roundTo(h + enthalpyBetween(below, REFERENCE_K, t) + t * entropy - enthalpyBetween(above, REFERENCE_K, t), 1),
      s: roundTo(s + entropyBetween(below, REFERENCE_K, t) + entropy - entropyBetween(above, REFERENCE_K, t), 0.001),
    });
  });
  const open = drawn.phases.map(({ label, law }, i) => phaseOf(label, law, levels[i]!.h, levels[i]!.s));
  const transitions: TrueTransition[] = [];
  for (let i = 0; i < drawn.steps.length; i++) {
    const near = drawn.steps[i]!.temperatureK;
    const at = crossing(open[i]!, open[i + 1]!, 0.9 * near, 1.1 * near);
    if (at === null) return null;
    const [a, b] = [open[i]!, open[i + 1]!];
    transitions.push({
      from: a.label,
      to: b.label,
      temperatureK: at,
      enthalpy: b.h(at) - a.h(at),
      entropy: b.s(at) - a.s(at),
    });
  }
  const phases = open.map((phase, i) => ({
    ...phase,
    stableK: [transitions[i - 1]?.temperatureK ?? 0, transitions[i]?.temperatureK ?? Number.POSITIVE_INFINITY] as const,
  }));
  const truth = { kind, molarMass: drawn.molarMass, phases, transitions };
  return inOrder(truth) ? truth : null;
}

function phaseOf(label: string, law: Law, formationEnthalpy: number, referenceEntropy: number): TruePhase {
  const h = (t: number): number => formationEnthalpy + enthalpyBetween(law, REFERENCE_K, t);
  const s = (t: number): number => referenceEntropy + entropyBetween(law, REFERENCE_K, t);
  return {
    label,
    law,
    formationEnthalpy,
    referenceEntropy,
    stableK: [0, Number.POSITIVE_INFINITY],
    cp: (t) => heatCapacity(law, t),
    h,
    s,
    g: (t) => h(t) - t * s(t),
  };
}

/** Where G of the two is equal, by bisection to 1e-10 K; null where they do not cross once between the two. */
export function crossing(below: TruePhase, above: TruePhase, lowK: number, highK: number): number | null {
  let low = lowK;
  let high = highK;
  const gap = (t: number): number => above.g(t) - below.g(t);
  if (!(gap(low) > 0) || !(gap(high) < 0)) return null;
  while (high - low > 1e-10) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (gap(middle) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** ln(p/1 bar) over the condensed phase, the vapour ideal. */
export function logVapourPressure(condensed: TruePhase, gas: TruePhase, t: number): number {
  return -(gas.g(t) - condensed.g(t)) / (R * t);
}

/** Each phase is lowest in G where it is stable, S rises from phase to phase, Cp is positive, and no pair crosses twice. */
function inOrder({ phases, transitions }: Truth): boolean {
  const last = transitions.at(-1)!.temperatureK;
  if (transitions.some(({ temperatureK }, i) => temperatureK < 1.03 * (transitions[i - 1]?.temperatureK ?? 0)))
    return false;
  for (let t = 100; t < 1.4 * last; t *= 1.01) {
    let lowest = phases[0]!;
    for (const phase of phases) {
      if (!(phase.cp(t) > 0)) return false;
      if (phase.g(t) < lowest.g(t)) lowest = phase;
    }
    if (t < lowest.stableK[0] - 1e-6 || t > lowest.stableK[1] + 1e-6) return false;
    if (t < REFERENCE_K) continue;
    for (let i = 1; i < phases.length; i++) if (!(phases[i]!.s(t) > phases[i - 1]!.s(t))) return false;
  }
  return phases.every(({ referenceEntropy }, i) => i === 0 || referenceEntropy > phases[i - 1]!.referenceEntropy);
}

function roundTo(x: number, unit: number): number {
  return Number((Math.round(x / unit) * unit).toFixed(6));
}
