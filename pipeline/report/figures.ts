/**
 * A number as a person would print it: as many decimals as its uncertainty bears (two significant digits of it), six
 * significant digits where none is known. A true minus sign, no exponent between 1e-4 and 1e15.
 */
export function figure(value: number, uncertainty: number | null = null): string {
  if (!Number.isFinite(value)) return Number.isNaN(value) ? 'not a number' : value > 0 ? '∞' : '−∞';
  const text = uncertainty !== null && uncertainty > 0 ? toPlace(value, lastPlace(uncertainty)) : significant(value);
  return text.replaceAll('-', '−');
}

/** `889.11 ± 0.012`: the value to the same place as its uncertainty. */
export function plusMinus(value: number, uncertainty: number): string {
  if (!(uncertainty > 0)) return figure(value);
  return `${figure(value, uncertainty)} ± ${figure(uncertainty, uncertainty)}`;
}

/** The way a unit is written in a sentence: `J/(mol.K)` becomes `J/(mol K)`. */
export function unitInWords(unit: string): string {
  return unit
    .replaceAll('.', ' ')
    .replace(/^cal_th\b/, 'cal(th)')
    .replace(/^Cel$/, '°C');
}

/** Decimals that show two significant digits of `uncertainty`; never more than 12, and never a rounding of whole digits. */
function lastPlace(uncertainty: number): number {
  return Math.min(12, Math.max(0, 1 - Math.floor(Math.log10(uncertainty))));
}

function toPlace(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return Number(text) === 0 && value !== 0 && Math.abs(value) < 1e-6 ? value.toPrecision(2) : positiveZero(text);
}

function significant(value: number): string {
  const size = Math.abs(value);
  if (size !== 0 && (size < 1e-4 || size >= 1e15)) return value.toPrecision(6).replace(/\.?0+e/, 'e');
  const decimals = size === 0 ? 0 : Math.max(0, 5 - Math.floor(Math.log10(size)));
  const text = value.toFixed(Math.min(12, decimals));
  return positiveZero(text.includes('.') ? text.replace(/\.?0+$/, '') : text);
}

function positiveZero(text: string): string {
  return Number(text) === 0 ? text.replace('-', '') : text;
}
