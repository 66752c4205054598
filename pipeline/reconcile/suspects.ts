import type { CheckedCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import { printedLike } from '../core/numeric/printed-like.js';
import { unitOf } from './adjustment-closes.js';
import type { SuspectGroup } from './rank-data.js';

/** The suspects table's rows of one group, best first. */
export function suspectsOf(checked: CheckedCase, finding: Finding, group: SuspectGroup, number: number): Suspect[] {
  const substance = checked.assembled.examined.harmonised.substance.id;
  return group.members.map((member, k) => {
    const { datum } = member.of;
    const { whole } = member;
    return {
      finding: finding.id,
      substance,
      place: 100 * (number - 1) + k + 1,
      group: number,
      cells: whole?.cells ?? 1,
      address: datum.address,
      printed: datum.printed,
      observed: datum.value,
      unit: unitOf(member.of),
      normalisedResidual: member.w,
      redundancy: member.redundancy,
      proposed: member.proposed,
      uProposed: member.uProposed,
      proposedPrinted:
        whole?.correctedPrinted ?? printedLike(datum.printed, (member.proposed - datum.offset) / datum.factor),
      smallestDetectable: member.smallestDetectable,
      explanation: whole?.code ?? null,
      explainedPrinted: whole?.correctedPrinted ?? null,
      toldApartBy: group.toldApartBy,
    };
  });
}
