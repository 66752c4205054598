/** Holds what a run says about a spoilt library against the slip that was planted, and against the clean library's run. */
import type { Slip } from './slip-maker.js';
import { materialLimit } from './slip-maker.js';
import type { SourceCell } from './source-cells.js';

/** What a run says, as far as the score needs it; field for field as published. */
export interface Seen {
  /** In the published order. */
  readonly findings: readonly {
    readonly finding: string;
    readonly evidenceHash: string;
    readonly substance: string;
    readonly rule: string;
    readonly severity: string;
    readonly cause: string | null;
  }[];
  readonly suspects: readonly {
    readonly finding: string;
    readonly place: number;
    readonly group: number;
    readonly source: string;
    readonly file: string;
    readonly line: number;
    readonly column: string;
  }[];
  readonly coverage: readonly {
    readonly substance: string;
    readonly rule: string;
    readonly place: string;
    readonly outcome: string;
    readonly smallestDetectable: number | null;
  }[];
}

export interface SlipScore {
  /** A fault or a doubt of the substance that the clean library does not have. */
  readonly found: boolean;
  /** Other substances with a fault or a doubt that the clean library does not have. */
  readonly elsewhere: readonly string[];
  /** The root finding has the planted cell as its first suspect … */
  readonly first: boolean;
  /** … or in the same group as the first suspect. */
  readonly firstGroup: boolean;
  /** Found, there only, and in the first group: what is asked for. */
  readonly good: boolean;
  /** Rule of the root finding, for reading the misses. */
  readonly rootRule: string | null;
  readonly firstSuspect: string | null;
}

/**
 * The root finding is the first new one, in the published order, that follows from no other and has suspects; faults go
 * before doubts, doubts before notes.
 */
export function scoreSlip(slip: Slip, clean: Seen, spoilt: Seen): SlipScore {
  const known = new Set(clean.findings.map(identity));
  const fresh = spoilt.findings.filter((finding) => finding.severity !== 'note' && !known.has(identity(finding)));
  const own = fresh.filter((finding) => finding.substance === slip.substance);
  const elsewhere = [...new Set(fresh.map((finding) => finding.substance))].filter((id) => id !== slip.substance);
  const found = own.length > 0;
  const roots = ['fault', 'doubt'].flatMap((severity) =>
    own.filter((finding) => finding.severity === severity && finding.cause === null),
  );
  const root = roots.find(({ finding }) => spoilt.suspects.some((suspect) => suspect.finding === finding));
  const suspects = spoilt.suspects
    .filter((suspect) => suspect.finding === root?.finding)
    .sort((a, b) => a.place - b.place);
  const hits = suspects.filter(
    ({ source, file, line, column }) =>
      source === slip.source && file === slip.file && line === slip.line && column === slip.column,
  );
  const firstGroup = hits.some((suspect) => suspect.group === suspects[0]!.group);
  const [leading] = suspects;
  return {
    found,
    elsewhere,
    first: hits.some((suspect) => suspect === leading),
    firstGroup,
    good: found && elsewhere.length === 0 && firstGroup,
    rootRule: (root ?? roots[0] ?? own[0])?.rule ?? null,
    firstSuspect: leading === undefined ? null : `${leading.file}:${leading.line} ${leading.column}`,
  };
}

/** A finding of the clean library counts as the same one only while the cells behind it are the same. */
function identity(finding: Seen['findings'][number]): string {
  return `${finding.finding} ${finding.evidenceHash} ${finding.severity}`;
}

/** Rules that test a quantity and speak in its own unit. */
const TESTED_BY: Readonly<Record<string, readonly string[]>> = {
  entropy: ['entropy-follows-heat-capacity', 'functions-close'],
  'gibbs-function': ['functions-close'],
  enthalpy: ['enthalpy-follows-heat-capacity'],
  'enthalpy-increment': ['enthalpy-follows-heat-capacity'],
  'heat-capacity': ['heat-capacity-smooth'],
  'enthalpy-of-formation': ['gibbs-continuous'],
  'transition-temperature': ['crossing-agrees'],
  'transition-enthalpy': ['transition-entropy-closes'],
};
/** Rules in the unit of an entropy that test an enthalpy too: an error in H shows as H/T. */
const TESTED_TIMES_T: Readonly<Record<string, readonly string[]>> = { 'enthalpy-increment': ['functions-close'] };

/** A slip is planted at this many times the smallest error that the clean library's run says it would reveal, or more. */
export const TIMES_DETECTABLE = 1.5;

/**
 * Least change of a cell, in its own unit: what a user would notice, and 1.5 times the printed smallest detectable error where
 * one is printed (of several rules the sharpest). Infinity where each rule that could test the cell is untestable there.
 */
export function leastFrom(clean: Seen): (cell: SourceCell) => number {
  return (cell) => {
    const testable = (rules: readonly string[]) =>
      clean.coverage.filter(
        (row) =>
          row.substance === cell.substance &&
          rules.includes(row.rule) &&
          row.outcome !== 'untestable' &&
          concerns(row.place, cell),
      );
    const own = testable(TESTED_BY[cell.quantity] ?? []);
    const timesT = testable(TESTED_TIMES_T[cell.quantity] ?? []);
    if (own.length + timesT.length === 0) return Number.POSITIVE_INFINITY;
    const printed = [
      ...own.flatMap((row) => row.smallestDetectable ?? []),
      ...timesT.flatMap((row) => (row.smallestDetectable ?? Number.NaN) * cell.temperatureK),
    ].filter((smallest) => !Number.isNaN(smallest));
    const si = printed.length === 0 ? 0 : Math.min(...printed);
    return Math.max(materialLimit(cell), (TIMES_DETECTABLE * si) / (cell.unit.startsWith('k') ? 1000 : 1));
  };
}

/** Coverage speaks of a phase or of a transition `from>to`; an anchor is tested through its phase's transitions. */
function concerns(place: string, cell: SourceCell): boolean {
  return place === cell.place || (cell.holds === 'anchors' && place.split('>').includes(cell.place));
}
