import { ErrorSum } from '../../core/physics/error-sum.js';
import { imperfection } from '../../core/physics/imperfection-error.js';
import { gasTermUncertainty } from '../../core/physics/placed-phase.js';
import type { TransitionView } from './transition-view.js';

/**
 * Standard uncertainties [J/mol] of dH and of T dS that two curves give at a temperature, what the two owe to one datum
 * cancelling. Errors of Cp, of a level carried by dH and dS, and of the gas's imperfection move H and TS together: neither is
 * bounded by u(dG). What u(dG) holds besides, the unknown volumes off the standard pressure, is added to both.
 */
export function differenceUncertainty({ from, to, atK, uGapJPerMol }: NonNullable<TransitionView['pair']>): {
  readonly enthalpyJPerMol: number;
  readonly entropyTimesTJPerMol: number;
} {
  const h = new ErrorSum().add(to.source, atK, 1 / to.formulaUnits, 0).add(from.source, atK, -1 / from.formulaUnits, 0);
  const s = new ErrorSum().add(to.source, atK, 0, 1 / to.formulaUnits).add(from.source, atK, 0, -1 / from.formulaUnits);
  const uGas = gasTermUncertainty(from, to, atK);
  for (const { key, by, u } of imperfection(uGas, 1, 0, atK)) h.addDatum(key, by, u);
  for (const { key, by, u } of imperfection(uGas, 0, 1, atK)) s.addDatum(key, by, u);
  const hh = Math.max(0, h.covariance(h));
  const ss = Math.max(0, atK * atK * s.covariance(s));
  const besides = Math.max(0, uGapJPerMol * uGapJPerMol - (hh - 2 * atK * h.covariance(s) + ss));
  return { enthalpyJPerMol: Math.sqrt(hh + besides), entropyTimesTJPerMol: Math.sqrt(ss + besides) };
}
