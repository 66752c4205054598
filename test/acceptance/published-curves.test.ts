import { rmSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import type { SourceCell } from '../slips/source-cells.js';
import { curveName, curvesOf, type Piece, type Values, valuesAt, valuesIn } from './curves.js';
import { isLimitOfGas, lastPlace, nameOf, printed, SOURCES, tableOf } from './printed-rows.js';
import { makeRelease, type Release, temporaryFolder } from './release.js';

vi.setConfig({ testTimeout: 30_000, hookTimeout: 60_000 });

let folder: string;
let release: Release;
let curves: Map<string, Piece[]>;
beforeAll(async () => {
  folder = temporaryFolder();
  release = await makeRelease(SOURCES, join(folder, 'out'));
  curves = curvesOf(release.table('pieces'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function curveOf(cell: SourceCell, phase = cell.place): Piece[] {
  const name = nameOf(cell, phase);
  const curve = curves.get(name);
  if (curve === undefined) throw new Error(`no curve ${name}`);
  return curve;
}

/** What the curve says for a printed cell, in the printed unit. Increments count from Tr = 298.15 K of their phase. */
function published(cell: SourceCell): number {
  const { enthalpy, entropy, heatCapacity } = valuesAt(curveOf(cell), cell.temperatureK);
  const home = (): number => valuesAt(curveOf(cell, tableOf(cell)?.incrementsFrom ?? cell.place), 298.15).enthalpy;
  const si = {
    'heat-capacity': () => heatCapacity,
    entropy: () => entropy,
    enthalpy: () => enthalpy,
    'enthalpy-increment': () => enthalpy - home(),
    'gibbs-function': () => entropy - (enthalpy - home()) / cell.temperatureK,
  }[cell.quantity]!();
  return cell.unit === 'kJ/mol' ? si / 1000 : si;
}

/** The two tables with real steps or a lambda peak. */
function allowed({ substance, place }: SourceCell): number {
  return (substance === 'iron' && place === 'cr-alpha') || (substance === 'aluminium' && place === 'g') ? 0.9 : 0.65;
}

describe('the published curves', () => {
  it.each([
    ['entropy', 1200],
    ['enthalpy-increment', 1100],
    ['gibbs-function', 1100],
    ['enthalpy', 110],
  ])('meet every printed %s within 0.65 of its last digit', (quantity, atLeast) => {
    const cells = printed.filter((cell) => cell.quantity === quantity && !isLimitOfGas(cell));
    expect(cells.length).toBeGreaterThan(atLeast);
    const missed = cells
      .map((cell) => ({ cell, units: (published(cell) - cell.value) / lastPlace(cell) }))
      .filter(({ cell, units }) => !(Math.abs(units) <= allowed(cell)))
      .map(
        ({ cell, units }) =>
          `${cell.source}/${cell.file}:${cell.line} ${cell.place} ${cell.temperatureK} K ${cell.text}: ${units.toFixed(3)}`,
      );
    expect(missed).toEqual([]);
  });

  it('are there for every phase that a table prints', () => {
    const phases = new Set(printed.map((cell) => nameOf(cell)));
    expect([...curves.keys()].sort()).toEqual([...phases].sort());
  });

  it('join: H and S of each piece end where those of the next begin, to 1e-9', () => {
    let joins = 0;
    for (const [name, pieces] of curves) {
      pieces.slice(1).forEach((next, i) => {
        const piece = pieces[i]!;
        expect(piece.highK, name).toBe(next.lowK);
        const end = valuesIn(piece, piece.highK);
        const change = valuesIn({ ...piece, enthalpy: 0, entropy: 0 }, piece.highK);
        const tell = `${name} at ${next.lowK} K`;
        // Relative to the numbers themselves or, where these pass through zero, to what the piece adds.
        const allowance = (value: number, added: number): number => 1e-9 * Math.max(Math.abs(value), Math.abs(added));
        expect(Math.abs(end.enthalpy - next.enthalpy), tell).toBeLessThanOrEqual(
          allowance(end.enthalpy, change.enthalpy),
        );
        expect(Math.abs(end.entropy - next.entropy), tell).toBeLessThanOrEqual(allowance(end.entropy, change.entropy));
        joins++;
      });
    }
    expect(joins).toBeGreaterThan(1000);
  });

  it('give every row of functions: Cp, its integrals H and S, and G = H - TS, to 1e-9 or the last published place', () => {
    const rows = release.table('functions');
    expect(rows.length).toBeGreaterThan(1400);
    for (const row of rows) {
      const name = curveName(row.substance as string, row.phase as string, row.isobar_Pa as number | null);
      const T = row.temperature_K as number;
      const side = row.side === 'below' ? 'below' : 'above';
      const { heatCapacity, entropy, enthalpy }: Values = valuesAt(curves.get(name)!, T, side);
      // Nine decimals of Cp and S are published, and six of H and G.
      const near = (field: string, value: number, scale: number, decimals: number): void => {
        const tell = `${name} at ${T} K: ${field}`;
        expect(Math.abs((row[field] as number) - value), tell).toBeLessThanOrEqual(
          Math.max(1e-9 * scale, 0.6 * 10 ** -decimals),
        );
      };
      near('heat_capacity_J_per_mol_K', heatCapacity, Math.abs(heatCapacity), 9);
      near('entropy_J_per_mol_K', entropy, Math.abs(entropy), 9);
      near('enthalpy_J_per_mol', enthalpy, Math.abs(enthalpy), 6);
      near('gibbs_energy_J_per_mol', enthalpy - T * entropy, Math.abs(enthalpy) + Math.abs(T * entropy), 6);
    }
  });
});
