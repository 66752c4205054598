/** A UCUM expression taken apart: its size, its dimension, and how often the mole stands in it. */
import { parseUnit, toCanonicalForm, ucum } from '@atomic-ehr/ucum';

/** Exponents of length, mass, time, angle, temperature, charge, luminous intensity. */
export type Dimension = readonly [number, number, number, number, number, number, number];

export interface UnitParts {
  /** In gram, metre, second, kelvin, coulomb; moles counted as 1, degrees Celsius and Fahrenheit as differences. */
  readonly magnitude: number;
  readonly dimension: Dimension;
  /** Exponent of `mol`, which UCUM itself takes for the plain number 6.02214076e23. */
  readonly moles: number;
  /** Base codes without prefix, as they occur. */
  readonly atoms: ReadonlySet<string>;
  /** The only atom with exponent 1, without a prefix; else null. A scale with its own zero has meaning only then. */
  readonly alone: string | null;
  /** Words in braces. */
  readonly annotations: readonly string[];
}

export type UnitReading = { readonly parts: UnitParts } | { readonly fault: string };

/** The parts of the package's syntax tree that are used here. */
type Node =
  | { type: 'binary'; operator: '.' | '/'; left: Node; right: Node }
  | { type: 'unary'; operand: Node }
  | { type: 'group'; expression: Node }
  | { type: 'factor'; value: number; annotation?: string }
  | { type: 'unit'; prefix?: string; atom: string; exponent?: number; annotation?: string };

interface Canonical {
  readonly magnitude: number;
  readonly dimension: Readonly<Record<string, number | undefined>>;
}

/** Size of one degree of the scales that have a zero of their own [K]; UCUM table 4 and 45. */
export const DEGREE_SIZE_K: Readonly<Record<string, number>> = { Cel: 1, '[degF]': 5 / 9, '[degRe]': 1.25 };

const read = new Map<string, UnitReading>();

/** Takes `code` apart; a code that is no UCUM expression gives the fault in words. Each code is read once. */
export function readUnit(code: string): UnitReading {
  let reading = read.get(code);
  if (reading === undefined) {
    reading = takeApart(code);
    read.set(code, reading);
  }
  return reading;
}

function takeApart(code: string): UnitReading {
  if (code === '') return { fault: 'no unit is given' };
  if (/\s/.test(code)) return { fault: 'a UCUM code holds no spaces' };
  if (/\d\.\d/.test(code)) return { fault: 'a UCUM code holds no decimal numbers (the dot multiplies)' };
  try {
    const tree = parseUnit(code) as unknown as { ast?: Node; errors: readonly { message: string }[] };
    if (tree.errors.length > 0 || tree.ast === undefined) {
      return { fault: tree.errors[0]?.message ?? 'it cannot be parsed' };
    }
    const sum = new Sum();
    sum.take(tree.ast, 1);
    return { parts: sum.parts() };
  } catch (error) {
    return { fault: error instanceof Error ? error.message : String(error) };
  }
}

class Sum {
  private magnitude = 1;
  private readonly exponents = [0, 0, 0, 0, 0, 0, 0];
  private moles = 0;
  private readonly atoms = new Set<string>();
  private readonly annotations: string[] = [];
  private alone: string | null = null;
  private terms = 0;

  take(node: Node, sign: 1 | -1): void {
    switch (node.type) {
      case 'binary':
        this.take(node.left, sign);
        this.take(node.right, node.operator === '/' ? (-sign as 1 | -1) : sign);
        return;
      case 'unary':
        this.take(node.operand, -sign as 1 | -1);
        return;
      case 'group':
        this.take(node.expression, sign);
        return;
      case 'factor':
        if (node.value === 0) throw new Error('a factor of 0 stands in it');
        this.magnitude *= node.value ** sign;
        this.terms++;
        if (node.annotation !== undefined) this.annotations.push(node.annotation);
        return;
      case 'unit':
        this.takeAtom(node.atom, node.prefix ?? '', sign * exponentOf(node.exponent));
        if (node.annotation !== undefined) this.annotations.push(node.annotation);
    }
  }

  private takeAtom(atom: string, prefix: string, exponent: number): void {
    // The package looks atoms up in plain objects, where `constructor` is found.
    if (atom in {}) throw new Error(`Unknown unit: ${atom}`);
    const degree = Object.hasOwn(DEGREE_SIZE_K, atom) ? DEGREE_SIZE_K[atom] : undefined;
    const plain = toCanonicalForm(atom) as unknown as Canonical;
    // The package takes a prefix on any unit and answers with nonsense; UCUM (2.2, §11) allows it on metric ones only.
    if (prefix !== '' && !ucum.info(atom).isMetric) throw new Error(`${atom} takes no prefix`);
    if (ucum.isArbitraryUnit(atom)) throw new Error(`${atom} is an arbitrary unit, it cannot be converted`);
    if (degree === undefined && ucum.isSpecialUnit(atom)) throw new Error(`${atom} is not a linear scale`);
    const prefixed =
      prefix === '' ? 1 : (toCanonicalForm(prefix + atom) as unknown as Canonical).magnitude / plain.magnitude;
    this.terms++;
    this.atoms.add(atom);
    this.alone = exponent === 1 && prefix === '' ? atom : null;
    if (atom === 'mol') {
      this.moles += exponent;
      this.magnitude *= prefixed ** exponent;
      return;
    }
    this.magnitude *= (prefixed * (degree ?? plain.magnitude)) ** exponent;
    for (const [index, name] of DIMENSION_NAMES.entries()) {
      this.exponents[index] += exponent * (plain.dimension[name] ?? 0);
    }
  }

  parts(): UnitParts {
    return {
      magnitude: this.magnitude,
      dimension: this.exponents as unknown as Dimension,
      moles: this.moles,
      atoms: this.atoms,
      alone: this.terms === 1 ? this.alone : null,
      annotations: this.annotations,
    };
  }
}

const DIMENSION_NAMES = ['L', 'M', 'T', 'A', 'Θ', 'Q', 'F'] as const;

/** The package reads an exponent of 0 as 1. */
function exponentOf(exponent: number | undefined): number {
  if (exponent === 0) throw new Error('an exponent of 0 stands in it');
  return exponent ?? 1;
}
