import type { TableRule } from './table-rules.js';

/** S(T2) - S(T1) = the integral of Cp/T, from Cp alone. */
export const entropyFollowsHeatCapacity: TableRule = {
  rule: 'entropy-follows-heat-capacity',
  names: ['entropy'],
  anomaly: 'entropy',
  unit: 'J/(mol.K)',
  missing: (series) => (series.entropy === null ? 'a column of entropies beside Cp' : null),
  detectable: (verdict) => verdict.detectable.entropy,
};
