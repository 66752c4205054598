/** Holds what a run says about a spoilt substance against the slips that were planted, and against the clean library's run. */
import { expectedCodes } from './expected-codes.js';
import type { Seen, SeenFinding, SeenSuspect } from './seen.js';
import type { Slip } from './slip-maker.js';

export interface SlipScore {
  /** A fault or a doubt of the substance that the clean library does not have. */
  readonly caught: boolean;
  /** The root finding has a planted cell as its first suspect … */
  readonly first: boolean;
  /** … or in the same group as the first suspect. */
  readonly firstGroup: boolean;
  /** Suspects in that group; 0 where there is none. */
  readonly groupSize: number;
  /** The first suspect is a planted cell and its explanation says what was planted; null where nothing was meant. */
  readonly explained: boolean | null;
  /** New findings that follow from no other. */
  readonly roots: number;
  /** Cells that the first suspect's hypothesis touches. */
  readonly cells: number;
  readonly rootRule: string | null;
  /** First suspect with its explanation, for reading the misses. */
  readonly said: string;
}

/** Findings and suspects of runs, by substance and finding. */
export class Findings {
  readonly #findings = new Map<string, SeenFinding[]>();
  readonly #suspects = new Map<string, SeenSuspect[]>();

  constructor({ findings, suspects }: Pick<Seen, 'findings' | 'suspects'>) {
    for (const finding of findings) push(this.#findings, finding.substance, finding);
    for (const suspect of suspects) push(this.#suspects, suspect.finding, suspect);
    for (const own of this.#suspects.values()) own.sort((a, b) => a.place - b.place);
  }

  of(substance: string): readonly SeenFinding[] {
    return this.#findings.get(substance) ?? [];
  }

  suspectsOf({ finding }: SeenFinding): readonly SeenSuspect[] {
    return this.#suspects.get(finding) ?? [];
  }

  /** Faults and doubts that `clean` does not have; one of the same id counts as new when the cells behind it changed. */
  newSince(clean: Findings, substance: string): readonly SeenFinding[] {
    const known = new Set(clean.of(substance).map(identity));
    return this.of(substance).filter((finding) => finding.severity !== 'note' && !known.has(identity(finding)));
  }
}

/**
 * The roots are the new findings that follow from no other, faults before doubts. A slip planted alone is held against the
 * first root that has suspects; of several slips in one substance, each against every group of all roots.
 */
export function scoreSlip(slip: Slip, clean: Findings, spoilt: Findings, alone = true): SlipScore {
  const fresh = spoilt.newSince(clean, slip.substance);
  const causes = fresh.filter(({ cause }) => cause === null);
  const roots = ['fault', 'doubt'].flatMap((severity) => causes.filter((finding) => finding.severity === severity));
  const suspected = roots.filter((root) => spoilt.suspectsOf(root).length > 0);
  const asked = alone ? suspected.slice(0, 1) : suspected;
  const heard = asked.flatMap((root) => {
    const suspects = spoilt.suspectsOf(root);
    // Each group is an error of its own: the first one is what a slip alone has to be.
    const groups = [...new Set(suspects.map(({ group }) => group))].slice(0, alone ? 1 : undefined);
    return groups.map((group) =>
      hear(
        slip,
        suspects.filter((suspect) => suspect.group === group),
        root,
      ),
    );
  });
  const best = heard.find(({ first }) => first) ?? heard.find(({ firstGroup }) => firstGroup) ?? heard[0];
  const silent: Heard = {
    ...{ first: false, firstGroup: false, groupSize: 0, cells: 0 },
    explained: slip.meant === null ? null : false,
    said: fresh.length === 0 ? 'nothing' : 'no suspect',
    rootRule: (roots[0] ?? fresh[0])?.rule ?? null,
  };
  return {
    ...(best ?? silent),
    caught: fresh.length > 0,
    roots: roots.length,
  };
}

type Heard = Omit<SlipScore, 'caught' | 'roots'>;

function hear(slip: Slip, group: readonly SeenSuspect[], root: SeenFinding): Heard {
  const [leading] = group as [SeenSuspect];
  const first = isPlanted(leading, slip);
  const codes = slip.meant === null ? null : expectedCodes(slip.meant);
  return {
    first,
    firstGroup: group.some((suspect) => isPlanted(suspect, slip)),
    groupSize: group.length,
    explained: codes === null ? null : first && codes.includes(leading.explanation ?? ''),
    cells: leading.cells,
    rootRule: root.rule,
    said: `${leading.file}:${leading.line} ${leading.column} = ${leading.proposedPrinted} (${leading.explanation ?? 'unexplained'})`,
  };
}

function isPlanted(suspect: SeenSuspect, slip: Slip): boolean {
  return slip.cells.some(({ source, file, line, column, cell }) => {
    // Of a row left out there is no cell to name: saying so is enough.
    if (column === '') return expectedCodes(slip.meant!).includes(suspect.explanation ?? '');
    // A word of a row: the row is what is named.
    const named = column === suspect.column || cell === null;
    return named && source === suspect.source && file === suspect.file && line === suspect.line;
  });
}

function identity(finding: SeenFinding): string {
  return `${finding.finding} ${finding.evidenceHash} ${finding.severity}`;
}

function push<T>(map: Map<string, T[]>, key: string, value: T): void {
  const own = map.get(key);
  if (own === undefined) map.set(key, [value]);
  else own.push(value);
}
