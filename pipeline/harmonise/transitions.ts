/** Stated transitions in SI, their temperatures on ITS-90. */
import type { Finding } from '../../schemas/finding.js';
import type { Datum, StatedTransition } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { RawRow } from '../../schemas/raw.js';
import { datumOf } from './datum.js';
import { datumOnIts90, publishedRange } from './datum-on-its90.js';
import { isGas } from './gas-pressure.js';
import { type ReadingNote, readingFinding } from './reading-finding.js';
import type { UnitBook } from './unit-book.js';

const ORDERS = ['first', 'continuous', 'glass'] as const;

/** Null where phases or a temperature are missing. What a row leaves open is said in `findings`. */
export function harmoniseTransition(
  row: RawRow,
  substance: string,
  book: UnitBook,
  policy: Policy,
  findings: Finding[],
): StatedTransition | null {
  const { table, words } = row;
  const from = words['from-phase'];
  const to = words['to-phase'];
  if (from === undefined || to === undefined) return null;
  const say = (note: Pick<ReadingNote, 'read' | 'wanted' | 'remedy' | 'column'> & Partial<ReadingNote>): void => {
    const place = { substance, table, line: row.line, fromPhase: from, toPhase: to };
    findings.push(readingFinding({ problem: 'required-missing', ...place, ...note }));
  };

  const printed = datumOf(row, 'transition-temperature', book, policy);
  if (printed === null) {
    if (row.cells['transition-temperature'] === undefined) {
      say({
        read: `The temperature of ${from} > ${to}`,
        wanted: 'a cell that `is` "transition-temperature"',
        remedy: 'Give it by a correction, or keep the row out with `where`.',
        column: headerOf(row, 'transition-temperature'),
      });
    }
    return null;
  }

  const order = ORDERS.find((name) => name === (words.order ?? 'first'));
  if (order === undefined) {
    say({
      read: `The order of ${from} > ${to} (it says ${words.order})`,
      wanted: ORDERS.join(', '),
      remedy: 'Write one of these words; the transition is taken for first order until then.',
      column: headerOf(row, 'order'),
    });
  }
  const withGas = isGas(from) || isGas(to);
  const gas = words.gas === 'real' || words.gas === 'ideal' ? words.gas : null;
  if (withGas && gas === null) {
    say({
      read: `What the gas of ${from} > ${to} is${words.gas === undefined ? '' : ` (it says ${words.gas})`}`,
      wanted: '"real" (a measured boiling or sublimation point) or "ideal" (fugacity equals the pressure)',
      remedy: 'Add a column or a constant that `is` "gas"; the transition is taken for a real one until then.',
      column: headerOf(row, 'gas'),
    });
  }
  const pressure = datumOf(row, 'pressure', book, policy);
  return {
    table,
    from,
    to,
    printedFrom: row.printedPhases?.from ?? null,
    printedTo: row.printedPhases?.to ?? null,
    order: order ?? 'first',
    gas: withGas ? (gas ?? 'real') : null,
    pressurePa: pressure?.value ?? table.isobarPa ?? table.standardPressurePa,
    pressure: pressure === null || pressure.address.line === 0 ? null : nominal(pressure),
    temperature: onIts90(row, printed, say),
    enthalpy: datumOf(row, 'transition-enthalpy', book, policy),
    entropy: datumOf(row, 'transition-entropy', book, policy),
  };
}

/** 1 or 101325: the digits of a nominal pressure bound nothing, and no policy knows better. What is stated of it stays. */
function nominal(pressure: Datum): Datum {
  const stated = pressure.origin === 'stated' || pressure.origin === 'source default';
  const u = stated ? Math.sqrt(Math.max(0, pressure.u ** 2 - pressure.uRounding ** 2)) : 0;
  return { ...pressure, u, uRounding: 0, halfUnit: 0, origin: stated ? pressure.origin : 'printed digits' };
}

function onIts90(
  row: RawRow,
  printed: Datum,
  say: (note: Pick<ReadingNote, 'read' | 'wanted' | 'remedy' | 'column' | 'severity'>) => void,
): Datum {
  const { temperatureScale } = row.table;
  const { datum, doubtK } = datumOnIts90(printed, temperatureScale);
  if (doubtK === null) return datum;
  say({
    read: `A published difference between ${temperatureScale} and ITS-90 at ${printed.value} K`,
    wanted: publishedRange(temperatureScale),
    remedy: `The temperature stays as printed; what it may be off by, ${doubtK.toPrecision(2)} K, is in its uncertainty.`,
    column: printed.address.column,
    severity: 'note',
  });
  return datum;
}

function headerOf(row: RawRow, is: string): string {
  return row.table.columns.find((column) => column.is === is)?.header ?? '';
}
