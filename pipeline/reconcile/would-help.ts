import type { StatedDatum } from './system/stated-data.js';
import type { ConditionSystem } from './system/system.js';

/** What would make a number testable that nothing else speaks of, in words for the curator. */
export function wouldHelp(d: StatedDatum, system: ConditionSystem): string {
  const [phase, other] = d.phases;
  const isobar = system.joined[0]?.from.source.family.isobarPa ?? null;
  const curve = (name: string) =>
    system.curves.find((c) => c.phase === name && c.family.isobarPa === isobar) ??
    system.curves.find((c) => c.phase === name);
  if (d.transition >= 0) {
    const stated = system.substance.transitions[d.transition];
    if (stated.order !== 'first' || phase === other)
      return 'a first-order transition: one curve runs through a continuous one';
    const without = [phase, other].filter((p) => curve(p) === undefined);
    if (without.length > 0) return `a heat-capacity table of ${without.join(' and ')}`;
    const unlevelled = [phase, other].find((p) => !(curve(p)?.hasEnthalpyLevel && curve(p)?.hasEntropyLevel));
    if (unlevelled !== undefined) return `a formation enthalpy and an entropy of ${unlevelled}`;
    if (!system.joined.some((j) => j.judged.index === d.transition))
      return `a heat-capacity table of ${phase} and ${other} that reaches the stated temperature`;
    return `a formation enthalpy and an entropy of ${phase} or ${other} that do not rest on this transition`;
  }
  if (d.kind === 'formation-gibbs-energy')
    return 'the Gibbs energy of formation of another phase, or reference data of the elements';
  if (curve(phase) === undefined) return `a heat-capacity table of ${phase}`;
  switch (d.kind) {
    case 'anchor-entropy':
      return `a transition of ${phase} to a phase whose entropy is known independently, or its heat capacity from below 20 K`;
    case 'formation-enthalpy':
      return `a transition of ${phase} to a phase whose formation enthalpy is known independently, or vapour pressures`;
    case 'enthalpy-from-zero':
      return `the heat capacity of ${phase} from 0 K`;
    case 'anchor-heat-capacity':
      return `a row of the heat-capacity table of ${phase} at the reference temperature`;
    default:
      return `a second, independent value`;
  }
}
