import type { TableRule } from './table-rules.js';

/** No point of Cp stands off the curve through its neighbours. */
export const heatCapacitySmooth: TableRule = {
  rule: 'heat-capacity-smooth',
  names: ['heat-capacity'],
  anomaly: 'heat-capacity',
  unit: 'J/(mol.K)',
  missing: (series) => (series.rows < 5 ? 'at least five rows' : null),
  detectable: (verdict) => verdict.detectable.heatCapacity,
};
