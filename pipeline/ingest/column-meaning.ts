/** What a descriptor says of a column, in the shape that the stages hand on. */
import type { TextQuantity } from '../../schemas/quantities.js';
import type { ColumnDescriptor } from '../../schemas/source.js';
import type { ColumnMeaning, StatedUncertainty } from '../../schemas/table-meaning.js';

export function columnMeaning(header: string, column: ColumnDescriptor): ColumnMeaning {
  const stated = 'uncertainty' in column ? column.uncertainty : undefined;
  const parts = stated === undefined ? [] : Array.isArray(stated) ? stated : [stated];
  return {
    header: tidyHeader(header),
    is: column.is,
    of: column.is === 'uncertainty' ? column.of : null,
    unit: 'unit' in column ? column.unit : null,
    per: ('per' in column ? column.per : undefined) ?? null,
    uncertainty: parts.map(
      (part): StatedUncertainty => ({
        relative: part.relative ?? null,
        absolute: part.absolute ?? null,
        coverage: part.coverage,
        shared: part.shared,
      }),
    ),
    rank: ('rank' in column ? column.rank : undefined) ?? null,
    coverage: column.is === 'uncertainty' ? column.coverage : 1,
    shared: column.is === 'uncertainty' ? column.shared : false,
  };
}

/** A column that holds words. */
export function wordMeaning(header: string, is: TextQuantity): ColumnMeaning {
  return columnMeaning(header, { is });
}

/** Headers are compared without blanks around them, each run of blanks inside being one. */
export const tidyHeader = (header: string): string => header.replace(/\s+/gu, ' ').trim();
