/** The tables of judgement: substances, findings, suspects, coverage, evidence. Every substance stands in them. */
import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import { RELEASE_TABLES } from '../../schemas/release-tables.js';
import { type Builders, buildersFor } from './builders.js';

export type JudgementBuilders = ReturnType<typeof judgementBuilders>;

export function judgementBuilders() {
  return {
    substances: buildersFor(RELEASE_TABLES.substances),
    findings: buildersFor(RELEASE_TABLES.findings),
    suspects: buildersFor(RELEASE_TABLES.suspects),
    coverage: buildersFor(RELEASE_TABLES.coverage),
    evidence: buildersFor(RELEASE_TABLES.evidence),
  };
}

export function addJudgement(
  to: JudgementBuilders,
  reconciled: ReconciledCase,
  sentence: (finding: Finding) => string,
): void {
  addSubstance(to.substances, reconciled);
  for (const finding of reconciled.findings) addFinding(to, finding, sentence);
  for (const suspect of reconciled.suspects) addSuspect(to.suspects, suspect);
  for (const { substance, rule, place, outcome, evidence, missing, smallestDetectable } of reconciled.outcomes) {
    to.coverage.substance.push(substance);
    to.coverage.rule.push(rule);
    to.coverage.place.push(place);
    to.coverage.outcome.push(outcome);
    to.coverage.evidence.push(evidence);
    to.coverage.missing.push(missing);
    to.coverage.smallest_detectable.push(smallestDetectable);
  }
}

function addSubstance(to: Builders<typeof RELEASE_TABLES.substances>, reconciled: ReconciledCase): void {
  const { substance } = reconciled.checked.assembled.examined.harmonised;
  const counts = { fault: 0, doubt: 0, note: 0, accepted: 0 };
  for (const finding of reconciled.findings) counts[finding.accepted ? 'accepted' : finding.severity]++;
  to.substance.push(substance.id);
  to.name.push(substance.name);
  to.formula.push(substance.formula);
  to.molar_mass_g_per_mol.push(Number.isNaN(substance.molarMassGPerMol) ? null : substance.molarMassGPerMol);
  to.verdict.push(reconciled.verdict);
  to.faults.push(counts.fault);
  to.doubts.push(counts.doubt);
  to.notes.push(counts.note);
  to.accepted.push(counts.accepted);
}

/** Also for findings that belong to no substance: a broken descriptor, a source that is missing. */
export function addFinding(
  to: Pick<JudgementBuilders, 'findings' | 'evidence'>,
  finding: Finding,
  sentence: (finding: Finding) => string,
): void {
  const { findings, evidence } = to;
  findings.finding.push(finding.id);
  findings.evidence_hash.push(finding.evidenceHash);
  findings.substance.push(finding.substance);
  findings.rule.push(finding.rule);
  findings.severity.push(finding.severity);
  findings.from_phase.push(finding.fromPhase);
  findings.to_phase.push(finding.toPhase);
  findings.temperature_K.push(finding.temperatureK);
  findings.observed.push(finding.observed);
  findings.expected.push(finding.expected);
  findings.difference.push(finding.difference);
  findings.tolerance.push(finding.tolerance);
  findings.unit.push(finding.unit);
  findings.source.push(finding.address?.source ?? null);
  findings.file.push(finding.address?.file ?? null);
  findings.line.push(finding.address?.line ?? null);
  findings.column.push(finding.address?.column ?? null);
  findings.message.push(sentence(finding));
  findings.cause.push(finding.cause);
  findings.accepted.pushFlag(finding.accepted);
  for (const cell of finding.evidence) {
    evidence.finding.push(finding.id);
    evidence.source.push(cell.source);
    evidence.file.push(cell.file);
    evidence.line.push(cell.line);
    evidence.column.push(cell.column);
    evidence.printed.push(cell.printed);
  }
}

function addSuspect(to: Builders<typeof RELEASE_TABLES.suspects>, suspect: Suspect): void {
  to.finding.push(suspect.finding);
  to.substance.push(suspect.substance);
  to.place.push(suspect.place);
  to.group.push(suspect.group);
  to.cells.push(suspect.cells);
  to.source.push(suspect.address.source);
  to.file.push(suspect.address.file);
  to.line.push(suspect.address.line);
  to.column.push(suspect.address.column);
  to.printed.push(suspect.printed);
  to.observed.push(suspect.observed);
  to.unit.push(suspect.unit);
  to.normalised_residual.push(suspect.normalisedResidual);
  to.redundancy.push(suspect.redundancy);
  to.proposed.push(suspect.proposed);
  to.u_proposed.push(suspect.uProposed);
  to.proposed_printed.push(suspect.proposedPrinted);
  to.smallest_detectable.push(suspect.smallestDetectable);
  to.explanation.push(suspect.explanation);
  to.explained_printed.push(suspect.explainedPrinted);
  to.told_apart_by.push(suspect.toldApartBy);
}
