/**
 * Column tables: how every long table travels between stages. Absence is marked beside the values, so that NaN in
 * `values` only ever means a broken calculation.
 */
export interface NumberColumn {
  readonly kind: 'number';
  readonly values: Float64Array;
  /** 1 where the cell is empty; null when none is. */
  readonly absent: Uint8Array | null;
}

export interface IntegerColumn {
  readonly kind: 'integer';
  readonly values: Int32Array;
  readonly absent: Uint8Array | null;
}

export interface BooleanColumn {
  readonly kind: 'boolean';
  readonly values: Uint8Array;
  readonly absent: Uint8Array | null;
}

/** Text by dictionary: `codes[i]` points into `words`; code 0xffffffff marks an empty cell. */
export interface TextColumn {
  readonly kind: 'text';
  readonly codes: Uint32Array;
  readonly words: readonly string[];
}

export type Column = NumberColumn | IntegerColumn | BooleanColumn | TextColumn;

export interface ColumnTable {
  readonly rows: number;
  /** In the published order of fields. */
  readonly columns: Readonly<Record<string, Column>>;
}

export const ABSENT_CODE = 0xffffffff;
