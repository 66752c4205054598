/** What metals, salts and molecular substances are like: the sizes of their heat capacities, and where and how they change phase. */
import type { Law, Mode } from './law.js';
import { heatCapacity, R } from './law.js';
import type { Chance } from './normal.js';

export const KINDS = ['metal', 'ionic', 'molecular'] as const;
/** As in the class column of the list of substances. */
export type Kind = (typeof KINDS)[number];

export interface DrawnPhase {
  readonly label: string;
  readonly law: Law;
}

export interface Drawn {
  readonly molarMass: number;
  readonly phases: readonly DrawnPhase[];
  /** Between one phase and the next. */
  readonly steps: readonly { readonly temperatureK: number; readonly entropy: number }[];
}

interface Frame {
  readonly crystal: Law;
  readonly gas: Law;
  /** Cp of the liquid over that of the crystal at the melting point, and its slope. */
  readonly liquid: (crystalAtMelting: number, meltingK: number) => Law;
  readonly meltingK: number;
  readonly boilingK: number;
  readonly fusionEntropy: number;
  readonly vaporizationEntropy: number;
}

export function drawLaws(random: Chance, kind: Kind, crystals: number): Drawn {
  const frame = FRAMES[kind](random);
  const labels = crystals === 1 ? ['cr'] : ['cr-III', 'cr-II', 'cr-I'].slice(3 - crystals);
  // The crystals share their lattice; each is a little softer than the one before it.
  const laws = labels.map((_, i) => softer(frame.crystal, i, random));
  const { meltingK, boilingK } = frame;
  const lowest = Math.min(Math.max(340, 0.45 * meltingK), 0.87 * meltingK);
  const inner = labels
    .slice(1)
    .map((_, i) => lowest + ((0.93 * meltingK - lowest) * (i + random.between(0.3, 0.7))) / Math.max(1, crystals - 1));
  const phases = labels.map((label, i) => ({ label, law: laws[i]! }));
  const liquid = frame.liquid(heatCapacity(laws.at(-1)!, meltingK), meltingK);
  return {
    molarMass: Number(random.between(kind === 'metal' ? 20 : 40, 220).toFixed(3)),
    phases: [...phases, { label: 'l', law: liquid }, { label: 'g', law: frame.gas }],
    steps: [
      ...inner.map((temperatureK) => ({
        temperatureK,
        entropy: frame.fusionEntropy * random.between(0.12, 0.4),
      })),
      { temperatureK: meltingK, entropy: frame.fusionEntropy },
      { temperatureK: boilingK, entropy: frame.vaporizationEntropy },
    ],
  };
}

const FRAMES: Readonly<Record<Kind, (random: Chance) => Frame>> = {
  metal: (random) => {
    const meltingK = random.logBetween(420, 1900);
    return {
      crystal: {
        constant: 0,
        linear: random.between(0.002, 0.008),
        modes: [{ count: 3, thetaK: random.between(90, 380) }],
      },
      gas: {
        constant: 2.5 * R,
        linear: 0,
        modes: [{ count: random.between(0.1, 0.6), thetaK: random.between(4000, 9000) }],
      },
      liquid: (cp) => ({ constant: cp * random.between(0.98, 1.1), linear: 0, modes: [] }),
      meltingK,
      boilingK: meltingK * random.between(1.5, 2.3),
      fusionEntropy: random.between(7, 12),
      vaporizationEntropy: random.between(90, 110),
    };
  },
  ionic: (random) => {
    const atoms = random.whole(2, 4);
    const meltingK = random.logBetween(600, 1400);
    return {
      crystal: {
        constant: 0,
        linear: random.between(0.004, 0.012) * (atoms / 2),
        modes: [
          { count: 1.5 * atoms, thetaK: random.between(140, 280) },
          { count: 1.5 * atoms, thetaK: random.between(280, 560) },
        ],
      },
      gas: {
        constant: (atoms === 2 ? 3.5 : 4) * R,
        linear: random.between(0, 0.001),
        modes: vibrations(random, atoms === 2 ? 1 : 3 * atoms - 6, 150, 700),
      },
      liquid: (cp) => ({ constant: cp * random.between(1.02, 1.15), linear: random.between(-0.002, 0.004), modes: [] }),
      meltingK,
      boilingK: meltingK * random.between(1.35, 1.7),
      fusionEntropy: random.between(10, 14) * atoms,
      vaporizationEntropy: random.between(92, 118),
    };
  },
  molecular: (random) => {
    const inside = vibrations(random, random.whole(9, 21), 450, 1900);
    const meltingK = random.between(360, 470);
    return {
      crystal: {
        constant: 0,
        linear: random.between(0.03, 0.1),
        modes: [{ count: 6, thetaK: random.between(60, 140) }, ...inside],
      },
      gas: { constant: 4 * R, linear: random.between(0, 0.01), modes: inside },
      liquid: (cp, t) => {
        const law = { constant: 0, linear: random.between(0.05, 0.12), modes: inside };
        return { ...law, constant: cp * random.between(1.06, 1.22) - heatCapacity(law, t) };
      },
      meltingK,
      boilingK: meltingK * random.between(1.3, 1.6),
      fusionEntropy: random.between(40, 75),
      vaporizationEntropy: random.between(86, 104),
    };
  },
};

function vibrations(random: Chance, total: number, lowK: number, highK: number): Mode[] {
  const groups = Math.min(total, 3);
  const counts = Array.from({ length: groups }, (_, i) => Math.floor((total + i) / groups));
  return counts.map((count) => ({ count, thetaK: random.logBetween(lowK, highK) }));
}

function softer(law: Law, steps: number, random: Chance): Law {
  if (steps === 0) return law;
  return {
    ...law,
    linear: law.linear * (1 + 0.1 * steps * random.unit()),
    modes: law.modes.map(({ count, thetaK }) => ({
      count: count * (1 + 0.01 * steps),
      thetaK: thetaK * 0.93 ** steps,
    })),
  };
}
