/** How many decimals a column usually prints. */
import { NO_CELL } from '../../schemas/raw.js';

/**
 * The largest number of decimals that enough of the non-zero cells print (a cell with four prints three too): a fifth of
 * a long column; more than half of a row table's, whose few cells say less. A column of zeros gives its largest, an empty
 * one NO_CELL.
 */
export class DecimalsCount {
  private readonly nonZero = new Uint32Array(256);
  private lowest = 256;
  private highest = -1;
  private cells = 0;
  private mostOfZeros = NO_CELL;

  add(value: number, decimals: number): void {
    if (value === 0) {
      if (decimals > this.mostOfZeros) this.mostOfZeros = decimals;
      return;
    }
    const place = decimals + 128;
    this.nonZero[place]!++;
    this.cells++;
    if (place < this.lowest) this.lowest = place;
    if (place > this.highest) this.highest = place;
  }

  usual(enough: 'a fifth' | 'most' = 'a fifth'): number {
    if (this.cells === 0) return this.mostOfZeros;
    let cells = 0;
    for (let place = this.highest; place > this.lowest; place--) {
      cells += this.nonZero[place]!;
      if (enough === 'most' ? cells * 2 > this.cells : cells * 5 >= this.cells) return place - 128;
    }
    return this.lowest - 128;
  }

  clear(): void {
    if (this.cells > 0) this.nonZero.fill(0, this.lowest, this.highest + 1);
    this.lowest = 256;
    this.highest = -1;
    this.cells = 0;
    this.mostOfZeros = NO_CELL;
  }
}
