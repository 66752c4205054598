/** Reads `substances.csv`. */
import papaparse from 'papaparse/papaparse.js';
import type { Finding } from '../../schemas/finding.js';
import { type Substance, type SubstanceRow, substanceRowSchema } from '../../schemas/substances.js';
import { readFormula } from './formula.js';
import { nearestWords } from './nearest.js';
import { type ReadingNote, readingFinding } from './reading.js';
import { decodeUtf8 } from './utf8.js';

export interface SubstancesResult {
  readonly substances: Substance[];
  /** A row whose id can be read stays in the list with its fault, so that the substance is withheld and not forgotten. */
  readonly findings: readonly Finding[];
}

export const SUBSTANCES_FILE = 'substances.csv';
const KEYS = Object.keys(substanceRowSchema.shape);

/** `bytes`: UTF-8. Comma, semicolon or tab, told by the header. */
export function readSubstances(bytes: Uint8Array): SubstancesResult {
  const text = decodeUtf8(bytes).replace(/^\uFEFF/, '');
  const substances: Substance[] = [];
  const findings: Finding[] = [];
  const report = (note: Omit<ReadingNote, 'address'>, line: number, column: string): void => {
    findings.push(readingFinding({ ...note, address: { source: '', file: SUBSTANCES_FILE, line, column } }));
  };
  const firstLine = text.split(/\r\n|\n|\r/, 1)[0]!;
  const delimiter = [',', ';', '\t'].reduce((a, b) => (firstLine.split(b).length > firstLine.split(a).length ? b : a));
  const { data } = papaparse.parse(text, { delimiter });
  const headers = (data[0] ?? []).map((header) => header.trim());
  if (!headers.includes('substance')) {
    report(
      {
        problem: 'column-missing',
        read: firstLine,
        wanted: `a column "substance" (columns: ${KEYS.join(', ')})`,
        remedy: 'give substances.csv its header line',
      },
      1,
      'substance',
    );
    return { substances, findings };
  }
  for (const header of headers)
    if (header !== '' && !KEYS.includes(header))
      report(
        {
          problem: 'column-unknown',
          severity: 'doubt',
          read: header,
          wanted: `one of ${KEYS.join(', ')}${nearestWords(header, KEYS)}`,
          remedy: 'correct the header or take the column out',
        },
        1,
        header,
      );

  const lineOfId = new Map<string, number>();
  let line = 1;
  for (const [index, cells] of data.entries()) {
    const here = line;
    line += 1 + cells.reduce((sum, cell) => sum + cell.split(/\r\n|\n|\r/).length - 1, 0);
    if (index === 0 || cells.every((cell) => cell.trim() === '')) continue;
    const raw: Record<string, string> = {};
    for (const [k, header] of headers.entries()) if (cells[k] !== undefined) raw[header] = cells[k];
    const id = (raw.substance ?? '').trim();
    if (cells.length > headers.length && cells.slice(headers.length).some((cell) => cell.trim() !== ''))
      report(
        {
          problem: 'row-too-long',
          substance: validId(id) ? id : '',
          read: cells.join(delimiter),
          wanted: `${headers.length} cells, as in the header`,
          remedy: 'put text with a comma in it into double quotes',
        },
        here,
        '',
      );
    let parsed = substanceRowSchema.safeParse(raw);
    if (!parsed.success) {
      for (const issue of parsed.error.issues) {
        const column = String(issue.path[0] ?? '');
        const number = issue.message.startsWith('a number');
        report(
          {
            problem: number ? 'cell-not-a-number' : 'substance-unknown',
            substance: validId(id) ? id : '',
            subject: id,
            read: raw[column] ?? '',
            wanted: issue.code === 'custom' ? issue.message : 'text',
            remedy: `correct ${column} in substances.csv`,
          },
          here,
          column,
        );
        delete raw[column];
      }
      if (!validId(id)) continue;
      parsed = substanceRowSchema.safeParse(raw);
      if (!parsed.success) continue;
    }
    const earlier = lineOfId.get(id);
    if (earlier !== undefined) {
      report(
        {
          problem: 'substance-twice',
          substance: id,
          read: id,
          wanted: `each id once; it stands in line ${earlier} too`,
          remedy: 'take one of the two rows out',
        },
        here,
        'substance',
      );
      continue;
    }
    lineOfId.set(id, here);
    substances.push(toSubstance(parsed.data, (note, column) => report({ ...note, substance: id }, here, column)));
  }
  return { substances, findings };
}

const validId = (id: string): boolean => /^[a-z0-9-]+$/.test(id);

function toSubstance(
  row: SubstanceRow,
  report: (note: Omit<ReadingNote, 'address'>, column: string) => void,
): Substance {
  const reading = row.formula === '' ? null : readFormula(row.formula);
  const formula = typeof reading === 'string' ? null : reading;
  if (typeof reading === 'string')
    report(
      {
        problem: 'molar-mass-unknown',
        severity: row.molar_mass === null ? 'fault' : 'doubt',
        read: row.formula,
        wanted: `a formula of elements and numbers; found ${reading}`,
        remedy: 'correct the formula, or leave it empty and give molar_mass',
      },
      'formula',
    );
  else if (reading === null && row.molar_mass === null)
    report(
      {
        problem: 'molar-mass-unknown',
        read: '',
        wanted: 'a formula or a molar_mass [g/mol]',
        remedy: 'give one of the two in substances.csv',
      },
      'molar_mass',
    );
  return {
    id: row.substance,
    name: row.name === '' ? row.substance : row.name,
    formula: row.formula,
    molarMassGPerMol: row.molar_mass ?? formula?.molarMassGPerMol ?? 0,
    atomsPerFormula: formula?.atoms ?? null,
    criticalTemperatureK: row.critical_temperature,
    criticalPressurePa: row.critical_pressure,
    acentricFactor: row.acentric_factor,
    polarA: row.polar_a,
    polarB: row.polar_b,
    class: row.class === '' ? null : (row.class as Substance['class']),
    vapourSpecies: vapourSpecies(row, formula?.molarMassGPerMol ?? row.molar_mass, report),
    residualEntropyJPerMolK: row.residual_entropy ?? 0,
  };
}

/** `S8` over S is 8 formula units a molecule, told by the two molar masses unless a number follows. */
function vapourSpecies(
  row: SubstanceRow,
  molarMassGPerMol: number | null,
  report: (note: Omit<ReadingNote, 'address'>, column: string) => void,
): Substance['vapourSpecies'] {
  if (row.vapour_species === '') return null;
  const [formula, stated] = row.vapour_species.split(/[\s:]+/);
  const reading = readFormula(formula!);
  const units =
    stated !== undefined
      ? Number(stated)
      : typeof reading === 'string' || !molarMassGPerMol
        ? Number.NaN
        : reading.molarMassGPerMol / molarMassGPerMol;
  if (units > 0 && Number.isFinite(units))
    return { formula: formula!, formulaUnits: Math.abs(units - Math.round(units)) < 1e-6 ? Math.round(units) : units };
  report(
    {
      problem: 'cell-not-a-number',
      read: row.vapour_species,
      wanted: 'a species, and the formula units in one molecule of it: S8 8',
      remedy: 'correct vapour_species in substances.csv',
    },
    'vapour_species',
  );
  return null;
}
