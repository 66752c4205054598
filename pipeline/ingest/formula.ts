/** Chemical formulas: Hill or ordinary, with brackets, hydrates and fractional amounts. */
import { ATOMIC_WEIGHTS } from './atomic-weights.js';

export interface FormulaReading {
  readonly molarMassGPerMol: number;
  readonly atoms: number;
}

/** The formula's molar mass [g/mol] and number of atoms; or in words what of it could not be read. */
export function readFormula(formula: string): FormulaReading | string {
  const counts = new Map<string, number>();
  for (const part of formula.replace(/\s/g, '').split(HYDRATE)) {
    const multiple = /^(\d+(?:\.\d+)?)(?=[A-Z([])/.exec(part);
    const rest = multiple === null ? part : part.slice(multiple[0].length);
    const fault = addGroup(rest, multiple === null ? 1 : Number(multiple[1]), counts);
    if (fault !== null) return fault;
  }
  let molarMassGPerMol = 0;
  let atoms = 0;
  for (const [element, count] of counts) {
    molarMassGPerMol += ATOMIC_WEIGHTS[element]! * count;
    atoms += count;
  }
  return { molarMassGPerMol: Number(molarMassGPerMol.toPrecision(12)), atoms };
}

/** A middle dot or asterisk; a full stop only before water, since elsewhere it may be a decimal point (Fe0.947O). */
const HYDRATE = /[·•*∙⋅]|\.(?=\d*H2O)/;
const PIECE = /([A-Z][a-z]?)(\d*\.?\d*)|([([])|([)\]])(\d*\.?\d*)/y;

function addGroup(text: string, multiple: number, counts: Map<string, number>): string | null {
  const stack: Map<string, number>[] = [new Map()];
  PIECE.lastIndex = 0;
  let at = 0;
  while (at < text.length) {
    PIECE.lastIndex = at;
    const piece = PIECE.exec(text);
    if (piece === null) return `"${text.slice(at)}" in it`;
    at += piece[0].length;
    const [, element, amount, open, close, amountAfter] = piece;
    if (element !== undefined) {
      if (!(element in ATOMIC_WEIGHTS)) return `"${element}", which has no standard atomic weight`;
      add(stack.at(-1)!, element, amount ? Number(amount) : 1);
    } else if (open !== undefined) stack.push(new Map());
    else if (close !== undefined) {
      const inner = stack.pop()!;
      const outer = stack.at(-1);
      if (outer === undefined) return 'a bracket that closes nothing';
      for (const [symbol, count] of inner) add(outer, symbol, count * (amountAfter ? Number(amountAfter) : 1));
    }
  }
  if (stack.length > 1) return 'a bracket that is not closed';
  if (stack[0]!.size === 0) return 'no element';
  for (const [symbol, count] of stack[0]!) add(counts, symbol, count * multiple);
  return null;
}

function add(counts: Map<string, number>, element: string, count: number): void {
  counts.set(element, (counts.get(element) ?? 0) + count);
}
