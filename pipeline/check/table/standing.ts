import { REFERENCE_TEMPERATURE_K } from '../../core/constants.js';
import type { TableContext } from './column-hypothesis.js';
import { cellU, type TableRows } from './table-rows.js';

/**
 * How well the table as changed fits what stands beside it, as a logarithm: the anchors of its phase, a gas's least heat
 * capacity (5/2 R), and about 3 R an atom elsewhere. It only counts between hypotheses that this table cannot tell apart.
 */
export function standing(rows: TableRows, { substance, anchors }: TableContext): number {
  const { series, s, h, t, cp, n } = rows;
  let sum = 0;
  const held = (difference: number, u: number): void => {
    sum -= 0.5 * Math.min(12, (difference / u) ** 2);
  };
  for (const anchor of anchors) {
    if (anchor.phase !== series.phase || Math.abs(anchor.referenceTemperatureK - REFERENCE_TEMPERATURE_K) > 0.02)
      continue;
    for (let i = 0; i < n; i++) {
      const r = rows.row[i];
      if (
        anchor.entropy !== null &&
        s !== null &&
        s.present[r] === 1 &&
        Math.abs(t[i] - REFERENCE_TEMPERATURE_K) < 0.02
      ) {
        const size = 1e-3 * Math.abs(anchor.entropy.value);
        held(s.values[r] - anchor.entropy.value, Math.hypot(anchor.entropy.u, cellU(s, r), 0.02 * size));
      }
      if (
        anchor.enthalpyFromZero !== null &&
        h !== null &&
        t[i] === 0 &&
        h.present[r] === 1 &&
        series.incrementsFrom === null
      ) {
        const size = 1e-2 * Math.abs(anchor.enthalpyFromZero.value);
        held(h.values[r] + anchor.enthalpyFromZero.value, Math.hypot(anchor.enthalpyFromZero.u, cellU(h, r), size));
      }
    }
  }
  const gas = series.phase === 'g' || series.phase.startsWith('g-');
  const last = cp[n - 1];
  const atoms = substance.atomsPerFormula;
  if (gas && last < 20.7) sum -= 6;
  if (atoms !== null && atoms > 0 && t[n - 1] > 250) {
    const each = last / atoms;
    if (each < (gas ? 5 : 8) || each > 60) sum -= 6;
  }
  return sum;
}
