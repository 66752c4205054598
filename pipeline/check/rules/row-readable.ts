import type { Finding, Outcome } from '../../../schemas/finding.js';
import type { HarmonisedCase } from '../../../schemas/harmonised.js';
import { outcome } from '../place.js';

/** Each row parses to finite numbers in known units: reading and harmonising found what did not; here it is tallied. */
export function rowReadable(substance: HarmonisedCase, read: readonly Finding[]): Outcome {
  const id = substance.substance.id;
  const bad = read.some((f) => f.rule === 'row-readable' && f.severity !== 'note');
  if (bad) return outcome(id, 'row-readable', '', 'disagrees', 'arithmetic');
  const { series, anchors, transitions, vapourPressures } = substance;
  const any = series.length + anchors.length + transitions.length + vapourPressures.length > 0;
  return any
    ? outcome(id, 'row-readable', '', 'agrees', 'arithmetic')
    : outcome(id, 'row-readable', '', 'untestable', null, { missing: 'a table that mentions the substance' });
}
