/** Fills in what most findings leave empty, and names the finding. */
import type { EvidenceCell, Finding, FindingDetail, RuleName, Severity } from './finding.js';
import { evidenceHash, findingId } from './finding-id.js';
import type { Address } from './harmonised.js';

/** The parts of a finding that its maker knows; `source`, `quantity` and `transition` only go into the id. */
export interface PartialFinding {
  readonly rule: RuleName;
  readonly severity: Severity;
  readonly detail: FindingDetail;
  readonly substance?: string;
  readonly fromPhase?: string | null;
  readonly toPhase?: string | null;
  readonly temperatureK?: number | null;
  readonly observed?: number | null;
  readonly expected?: number | null;
  readonly difference?: number | null;
  readonly tolerance?: number | null;
  readonly unit?: string | null;
  readonly address?: Address | null;
  readonly evidence?: readonly EvidenceCell[];
  readonly cause?: string | null;
  /** Source id; default: the address's. */
  readonly source?: string;
  /** Default: the detail's own `quantity`, if it has one; readings take the problem, file and column. */
  readonly quantity?: string;
  readonly transition?: string;
}

/** A whole finding: nulls where nothing is known, not accepted, id from its parts, evidence hash from its cells. */
export function makeFinding(partial: PartialFinding): Finding {
  const evidence = partial.evidence ?? [];
  const address = partial.address ?? null;
  const substance = partial.substance ?? '';
  const fromPhase = partial.fromPhase ?? null;
  const toPhase = partial.toPhase ?? null;
  return {
    id: findingId({
      rule: partial.rule,
      substance,
      phases: [fromPhase, toPhase],
      transition: partial.transition ?? '',
      source: partial.source ?? address?.source ?? '',
      quantity: partial.quantity ?? quantityOf(partial.detail, address),
    }),
    evidenceHash: evidenceHash(evidence),
    substance,
    rule: partial.rule,
    severity: partial.severity,
    fromPhase,
    toPhase,
    temperatureK: partial.temperatureK ?? null,
    observed: partial.observed ?? null,
    expected: partial.expected ?? null,
    difference: partial.difference ?? null,
    tolerance: partial.tolerance ?? null,
    unit: partial.unit ?? null,
    address,
    evidence,
    detail: partial.detail,
    cause: partial.cause ?? null,
    accepted: false,
  };
}

function quantityOf(detail: FindingDetail, address: Address | null): string {
  if ('quantity' in detail) return detail.quantity;
  if (detail.code === 'reading') return `${detail.problem} ${address?.file ?? ''} ${address?.column ?? ''}`;
  return '';
}
