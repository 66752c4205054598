import type { Finding, Outcome, Severity } from '../../schemas/finding.js';
import { makeFinding } from '../../schemas/make-finding.js';
import type { Policy } from '../../schemas/policy.js';
import { REFERENCE_TEMPERATURE_K } from '../core/constants.js';
import { chiSquareTail } from '../core/numeric/chi-square.js';
import { sidakThreshold, upperTail } from '../core/numeric/normal.js';
import { type DatumTest, FreeData, type Whitened, whitened } from '../core/physics/adjustment.js';
import { datumKey } from '../core/physics/datum-keys.js';
import { noticeablePressurePa } from './noticeable-pressure.js';
import type { RankedDatum, SuspectGroup } from './rank-data.js';
import { inPressure, isPressure } from './system/stated-data.js';
import type { ConditionDatum, ConditionSystem } from './system/system.js';
import { wouldHelp } from './would-help.js';

/** What the adjustment of a substance says before anything is set free. */
export interface Adjusted {
  readonly system: ConditionSystem;
  readonly whitened: Whitened;
  readonly tests: readonly (DatumTest | null)[];
  /** Two-sided critical values of w, alpha shared over the substance's tests. */
  readonly critical: { readonly fault: number; readonly doubt: number };
  /** The global test, or a normalised residual, is beyond what a doubt allows. */
  readonly open: boolean;
}

/** The global test and the normalised residual of each stated number (Baarda 1968: see `core/physics/adjustment.ts`). */
export function adjusted(system: ConditionSystem, tests: number, policy: Policy): Adjusted {
  const white = whitened(system.y, system.q, system.m);
  const free = new FreeData(white);
  const results = system.data.map((d) => free.test(system.y, d.direction, d.u));
  const critical = {
    fault: sidakThreshold(policy.alphaFault, tests),
    doubt: sidakThreshold(policy.alphaDoubt, tests),
  };
  // A nominal pressure is no suspect before another number is one.
  const stands = (t: DatumTest | null, i: number): boolean =>
    t !== null && Math.abs(t.w) > critical.doubt && system.data[i].kind !== 'transition-pressure';
  const open = failsGlobally(white, critical.doubt) || results.some(stands);
  return { system, whitened: white, tests: results, critical, open };
}

/** One outcome a stated number, with its smallest detectable error; those that nothing else speaks of, with what would. */
export function adjustmentOutcomes({ system, tests, whitened: white, critical, open }: Adjusted): Outcome[] {
  const substance = system.substance.substance.id;
  const rule = 'adjustment-closes' as const;
  const outcomes: Outcome[] = [];
  if (white.freedom > 0) {
    outcomes.push({
      substance,
      rule,
      place: '',
      outcome: failsGlobally(white, critical.doubt) ? 'disagrees' : 'agrees',
      evidence: system.conditions.every((c) => c.within) ? 'arithmetic' : 'independent',
      missing: null,
      smallestDetectable: null,
    });
  }
  system.data.forEach((d, i) => {
    const test = tests[i];
    if (test === null) return;
    outcomes.push({
      substance,
      rule,
      place: d.place,
      outcome: open && Math.abs(test.w) > critical.doubt ? 'disagrees' : 'agrees',
      evidence: d.within ? 'arithmetic' : 'independent',
      missing: null,
      smallestDetectable: isPressure(d) ? inPressure(d.datum.value, test.smallestDetectable) : test.smallestDetectable,
    });
  });
  for (const d of system.unseen) {
    outcomes.push({
      substance,
      rule,
      place: d.place,
      outcome: 'untestable',
      evidence: null,
      missing: wouldHelp(d, system),
      smallestDetectable: null,
    });
  }
  return outcomes;
}

/** A finding for each error that the adjustment points to, and one where only the whole does not close. */
export function adjustmentFindings(
  { system, whitened: white, tests, critical }: Adjusted,
  groups: readonly SuspectGroup[],
  policy: Policy,
): Finding[] {
  const substance = system.substance.substance.id;
  const common = { rule: 'adjustment-closes', substance, unit: null } as const;
  const findings: Finding[] = [];
  for (const group of groups) {
    const [first] = group.members;
    const { of } = first;
    const i = system.data.indexOf(of);
    const w = first.whole === null && i >= 0 ? (tests[i]?.w ?? first.w) : first.w;
    findings.push(
      makeFinding({
        ...common,
        severity: severityOf(first, system, critical, policy),
        ...placeOf(of),
        observed: of.datum.value,
        expected: first.proposed,
        difference: of.datum.value - first.proposed,
        tolerance: critical.fault * first.uProposed,
        unit: unitOf(of),
        address: of.datum.address,
        evidence: group.members.map((m) => ({ ...m.of.datum.address, printed: m.of.datum.printed })),
        quantity: of.place,
        detail: {
          code: 'adjustment',
          place: of.place,
          cells: first.whole?.cells ?? 1,
          w,
          critical: critical.doubt,
          chiSquare: white.chiSquare,
          freedom: white.freedom,
        },
      }),
    );
  }
  if (groups.length === 0 && failsGlobally(white, critical.doubt)) {
    findings.push(
      makeFinding({
        ...common,
        severity: 'doubt',
        quantity: 'all',
        evidence: system.data.map((d) => ({ ...d.datum.address, printed: d.datum.printed })),
        detail: {
          code: 'adjustment',
          place: '',
          cells: 1,
          w: null,
          critical: critical.doubt,
          chiSquare: white.chiSquare,
          freedom: white.freedom,
        },
      }),
    );
  }
  return findings;
}

/** The statistic is less probable than a normalised residual at its critical value. */
function failsGlobally(white: Whitened, critical: number): boolean {
  return white.freedom > 0 && chiSquareTail(white.chiSquare, white.freedom) < 2 * upperTail(critical);
}

function severityOf(
  first: RankedDatum,
  system: ConditionSystem,
  critical: Adjusted['critical'],
  policy: Policy,
): Severity {
  const error = Math.abs(first.of.datum.value - first.proposed);
  const large =
    first.whole === null || first.whole.open
      ? error > noticeableError(first.of, system, policy)
      : isLargeChange(first.whole.change, system, policy);
  return Math.abs(first.w) > critical.fault && large ? 'fault' : 'doubt';
}

/** Undoing a slip of many numbers moves a condition by what a user would notice there. */
function isLargeChange(change: Float64Array, { conditions, joined }: ConditionSystem, { material }: Policy): boolean {
  return conditions.some(({ kind, joined: k }, i) => {
    const { entropyJPerMolK: dS = 0 } = joined[k]?.at ?? {};
    const gap = material.transitionTemperatureK * Math.abs(dS);
    const limit =
      kind === 'entropy'
        ? gap / (joined[k]?.atK ?? 1)
        : kind === 'anchor-entropy'
          ? material.entropyJPerMolK
          : gap || material.enthalpyJPerMol;
    return Math.abs(change[i]) > limit;
  });
}

/** What a user of the release would notice, carried to the number in question [its SI unit]. */
function noticeableError(d: ConditionDatum, system: ConditionSystem, policy: Policy): number {
  const { material } = policy;
  const own = Math.abs(d.datum.value);
  const k = system.joined.find((j) => j.judged.index === d.transition);
  const dS = Math.abs(k?.at.entropyJPerMolK ?? 0);
  switch (d.kind) {
    case 'temperature':
    case 'saturation-temperature':
      return material.transitionTemperatureK;
    case 'enthalpy':
      return material.transitionTemperatureK * dS;
    case 'entropy':
      return (material.transitionTemperatureK * dS) / (k?.atK ?? 1);
    case 'formation-enthalpy': {
      const jumps = system.joined.filter(
        (j) => j.judged.stated.from === d.phases[0] || j.judged.stated.to === d.phases[0],
      );
      const least = Math.min(...jumps.map((j) => material.transitionTemperatureK * Math.abs(j.at.entropyJPerMolK)));
      return Math.min(material.enthalpyJPerMol, least);
    }
    case 'anchor-entropy':
      return Math.max(material.entropyJPerMolK, material.entropyRelative * own);
    case 'anchor-heat-capacity':
      return material.heatCapacityRelative * own;
    case 'saturation-pressure':
    case 'transition-pressure':
      return noticeablePressurePa(own, pressureAtK(d, system), policy);
    default:
      return material.enthalpyJPerMol;
  }
}

/** The temperature that a pressure is stated at [K]. */
function pressureAtK({ key, transition }: ConditionDatum, { saturated, substance }: ConditionSystem): number {
  const over = saturated.find(({ index }) => datumKey.saturationPressure(index) === key);
  return over?.atK ?? substance.transitions[transition]?.temperature.value ?? REFERENCE_TEMPERATURE_K;
}

function placeOf(d: ConditionDatum): { fromPhase: string; toPhase: string | null; transition: string } {
  const [from, to = null] = d.phases;
  return { fromPhase: from, toPhase: to, transition: d.key };
}

/** UCUM code of a stated number in SI. */
export function unitOf({ kind }: ConditionDatum): string {
  switch (kind) {
    case 'temperature':
    case 'saturation-temperature':
      return 'K';
    case 'entropy':
    case 'anchor-entropy':
    case 'anchor-heat-capacity':
    case 'column':
      return 'J/(mol.K)';
    case 'saturation-pressure':
    case 'transition-pressure':
      return 'Pa';
    default:
      return 'J/mol';
  }
}
