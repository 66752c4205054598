/** `source.json`: what a source's raw tables mean. */
import { z } from 'zod';
import { QUANTITY_UNITS, TEXT_QUANTITIES } from './quantities.js';

/** Kinds of tables that are read. */
export const READ_KINDS = ['thermal-functions', 'anchors', 'transitions', 'vapour-pressures'] as const;
/** Kinds that a descriptor may declare and that are not read yet. */
export const PLANNED_KINDS = [
  'vapour-pressure-equations',
  'heat-capacity-equations',
  'volumes',
  'second-virials',
  'coexistence',
] as const;

const word = z.string().trim().min(1);
const numberQuantities = Object.keys(QUANTITY_UNITS) as (keyof typeof QUANTITY_UNITS)[];
const numberQuantity = z.enum(numberQuantities as [keyof typeof QUANTITY_UNITS, ...(keyof typeof QUANTITY_UNITS)[]]);
const value = z.strictObject({ value: z.number(), unit: word });

/** A constant word, or the column that holds it, or one of the ways that are not read yet. */
const wordOrColumn = z.union([
  word,
  z.strictObject({ column: word }),
  z.strictObject({ columns: z.array(word).min(1) }),
  z.strictObject({ inOrder: z.array(word).min(1) }),
  z.strictObject({ fileName: word }),
]);

const uncertainty = z
  .strictObject({
    relative: z.number().positive().optional(),
    absolute: z.number().positive().optional(),
    coverage: z.number().positive().default(1),
    shared: z.boolean().default(false),
    below: z.number().optional(),
    above: z.number().optional(),
  })
  .refine((u) => (u.relative === undefined) !== (u.absolute === undefined), {
    message: 'wanted either "relative" or "absolute"',
  });

const common = {
  from: z.literal(0).optional(),
  rank: z.number().positive().optional(),
  as: z.array(z.enum(['reciprocal', 'log10', 'ln', 'negative', 'over-temperature'])).optional(),
};

const numberColumn = z.strictObject({
  is: numberQuantity,
  unit: word,
  per: z.literal('atom').optional(),
  uncertainty: z.union([uncertainty, z.array(uncertainty)]).optional(),
  ...common,
});
const uncertaintyColumn = z.strictObject({
  is: z.literal('uncertainty'),
  of: numberQuantity,
  unit: word,
  per: z.literal('atom').optional(),
  coverage: z.number().positive().default(1),
  shared: z.boolean().default(false),
});
const wordColumn = z.strictObject({ is: z.enum([...TEXT_QUANTITIES, 'ignored']) });

/** One column; `is` tells which kind. */
export const columnSchema = z.discriminatedUnion('is', [numberColumn, uncertaintyColumn, wordColumn]);

export type ColumnDescriptor = z.infer<typeof columnSchema>;

/** Keys that may stand on the source or on a table; the table's wins. */
const shared = {
  basis: z.enum(['measured', 'evaluated', 'computed', 'estimated']).optional(),
  restsOn: z.array(word).optional(),
  rank: z.number().positive().optional(),
  temperatureScale: z.enum(['ITS-90', 'IPTS-68', 'IPTS-48', 'thermodynamic', 'not-stated']).optional(),
  standardPressure: value.optional(),
  referenceTemperature: z.union([z.number().positive(), value]).optional(),
  enthalpyZero: word.optional(),
  entropyZero: word.optional(),
  names: z.union([z.record(z.string(), word), word]).optional(),
  phases: z.record(z.string(), z.union([word, z.record(z.string(), word)])).optional(),
  delimiter: z.union([z.string().length(1), z.literal('spaces')]).optional(),
  skipLines: z.number().int().min(0).optional(),
  comment: word.optional(),
  decimal: z.enum(['.', ',']).optional(),
  missing: z.array(z.string()).optional(),
  // Layouts that are known and not read yet, each refused by name.
  widths: z.array(z.number().int().positive()).optional(),
  lines: z.tuple([z.number().int(), z.number().int()]).optional(),
  header: z.union([z.number().int(), z.tuple([z.number().int(), z.number().int()])]).optional(),
  headerless: z.boolean().optional(),
  joinLines: z.number().int().positive().optional(),
  thousands: word.optional(),
  fillDown: z.array(word).optional(),
  cells: z.looseObject({}).optional(),
};

const bound = z.strictObject({
  from: z.number().optional(),
  to: z.number().optional(),
  is: z.union([z.string(), z.array(z.string())]).optional(),
  not: z.union([z.string(), z.array(z.string())]).optional(),
});

export const tableSchema = z.strictObject({
  ...shared,
  id: word.optional(),
  file: word,
  holds: z.enum([...READ_KINDS, ...PLANNED_KINDS]),
  substance: wordOrColumn.optional(),
  phase: wordOrColumn.optional(),
  incrementsFrom: word.optional(),
  from: z.literal(0).optional(),
  pressure: value.optional(),
  constants: z.record(z.string(), z.union([word, z.number(), value])).optional(),
  where: z.record(z.string(), bound).optional(),
  others: z.union([z.literal('ignored'), z.looseObject({ is: z.string() })]).optional(),
  columns: z.record(z.string(), columnSchema),
});

export type TableDescriptor = z.infer<typeof tableSchema>;

/** Keys of the source alone. */
export const sourceHeadSchema = z.strictObject({
  title: word,
  citation: word.optional(),
  doi: word.optional(),
  year: z.number().int().optional(),
  licence: word.optional(),
  ...shared,
  tables: z.array(z.unknown()).min(1),
});

export type SourceHead = z.infer<typeof sourceHeadSchema>;

export const sourceSchema = sourceHeadSchema.extend({ tables: z.array(tableSchema).min(1) });
