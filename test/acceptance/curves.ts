/** Cp, S and H of published curves from `pieces.csv`, by quadrature: no code of the pipeline's. */
import type { Row } from './release.js';

export interface Piece {
  readonly lowK: number;
  readonly highK: number;
  readonly c: readonly [number, number, number, number];
  readonly enthalpy: number;
  readonly entropy: number;
}

export interface Values {
  readonly heatCapacity: number;
  readonly entropy: number;
  readonly enthalpy: number;
}

/** Pieces of each curve in rising temperature, by `substance phase isobar`. */
export function curvesOf(pieces: readonly Row[]): Map<string, Piece[]> {
  const curves = new Map<string, Piece[]>();
  for (const row of pieces) {
    const name = curveName(row.substance as string, row.phase as string, row.isobar_Pa as number | null);
    const list = curves.get(name) ?? [];
    list.push({
      lowK: row.low_K as number,
      highK: row.high_K as number,
      c: [row.c0, row.c1, row.c2, row.c3] as [number, number, number, number],
      enthalpy: (row.enthalpy_J_per_mol ?? Number.NaN) as number,
      entropy: (row.entropy_J_per_mol_K ?? Number.NaN) as number,
    });
    curves.set(name, list);
  }
  for (const list of curves.values()) list.sort((a, b) => a.lowK - b.lowK);
  return curves;
}

export function curveName(substance: string, phase: string, isobarPa: number | null): string {
  return `${substance} ${phase} ${isobarPa ?? 'standard'}`;
}

/** The curve at T; at a joint from the piece above it, unless `side` is 'below'. */
export function valuesAt(curve: readonly Piece[], temperatureK: number, side: 'above' | 'below' = 'above'): Values {
  const inside = curve.filter((piece) => piece.lowK <= temperatureK && temperatureK <= piece.highK);
  const piece = side === 'above' ? inside.at(-1) : inside[0];
  if (piece === undefined) throw new Error(`no piece reaches ${temperatureK} K`);
  return valuesIn(piece, temperatureK);
}

export function valuesIn({ lowK, c, enthalpy, entropy }: Piece, temperatureK: number): Values {
  const x = temperatureK - lowK;
  const [c0, c1, c2, c3] = c;
  return {
    heatCapacity: c0 + x * (c1 + x * (c2 + x * c3)),
    enthalpy: enthalpy + x * (c0 + x * (c1 / 2 + x * (c2 / 3 + (x * c3) / 4))),
    entropy: entropy + entropyChange(lowK, x, c),
  };
}

/** The integral of Cp/T from low to low + x; from 0 K Cp/T is itself a polynomial. */
function entropyChange(lowK: number, x: number, [c0, c1, c2, c3]: Piece['c']): number {
  if (lowK === 0) {
    if (c0 !== 0) throw new Error('Cp does not vanish at 0 K');
    return x * (c1 + x * (c2 / 2 + (x * c3) / 3));
  }
  // Panels no wider than half of their temperature: 12 nodes are then exact to the last bit or two.
  const panels = Math.max(1, Math.ceil((2 * x) / lowK));
  let sum = 0;
  for (let k = 0; k < panels; k++) {
    const from = (k * x) / panels;
    for (const [node, weight] of GAUSS) {
      const y = from + (node * x) / panels;
      sum += (weight * (c0 + y * (c1 + y * (c2 + y * c3)))) / (lowK + y);
    }
  }
  return (sum * x) / panels;
}

/** Gauss-Legendre nodes and weights on [0, 1], by Newton's method on the Legendre polynomial. */
const GAUSS = gauss(12);

function gauss(n: number): [number, number][] {
  return Array.from({ length: n }, (_, i) => {
    let z = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 1;
    for (let step = 0; step < 20; step++) {
      let p = 1;
      let before = 0;
      for (let k = 0; k < n; k++) [p, before] = [((2 * k + 1) * z * p - k * before) / (k + 1), p];
      slope = (n * (z * p - before)) / (z * z - 1);
      z -= p / slope;
    }
    return [(1 - z) / 2, 1 / ((1 - z * z) * slope * slope)];
  });
}
