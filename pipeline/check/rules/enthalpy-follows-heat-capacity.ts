import type { TableRule } from './table-rules.js';

/** H(T2) - H(T1) = the integral of Cp, from Cp alone. */
export const enthalpyFollowsHeatCapacity: TableRule = {
  rule: 'enthalpy-follows-heat-capacity',
  names: ['enthalpy-increment', 'enthalpy'],
  anomaly: 'enthalpy',
  unit: 'J/mol',
  missing: (series) =>
    series.enthalpyIncrement === null && series.enthalpy === null ? 'a column of enthalpy increments beside Cp' : null,
  detectable: (verdict) => verdict.detectable.enthalpy,
};
