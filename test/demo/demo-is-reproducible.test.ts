import { readFileSync } from 'node:fs';
import { gunzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { differences, makeDemo, type PlantedSlip } from './make-demo.js';

const demo = makeDemo();
const R = 8.31446261815324;

/** Composite Simpson, 2000 panels: another route than the generator's closed forms. */
function integral(f: (x: number) => number, from: number, to: number): number {
  const n = 2000;
  const h = (to - from) / n;
  let sum = f(from) + f(to);
  for (let i = 1; i < n; i++) sum += f(from + i * h) * (i % 2 === 1 ? 4 : 2);
  return (sum * h) / 3;
}

function everyPhase() {
  return demo.media.flatMap((medium) =>
    Object.entries(medium.phases).map(([label, { law, rangeK }]) => {
      const [a = 0, b = 0, c = 0, d = 0] = law;
      const Cp = (T: number) => a + b * T + c / (T * T) + d * T * T;
      return { place: `${medium.id} ${label}`, Cp, rangeK, phase: demo.closed[medium.id]!.phases[label]! };
    }),
  );
}

function committed(source: string, file: string): string {
  const bytes = readFileSync(new URL(`../../sources/${source}/${file}`, import.meta.url));
  return (file.endsWith('.gz') ? gunzipSync(bytes) : bytes).toString('utf8');
}

describe('the demo', () => {
  it('is made again by its generator, file for file', () => {
    expect(differences()).toEqual([]);
  });

  it('packs without a clock: the same bytes twice', () => {
    const path = 'sources/vapour-models/ideal-gases.csv.gz';
    const packed = demo.files.get(path)!;
    expect(packed.equals(makeDemo().files.get(path)!)).toBe(true);
    expect([...packed.subarray(4, 8)]).toEqual([0, 0, 0, 0]);
  });

  it('has 24 media, eight of them with one slip of a kind of its own', () => {
    expect(demo.media).toHaveLength(24);
    expect(new Set(demo.slips.map((slip) => slip.medium)).size).toBe(8);
    expect(new Set(demo.slips.map((slip) => slip.kind)).size).toBe(8);
    expect(new Set(demo.slips.map((slip) => slip.quantity)).size).toBe(8);
  });

  it('differs from the clean figures in the planted cells and the known misprint only', () => {
    const found: string[] = [];
    for (const [path, clean] of demo.clean) {
      const [, source, ...rest] = path.split('/');
      const lines = committed(source!, rest.join('/')).split('\n');
      clean.split('\n').forEach((line, i) => {
        if (line !== lines[i]) found.push(`${path}:${i + 1}`);
      });
    }
    const known = demo.corrections.map(({ source, correction }) => ({ source, ...correction }));
    const planted = [...demo.slips, ...known].map((one) => `sources/${one.source}/${one.file}:${one.line}`);
    expect(found.toSorted()).toEqual(planted.toSorted());
  });

  it('prints each slip at the line and column that the list gives', () => {
    const slips: PlantedSlip[] = JSON.parse(readFileSync(new URL('./planted-slips.json', import.meta.url), 'utf8'));
    expect(slips).toEqual(demo.slips);
    for (const { source, file, line, column, printed, clean } of slips) {
      const lines = committed(source, file).replace('\ufeff', '').split(/\r?\n/);
      const separator = file.endsWith('.tsv') ? '\t' : source === 'bench-two' ? ';' : ',';
      const header = lines.find((text) => text.split(separator).includes(column))!;
      expect(lines[line - 1]!.split(separator)[header.split(separator).indexOf(column)]).toBe(printed);
      expect(printed).not.toBe(clean);
    }
  });
});

describe('the clean figures', () => {
  it('keep dH = the integral of Cp dT and dS = the integral of Cp/T dT in every phase', () => {
    for (const { place, Cp, rangeK, phase } of everyPhase()) {
      const [from, to] = rangeK;
      expect(Math.abs(phase.H(to) - phase.H(from) - integral(Cp, from, to)), place).toBeLessThan(1e-5);
      const entropy = integral((T) => Cp(T) / T, from, to);
      expect(Math.abs(phase.S(to) - phase.S(from) - entropy), place).toBeLessThan(1e-8);
    }
  });

  it('count H and S from the formation enthalpy and the entropy at 298.15 K', () => {
    for (const { place, phase } of everyPhase()) {
      expect(Math.abs(phase.H(298.15) - phase.enthalpyOfFormation), place).toBeLessThan(1e-8);
      expect(Math.abs(phase.S(298.15) - phase.entropy), place).toBeLessThan(1e-10);
      expect(Math.abs(phase.G(298.15) - (phase.H(298.15) - 298.15 * phase.S(298.15))), place).toBeLessThan(1e-8);
    }
  });

  it('have equal G on both sides of every transition, and its heat and entropy between them', () => {
    for (const medium of demo.media) {
      const { phases, steps } = demo.closed[medium.id]!;
      for (const { from, to, temperatureK: T, enthalpy, entropy, gas, pressurePa = 1e5 } of steps) {
        const place = `${medium.id} ${from} ${to}`;
        let B = 0;
        let slope = 0;
        if (gas === 'real') {
          B = virial(medium.critical!, T);
          slope = (virial(medium.critical!, T + 0.01) - virial(medium.critical!, T - 0.01)) / 0.02;
        }
        const gasTerm = gas ? R * T * Math.log(pressurePa / 1e5) + B * pressurePa : 0;
        expect(Math.abs(phases[to]!.G(T) + gasTerm - phases[from]!.G(T)), place).toBeLessThan(1e-5);
        const heat = phases[to]!.H(T) + pressurePa * (B - T * slope) - phases[from]!.H(T);
        expect(Math.abs(heat - enthalpy), place).toBeLessThan(1e-2);
        expect(Math.abs(enthalpy - T * entropy), place).toBeLessThan(1e-8);
      }
    }
  });

  it('print rows whose steps in S and H follow the law to within the rounding', () => {
    const rows = [...demo.clean].filter(([path]) => path.includes('/tables/')).flatMap(([, text]) => text.split('\n'));
    const words: Record<string, string> = {
      crystal: 'cr',
      'crystal I': 'cr-I',
      'crystal II': 'cr-II',
      liquid: 'l',
      'ideal gas': 'g',
    };
    let compared = 0;
    let before: string[] = [];
    for (const row of rows) {
      const cells = row.split(',');
      if (cells.length === 8 && cells[0] === before[0] && cells[1] === before[1] && cells[2] !== 'T/K') {
        const medium = demo.media.find(({ name }) => name === cells[0])!;
        const { Cp } = demo.closed[medium.id]!.phases[words[cells[1]!]!]!;
        const [T1, T2] = [Number(before[2]), Number(cells[2])];
        const dS = Number(cells[4]) - Number(before[4]);
        const dH = 1000 * (Number(cells[6]) - Number(before[6]));
        expect(Math.abs(dS - integral((T) => Cp(T) / T, T1, T2)), row).toBeLessThan(0.00101);
        expect(Math.abs(dH - integral(Cp, T1, T2)), row).toBeLessThan(1.01);
        expect(Math.abs(Number(cells[4]) - Number(cells[5]) - (1000 * Number(cells[6])) / T2), row).toBeLessThan(
          0.001 + 0.51 / T2,
        );
        compared += 1;
      }
      before = cells;
    }
    expect(compared).toBeGreaterThan(500);
  });

  it('keep measured heat capacities within the stated uncertainty of their law', () => {
    let compared = 0;
    for (const [path, text] of demo.clean) {
      if (!path.includes('bench-two/cp/')) continue;
      const words: Record<string, string> = { solid: 'cr', 'solid I': 'cr-I', 'solid II': 'cr-II', melt: 'l' };
      for (const line of text.trim().split('\r\n').slice(1)) {
        const [sample, state, , t, cp] = line.replaceAll(',', '.').replaceAll('−', '-').split(';');
        const medium = demo.media.find(({ name }) => name === sample)!;
        const law = demo.closed[medium.id]!.phases[words[state!]!]!.Cp(Number(t) + 273.15) / medium.molarMass;
        expect(Math.abs(Number(cp) / law - 1), line).toBeLessThan(0.005 + 0.004);
        compared += 1;
      }
    }
    expect(compared).toBeGreaterThan(150);
  });
});

/** Second virial coefficient [m3/mol], nonpolar: Tsonopoulos, AIChE J. 20 (1974) 263. */
function virial(critical: { temperatureK: number; pressurePa: number; acentricFactor: number }, T: number): number {
  const x = T / critical.temperatureK;
  const f0 = 0.1445 - 0.33 / x - 0.1385 / x ** 2 - 0.0121 / x ** 3 - 0.000607 / x ** 8;
  const f1 = 0.0637 + 0.331 / x ** 2 - 0.423 / x ** 3 - 0.008 / x ** 8;
  return ((R * critical.temperatureK) / critical.pressurePa) * (f0 + critical.acentricFactor * f1);
}
