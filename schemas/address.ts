/** Where a value was printed. `line` 0: the descriptor itself (`constants`). */
export interface Address {
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly column: string;
}
