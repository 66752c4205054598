import { between, type Residuals, standoff, standoffWithout } from './residuals.js';
import { secondRow } from './second-row.js';
import type { TableRows } from './table-rows.js';
import { type ByIntegrals, type Hypothesis, testHeatCapacity, type Window } from './window.js';

/** Integrals that would not show a Cp off by all of its stand-off by more than this are too blunt to name it. */
const BLUNT = 12;

/**
 * "This Cp", by the integrals around it where there are any, and by the row's own stand-off. First and last rows never. In a
 * stretch too short for a stand-off the integrals decide; where their u is too large to, they only must not contradict.
 */
export function heatCapacityHypothesis(rows: TableRows, res: Residuals, k: number, window: Window): Hypothesis | null {
  if (k === rows.from[k] || k === rows.to[k]) return null;
  if (window.conditions === 0) return byStandoff(rows, k);
  const joint = testHeatCapacity(rows, res, k);
  if (joint === null) return null;
  const stand = standoff(rows, k);
  if (!stand.interior) return byIntegrals(rows, joint);
  if (joint.foreseen < BLUNT && (joint.foreseen < 3 || joint.w > 0.5 * joint.foreseen)) {
    const alone = byStandoff(rows, k);
    if (alone !== null && alone.after === 0) {
      return {
        ...alone,
        w: Math.hypot(alone.w, joint.w),
        before: joint.before + alone.before,
        after: joint.after,
        freedom: joint.freedom,
      };
    }
  }
  if (joint.w < 3) return null;
  return {
    ...joint,
    w: Math.hypot(joint.w, Math.min(Math.abs(stand.difference) / stand.u, joint.w)),
    error: stand.difference,
    uError: stand.u,
  };
}

/** The neighbours must lie on their own curve once the row is out, and the row stand off from it. */
export function byStandoff(rows: TableRows, k: number): Hypothesis | null {
  const stand = standoff(rows, k);
  if (!stand.interior) return null;
  const sure = stand.symmetric ? stand : secondRow(rows, k);
  if (sure === null) return null;
  const { difference, u } = sure;
  let worst = 0;
  for (let j = Math.max(rows.from[k], k - 3); j <= Math.min(rows.to[k], k + 3); j++) {
    if (j === k) continue;
    const other = standoffWithout(rows, j, k);
    if (other !== null && Math.abs(other.difference) > 3 * other.u) {
      worst = Math.max(worst, Math.abs(other.difference));
    }
  }
  const w = Math.abs(difference) / u;
  const after = worst > 0.25 * Math.abs(difference) ? w * w : 0;
  return { row: k, pattern: 'heat-capacity', w, error: difference, uError: u, before: w * w, after, freedom: 1 };
}

/** They must ask for about the value that the few rows beside it give. */
function byIntegrals(rows: TableRows, joint: ByIntegrals): Hypothesis | null {
  if (joint.share < 0.5 || joint.share > 2) return null;
  const difference = rows.cp[joint.row] - between(rows, joint.row);
  return { ...joint, error: joint.share * difference, uError: Math.abs(difference) / joint.foreseen };
}
