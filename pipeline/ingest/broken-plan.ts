/** What can still be told of a table whose entry cannot be used: which substances it would have touched. */
import type { Finding } from '../../schemas/finding.js';
import { READ_KINDS, type TableDescriptor } from '../../schemas/source.js';
import type { ColumnMeaning } from '../../schemas/table-meaning.js';
import { wordMeaning } from './column-meaning.js';
import { matchFiles } from './glob.js';
import { layoutOf } from './layout.js';
import { namesFromCsv } from './names.js';
import { isObject } from './not-yet-read.js';
import type { TablePlan, WordFrom } from './plan.js';
import type { TableSetting } from './table-plan.js';
import type { Kind } from './table-quantities.js';

/** A plan for each file that the entry may mean, none where it names no file. */
export function brokenPlans(setting: TableSetting, broken: Finding): TablePlan[] {
  const { raw, sourceId, index } = setting;
  if (typeof raw.file !== 'string') return [];
  const header = substanceHeader(raw);
  const columns: ColumnMeaning[] = header === null ? [] : [wordMeaning(header, 'substance')];
  const constant = typeof raw.substance === 'string' ? { constant: raw.substance } : null;
  const substance: WordFrom | null = header === null ? constant : { column: 0 };
  const files = matchFiles(raw.file, setting.fileNames);
  return (files.length > 0 ? files : [raw.file]).map((file) => ({
    meaning: {
      source: sourceId,
      file,
      table: typeof raw.id === 'string' ? raw.id : `#${index}`,
      holds: (READ_KINDS as readonly unknown[]).includes(raw.holds) ? (raw.holds as Kind) : 'thermal-functions',
      basis: 'measured',
      restsOn: [],
      rank: 1,
      temperatureScale: 'not-stated',
      standardPressurePa: 100000,
      referenceTemperatureK: 298.15,
      enthalpyZero: null,
      entropyZero: null,
      isobarPa: null,
      incrementsFromZeroK: false,
      columns,
    },
    file,
    layout: layoutOf(raw as Partial<TableDescriptor>, file),
    substance,
    words: {},
    numbers: {},
    where: [],
    names: namesOf(setting),
    phases: {},
    othersIgnored: true,
    namedElsewhere: [],
    broken,
  }));
}

function substanceHeader(raw: TableSetting['raw']): string | null {
  if (isObject(raw.substance)) return typeof raw.substance.column === 'string' ? raw.substance.column : null;
  if (!isObject(raw.columns) || typeof raw.substance === 'string') return null;
  const found = Object.entries(raw.columns).find(([, column]) => isObject(column) && column.is === 'substance');
  return found?.[0] ?? null;
}

function namesOf({ raw, textOf }: TableSetting): Readonly<Record<string, string>> {
  if (typeof raw.names === 'string') return namesFromCsv(textOf(raw.names) ?? '');
  const entries = isObject(raw.names) ? Object.entries(raw.names) : [];
  return Object.fromEntries(entries.filter((entry): entry is [string, string] => typeof entry[1] === 'string'));
}
