import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';

const FEWEST_CELLS = 6;
const MOST_PLACES = 4;

/**
 * The series with the rounding that its figures show: a column of which every figure ends in noughts (kilojoules of two
 * decimals written in joules) is known to the last place that is ever used, and no further.
 */
export function withOwnDigits(series: Series): Series {
  return {
    ...series,
    heatCapacity: rounded(series.heatCapacity),
    entropy: rounded(series.entropy),
    enthalpyIncrement: rounded(series.enthalpyIncrement),
    gibbsFunction: rounded(series.gibbsFunction),
    enthalpy: rounded(series.enthalpy),
  };
}

function rounded<Q extends SeriesQuantity | null>(q: Q): Q {
  if (q === null) return q;
  let scale = 1;
  for (let places = 0; places < MOST_PLACES && isMultiple(q, 10 * scale); places++) scale *= 10;
  return scale === 1 ? q : { ...q, halfUnit: q.halfUnit.map((half) => half * scale) };
}

/** Every figure is a multiple of so many units of the last place. */
function isMultiple(q: SeriesQuantity, units: number): boolean {
  let cells = 0;
  for (let row = 0; row < q.values.length; row++) {
    if (q.present[row] === 0 || q.values[row] === 0 || q.halfUnit[row] === 0) continue;
    const figure = q.values[row] / (2 * q.halfUnit[row] * units);
    if (Math.abs(figure - Math.round(figure)) > 1e-4) return false;
    cells++;
  }
  return cells >= FEWEST_CELLS;
}
