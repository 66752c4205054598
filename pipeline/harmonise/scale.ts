/** Temperatures of a series on ITS-90, and what follows for the quantities beside them. */
import type { Finding } from '../../schemas/finding.js';
import type { RawSeries } from '../../schemas/raw.js';
import { largestPossibleDifferenceK, possibleDifferenceK, toIts90 } from '../core/units/temperature-scale.js';
import type { LinearConversion } from '../core/units/ucum.js';
import { type Draft, writable } from './draft.js';
import { readingFinding } from './reading-finding.js';

export interface ScaledTemperatures {
  readonly temperatureK: Float64Array;
  /** As printed, in K on the source's own scale; null where nothing was converted. */
  readonly printedK: Float64Array | null;
  /** dt(old)/dt(90) a row; null where nothing was converted. */
  readonly slope: Float64Array | null;
  readonly scaleDoubtK: number;
}

/** Printed temperatures to K and ITS-90. Rows outside the published range stay as printed, with a note. */
export function scaledTemperatures(
  raw: RawSeries,
  values: Float64Array,
  { factor, offset }: LinearConversion,
  substance: string,
  findings: Finding[],
): ScaledTemperatures {
  const { temperatureScale: scale } = raw.table;
  let printedK = values;
  if (factor !== 1 || offset !== 0) {
    printedK = new Float64Array(raw.rows);
    for (let i = 0; i < raw.rows; i++) printedK[i] = withoutDust(values[i] * factor + offset);
  }
  if (scale !== 'IPTS-68' && scale !== 'IPTS-48') {
    let low = Number.POSITIVE_INFINITY;
    let high = 0;
    for (let i = 0; i < raw.rows; i++) {
      if (printedK[i] < low) low = printedK[i];
      if (printedK[i] > high) high = printedK[i];
    }
    const scaleDoubtK = raw.rows === 0 ? 0 : largestPossibleDifferenceK(low, high, scale);
    return { temperatureK: printedK, printedK: null, slope: null, scaleDoubtK };
  }
  const temperatureK = new Float64Array(raw.rows);
  const slope = new Float64Array(raw.rows);
  let scaleDoubtK = 0;
  let firstLeft = -1;
  for (let i = 0; i < raw.rows; i++) {
    const scaled = toIts90(printedK[i], scale);
    temperatureK[i] = scaled.temperatureK;
    slope[i] = scaled.slope;
    if (!scaled.converted && printedK[i] !== 0) {
      if (firstLeft < 0) firstLeft = i;
      scaleDoubtK = Math.max(scaleDoubtK, possibleDifferenceK(printedK[i], scale));
    }
  }
  if (firstLeft >= 0) findings.push(unconverted(raw, substance, raw.line[firstLeft], printedK[firstLeft], scaleDoubtK));
  return { temperatureK, printedK, slope, scaleDoubtK };
}

/** A row at 0 K is a limit row: -459.67 degrees Fahrenheit must not become 3e-14 K below it. */
function withoutDust(temperatureK: number): number {
  return Math.round(temperatureK * 1e9) / 1e9 + 0;
}

function unconverted(raw: RawSeries, substance: string, line: number, atK: number, doubtK: number): Finding {
  const { table } = raw;
  return readingFinding({
    substance,
    table,
    problem: 'required-missing',
    read: `A published difference between ${table.temperatureScale} and ITS-90 at ${atK} K`,
    wanted: table.temperatureScale === 'IPTS-68' ? '73.15 K or more' : '93.15 to 533.15 K',
    remedy: `Such temperatures stay as printed and may be off by ${doubtK.toPrecision(2)} K; give converted ones if you have them.`,
    line,
    column: '',
    severity: 'note',
    fromPhase: raw.phase,
  });
}

/**
 * What a new temperature changes beside it: Cp is per new kelvin, and -[G - H(Tr)]/T is S - [H - H(Tr)]/T at the new T.
 * S and H are the state's own and stay; the part of S that rests on T inside its integral (a share of the shift over T) is
 * left, below 0.04 % of a row's step.
 */
export function followScale(draft: Draft, printedK: Float64Array, slope: Float64Array): void {
  const heatCapacity = draft.quantities['heat-capacity'];
  if (heatCapacity !== undefined) {
    const values = writable(heatCapacity);
    for (let i = 0; i < values.length; i++) values[i] *= slope[i];
  }
  const gibbs = draft.quantities['gibbs-function'];
  if (gibbs === undefined) return;
  const enthalpy = draft.quantities['enthalpy-increment'];
  const entropy = draft.quantities.entropy;
  const values = writable(gibbs);
  const { temperatureK } = draft;
  for (let i = 0; i < values.length; i++) {
    if (gibbs.present[i] === 0 || printedK[i] === 0) continue;
    let increment = 0;
    if (enthalpy !== undefined && enthalpy.present[i] === 1) increment = enthalpy.values[i];
    else if (entropy !== undefined && entropy.present[i] === 1)
      increment = printedK[i] * (entropy.values[i] - values[i]);
    values[i] += increment / printedK[i] - increment / temperatureK[i];
  }
}
