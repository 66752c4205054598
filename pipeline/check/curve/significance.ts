import type { Severity } from '../../../schemas/finding.js';
import type { Policy } from '../../../schemas/policy.js';
import { sidakThreshold } from '../../core/numeric/normal.js';

/** Critical values of one substance: alpha shared over its tests. */
export interface Thresholds {
  readonly fault: number;
  readonly doubt: number;
}

const made = new Map<string, Thresholds>();

export function thresholds(policy: Policy, tests: number): Thresholds {
  const key = `${policy.alphaFault} ${policy.alphaDoubt} ${tests}`;
  let found = made.get(key);
  if (found === undefined) {
    found = { fault: sidakThreshold(policy.alphaFault, tests), doubt: sidakThreshold(policy.alphaDoubt, tests) };
    made.set(key, found);
  }
  return found;
}

/**
 * How grave a difference is: significant and material a fault, significant only a doubt, else nothing. A difference that
 * matters and that the data are too uncertain to decide is no finding: the coverage says how small an error would have shown.
 * `u` is the standard uncertainty of the difference.
 */
export function gravity(
  difference: number,
  u: number,
  material: number,
  limits: Thresholds,
): Exclude<Severity, 'note'> | null {
  const size = Math.abs(difference);
  if (size > limits.fault * u) return size > material ? 'fault' : 'doubt';
  return size > limits.doubt * u ? 'doubt' : null;
}
