import type { Correction } from '../../schemas/corrections.js';
import type { Address } from '../../schemas/harmonised.js';
import { figure, plusMinus, sayPlace } from '../report/report.js';
import { count, table, wrap } from './text.js';
import type { Trace } from './trace.js';

const WIDTH = 80;
/** How many numbers are shown without `--all`. */
export const MOST_SHOWN = 20;

/** One trace for the terminal: the values, the numbers behind them by weight, and what lies elsewhere. */
export function traceLines(
  trace: Trace,
  all: boolean,
  correctionAt: (address: Address) => Correction | null,
): string[] {
  const { weights, shared, tried } = trace;
  const shown = all ? weights : weights.slice(0, MOST_SHOWN);
  const rows = [
    ['share', 'weight', '∂G/∂x', 'raw cell'],
    ...shown.map(({ of, weightJPerMol, share }) => [
      percent(share),
      short(weightJPerMol),
      figure(of.sensitivity.gibbs),
      `${sayPlace(of.address)} = ${of.printed}${corrected(correctionAt(of.address))}`,
    ]),
    ...shared.map(({ weightJPerMol, cells, first, relative }) => [
      percent(shareOf(weightJPerMol, trace)),
      short(weightJPerMol),
      '',
      `calibration, ${figure(100 * relative)} % of ${count(cells, 'cell')} of ${sayPlace({ ...first.address, line: 0 })}`,
    ]),
  ];
  return [
    ...valueLines(trace),
    '',
    ...wrap(
      `${weights.length} of ${count(tried, 'raw cell')} act on it. Share: of u(G)². Weight: |∂G/∂x| u(x) in J/mol. ∂G/∂x in SI: J/mol for each unit of x, so K where x is an entropy or a heat capacity.`,
      WIDTH,
    ),
    '',
    ...table(rows, [0, 1, 2]),
    '',
    ...restLines(trace, shown.length),
  ];
}

function valueLines(trace: Trace): string[] {
  const { curve, temperatureK } = trace;
  const { phase, family, measuredFromK, measuredToK } = curve;
  const zeros = [
    `H counts from ${family.enthalpyZero ?? 'a zero of its own'}`,
    `S from ${family.entropyZero ?? 'a zero of its own'}`,
  ];
  const beyond = temperatureK < measuredFromK || temperatureK > measuredToK;
  return [
    `${phase} at ${figure(temperatureK)} K, ${family.isobarPa === null ? 'standard state' : `${figure(family.isobarPa)} Pa`}`,
    ...table([
      ['  G', plusMinus(trace.gibbsEnergyJPerMol, trace.uGibbsEnergyJPerMol), 'J/mol'],
      ['  H', plusMinus(trace.enthalpyJPerMol, trace.uEnthalpyJPerMol), 'J/mol'],
      ['  S', plusMinus(trace.entropyJPerMolK, trace.uEntropyJPerMolK), 'J/(mol K)'],
    ]),
    `  ${zeros.join(', ')}.`,
    ...(beyond
      ? [`  Beyond the data, which run from ${figure(measuredFromK)} to ${figure(measuredToK)} K: continued.`]
      : []),
  ];
}

/** What is not shown, and what no cell accounts for. */
function restLines(trace: Trace, shown: number): string[] {
  const { weights, shared, uGibbsEnergyJPerMol } = trace;
  if (!(uGibbsEnergyJPerMol > 0)) return ['G has no uncertainty here, so there are no shares.'];
  const rest = weights.slice(shown);
  const hidden = rest.reduce((sum, { share }) => sum + (share ?? 0), 0);
  const ofCells = weights.reduce((sum, { share }) => sum + (share ?? 0), 0);
  const ofShared = shared.reduce((sum, { weightJPerMol }) => sum + shareOf(weightJPerMol, trace), 0);
  const between = 1 - ofCells - ofShared;
  const more =
    rest.length === 0
      ? []
      : [`The other ${count(rest.length, 'cell')} have ${percent(hidden)} together; --all shows them.`];
  if (between < -0.005) {
    const u = short(uGibbsEnergyJPerMol * Math.sqrt(ofCells + ofShared));
    return wrap([...more, `Taken one by one, the errors of the cells would make u(G) ${u} J/mol.`].join(' '), WIDTH);
  }
  return wrap(
    [...more, `${percent(Math.max(0, between))} is no cell’s own: the way between the rows, and beyond them.`].join(
      ' ',
    ),
    WIDTH,
  );
}

function shareOf(weightJPerMol: number, { uGibbsEnergyJPerMol }: Trace): number {
  return (weightJPerMol / uGibbsEnergyJPerMol) ** 2;
}

function percent(share: number | null): string {
  if (share === null) return '–';
  if (share > 0 && share < 0.00005) return '<0.01 %';
  return `${(100 * share).toFixed(share >= 0.0995 ? 1 : 2)} %`;
}

/** Three significant digits. */
function short(value: number): string {
  return figure(Number(value.toPrecision(3)));
}

function corrected(correction: Correction | null): string {
  return correction === null ? '' : `, corrected to ${correction.corrected ?? 'nothing'}`;
}
