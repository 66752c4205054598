/** `substances.csv`, one row a substance. */
import { z } from 'zod';

const empty = z.string().transform((text) => text.trim());
const number = (check: (value: number) => boolean, wanted: string) =>
  empty.transform((text, context) => {
    if (text === '') return null;
    const value = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/.test(text) ? Number(text) : Number.NaN;
    if (Number.isFinite(value) && check(value)) return value;
    context.addIssue({ code: 'custom', message: wanted });
    return z.NEVER;
  });
const positive = number((value) => value > 0, 'a number above 0, or nothing');
const any = number(() => true, 'a number, or nothing');

/** The cells of one row as text; empty ones are ''. Only `substance` is needed. */
export const substanceRowSchema = z.object({
  substance: empty.refine((id) => /^[a-z0-9-]+$/.test(id), 'an id of lower-case letters, digits and "-"'),
  name: empty.default(''),
  formula: empty.default(''),
  molar_mass: positive.default(null),
  critical_temperature: positive.default(null),
  critical_pressure: positive.default(null),
  acentric_factor: any.default(null),
  polar_a: any.default(null),
  polar_b: any.default(null),
  class: empty
    .refine(
      (word) => ['', 'metal', 'molecular', 'ionic', 'network'].includes(word),
      'metal, molecular, ionic, network or nothing',
    )
    .default(''),
  /** The species, and formula units in one of it where the formulas do not tell: `S8`, `P4`, `S8 8`. */
  vapour_species: empty.default(''),
  residual_entropy: number((value) => value >= 0, 'a number of at least 0 [J/(mol.K)], or nothing').default(null),
});

export type SubstanceRow = z.infer<typeof substanceRowSchema>;

export interface Substance {
  readonly id: string;
  readonly name: string;
  readonly formula: string;
  readonly molarMassGPerMol: number;
  readonly atomsPerFormula: number | null;
  readonly criticalTemperatureK: number | null;
  readonly criticalPressurePa: number | null;
  readonly acentricFactor: number | null;
  readonly polarA: number | null;
  readonly polarB: number | null;
  readonly class: 'metal' | 'molecular' | 'ionic' | 'network' | null;
  /** The vapour's species when it is not the formula unit (S8), with formula units per molecule. */
  readonly vapourSpecies: { readonly formula: string; readonly formulaUnits: number } | null;
  readonly residualEntropyJPerMolK: number;
}
