/** How many decimals a column usually prints. */
import { NO_CELL } from '../../schemas/raw.js';

/**
 * The largest number of decimals that at least a fifth of the non-zero cells print (a cell with four prints three too).
 * A column of zeros gives its largest, an empty one NO_CELL.
 */
export class DecimalsCount {
  private readonly nonZero = new Uint32Array(256);
  private cells = 0;
  private mostOfZeros = NO_CELL;

  add(value: number, decimals: number): void {
    if (value === 0) {
      if (decimals > this.mostOfZeros) this.mostOfZeros = decimals;
      return;
    }
    this.nonZero[decimals + 128]!++;
    this.cells++;
  }

  usual(): number {
    if (this.cells === 0) return this.mostOfZeros;
    let cells = 0;
    for (let place = 255; place > 0; place--) {
      cells += this.nonZero[place]!;
      if (cells * 5 >= this.cells) return place - 128;
    }
    return NO_CELL;
  }

  clear(): void {
    this.nonZero.fill(0);
    this.cells = 0;
    this.mostOfZeros = NO_CELL;
  }
}
