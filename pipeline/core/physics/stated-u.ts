/** A stated number's standard uncertainties: of its rounding, as stated or by default, and beside another source's numbers. */
export interface StatedU {
  readonly u: number;
  readonly uRounding: number;
  readonly uBeside?: number | undefined;
}

/**
 * The uncertainty that a stated number is compared with. Within one evaluated source its numbers are one calculation, and only
 * rounding stands between them; beside another source's numbers digits alone do not say how well it is known.
 */
export function uStated(datum: StatedU, within: boolean): number {
  return within ? datum.uRounding : (datum.uBeside ?? datum.u);
}
