/**
 * The 24 invented media: stated laws, ranges, transitions and levels. Everything else in the demo follows from these.
 *
 * law:    Cp = a + b T + c / T^2 + d T^2 [J/(mol K)]
 * steps:  temperature [K] and entropy [J/(mol K)] of each transition; where a gas is in it, at `pressurePa` and of the
 *         real or the ideal gas
 * origin: the phase whose formation enthalpy [J/mol] and entropy [J/(mol K)] at 298.15 K are stated; the others follow
 *
 * @typedef {object} Phase
 * @property {import('./laws.js').Law} law
 * @property {readonly [number, number]} rangeK tabulated from, to
 * @property {string} source
 *
 * @typedef {object} Step
 * @property {string} from
 * @property {string} to
 * @property {number} temperatureK
 * @property {number} entropy
 * @property {'real' | 'ideal'} [gas]
 * @property {number} [pressurePa]
 *
 * @typedef {object} Medium
 * @property {string} id
 * @property {string} name
 * @property {'metal' | 'molecular' | 'ionic' | 'network'} class
 * @property {number} molarMass g/mol
 * @property {{ temperatureK: number, pressurePa: number, acentricFactor: number }} [critical]
 * @property {{ phase: string, enthalpy: number, entropy: number }} origin
 * @property {Readonly<Record<string, Phase>>} phases
 * @property {readonly Step[]} steps
 * @property {string} source where its anchors and transitions stand
 * @property {boolean} [running] its table runs through its phases, increments from the first
 */
import { ATMOSPHERE_PA, STANDARD_PRESSURE_PA } from './laws.js';

export const QUAY = 'quay-tables';
export const BINDER = 'grey-binder';
export const BENCH = 'bench-two';
export const MODELS = 'vapour-models';

const ideal = { gas: 'ideal', pressurePa: STANDARD_PRESSURE_PA };
const boiling = { gas: 'real', pressurePa: ATMOSPHERE_PA };

/** @returns {Medium} */
function medium(source, id, kind, molarMass, origin, phases, steps, more = {}) {
  const [phase, enthalpy, entropy] = origin;
  const made = {};
  for (const [label, [law, rangeK, from]] of Object.entries(phases)) {
    made[label] = { law, rangeK, source: from ?? source };
  }
  return {
    id,
    name: id[0].toUpperCase() + id.slice(1),
    class: kind,
    molarMass,
    origin: { phase, enthalpy, entropy },
    phases: made,
    steps: steps.map(([from, to, temperatureK, dS, gas]) => ({ from, to, temperatureK, entropy: dS, ...gas })),
    source,
    ...more,
  };
}

const critical = (temperatureK, megapascal, acentricFactor) => ({
  critical: { temperatureK, pressurePa: megapascal * 1e6, acentricFactor },
});

/** @type {readonly Medium[]} */
export const MEDIA = [
  medium(QUAY, 'calmorite', 'ionic', 92.41, ['cr', -412600, 78.4], {
    cr: [[49.1, 0.0161, -3.9e5], [298.15, 1000]],
    l: [[66.8, 0.0008, -1e5], [298.15, 1500]],
    g: [[37.2, 0.0009, -1.7e5], [298.15, 1500], MODELS],
  }, [['cr', 'l', 861.4, 25.3], ['l', 'g', 1392.6, 101, ideal]]),
  medium(QUAY, 'dunsalt', 'ionic', 138.07, ['cr', -655200, 104.7], {
    cr: [[72.5, 0.0205, -6.1e5], [200, 900]],
    l: [[101, -0.002, -3e5], [298.15, 1500]],
    g: [[56.9, 0.0006, -2.6e5], [298.15, 1500]],
  }, [['cr', 'l', 774.2, 33.4], ['l', 'g', 1336.85, 98.6, ideal]]),
  medium(QUAY, 'fennarite', 'ionic', 211.5, ['cr-II', -1240700, 148.3], {
    'cr-II': [[118, 0.062, -1.5e6], [200, 800]],
    'cr-I': [[126, 0.055, -1.5e6], [298.15, 1200]],
    l: [[136, 0.055, -1.4e6], [298.15, 1500]],
  }, [['cr-II', 'cr-I', 689.15, 8.75], ['cr-I', 'l', 1104.5, 27.2]]),
  medium(QUAY, 'grendite', 'ionic', 117.9, ['cr', -731400, 96.1], {
    cr: [[81.2, 0.0311, -1.02e6], [200, 1100]],
    l: [[98, 0.02, -7e5], [298.15, 1500]],
  }, [['cr', 'l', 934.7, 28.6]]),
  medium(QUAY, 'hollmerite', 'ionic', 164.2, ['cr-II', -987300, 133.9], {
    'cr-II': [[104.4, 0.041, -1.35e6], [200, 700]],
    'cr-I': [[108, 0.043, -1.2e6], [298.15, 1150]],
    l: [[121, 0.038, -1.1e6], [298.15, 1500]],
  }, [['cr-II', 'cr-I', 571.3, 12.346], ['cr-I', 'l', 1011.6, 24.9]]),
  medium(QUAY, 'isarnite', 'ionic', 101.3, ['cr', -548900, 71.2], {
    cr: [[63.7, 0.0262, -7.7e5], [200, 1200]],
    l: [[79, 0.017, -5e5], [298.15, 1500]],
  }, [['cr', 'l', 1043.2, 24.1]]),
  medium(QUAY, 'jorvalite', 'ionic', 83.6, ['cr', -388750, 88.6], {
    cr: [[53.5, 0.0188, -4.6e5], [200, 850]],
    l: [[69.5, 0.004, -2e5], [298.15, 1400]],
    g: [[38.1, 0.001, -1.5e5], [298.15, 1500]],
  }, [['cr', 'l', 722.9, 26.2], ['l', 'g', 1248.3, 103, ideal]]),
  medium(QUAY, 'sarnium', 'metal', 98.2, ['cr', 0, 51.8], {
    cr: [[22.6, 0.0098, -0.4e5], [200, 700]],
    l: [[30.1, 0.0006, 0], [298.15, 1400]],
    g: [[20.786, 0, 0], [298.15, 1500]],
  }, [['cr', 'l', 561.8, 9.9], ['l', 'g', 1187.4, 93.1, ideal]]),
  medium(QUAY, 'torvium', 'metal', 74.9, ['cr-II', 0, 34.1], {
    'cr-II': [[21.9, 0.0121, -0.6e5], [200, 900]],
    'cr-I': [[22.8, 0.0118, -0.5e5], [298.15, 1300]],
    l: [[31, 0.006, 0], [298.15, 1500]],
  }, [['cr-II', 'cr-I', 742.5, 4.62], ['cr-I', 'l', 1207.3, 9.2]]),
  medium(QUAY, 'wexide', 'network', 66.8, ['cr', -842000, 53.6], {
    cr: [[68.2, 0.0182, -1.55e6], [250, 1300]],
    l: [[83, 0.009, -1.2e6], [298.15, 1500]],
  }, [['cr', 'l', 1188, 19.3]]),
  medium(QUAY, 'quillane', 'molecular', 142.6, ['cr', -318400, 265], {
    cr: [[41, 0.46, 0], [200, 400]],
    l: [[98, 0.42, 0], [298.15, 600]],
    g: [[21, 0.56, 0, -1.9e-4], [298.15, 900], MODELS],
  }, [['cr', 'l', 352.7, 58], ['l', 'g', 523.4, 91, boiling]], critical(760, 2.6, 0.42)),

  medium(BINDER, 'kestrane', 'molecular', 128.3, ['cr', -297100, 231], {
    cr: [[33, 0.4, 0], [200, 360]],
    l: [[84, 0.36, 0], [298.15, 560]],
    g: [[17, 0.47, 0, -1.6e-4], [298.15, 800]],
  }, [['cr', 'l', 331.6, 62], ['l', 'g', 497.2, 88.5, boiling]], critical(702, 2.9, 0.38)),
  medium(BINDER, 'lumerite', 'ionic', 149.7, ['cr', -812300, 121], {
    cr: [[92, 0.034, -1.1e6], [250, 700]],
    l: [[109, 0.03, -0.9e6], [298.15, 1200]],
  }, [['cr', 'l', 598.6, 31.2]]),
  medium(BINDER, 'nerathene', 'molecular', 108.9, ['cr', 62400, 198], {
    cr: [[29, 0.37, 0], [200, 380]],
    l: [[73, 0.35, 0], [298.15, 560]],
    g: [[10, 0.46, 0, -1.7e-4], [298.15, 800]],
  }, [['cr', 'l', 347.9, 54.5], ['l', 'g', 484.6, 87.2, boiling]], critical(715, 3.6, 0.33)),
  medium(BINDER, 'ulmerium', 'metal', 121.4, ['cr', 0, 48.7], {
    cr: [[21.5, 0.0135, -0.3e5], [298.15, 702.4]],
    l: [[31.6, 0, 0], [702.4, 1300]],
  }, [['cr', 'l', 702.4, 10.3]], { running: true }),
  medium(BINDER, 'yarrolite', 'ionic', 126.5, ['cr-II', -624000, 101.5], {
    'cr-II': [[77, 0.029, -0.9e6], [250, 600]],
    'cr-I': [[80.5, 0.03, -0.85e6], [298.15, 900]],
    l: [[93, 0.026, -0.8e6], [298.15, 1300]],
  }, [['cr-II', 'cr-I', 488.2, 7.9], ['cr-I', 'l', 803.7, 21.7]]),
  medium(BINDER, 'orblesalt', 'ionic', 111.2, ['cr', -503600, 84], {
    cr: [[69, 0.024, -0.7e6], [298.15, 681.3]],
    l: [[86, 0.012, -0.4e6], [681.3, 1200]],
  }, [['cr', 'l', 681.3, 26.6]], { running: true }),
  medium(BINDER, 'brevorite', 'ionic', 133.3, ['cr', -877000, 99], {
    cr: [[88, 0.027, -1e6], [250, 1050]],
    l: [[106, 0.02, -0.8e6], [298.15, 1400]],
  }, [['cr', 'l', 912.5, 29.9]]),

  medium(BENCH, 'mossanol', 'molecular', 152.3, ['cr', -1104200, 221.3], {
    cr: [[52, 0.47, 0], [233, 389]],
    l: [[135, 0.42, 0], [384, 480]],
  }, [['cr', 'l', 391.2, 88]]),
  medium(BENCH, 'ostrelane', 'molecular', 198.4, ['cr', -587300, 372.1], {
    cr: [[70, 0.6, 0], [213, 307.5]],
    l: [[165, 0.52, 0], [304, 575]],
    g: [[38, 0.75, 0, -2.6e-4], [298.15, 800], MODELS],
  }, [['cr', 'l', 309.6, 112], ['l', 'g', 561.3, 94, boiling]], critical(770, 2.2, 0.5)),
  medium(BENCH, 'pellanol', 'molecular', 118.1, ['cr', -871400, 190.4], {
    cr: [[44, 0.42, 0], [233, 363]],
    l: [[118, 0.39, 0], [288, 440]],
  }, [['cr', 'l', 364.9, 71]]),
  medium(BENCH, 'rowenol', 'molecular', 131.7, ['cr', -602300, 211.2], {
    cr: [[48, 0.44, 0], [223, 339]],
    l: [[112, 0.41, 0], [333, 500]],
    g: [[22, 0.55, 0, -1.9e-4], [298.15, 800], MODELS],
  }, [['cr', 'l', 341.2, 66], ['l', 'g', 488.7, 96, boiling]], critical(690, 3.3, 0.5)),
  medium(BENCH, 'vessium', 'metal', 112.3, ['cr', 0, 58.2], {
    cr: [[22.9, 0.0085, -0.3e5], [243, 428]],
    l: [[29.8, 0.001, 0], [431, 720]],
  }, [['cr', 'l', 429.8, 8.9]]),
  medium(BENCH, 'zellanide', 'ionic', 176.5, ['cr-I', -1822600, 302.5], {
    'cr-II': [[148, 0.27, -1.2e6], [213, 286]],
    'cr-I': [[155, 0.27, -1.2e6], [280, 332.5]],
    l: [[248, 0.2, 0], [323, 420]],
  }, [['cr-II', 'cr-I', 287.4, 14], ['cr-I', 'l', 334.4, 98]]),
];

/** A laboratory series of a phase that a handbook has too: it reaches lower. */
export const EXTRA_SERIES = [{ medium: 'calmorite', phase: 'cr', source: BENCH, rangeK: [213, 345] }];
