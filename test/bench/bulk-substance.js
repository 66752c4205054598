/**
 * One invented substance with crystal, liquid and gas: smooth heat-capacity curves with exact integrals, tied together
 * so that G of two phases is equal at each transition. Crystal and gas are sums of Einstein oscillators (the crystal's
 * entropy is absolute, from 0 K), the liquid is a + bT + cT^-2.
 */
import { seededRandom } from './random.js';

const R = 8.31446261815324;
export const REFERENCE_K = 298.15;
export const PHASES = /** @type {const} */ (['cr', 'l', 'g']);
/** Rows of cr, l and g: together 100. */
const ROWS = [34, 33, 33];

/**
 * @typedef {object} Curve
 * @property {(t: number) => number} heatCapacity [J/(mol K)]
 * @property {(t: number) => number} enthalpy indefinite integral of Cp [J/mol]
 * @property {(t: number) => number} entropy indefinite integral of Cp/T [J/(mol K)]
 *
 * @typedef {object} BulkPhase
 * @property {'cr' | 'l' | 'g'} phase
 * @property {Float64Array} temperatureK
 * @property {Float64Array} heatCapacity [J/(mol K)]
 * @property {Float64Array} entropy absolute [J/(mol K)]
 * @property {Float64Array} increment H(T) - H(298.15 K) [J/mol]
 * @property {number} formationEnthalpy at 298.15 K [J/mol]
 * @property {number} referenceEntropy at 298.15 K [J/(mol K)]
 *
 * @typedef {object} BulkTransition
 * @property {'cr' | 'l'} from
 * @property {'l' | 'g'} to
 * @property {number} temperatureK
 * @property {number} enthalpy [J/mol]
 * @property {number} entropy [J/(mol K)]
 *
 * @typedef {object} BulkSubstance
 * @property {string} id
 * @property {'metal' | 'molecular' | 'ionic'} class
 * @property {number} molarMass [g/mol]
 * @property {boolean} heatCapacityOnly
 * @property {readonly BulkPhase[]} phases
 * @property {readonly BulkTransition[]} transitions
 */

/**
 * Draws again until the phases lie in their physical order at every row; about one draw in three is refused.
 * @param {number} seed
 * @param {number} index 0 …
 * @returns {BulkSubstance}
 */
export function bulkSubstance(seed, index) {
  for (let attempt = 0; attempt < 200; attempt++) {
    const drawn = draw(seed, index, attempt);
    if (inPhysicalOrder(drawn)) return drawn;
  }
  throw new Error(`substance ${index} of seed ${seed}: no draw in 200 has its phases in order`);
}

/**
 * A sum of Einstein oscillators over a constant and a linear term (Einstein, Ann. Phys. 22 (1907) 180).
 * @param {number} constant [J/(mol K)]
 * @param {number} linear [J/(mol K2)]
 * @param {readonly { theta: number, count: number }[]} modes
 * @returns {Curve}
 */
function oscillators(constant, linear, modes) {
  return {
    heatCapacity(t) {
      let sum = constant + linear * t;
      for (const { theta, count } of modes) {
        const x = theta / t;
        const d = Math.expm1(x);
        sum += (count * R * x * x * (d + 1)) / (d * d);
      }
      return sum;
    },
    enthalpy(t) {
      let sum = constant * t + (linear * t * t) / 2;
      for (const { theta, count } of modes) sum += (count * R * theta) / Math.expm1(theta / t);
      return sum;
    },
    entropy(t) {
      let sum = (constant === 0 ? 0 : constant * Math.log(t)) + linear * t;
      for (const { theta, count } of modes) {
        const x = theta / t;
        sum += count * R * (x / Math.expm1(x) - Math.log1p(-Math.exp(-x)));
      }
      return sum;
    },
  };
}

/**
 * Cp = a + bT + cT^-2 (Maier and Kelley, J. Am. Chem. Soc. 54 (1932) 3243).
 * @returns {Curve}
 */
function maierKelley(a, b, c) {
  return {
    heatCapacity: (t) => a + b * t + c / (t * t),
    enthalpy: (t) => a * t + (b * t * t) / 2 - c / t,
    entropy: (t) => a * Math.log(t) + b * t - c / (2 * t * t),
  };
}

function draw(seed, index, attempt) {
  const random = seededRandom(seed, index * 256 + attempt);
  const atoms = random.pick([1, 1, 2, 2, 3, 3, 4, 5, 6]);
  const stepK = random.pick([25, 50]);
  const temperatures = ROWS.map((rows) => temperatureRows(stepK, rows));
  const highK = temperatures[1][ROWS[1] - 1];
  const meltingK = round(random.between(330, 0.58 * highK), 2);
  const boilingK = round(random.between(meltingK + 0.1 * highK, highK - 1.2 * stepK), 2);

  const crystal = oscillators(0, atoms * random.between(0.001, 0.004), [
    { theta: random.between(90, 260), count: 3 },
    ...(atoms > 1 ? [{ theta: random.between(240, stepK === 25 ? 700 : 480), count: 3 * atoms - 3 }] : []),
  ]);
  const rise = atoms * random.between(0.5, 3.5);
  const slope = atoms * random.between(-0.001, 0.003);
  const curvature = -atoms * random.between(0, stepK === 25 ? 40000 : 15000);
  const atMelting = crystal.heatCapacity(meltingK) + rise;
  const liquid = maierKelley(
    atMelting - slope * meltingK - curvature / (meltingK * meltingK),
    slope,
    curvature,
  );
  const gas = gasCurve(random, atoms);

  const fusionEntropy = random.between(7.5, 12) + (atoms - 1) * random.between(4, 8);
  const vaporizationEntropy = random.between(82, 118);
  const formation = atoms === 1 ? 0 : -1000 * random.between(40, 180) * atoms;
  const crystalLevel = {
    enthalpy: formation - crystal.enthalpy(REFERENCE_K),
    entropy: 0,
  };
  const liquidLevel = levelAbove(crystal, crystalLevel, liquid, meltingK, fusionEntropy);
  const gasLevel = levelAbove(liquid, liquidLevel, gas, boilingK, vaporizationEntropy);
  const levelled = [
    { curve: crystal, level: crystalLevel },
    { curve: liquid, level: liquidLevel },
    { curve: gas, level: gasLevel },
  ];
  return {
    id: `medium-${String(index + 1).padStart(6, '0')}`,
    class: atoms === 1 ? 'metal' : random.pick(['molecular', 'ionic']),
    molarMass: round(atoms * random.between(14, 60), 3),
    heatCapacityOnly: index % 2 === 0,
    phases: levelled.map(({ curve, level }, i) => tabulate(PHASES[i], curve, level, temperatures[i])),
    transitions: [
      transition('cr', 'l', meltingK, fusionEntropy),
      transition('l', 'g', boilingK, vaporizationEntropy),
    ],
  };
}

/** Translation and rotation are classical; a monatomic gas has 5/2 R, a few of them a low electronic level. */
function gasCurve(random, atoms) {
  if (atoms === 1) return oscillators(2.5 * R, random.unit() < 0.5 ? 0 : random.between(0, 0.001), []);
  const vibrations = atoms === 2 ? 1 : 3 * atoms - 6;
  const low = Math.ceil(vibrations / 2);
  return oscillators(atoms === 2 ? 3.5 * R : 4 * R, 0, [
    { theta: random.between(250, 700), count: low },
    ...(vibrations > low ? [{ theta: random.between(600, 1600), count: vibrations - low }] : []),
  ]);
}

/** The level that makes the step at the transition exactly (T dS, dS). */
function levelAbove(below, level, curve, atK, stepEntropy) {
  return {
    enthalpy: below.enthalpy(atK) + level.enthalpy + atK * stepEntropy - curve.enthalpy(atK),
    entropy: below.entropy(atK) + level.entropy + stepEntropy - curve.entropy(atK),
  };
}

function transition(from, to, temperatureK, entropy) {
  return { from, to, temperatureK, entropy, enthalpy: temperatureK * entropy };
}

/** From 200 K in steps of 25 K; coarse tables go on in steps of 50 K above room temperature. 298.15 K stands for 300 K. */
function temperatureRows(stepK, rows) {
  return Float64Array.from({ length: rows }, (_, i) => {
    if (i === 4) return REFERENCE_K;
    return i < 4 ? 200 + 25 * i : 300 + stepK * (i - 4);
  });
}

function tabulate(phase, curve, level, temperatureK) {
  const referenceH = curve.enthalpy(REFERENCE_K);
  return {
    phase,
    temperatureK,
    heatCapacity: temperatureK.map(curve.heatCapacity),
    entropy: temperatureK.map((t) => curve.entropy(t) + level.entropy),
    increment: temperatureK.map((t) => curve.enthalpy(t) - referenceH),
    formationEnthalpy: referenceH + level.enthalpy,
    referenceEntropy: curve.entropy(REFERENCE_K) + level.entropy,
  };
}

/** Lowest G as the transitions say, and S(cr) < S(l) < S(g), at every row that the phases share. */
function inPhysicalOrder({ phases, transitions }) {
  const [crystal, liquid, gas] = phases;
  for (let i = 0; i < liquid.temperatureK.length; i++) {
    const t = liquid.temperatureK[i];
    if (crystal.heatCapacity[i] <= 0 || liquid.heatCapacity[i] <= 0) return false;
    if (!(crystal.entropy[i] < liquid.entropy[i] - 1 && liquid.entropy[i] < gas.entropy[i] - 20)) return false;
    const [gCrystal, gLiquid, gGas] = phases.map(
      (p) => p.formationEnthalpy + p.increment[i] - t * p.entropy[i],
    );
    const lowest = Math.min(gCrystal, gLiquid, gGas);
    const stated =
      t < transitions[0].temperatureK ? gCrystal : t < transitions[1].temperatureK ? gLiquid : gGas;
    if (lowest !== stated) return false;
  }
  return true;
}

function round(value, decimals) {
  const scale = 10 ** decimals;
  return Math.round(value * scale) / scale;
}
