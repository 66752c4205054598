/** What the conditions of many draws of one experiment leave open, with the tests of each stated number. */
import { adjusted } from '../../pipeline/reconcile/adjustment-closes.js';
import { isPressure } from '../../pipeline/reconcile/system/stated-data.js';
import { systemOf } from '../../pipeline/reconcile/system/system.js';
import type { ReconciledCase } from '../../schemas/checked.js';
import { policySchema } from '../../schemas/policy.js';
import { column, type Matrix, product, solved, transposed } from '../core/numeric/dense.js';
import { type Design, WHICH } from '../synthetic/design.js';
import type { Truth } from '../synthetic/truth.js';
import { reconcileDraws } from './draws.js';

const policy = policySchema.parse({});

export interface Misclosures {
  /** A row a draw. */
  readonly y: readonly (readonly number[])[];
  readonly chiSquare: readonly number[];
  readonly freedom: number;
  /** By place, `T cr>l` or `p over l 3`: w of each draw, and the smallest detectable error of the first. */
  readonly w: ReadonlyMap<string, number[]>;
  readonly smallest: ReadonlyMap<string, number>;
}

export function misclosures(design: Design, truth: Truth, draws: number, seed: number): Misclosures {
  const y: number[][] = [];
  const chiSquare: number[] = [];
  const w = new Map<string, number[]>();
  const smallest = new Map<string, number>();
  let freedom = 0;
  reconcileDraws({ design, truth, draws, seed }, (one: ReconciledCase) => {
    const { system, whitened, tests } = adjusted(systemOf(one.checked, null), 1, policy);
    y.push([...system.y]);
    chiSquare.push(whitened.chiSquare);
    freedom = whitened.freedom;
    const seen = new Map<string, number>();
    system.data.forEach((d, i) => {
      const test = tests[i];
      if (test == null) return;
      const again = seen.get(d.place) ?? 0;
      seen.set(d.place, again + 1);
      const place = again === 0 ? d.place : `${d.place} ${again + 1}`;
      w.set(place, [...(w.get(place) ?? []), test.w]);
      const size = isPressure(d) ? d.datum.value * Math.expm1(test.smallestDetectable) : null;
      if (!smallest.has(place)) smallest.set(place, size ?? test.smallestDetectable);
    });
  });
  return { y, chiSquare, freedom, w, smallest };
}

/** The covariance that the draws themselves show. */
export function sampleCovariance(rows: readonly (readonly number[])[]): Matrix {
  const n = rows.length;
  const mean = rows[0]!.map((_, i) => rows.reduce((sum, row) => sum + row[i]!, 0) / n);
  return mean.map((a, i) =>
    mean.map((b, j) => rows.reduce((sum, row) => sum + (row[i]! - a) * (row[j]! - b), 0) / (n - 1)),
  );
}

/** Baarda (1968), section 4: delta0 / sqrt(d^T Q^-1 d), by elimination. */
export function smallestDetectable(direction: readonly number[], q: Matrix, delta0: number): number {
  const d = column(direction);
  return delta0 / Math.sqrt(product(transposed(d), solved(q, d))[0]![0]!);
}

/** The design with the rows of one file that `which` takes out left unwritten. */
export function without(design: Design, file: string, which: (row: readonly string[]) => boolean): Design {
  return {
    ...design,
    fill: (task) =>
      design.fill({
        ...task,
        write: (source, name, row) => {
          if (name !== file || !which(row)) task.write(source, name, row);
        },
      }),
  };
}

/**
 * The design with two more kinds of number, each of stated u: the pressure of the boiling point (0.2 %), and Gibbs energies of
 * formation of the crystal and the gas (200 J/mol), from elements of any entropy.
 */
export function withPressureAndGibbsEnergies(design: Design): Design {
  const columns = {
    ...WHICH,
    dfG: { is: 'gibbs-energy-of-formation', unit: 'kJ/mol', uncertainty: { absolute: 0.2 } },
  };
  const pressure = { 'p/Pa': { is: 'pressure', unit: 'Pa', uncertainty: { relative: 0.002 } } };
  const home = design.sources.find(({ tables }) => tables.some(({ file }) => file === 'anchors.csv'))!.id;
  const sources = design.sources.map((source) => ({
    ...source,
    tables: [
      ...source.tables.map((table) =>
        table.file === 'transitions.csv' ? { ...table, columns: { ...table.columns, ...pressure } } : table,
      ),
      ...(source.id === home ? [{ file: 'gibbs-energies.csv', holds: 'anchors', columns }] : []),
    ],
  }));
  return {
    ...design,
    sources,
    fill: (task) => {
      const { id, truth, pen, write } = task;
      design.fill({
        ...task,
        write: (source, file, row) => {
          if (file !== 'transitions.csv') return write(source, file, row);
          return write(source, file, [...row, row[2] === 'g' ? pen.measured(1e5, 200) : '100000']);
        },
      });
      for (const { label, formationEnthalpy, referenceEntropy } of [truth.phases[0]!, truth.phases.at(-1)!]) {
        const gibbs = formationEnthalpy - 298.15 * (referenceEntropy - 120);
        write(home, 'gibbs-energies.csv', [id, label, pen.measured(gibbs / 1000, 0.2)]);
      }
    },
  };
}

/** The design with one cell of one row moved by `by`, in the column's unit; its decimals are kept. */
export function moved(
  design: Design,
  file: string,
  which: (row: readonly string[]) => boolean,
  at: number,
  by: number,
): Design {
  return {
    ...design,
    fill: (task) => {
      let done = false;
      design.fill({
        ...task,
        write: (source, name, row) => {
          if (done || name !== file || !which(row)) return task.write(source, name, row);
          done = true;
          const decimals = row[at]!.split('.')[1]?.length ?? 0;
          const cells = row.map((cell, i) => (i === at ? (Number(cell) + by).toFixed(decimals) : cell));
          return task.write(source, name, cells);
        },
      });
    },
  };
}
