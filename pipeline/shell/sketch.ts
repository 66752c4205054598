/** One phase of a sketch: its Gibbs energy at some temperatures that rise. */
export interface SketchCurve {
  readonly phase: string;
  readonly temperatureK: ArrayLike<number>;
  readonly gibbsEnergyJPerMol: ArrayLike<number>;
}

const MARGIN = 10;

/**
 * A G–T diagram in characters, at most `width` columns: for each phase, how far its G lies above the lowest one, on an
 * axis whose steps grow upwards (cube root), so that the crossings near the bottom are seen beside a gas far above.
 * Stable is the letter on the bottom line. Values between the given temperatures are interpolated linearly: a picture,
 * no figures. Empty when no two temperatures are known.
 */
export function sketch(curves: readonly SketchCurve[], width = 80, height = 16): string[] {
  const drawn = curves.filter(({ temperatureK }) => temperatureK.length > 1);
  if (drawn.length === 0) return [];
  const columns = width - MARGIN - 1;
  const lowK = Math.min(...drawn.map(({ temperatureK }) => temperatureK[0]!));
  const highK = Math.max(...drawn.map(({ temperatureK }) => temperatureK[temperatureK.length - 1]!));
  const atK = (column: number): number => lowK + ((highK - lowK) * column) / (columns - 1);
  const letters = labels(drawn.map(({ phase }) => phase));

  const above = Array.from({ length: columns }, (_, column) => {
    const values = drawn.map((curve) => interpolate(curve, atK(column)));
    const lowest = Math.min(...values.filter((value) => value !== null));
    return values.map((value) => (value === null ? null : value - lowest));
  });
  const highest = Math.max(1e-9, ...above.flat().filter((value) => value !== null));
  const rowOf = (value: number): number => Math.round((height - 1) * Math.cbrt(value / highest));

  const paper = Array.from({ length: height }, () => Array.from({ length: columns }, () => ' '));
  // The lowest curve is drawn last, so that its letter is the one seen on the bottom line.
  above.forEach((values, column) => {
    values
      .map((value, i) => ({ value, i }))
      .sort((a, b) => (b.value ?? -1) - (a.value ?? -1))
      .forEach(({ value, i }) => {
        if (value !== null) paper[rowOf(value)]![column] = letters[i]!;
      });
  });

  const marks = new Map([0, 0.25, 0.5, 0.75, 1].map((share) => [Math.round(share * (height - 1)), share]));
  const lines = paper
    .map((row, i) => {
      const share = marks.get(i);
      const label = share === undefined ? '' : kilojoules(highest * (i / (height - 1)) ** 3);
      return `${label.padStart(MARGIN - 1)} ${share === undefined ? '│' : '┤'}${row.join('')}`.trimEnd();
    })
    .reverse();
  return [
    `${'kJ/mol'.padStart(MARGIN - 1)}   G above the lowest phase`,
    ...lines,
    `${' '.repeat(MARGIN)}└${axis(columns)}`,
    ticks(lowK, highK, columns),
    `${' '.repeat(MARGIN + 1)}${drawn.map(({ phase }, i) => `${letters[i]} ${phase}`).join('   ')}`.slice(0, width),
  ];
}

/** A letter for each phase that recalls its label: `l`, `g`, and `a`, `b` … for the rest, each different. */
function labels(phases: readonly string[]): string[] {
  const taken = new Set<string>(phases.filter((phase) => phase === 'l' || phase === 'g'));
  const free = [...'abcdefhijkmnopqrstuvwxyz'].filter((letter) => !taken.has(letter));
  return phases.map((phase) => (phase === 'l' || phase === 'g' ? phase : (free.shift() ?? '?')));
}

function interpolate({ temperatureK, gibbsEnergyJPerMol }: SketchCurve, atK: number): number | null {
  const n = temperatureK.length;
  const slack = 1e-9 * Math.abs(atK);
  if (atK < temperatureK[0]! - slack || atK > temperatureK[n - 1]! + slack) return null;
  let low = 0;
  let high = n - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (temperatureK[middle]! <= atK) low = middle;
    else high = middle;
  }
  const span = temperatureK[high]! - temperatureK[low]!;
  const share = span === 0 ? 0 : Math.min(1, Math.max(0, (atK - temperatureK[low]!) / span));
  return gibbsEnergyJPerMol[low]! + share * (gibbsEnergyJPerMol[high]! - gibbsEnergyJPerMol[low]!);
}

function kilojoules(joules: number): string {
  const value = joules / 1000;
  return value === 0 ? '0' : value >= 100 ? value.toFixed(0) : value.toPrecision(2);
}

function axis(columns: number): string {
  return Array.from({ length: columns }, (_, column) => (column % 15 === 0 ? '┬' : '─')).join('');
}

function ticks(lowK: number, highK: number, columns: number): string {
  let line = '';
  for (let column = 0; column < columns; column += 15) {
    const text = (lowK + ((highK - lowK) * column) / (columns - 1)).toFixed(highK - lowK < 20 ? 1 : 0);
    line = line.padEnd(MARGIN + 1 + column - (column === 0 ? 0 : Math.floor(text.length / 2))) + text;
  }
  return `${line} K`;
}
