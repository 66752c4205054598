import type { CheckedCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import type { SuspectGroup } from './rank-data.js';

/** The suspects table's rows of one group, best first. */
export function suspectsOf(
  checked: CheckedCase,
  finding: Finding,
  group: SuspectGroup,
  number: number,
  _policy: Policy,
): Suspect[] {
  const substance = checked.assembled.examined.harmonised.substance.id;
  return group.members.map((member, k) => {
    const { datum } = member.of;
    return {
      finding: finding.id,
      substance,
      place: 100 * (number - 1) + k + 1,
      group: number,
      address: datum.address,
      printed: datum.printed,
      observed: datum.value,
      normalisedResidual: member.w,
      redundancy: member.redundancy,
      proposed: member.proposed,
      uProposed: member.uProposed,
      proposedPrinted: printedLike(datum.printed, (member.proposed - datum.offset) / datum.factor),
      smallestDetectable: member.smallestDetectable,
      explanation: null,
      explainedPrinted: null,
    };
  });
}

/** A number in the column's own unit with the decimals and the decimal mark of the printed cell. */
export function printedLike(printed: string, value: number): string {
  const plain = printed.trim();
  const comma = plain.includes(',') && !plain.includes('.');
  const point = plain.search(/[.,]/);
  const exponent = plain.search(/[eEdD]/);
  const decimals = point < 0 ? 0 : (exponent < 0 ? plain.length : exponent) - point - 1;
  const text = value.toFixed(Math.max(0, Math.min(12, decimals)));
  return comma ? text.replace('.', ',') : text;
}
