import type { ExaminedCase } from '../../schemas/checked.js';
import type { AssembledCase } from '../../schemas/curves.js';
import type { Finding } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import { crossingsOfCase } from './crossings.js';
import { curvesOf } from './families.js';
import { tabulated } from './tabulate.js';

/**
 * One curve a phase, its crossings with the others, and the published values. Pure: nothing but the tables, what the checks
 * named in them, and the policy goes in.
 */
export function assemble(
  cases: readonly ExaminedCase[],
  settings: { readonly policy: Policy },
): { artefact: AssembledCase[]; findings: Finding[] } {
  const { policy } = settings;
  const artefact = cases.map((examined) => {
    const curves = curvesOf(examined.harmonised, examined.named, policy);
    const crossings = crossingsOfCase(examined.harmonised, curves, policy);
    const functions = curves.map((c) => tabulated(c, curves, crossings, examined.harmonised, policy));
    return { examined, curves, crossings, functions };
  });
  return { artefact, findings: [] };
}
