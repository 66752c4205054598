import type { Finding } from '../../schemas/finding.js';
import { makeFinding } from '../../schemas/make-finding.js';
import type { RawCase } from '../../schemas/raw.js';

/**
 * Gives each substance what was found about its row of substances.csv, and withholds one for which no table holds a row with
 * a finding that says so, or it would vanish in silence.
 */
export function accountForAll(
  cases: readonly RawCase[],
  settings: { readonly listed: ReadonlyMap<string, readonly Finding[]> },
): { artefact: readonly RawCase[]; findings: readonly Finding[] } {
  const made: Finding[] = [];
  const artefact = cases.map((read) => {
    const listed = settings.listed.get(read.substance.id);
    const raw = listed === undefined ? read : { ...read, findings: [...listed, ...read.findings] };
    const { substance, series, anchors, transitions, vapourPressures, findings } = raw;
    const has = series.length + anchors.length + transitions.length + vapourPressures.length > 0;
    if (has || findings.some(({ severity }) => severity === 'fault')) return raw;
    const finding = makeFinding({
      rule: 'row-readable',
      severity: 'fault',
      substance: substance.id,
      quantity: 'key-without-row',
      detail: {
        code: 'reading',
        problem: 'key-without-row',
        read: substance.id,
        wanted: 'at least one row in a table of a source',
        remedy:
          'Mend the sources that could not be read, if any are named above; else add a table, map the name that a source gives it, or take it out of substances.csv',
      },
    });
    made.push(finding);
    return { ...raw, findings: [...findings, finding] };
  });
  return { artefact, findings: made };
}
