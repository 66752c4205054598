import type { CheckedCase } from '../../schemas/checked.js';
import type { Finding } from '../../schemas/finding.js';
import type { SuspectGroup } from './rank-data.js';
import type { ConditionDatum } from './system/system.js';

const RANK: Readonly<Record<string, number>> = {
  'row-readable': 0,
  'rows-distinct': 1,
  'value-possible': 1,
  'entropy-follows-heat-capacity': 2,
  'enthalpy-follows-heat-capacity': 2,
  'functions-close': 2,
  'heat-capacity-smooth': 2,
  'entropy-rises': 6,
  'slope-jumps-only-at-transitions': 3,
  'gibbs-continuous': 4,
  'transition-entropy-closes': 4,
  'crossing-agrees': 5,
  'heating-raises-entropy': 5,
  'stated-transition-jumps': 6,
  'lowest-curve-is-the-stated-phase': 7,
  'adjustment-closes': 8,
};

export interface RootedGroup {
  readonly finding: Finding;
  readonly group: SuspectGroup;
  /** 1 for the first error of its finding. */
  readonly number: number;
}

/**
 * One cause, one finding: each group of suspects belongs to the finding that its first datum shows in most directly; the
 * substance's other transition findings follow from it. A cell named inside a table is the cause of what its table shows.
 */
export function withCauses(
  checked: CheckedCase,
  groups: readonly SuspectGroup[],
): { findings: readonly Finding[]; groups: readonly RootedGroup[] } {
  const findings = [...checked.findings];
  const rooted: RootedGroup[] = [];
  const causeOf = new Map<string, string>();
  const open = (f: Finding): boolean => f.severity !== 'note' && RANK[f.rule] >= 4;

  // A cell or a column that the row checks name explains what the same table shows beside it.
  for (const cell of findings) {
    if (!namesCells(cell) || cell.cause !== null) continue;
    for (const f of findings) {
      if (f === cell || namesCells(f) || f.cause !== null || causeOf.has(f.id)) continue;
      const samePlace = f.fromPhase === cell.fromPhase && f.address?.file === cell.address?.file;
      const sameLine = f.evidence.some((e) => e.file === cell.address?.file && e.line === cell.address?.line);
      const table = f.rule === 'entropy-rises' || f.rule === 'value-possible' || f.detail.code === 'anomaly';
      if (samePlace && (sameLine || table) && RANK[f.rule] !== 0) causeOf.set(f.id, cell.id);
    }
  }

  const numbers = new Map<string, number>();
  for (const group of groups) {
    const first = group.members[0];
    const wanted = candidates(
      findings.filter((f) => open(f) && canBring(group, f, checked)),
      first.of,
      group.phases,
    );
    const root = wanted.find((f) => !rooted.some((r) => r.finding === f)) ?? wanted[0] ?? rooted[0]?.finding;
    if (root === undefined) continue;
    const number = (numbers.get(root.id) ?? 0) + 1;
    numbers.set(root.id, number);
    rooted.push({ finding: root, group, number });
  }
  // What is left over follows from the first error that can bring it about, else from one that touches its phases.
  for (const f of findings) {
    if (!open(f) || rooted.some((r) => r.finding === f) || causeOf.has(f.id)) continue;
    const near =
      rooted.find((r) => isItsOwn(r, f)) ??
      rooted.find((r) => canBring(r.group, f, checked) && explains(r, f)) ??
      rooted.find((r) => canBring(r.group, f, checked) && touches(r, f)) ??
      rooted.find((r) => canBring(r.group, f, checked));
    if (near !== undefined) causeOf.set(f.id, near.finding.id);
  }
  // A curve made without a column that is named shows what it lacks.
  for (const column of findings) {
    if (column.detail.code !== 'column' || column.cause !== null) continue;
    for (const f of findings) {
      const shows =
        f.rule === 'adjustment-closes' && (f.fromPhase === column.fromPhase || f.toPhase === column.fromPhase);
      if (shows && !causeOf.has(f.id)) causeOf.set(f.id, column.id);
    }
  }
  if (rooted.length === 0) {
    // Nothing ranked: the same transition's findings still follow from the most direct of them.
    const transitions = findings.filter(open).sort((a, b) => RANK[a.rule] - RANK[b.rule]);
    for (const f of transitions.slice(1)) if (!causeOf.has(f.id)) causeOf.set(f.id, transitions[0].id);
  }
  return {
    findings: findings.map((f) => (causeOf.has(f.id) ? { ...f, cause: causeOf.get(f.id) ?? null } : f)),
    groups: rooted,
  };
}

/** Whether the error shows where the finding was made: in that transition's conditions, in its own number, or in its phases. */
function canBring(group: SuspectGroup, f: Finding, checked: CheckedCase): boolean {
  if (f.detail.code === 'adjustment') return f.detail.place === group.members[0].of.place;
  // Curves show only what they rest on.
  if (f.rule === 'lowest-curve-is-the-stated-phase' || f.toPhase === null)
    return group.reaches.size > 0 && touchesPhase(group.phases, f);
  const { transitions } = checked.assembled.examined.harmonised;
  return transitions.some((t, index) => t.from === f.fromPhase && t.to === f.toPhase && group.reaches.has(index));
}

function namesCells({ detail }: Finding): boolean {
  return detail.code === 'cell' || detail.code === 'column';
}

function candidates(findings: readonly Finding[], datum: ConditionDatum, phases: readonly string[]): Finding[] {
  const { kind } = datum;
  const wanted =
    kind === 'enthalpy' || kind === 'entropy'
      ? ['heating-raises-entropy', 'transition-entropy-closes', 'gibbs-continuous', 'crossing-agrees']
      : ['gibbs-continuous', 'crossing-agrees', 'transition-entropy-closes'];
  const score = (f: Finding): number => {
    const at = wanted.indexOf(f.rule);
    return (at < 0 ? wanted.length : at) + (isItsTransition(datum, f) ? 0 : touchesPhase(phases, f) ? 10 : 20);
  };
  return findings.filter((f) => RANK[f.rule] >= 4).sort((a, b) => score(a) - score(b));
}

const OF_STATED_SIZE: ReadonlySet<string> = new Set([
  'transition-entropy-closes',
  'heating-raises-entropy',
  'stated-transition-jumps',
]);

/** A stated dH or dS shows in its own transition's closure, a stated temperature in all that its transition is asked, an anchor in all that its phase is. */
function explains(rooted: RootedGroup, f: Finding): boolean {
  const datum = rooted.group.members[0].of;
  const { kind } = datum;
  const same = isItsTransition(datum, f);
  if (kind === 'enthalpy' || kind === 'entropy') return same && OF_STATED_SIZE.has(f.rule);
  if (kind === 'temperature' || kind === 'transition-pressure')
    return same || (f.rule === 'lowest-curve-is-the-stated-phase' && touches(rooted, f));
  return touches(rooted, f);
}

/** What the adjustment says of the very number that the group begins with. */
function isItsOwn({ group }: RootedGroup, f: Finding): boolean {
  return f.detail.code === 'adjustment' && f.detail.place === group.members[0].of.place;
}

function touches(rooted: RootedGroup, f: Finding): boolean {
  return touchesPhase(rooted.group.phases, f);
}

function touchesPhase(phases: readonly string[], f: Finding): boolean {
  return phases.includes(f.fromPhase ?? '') || phases.includes(f.toPhase ?? '');
}

function isItsTransition({ transition, phases }: ConditionDatum, f: Finding): boolean {
  return transition >= 0 && phases[0] === f.fromPhase && phases[1] === f.toPhase;
}
