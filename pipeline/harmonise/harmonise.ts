/** Raw tables to SI, molar, ITS-90 as far as known, 1 bar, 298.15 K and standard uncertainties with k = 1. */
import type { Finding } from '../../schemas/finding.js';
import type { Anchor, HarmonisedCase, StatedTransition } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { RawCase } from '../../schemas/raw.js';

import { harmoniseAnchor } from './anchors.js';
import { type Draft, finished } from './draft.js';
import { countFromReference } from './reference-temperature.js';
import { draftSeries } from './series.js';
import { harmoniseTransition } from './transitions.js';
import { UnitBook } from './unit-book.js';
import { harmoniseVapourPressures } from './vapour-pressures.js';

export interface HarmoniseSettings {
  readonly policy: Policy;
}

/**
 * One harmonised case a raw case, in order. A case's `findings` are those of reading and those made here; the result's
 * `findings` are only those made here. What cannot be converted is left out and said, never guessed.
 */
export function harmonise(
  cases: readonly RawCase[],
  { policy }: HarmoniseSettings,
): { readonly artefact: readonly HarmonisedCase[]; readonly findings: readonly Finding[] } {
  const all: Finding[] = [];
  const artefact = cases.map((raw) => {
    const findings: Finding[] = [];
    const harmonised = harmoniseCase(raw, policy, findings);
    for (const finding of findings) all.push(finding);
    return harmonised;
  });
  return { artefact, findings: all };
}

function harmoniseCase(raw: RawCase, policy: Policy, findings: Finding[]): HarmonisedCase {
  const { substance } = raw;
  const book = new UnitBook(substance, findings);
  const drafts: Draft[] = [];
  for (const series of raw.series) {
    const draft = draftSeries(series, substance.id, book, policy, findings);
    if (draft !== null) drafts.push(draft);
  }
  const anchors: Anchor[] = [];
  for (const row of raw.anchors) {
    const anchor = harmoniseAnchor(row, substance.id, drafts, book, policy, findings);
    if (anchor !== null) anchors.push(anchor);
  }
  const transitions: StatedTransition[] = [];
  for (const row of raw.transitions) {
    const transition = harmoniseTransition(row, substance.id, book, policy, findings);
    if (transition !== null) transitions.push(transition);
  }
  const vapourPressures = harmoniseVapourPressures(raw.vapourPressures, substance.id, book, policy, findings);
  countFromReference(drafts, anchors, substance.id, findings);
  return {
    substance,
    series: drafts.map(finished),
    anchors,
    transitions,
    vapourPressures,
    findings: findings.length === 0 ? raw.findings : [...raw.findings, ...findings],
  };
}
