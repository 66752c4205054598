import type { TableRule } from './table-rules.js';

/** S = -[G - H(Tr)]/T + (H - H(Tr))/T in each row. */
export const functionsClose: TableRule = {
  rule: 'functions-close',
  names: ['gibbs-function'],
  anomaly: 'closure',
  unit: 'J/(mol.K)',
  missing: (series) =>
    series.entropy === null || series.enthalpyIncrement === null || series.gibbsFunction === null
      ? 'S, H - H(Tr) and -[G - H(Tr)]/T in one table'
      : null,
  detectable: (verdict) => verdict.detectable.closure,
};
