/**
 * Units at the door: from a declared UCUM code to the SI unit of a quantity, or a refusal that says what to write instead.
 *
 * The package that knows the codes converts kJ to kJ/mol in silence (UCUM's mole is a number), 0.4 degrees of difference
 * in Celsius to 273.55 K and J/(mol.Cel) by 273.15. Here the mole is counted, and degrees inside an expression or in an
 * uncertainty are differences.
 */
import { AVOGADRO_CONSTANT, ICE_POINT_K } from '../constants.js';
import { DEGREE_SIZE_K, type Dimension, readUnit, type UnitParts } from './expression.js';
import { nearestCodes } from './known-codes.js';

/** What a conversion may need to know about the substance and the column. */
export interface UnitContext {
  readonly molarMassGPerMol: number;
  /** Atoms in the formula unit; null when the formula is not known. */
  readonly atomsPerFormula: number | null;
  readonly per: 'atom' | null;
}

/** SI value = printed value * factor + offset. */
export interface LinearConversion {
  readonly ok: true;
  readonly factor: number;
  readonly offset: number;
}

export interface UnitRefusal {
  readonly ok: false;
  readonly problem: 'unit-unknown' | 'unit-unfit';
  /** What is wrong, what would fit, and what to do. */
  readonly fault: string;
  readonly wanted: string;
  readonly remedy: string;
  /** Codes of the right kind, nearest first. */
  readonly suggestions: readonly string[];
}

export type UnitConversion = LinearConversion | UnitRefusal;

/** How a unit becomes SI before anything is known about the substance. */
type Rule =
  | { readonly kind: 'plain' | 'per-gram' | 'per-atom'; readonly factor: number; readonly offset: number }
  | UnitRefusal;

const rules = new Map<string, Rule>();

/**
 * The conversion of values printed in `unit` to `target`, the SI code that a quantity is kept in (`J/(mol.K)`, `J/mol`,
 * `K`, `Pa`, `m3/mol`, `kg/m3`). A `target` that is no code throws.
 */
export function conversionTo(target: string, unit: string, context: UnitContext): UnitConversion {
  const key = `${target} ${context.per ?? ''} ${unit}`;
  let rule = rules.get(key);
  if (rule === undefined) {
    rule = ruleFor(target, unit, context.per);
    rules.set(key, rule);
  }
  if (!('kind' in rule)) return rule;
  if (rule.kind === 'plain') return { ok: true, factor: rule.factor, offset: rule.offset };
  if (rule.kind === 'per-gram') {
    if (!(context.molarMassGPerMol > 0)) {
      return refusal(
        target,
        unit,
        'unit-unfit',
        'it counts by mass and the molar mass is not known',
        'give `molar_mass` or a `formula` in substances.csv',
      );
    }
    return { ok: true, factor: rule.factor * context.molarMassGPerMol, offset: 0 };
  }
  if (context.atomsPerFormula === null || !(context.atomsPerFormula > 0)) {
    return refusal(
      target,
      unit,
      'unit-unfit',
      'it counts by atom and the number of atoms is not known',
      'give a `formula` in substances.csv',
    );
  }
  return { ok: true, factor: rule.factor * context.atomsPerFormula, offset: 0 };
}

/** The same for a difference or an uncertainty: no offset, whatever the scale's zero. */
export function differenceTo(target: string, unit: string, context: UnitContext): UnitConversion {
  const conversion = conversionTo(target, unit, context);
  return conversion.ok && conversion.offset !== 0 ? { ok: true, factor: conversion.factor, offset: 0 } : conversion;
}

/** The number that a dimensionless code stands for (`%` is 0.01, `1` is 1); null for any other code. */
export function ratioOf(unit: string): number | null {
  const reading = readUnit(unit);
  if (!('parts' in reading)) return null;
  const { parts } = reading;
  return parts.moles === 0 && parts.dimension.every((exponent) => exponent === 0) ? tidy(parts.magnitude) : null;
}

function ruleFor(target: string, unit: string, per: 'atom' | null): Rule {
  const refuse = (fault: string, remedy?: string): UnitRefusal => refusal(target, unit, 'unit-unfit', fault, remedy);
  const reading = readUnit(unit);
  if (!('parts' in reading)) return refusal(target, unit, 'unit-unknown', reading.fault);
  const { parts } = reading;
  const wanted = targetOf(target);

  const atomAnnotation = parts.annotations.find((words) => /atom/i.test(words));
  if (atomAnnotation !== undefined) {
    return refuse(`words in braces change nothing (${atomAnnotation})`, 'leave the braces out and say `"per": "atom"`');
  }
  if (wanted.moles === 0) {
    if (per !== null) return refuse('`per` has no meaning for this quantity', 'leave `per` out');
    if (parts.moles !== 0 || !same(parts.dimension, wanted.dimension)) return refuse('its dimension does not fit');
    const degree = Object.keys(DEGREE_SIZE_K).find((atom) => parts.atoms.has(atom));
    if (degree !== undefined && parts.alone !== degree) {
      return refuse(`${degree} counts from a zero of its own`, `let ${degree} stand alone`);
    }
    const factor = tidy(parts.magnitude / wanted.magnitude);
    return { kind: 'plain', factor, offset: target === 'K' ? offsetOf(parts.alone) : 0 };
  }

  const countsParticles = parts.atoms.has('eV') || parts.atoms.has('[k]');
  if (parts.moles === wanted.moles && same(parts.dimension, wanted.dimension)) {
    if (countsParticles) {
      return refuse('eV and [k] belong to one particle, not to a mole', 'leave the mole out and say `"per": "atom"`');
    }
    const factor = tidy(parts.magnitude / wanted.magnitude);
    return { kind: per === 'atom' ? 'per-atom' : 'plain', factor, offset: 0 };
  }
  if (parts.moles !== 0) return refuse(misplacedMole(parts, wanted) ?? 'its dimension does not fit');
  if (same(parts.dimension, perMass(wanted.dimension))) {
    if (per === 'atom') return refuse('it counts by mass and the column says by atom', 'leave `per` out');
    return { kind: 'per-gram', factor: tidy(parts.magnitude / wanted.magnitude), offset: 0 };
  }
  if (!same(parts.dimension, wanted.dimension)) return refuse('its dimension does not fit');
  if (!countsParticles) {
    return refuse(
      'no amount of substance and no mass stands in it',
      `divide it by mol, g or kg${per === null ? '' : '; only eV and [k] may stand alone with `per`'}`,
    );
  }
  if (per === null) {
    return refuse('it belongs to one particle, and the column does not say to which', 'say `"per": "atom"`');
  }
  return { kind: 'per-atom', factor: tidy((parts.magnitude / wanted.magnitude) * AVOGADRO_CONSTANT.value), offset: 0 };
}

function targetOf(target: string): UnitParts {
  const reading = readUnit(target);
  if (!('parts' in reading)) throw new Error(`no UCUM code: ${target}`);
  return reading.parts;
}

/** Kelvin at the zero of a scale: 0 Cel is 273.15 K, 0 [degF] is 32 degrees of 5/9 K below it, 0 [degRe] is 0 Cel. */
function offsetOf(alone: string | null): number {
  if (alone === null || !Object.hasOwn(DEGREE_SIZE_K, alone)) return 0;
  return alone === '[degF]' ? ICE_POINT_K - (32 * 5) / 9 : ICE_POINT_K;
}

/** J/mol.K is (J/mol) times K in UCUM, read from left to right. */
function misplacedMole(parts: UnitParts, target: UnitParts): string | null {
  const kelvin = parts.dimension[4];
  return parts.moles === target.moles && kelvin === -target.dimension[4] && kelvin !== 0
    ? 'read from left to right the kelvin multiplies; put what divides in brackets'
    : null;
}

function same(a: Dimension, b: Dimension): boolean {
  return a.every((exponent, index) => exponent === b[index]);
}

/** What is per mole in `dimension`, per mass. */
function perMass(dimension: Dimension): Dimension {
  return dimension.map((exponent, index) => (index === 1 ? exponent - 1 : exponent)) as unknown as Dimension;
}

/** The decimal number that was meant where it lies within two rounding errors: cm3 is 1e-6 m3, not 1.0000000000000002e-6. */
function tidy(factor: number): number {
  const decimal = Number(factor.toPrecision(15));
  return Math.abs(decimal - factor) <= 2 * Number.EPSILON * Math.abs(factor) ? decimal : factor;
}

function refusal(
  target: string,
  unit: string,
  problem: UnitRefusal['problem'],
  fault: string,
  remedy?: string,
): UnitRefusal {
  const suggestions = nearestCodes(target, unit);
  return {
    ok: false,
    problem,
    fault,
    wanted: `a UCUM code that becomes ${target}, such as ${suggestions.join(', ')}`,
    remedy: `${fault}; ${remedy ?? `write ${suggestions[0]} if that is meant`}`,
    suggestions,
  };
}
