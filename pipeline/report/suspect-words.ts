/** Sentences about suspects: which cell, what it says, what it should probably say. */
import type { Finding, Suspect } from '../../schemas/finding.js';
import { sayExplanation } from './explanations.js';
import { plusMinus, unitInWords } from './figures.js';
import { sayFinding, sayPlace } from './words.js';

/** Cell, what it says, and what it should probably say: `x/points.csv:412 S says 888.108, probably 889.108 (one digit wrong)`. */
export function saySuspect(suspect: Suspect): string {
  const { address, cells, printed, proposedPrinted, explanation, explainedPrinted } = suspect;
  const more = cells > 1 ? ` and ${cells - 1} more, the first` : '';
  const says = `${sayPlace(address)}${more} says ${printed}`;
  if (proposedPrinted === printed) return `${says}; a change below its last digit would close it`;
  if (explanation === null) return `${says}, probably ${proposedPrinted}`;
  return `${says}, probably ${explainedPrinted ?? proposedPrinted} (${sayExplanation(explanation)}?)`;
}

/**
 * The suspects of one finding, a line each: the cells of one group cannot be told apart, a further group is a further error.
 * After a group of several stands what would tell them apart.
 */
export function saySuspects(suspects: readonly Suspect[]): string[] {
  const ordered = [...suspects].sort((a, b) => a.place - b.place);
  return ordered.flatMap((suspect, i) => {
    const role = i === 0 ? 'suspect' : ordered[i - 1]!.group === suspect.group ? 'or' : 'and';
    const line = `${role}: ${saySuspect(suspect)}${closesAt(suspect)}`;
    const ends = ordered[i + 1]?.group !== suspect.group;
    return ends && suspect.toldApartBy !== null ? [line, `told apart by: ${suspect.toldApartBy}`] : [line];
  });
}

/** What the rest of the data put there, in SI; nothing of a phase, which is no number. */
function closesAt({ explanation, observed, proposed, uProposed, unit }: Suspect): string {
  if (explanation === 'from-and-to-exchanged' && proposed === observed) return '';
  return `; the rest puts it at ${plusMinus(proposed, uProposed)} ${unitInWords(unit)}`;
}

/**
 * Why a substance is withheld or flagged, in one line: the first suspect cell of its worst finding, or that finding itself.
 * `findings` are worst first, as reconcile leaves them.
 */
export function sayReason(findings: readonly Finding[], suspects: readonly Suspect[]): string {
  const grave = findings.filter(({ severity, accepted }) => severity !== 'note' && !accepted);
  const roots = grave.filter(({ cause }) => cause === null);
  const order = new Map([...roots, ...grave].map(({ id }, i) => [id, i]).reverse() as [string, number][]);
  const [first] = suspects
    .filter(({ finding }) => order.has(finding))
    .sort((a, b) => a.place - b.place || order.get(a.finding)! - order.get(b.finding)!);
  if (first !== undefined) {
    const alike = suspects.filter((one) => one !== first && one.finding === first.finding && one.group === first.group);
    return [first, ...alike].map(saySuspect).join('; or ');
  }
  const worst = roots[0] ?? grave[0] ?? findings[0];
  return worst === undefined ? 'nothing was found' : sayFinding(worst);
}
