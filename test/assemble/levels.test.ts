import { describe, expect, it } from 'vitest';
import { enthalpyAt, entropyAt, gibbsAt } from '../../pipeline/core/physics/curve.js';
import { gibbsDifferenceUncertainty, stateCovariance } from '../../pipeline/core/physics/curve-uncertainty.js';
import { rowsCovariance } from '../../pipeline/core/physics/rows-covariance.js';
import type { PhaseCurve } from '../../schemas/curves.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { seeded } from '../core/numeric/random.js';
import { anchorOf, assembled, type CaseParts, curveOfPhase, datum, seriesOf, transitionOf } from './cases.js';
import { steps, TR, withReference } from './model.js';

const MEASURED: Partial<TableMeaning> = { basis: 'measured', source: 'bench' };

/** Cp constant, no H or S printed. */
const bare = (phase: string, low: number, high: number, cp: number, table: Partial<TableMeaning> = {}) => {
  const temperatureK = steps(low, high, (high - low) / 10);
  return seriesOf({ phase, temperatureK, cp: { values: temperatureK.map(() => cp), decimals: 4 }, table });
};

/** Cp constant, H - H(Tr) and S printed; `increment` at Tr. */
const printed = (phase: string, temperatureK: number[], cp: number, s: number, increment = 0, from?: string) =>
  seriesOf({
    phase,
    temperatureK,
    cp: { values: temperatureK.map(() => cp), decimals: 4 },
    s: { values: temperatureK.map((t) => s + cp * Math.log(t / TR)), decimals: 4 },
    increment: { values: temperatureK.map((t) => increment + cp * (t - TR)), decimals: 2 },
    ...(from === undefined ? {} : { incrementsFrom: from }),
  });

/** u(G) at the reference temperature from the rows alone. */
const rowsU = (curve: PhaseCurve): number => {
  const { hh, hs, ss } = rowsCovariance(curve, TR);
  return Math.sqrt(hh - 2 * TR * hs + TR * TR * ss);
};

const GRID = withReference(steps(250, 900, 50));

describe('levels of H and S', () => {
  it('come from an anchor at its reference temperature for a bare table, H and S each', () => {
    const curve = curveOfPhase(
      assembled({
        series: [bare('l', 280, 500, 80)],
        anchors: [anchorOf('l', { h: datum(-285000, 40), s: datum(70, 0.2) }, { source: 'other' })],
      }),
      'l',
    );
    expect(enthalpyAt(curve, TR)).toBeCloseTo(-285000, 6);
    expect(entropyAt(curve, TR)).toBeCloseTo(70, 9);
    expect(enthalpyAt(curve, 400)).toBeCloseTo(-285000 + 80 * (400 - TR), 5);
    expect(entropyAt(curve, 400)).toBeCloseTo(70 + 80 * Math.log(400 / TR), 8);
    expect(Math.sqrt(stateCovariance(curve, TR).hh)).toBeCloseTo(40, 6);
    expect(Math.sqrt(stateCovariance(curve, TR).ss)).toBeCloseTo(0.2, 8);
    expect([curve.enthalpyLevelFrom, curve.entropyLevelFrom, curve.enthalpyAnchor, curve.entropyAnchor]).toEqual([
      'anchor',
      'anchor',
      0,
      0,
    ]);
  });

  it('share what one evaluated source states between its phases, so that only the rounding is left of their difference', () => {
    const curves = (source: string) => {
      const made = assembled({
        series: [printed('cr', GRID, 50, 60), printed('l', GRID, 60, 80)],
        anchors: [
          anchorOf('cr', { h: datum(-1e5, 300, 5) }, { source }),
          anchorOf('l', { h: datum(-9e4, 200, 5) }, { source }),
        ],
      });
      return [curveOfPhase(made, 'cr'), curveOfPhase(made, 'l')] as const;
    };
    const rounding = 5 / Math.sqrt(3);
    const [cr, l] = curves('desk');
    expect(cr.uEnthalpyLevelJPerMol).toBeCloseTo(Math.hypot(300, rounding), 6);
    expect(l.uEnthalpyLevelJPerMol).toBeCloseTo(Math.hypot(300, rounding), 6);
    const rows = Math.hypot(rowsU(cr), rowsU(l));
    expect(gibbsDifferenceUncertainty(cr, 1, l, 1, TR)).toBeCloseTo(Math.hypot(rounding * Math.SQRT2, rows), 6);
    const [other, another] = curves('elsewhere');
    expect(other.uEnthalpyLevelJPerMol).toBeCloseTo(Math.hypot(300, rounding), 9);
    expect(gibbsDifferenceUncertainty(other, 1, another, 1, TR)).toBeCloseTo(
      Math.hypot(300, 200, rounding * Math.SQRT2, rows),
      6,
    );
  });

  it('prefer the anchor of better rank, and among equals that of the own source', () => {
    const result = assembled({
      series: [printed('cr', GRID, 50, 60)],
      anchors: [
        anchorOf('cr', { h: datum(1) }, { source: 'elsewhere', rank: 1 }),
        anchorOf('cr', { h: datum(2) }, { source: 'desk', rank: 1 }),
        anchorOf('cr', { h: datum(3) }, { source: 'elsewhere', rank: 0.4 }),
      ],
    });
    expect(curveOfPhase(result, 'cr').enthalpyAnchor).toBe(2);
  });

  it('are taken from two anchors where one states H and the other S', () => {
    const curve = curveOfPhase(
      assembled({
        series: [bare('l', 280, 500, 80)],
        anchors: [anchorOf('l', { s: datum(70) }), anchorOf('l', { h: datum(-285000) }, { rank: 2, source: 'other' })],
      }),
      'l',
    );
    expect(enthalpyAt(curve, TR)).toBeCloseTo(-285000, 6);
    expect(entropyAt(curve, TR)).toBeCloseTo(70, 9);
    expect([curve.enthalpyAnchor, curve.entropyAnchor]).toEqual([1, 0]);
  });

  it('share the error of one anchor: phases whose increments count from one H(Tr) differ by their tables alone', () => {
    const u = (uAnchor: number): number => {
      const result = assembled({
        series: [printed('cr', GRID, 50, 60), printed('l', GRID, 60, 90, 15000, 'cr')],
        anchors: [anchorOf('cr', { h: datum(-400000, uAnchor) }, { source: 'other' })],
      });
      expect(result.crossings.length).toBe(1);
      return result.crossings[0].uK;
    };
    expect(u(5000)).toBeCloseTo(u(0), 9);
    expect(u(0)).toBeGreaterThan(0);
  });

  it('are the increments from another phase where the table counts them so', () => {
    const curve = curveOfPhase(
      assembled({
        series: [printed('l', GRID, 70, 90, 12000, 'cr')],
        anchors: [anchorOf('cr', { h: datum(-400000) }), anchorOf('l', { h: datum(-1) })],
      }),
      'l',
    );
    expect(enthalpyAt(curve, TR)).toBeCloseTo(-400000 + 12000, 2);
    expect(curve.enthalpyAnchor).toBe(0);
  });

  it('are left alone where the table declares H and S themselves', () => {
    const temperatureK = GRID;
    const absolute = seriesOf({
      phase: 'g',
      temperatureK,
      cp: { values: temperatureK.map(() => 30), decimals: 4 },
      s: { values: temperatureK.map((t) => 190 + 30 * Math.log(t / TR)), decimals: 4 },
      h: { values: temperatureK.map((t) => -5000 + 30 * t), decimals: 2 },
      g: { values: temperatureK.map((t) => -5000 + 30 * t - t * (190 + 30 * Math.log(t / TR))), decimals: 2 },
    });
    const curve = curveOfPhase(assembled({ series: [absolute], anchors: [anchorOf('g', { h: datum(777) })] }), 'g');
    expect(curve.enthalpyLevelFrom).toBe('table');
    expect(Math.abs(enthalpyAt(curve, 600) - (-5000 + 18000))).toBeLessThan(0.01);
    expect(Math.abs(gibbsAt(curve, 600) - (13000 - 600 * (190 + 30 * Math.log(600 / TR))))).toBeLessThan(0.05);
  });

  it('reach across to a continued curve at the reference temperature, no farther than 150 K, with its growing u', () => {
    const near = curveOfPhase(
      assembled({
        series: [bare('l', 320, 500, 80, MEASURED)],
        anchors: [anchorOf('l', { h: datum(-285000), s: datum(70) }, MEASURED)],
      }),
      'l',
    );
    expect(enthalpyAt(near, TR)).toBeCloseTo(-285000, 6);
    const x = 320 - TR;
    expect(near.uEnthalpyLevelJPerMol).toBeCloseTo((0.001 * 80 * x * x) / 2, 6);
    const far = curveOfPhase(
      assembled({ series: [bare('l', 600, 900, 80)], anchors: [anchorOf('l', { h: datum(-285000), s: datum(70) })] }),
      'l',
    );
    expect(far.enthalpyAnchor).toBe(-1);
  });
});

/** A crystal with levels, and what its phases are carried through: II > I at 400 K, I > l at 600 K. */
function ladder(extra: Partial<CaseParts> = {}, uH = 30) {
  return assembled({
    series: [
      bare('cr-II', 250, 420, 50, MEASURED),
      bare('cr-I', 390, 620, 60, MEASURED),
      bare('l', 590, 900, 75, MEASURED),
    ],
    anchors: [anchorOf('cr-II', { h: datum(-300000, 500), s: datum(80, 0.3) }, MEASURED)],
    transitions: [
      transitionOf('cr-I', 'l', datum(600, 0.1), { h: datum(18000, uH) }, MEASURED),
      transitionOf('cr-II', 'cr-I', datum(400, 0.1), { s: datum(5, 0.02) }, MEASURED),
    ],
    ...extra,
  });
}

describe('levels carried through transitions', () => {
  const result = ladder();
  const [ii, i, l] = ['cr-II', 'cr-I', 'l'].map((phase) => curveOfPhase(result, phase));

  it('put dH and dS of each transition between the curves, one from the other by dH = T dS', () => {
    expect(enthalpyAt(i, 400) - enthalpyAt(ii, 400)).toBeCloseTo(400 * 5, 6);
    expect(entropyAt(i, 400) - entropyAt(ii, 400)).toBeCloseTo(5, 9);
    expect(enthalpyAt(l, 600) - enthalpyAt(i, 600)).toBeCloseTo(18000, 6);
    expect(entropyAt(l, 600) - entropyAt(i, 600)).toBeCloseTo(30, 9);
    expect([i.enthalpyThrough, l.enthalpyThrough]).toEqual([1, 0]);
    expect([i.entropyThrough, l.entropyThrough]).toEqual([1, 0]);
    expect([i.enthalpyLevelFrom, l.entropyLevelFrom]).toEqual(['transition', 'transition']);
  });

  it('so cross where it was stated, both ways along the ladder', () => {
    const at = result.crossings
      .filter((c) => c.stable)
      .map((c) => [c.from, c.to, Math.round(c.temperatureK * 1e6) / 1e6]);
    expect(at).toEqual([
      ['cr-II', 'cr-I', 400],
      ['cr-I', 'l', 600],
    ]);
    const downwards = ladder({ anchors: [anchorOf('l', { h: datum(0), s: datum(0) }, MEASURED, 600)] });
    expect(downwards.crossings.filter((c) => c.stable).map((c) => Math.round(c.temperatureK * 1e6) / 1e6)).toEqual([
      400, 600,
    ]);
    expect(enthalpyAt(curveOfPhase(downwards, 'cr-II'), 400)).toBeCloseTo(-18000 - 60 * 200 - 2000, 4);
  });

  it('owe their crossing to the stated temperature alone: what dH, the anchor and the tables below share cancels there', () => {
    const [first, second] = result.crossings.filter((c) => c.stable);
    // By construction dG is 0 at the stated temperature, whatever dS is; u(T) of the crossing is the temperature's own. Where
    // dS is stated and dH = T dS, it moves as well.
    expect(second.uK).toBeCloseTo(0.1, 4);
    expect(first.uK).toBeCloseTo(0.1, 4);
    const wide = ladder({}, 3000).crossings.filter((c) => c.stable);
    expect(wide[1].uK).toBeCloseTo(0.1, 4);
  });

  it('bring the errors of all that they came through: u(H) of the liquid from the anchor, both dH and both tables', () => {
    const { hh } = stateCovariance(l, 600);
    const own = stateCovariance({ ...ii, uEnthalpyLevelJPerMol: 0, uEntropyLevelJPerMolK: 0 }, 400).hh;
    const tables = hh - (500 ** 2 + 30 ** 2 + (400 * 0.02) ** 2 + (5 * 0.1) ** 2);
    expect(tables).toBeGreaterThan(own * 0.99);
    expect(tables).toBeLessThan(own + 60);
  });

  it('spread as they say: 500 draws of every datum, H and G of the liquid and its crossing', () => {
    const { normal } = seeded(9);
    const draws = 500;
    let sumH = 0;
    let sumG = 0;
    let sumT = 0;
    const t = 750;
    const other = bare('cr-I', 390, 620, 60, MEASURED);
    for (let k = 0; k < draws; k++) {
      const drawn = ladder({
        series: [bare('cr-II', 250, 420, 50, MEASURED), other, bare('l', 590, 900, 75, MEASURED)],
        anchors: [
          anchorOf('cr-II', { h: datum(-300000 + 500 * normal(), 500), s: datum(80 + 0.3 * normal(), 0.3) }, MEASURED),
        ],
        transitions: [
          transitionOf(
            'cr-I',
            'l',
            datum(600 + 0.1 * normal(), 0.1),
            { h: datum(18000 + 30 * normal(), 30) },
            MEASURED,
          ),
          transitionOf(
            'cr-II',
            'cr-I',
            datum(400 + 0.1 * normal(), 0.1),
            { s: datum(5 + 0.02 * normal(), 0.02) },
            MEASURED,
          ),
        ],
      });
      const liquid = curveOfPhase(drawn, 'l');
      sumH += (enthalpyAt(liquid, t) - enthalpyAt(l, t)) ** 2 / draws;
      sumG += (gibbsAt(liquid, t) - gibbsAt(l, t)) ** 2 / draws;
      const melting = drawn.crossings.find((c) => c.from === 'cr-I' && c.to === 'l');
      sumT += ((melting?.temperatureK ?? Number.NaN) - 600) ** 2 / draws;
    }
    const { hh, hs, ss } = stateCovariance(l, t);
    // The tables themselves are not drawn: their digits and interpolation widen u by a few joules per mole. An rms of 500
    // draws is uncertain by 3 %.
    expect(Math.sqrt(sumH / hh)).toBeGreaterThan(0.9);
    expect(Math.sqrt(sumH / hh)).toBeLessThan(1.1);
    expect(Math.sqrt(sumG / (hh - 2 * t * hs + t * t * ss))).toBeGreaterThan(0.9);
    expect(Math.sqrt(sumG / (hh - 2 * t * hs + t * t * ss))).toBeLessThan(1.1);
    expect(Math.sqrt(sumT) / 0.1).toBeGreaterThan(0.9);
    expect(Math.sqrt(sumT) / 0.1).toBeLessThan(1.1);
  });

  it('count from the first phase where nothing is anchored, and say so', () => {
    const free = ladder({ anchors: [] });
    expect(free.curves.map((c) => c.hasEnthalpyLevel && c.hasEntropyLevel)).toEqual([true, true, true]);
    expect(curveOfPhase(free, 'cr-II').enthalpyLevelFrom).toBe('none');
    expect(free.crossings.filter((c) => c.stable).length).toBe(2);
  });

  it('stay open where a continuous or a glass transition, or one without dH and dS, is all there is', () => {
    for (const order of ['continuous', 'glass'] as const) {
      const open = ladder({
        transitions: [
          transitionOf('cr-II', 'cr-I', datum(400), { h: datum(0), order }),
          transitionOf('cr-I', 'l', datum(600)),
        ],
      });
      expect(curveOfPhase(open, 'cr-I').hasEnthalpyLevel).toBe(false);
      expect(curveOfPhase(open, 'l').hasEntropyLevel).toBe(false);
      expect(open.crossings).toEqual([]);
    }
  });
});

describe('levels of a gas', () => {
  const identity = {
    criticalTemperatureK: 562.05,
    criticalPressurePa: 4.895e6,
    acentricFactor: 0.2103,
    polarA: 0,
    polarB: 0,
    class: 'molecular' as const,
  };
  const boil = (kind: 'real' | 'ideal', pressurePa: number, extra: Partial<CaseParts['substance']> = {}) =>
    assembled({
      series: [bare('l', 290, 370, 135), bare('g', 290, 600, 90)],
      anchors: [anchorOf('l', { h: datum(49000), s: datum(173) })],
      transitions: [transitionOf('l', 'g', datum(353.2), { h: datum(30700), gas: kind, pressurePa })],
      substance: { ...identity, ...extra },
    });

  it.each([
    ['real', 101325],
    ['real', 50000],
    ['ideal', 100000],
    ['ideal', 101325],
  ] as const)(
    "carried through boiling (%s, %d Pa) cross there at the transition's own pressure",
    (kind, pressurePa) => {
      const result = boil(kind, pressurePa);
      const c = result.crossings.find((x) => x.pressurePa === pressurePa && x.gas === kind);
      expect(c?.temperatureK).toBeCloseTo(353.2, 5);
      expect(c?.enthalpyJPerMol).toBeCloseTo(30700, 4);
      expect(c?.entropyJPerMolK).toBeCloseTo(30700 / 353.2, 6);
    },
  );

  it('are those of the ideal gas at 1 bar: S by R ln(p/p0) above the vapour of 101 325 Pa', () => {
    const atBar = boil('ideal', 100000);
    const atAtmosphere = boil('ideal', 101325);
    const s = (r: ReturnType<typeof boil>): number => entropyAt(curveOfPhase(r, 'g'), TR);
    // 0.1094 J/(mol K) (IUPAC Green Book, 3rd ed., 2.11.1: the change of the standard pressure).
    expect(s(atAtmosphere) - s(atBar)).toBeCloseTo(0.1094, 4);
  });

  it.each([
    ['evaluated', 0],
    ['measured', 200],
  ] as const)('carried to the gas (%s) rest on the pressure of the boiling point: S by R d(ln p)', (basis, uPa) => {
    const boiling = {
      ...transitionOf('l', 'g', datum(353.2), { h: datum(30700), gas: 'ideal' }, { basis }),
      pressure: { ...datum(100000), u: uPa },
    };
    const made = assembled({
      series: [bare('l', 290, 370, 135), bare('g', 290, 600, 90)],
      anchors: [anchorOf('l', { h: datum(49000), s: datum(173) })],
      transitions: [boiling],
      substance: identity,
    });
    const [error, ...more] = curveOfPhase(made, 'g').entropyLevel!.errors.filter(({ key }) => key.startsWith('p of'));
    expect(more).toEqual([]);
    expect(error).toMatchObject({ key: 'p of transition 0', by: 8.31446261815324, u: uPa / 100000 });
    const heights = [100000, 110000].map((pressurePa) => entropyAt(curveOfPhase(boil('ideal', pressurePa), 'g'), TR));
    expect(heights[1]! - heights[0]!).toBeCloseTo(error!.by * Math.log(1.1), 6);
  });

  it('count one mole of the vapour species', () => {
    const result = boil('ideal', 100000, { vapourSpecies: { formula: 'X2', formulaUnits: 2 } });
    const [l, g] = ['l', 'g'].map((phase) => curveOfPhase(result, phase));
    expect(enthalpyAt(g, 353.2) / 2 - enthalpyAt(l, 353.2)).toBeCloseTo(30700, 4);
    expect(result.crossings.find((c) => c.gas === 'ideal')?.temperatureK).toBeCloseTo(353.2, 5);
  });
});
