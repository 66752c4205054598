/** The rates that are asked for, computed from scored slips, and the tables that a bench prints. */
import type { Scored } from './campaign.js';
import type { SlipScore } from './slip-score.js';

export interface Rate {
  readonly what: string;
  /** Shares in [0, 1]; of a group size the size. */
  readonly reached: number;
  readonly asked: number;
  readonly of: number;
  readonly holds: boolean;
}

export interface Cleanness {
  readonly substances: number;
  /** With a fault or a doubt. */
  readonly accused: readonly string[];
  /** With notes only. */
  readonly noted: number;
}

/** Designs whose stated uncertainties are hundreds to a thousand times what printed digits leave open; in the others digits speak. */
const WIDE_DESIGNS = ['coarse', 'measured', 'vapour-pressures', 'chain'];

export function rates(one: readonly Scored[], two: readonly Scored[], clean: Cleanness): Rate[] {
  const testable = one.filter((scored) => scored.testable);
  const family = (name: string) => testable.filter(({ slip }) => slip.family === name);
  const [table, heat, data, many] = ['table', 'heat-capacity', 'datum', 'many'].map(family) as Scored[][];
  const single = data!.filter(({ slip, score }) => slip.sharp || score.groupSize <= 1);
  const meant = testable.filter(({ score }) => score.explained !== null);
  const wide = meant.filter(({ design }) => WIDE_DESIGNS.includes(design));
  const digits = meant.filter(({ design }) => !WIDE_DESIGNS.includes(design));
  const groups = data!.filter(({ score }) => score.groupSize > 0).map(({ score }) => score.groupSize);
  const both = pairs(two);
  return [
    share('S, H, -[G-H]/T cells of five units or more: caught', table!, (s) => s.caught, 0.99),
    share('S, H, -[G-H]/T cells: first', table!, (s) => s.first, 0.98),
    share('interior Cp cells of 1 % or more: caught', heat!, (s) => s.caught, 0.97),
    share('interior Cp cells: first', heat!, (s) => s.first, 0.95),
    share('anchors and transitions: caught', data!, (s) => s.caught, 0.97),
    share('anchors and transitions: in the first group', data!, (s) => s.firstGroup, 0.98),
    share(
      'anchors and transitions: first, where alone in its group, or of unit, sign or exchange',
      single,
      (s) => s.first,
      0.97,
    ),
    {
      ...{ what: 'anchors and transitions: median group size', reached: median(groups), asked: 2, of: groups.length },
      holds: median(groups) <= 2,
    },
    share('right explanation first, at printed-digit u', digits, (s) => s.explained === true, 0.9),
    share('right explanation first, at u a thousand times larger', wide, (s) => s.explained === true, 0.75),
    share('many cells at once: caught', many!, (s) => s.caught, 0.97),
    share('many cells at once: first', many!, (s) => s.first, 0.97),
    share('two slips in one substance: each caught', two, (s) => s.caught, 0.97),
    ratio(
      'two slips in one substance: both named first',
      both.filter(([a, b]) => a!.score.first && b!.score.first).length,
      both.length,
      0.95,
    ),
    {
      ...ratio('clean substances with a fault or a doubt', clean.accused.length, clean.substances, 0.02),
      holds: clean.accused.length <= 0.02 * clean.substances,
    },
    {
      ...ratio('clean substances with notes only', clean.noted, clean.substances, 1),
      holds: true,
    },
  ];
}

export function rateTable(list: readonly Rate[]): string {
  const lines = ['what | reached | asked | of', '--- | --: | --: | --:'];
  for (const { what, reached, asked, of, holds } of list) {
    const isSize = what.includes('size');
    const show = (value: number) => (isSize ? String(value) : `${(100 * value).toFixed(1)} %`);
    lines.push(`${what} | ${show(reached)}${holds ? '' : ' **short**'} | ${show(asked)} | ${of}`);
  }
  return lines.join('\n');
}

const HEADER = [
  'design | where | kind | planted | untestable | caught | first group | first | explained | group | one root | caught of all',
  '--- | --- | --- | --: | --: | --: | --: | --: | --: | --: | --: | --:',
];

/** Rows by whatever `key` gives, sorted; counts of caught and on are of the testable. */
export function slipTable(list: readonly Scored[], key: (scored: Scored) => string): string {
  const groups = new Map<string, Scored[]>();
  for (const scored of list) groups.set(key(scored), [...(groups.get(key(scored)) ?? []), scored]);
  const rows = [...groups].sort(([a], [b]) => (a < b ? -1 : 1)).map(([name, own]) => `${name} | ${counts(own)}`);
  return [...HEADER, ...rows].join('\n');
}

export const byKind = ({ slip }: Scored): string => `all | ${slip.family} | ${slip.kind}`;
export const byFamilyAndDesign = ({ slip, design }: Scored): string => `${design} | ${slip.family} | all`;
export const byKindAndDesign = ({ slip, design }: Scored): string => `${design} | ${slip.family} | ${slip.kind}`;

function counts(list: readonly Scored[]): string {
  const testable = list.filter((scored) => scored.testable);
  const percent = (keep: (score: SlipScore) => boolean, of: readonly Scored[] = testable) =>
    of.length === 0 ? '' : `${((100 * of.filter(({ score }) => keep(score)).length) / of.length).toFixed(0)} %`;
  const meant = testable.filter(({ score }) => score.explained !== null);
  const sizes = testable.filter(({ score }) => score.groupSize > 0).map(({ score }) => score.groupSize);
  const untestable = list.length - testable.length;
  return [
    list.length,
    `${((100 * untestable) / list.length).toFixed(0)} %`,
    percent((s) => s.caught),
    percent((s) => s.firstGroup),
    percent((s) => s.first),
    percent((s) => s.explained === true, meant),
    sizes.length === 0 ? '' : median(sizes),
    percent((s) => s.roots === 1),
    percent((s) => s.caught, list),
  ].join(' | ');
}

/** A line for each testable slip that was not caught, not named first, or not explained. */
export function misses(list: readonly Scored[]): string[] {
  return list.flatMap(({ seed, library, slip, testable, score }) => {
    if (!testable || (score.caught && score.first && score.explained !== false)) return [];
    const why = !score.caught ? 'MISSED' : !score.firstGroup ? 'OTHER' : !score.first ? 'GROUP' : 'UNEXPLAINED';
    const [cell] = slip.cells;
    const where = `${cell!.file}:${cell!.line} ${cell!.column} ${cell!.clean} → ${cell!.printed}`;
    const size = slip.cells.length > 1 ? ` and ${slip.cells.length - 1} more` : '';
    return [
      `${why} ${slip.family}/${slip.kind} [seed ${seed} in ${library}, ${slip.substance} ${slip.place}] ${where}${size}; said by ${score.rootRule}: ${score.said}, ${score.roots} roots, group ${score.groupSize}`,
    ];
  });
}

/** The two slips of each spoilt substance. */
function pairs(two: readonly Scored[]): Scored[][] {
  const gathered = new Map<string, Scored[]>();
  for (const scored of two) {
    const key = `${scored.seed} ${scored.library} ${scored.slip.substance}`;
    gathered.set(key, [...(gathered.get(key) ?? []), scored]);
  }
  return [...gathered.values()].filter((own) => own.length === 2);
}

function share(what: string, list: readonly Scored[], keep: (score: SlipScore) => boolean, asked: number): Rate {
  return ratio(what, list.filter(({ score }) => keep(score)).length, list.length, asked);
}

function ratio(what: string, count: number, of: number, asked: number): Rate {
  const reached = of === 0 ? Number.NaN : count / of;
  return { what, reached, asked, of, holds: of === 0 || reached >= asked };
}

function median(list: readonly number[]): number {
  const sorted = [...list].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  if (sorted.length === 0) return Number.NaN;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}
