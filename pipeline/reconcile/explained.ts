import type { CheckedCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import { explain, type SuspectContext } from './explain.js';
import { suspectContext } from './suspect-context.js';

/** Suspects with the usual slip that leads to their proposed value, where one does. */
export function explained(checked: CheckedCase, suspects: readonly Suspect[], policy: Policy): Suspect[] {
  const substance = checked.assembled.examined.harmonised;
  return suspects.map((suspect) => {
    const found = suspectContext(substance, suspect);
    if (found === null) return suspect;
    const [best] = explain(found, suspect.proposed, suspect.uProposed, materialOf(found, policy));
    return best === undefined
      ? suspect
      : { ...suspect, explanation: best.slip, explainedPrinted: best.correctedPrinted };
  });
}

/** Findings that name a cell take their first suspect's explanation. */
export function withExplanations(findings: readonly Finding[], suspects: readonly Suspect[]): Finding[] {
  return findings.map((finding) => {
    if (finding.detail.code !== 'cell') return finding;
    const first = suspects.find((s) => s.finding === finding.id && s.place === 1);
    if (first === undefined || first.explanation === null) return finding;
    return { ...finding, detail: { ...finding.detail, explanation: first.explanation } };
  });
}

function materialOf(context: SuspectContext, policy: Policy): number {
  const { material } = policy;
  const t = context.temperatureK ?? 298.15;
  switch (context.quantity) {
    case 'transition-temperature':
      return material.transitionTemperatureK;
    case 'transition-enthalpy':
      return (material.transitionTemperatureK * Math.abs(context.observed)) / t;
    case 'heat-capacity':
      return 0.5 * material.heatCapacityRelative * Math.abs(context.observed);
    case 'entropy':
    case 'transition-entropy':
    case 'gibbs-function':
      return material.entropyJPerMolK;
    default:
      return material.enthalpyJPerMol;
  }
}
