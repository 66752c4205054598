/** H and S of a phase at one temperature. */
export interface State {
  readonly enthalpyJPerMol: number;
  readonly entropyJPerMolK: number;
}

/** The same with one number moved, and that number in SI. */
export interface MovedState extends State {
  readonly number: number;
}

/** Change of H, S and G at T per SI unit of one number. */
export interface Sensitivity {
  readonly enthalpy: number;
  readonly entropy: number;
  readonly gibbs: number;
}

const FLAT: Sensitivity = { enthalpy: 0, entropy: 0, gibbs: 0 };
/** The two sides may differ by this share before a shorter step is tried. */
const BENT = 0.01;
const SHORTER = 8;
const TRIES = 3;

/**
 * Sensitivity of H, S and G = H - T S at `temperatureK` to one number, by the central difference of the whole calculation
 * (JCGM 100:2008, 5.1.3): exact where the curve is linear in the number, as it is in printed H, S, -[G - H]/T and in the
 * levels, and free of second derivatives elsewhere. Where the two sides differ, since a step crossed a decision of the
 * calculation, shorter steps are tried and the straightest pair is kept. Zero where the number does not move.
 *
 * `centre`: the state as it stands; `moved(by)`: with the number moved by so much in its own unit; `step`: in that unit,
 * above 0.
 */
export function sensitivity(
  centre: State,
  moved: (by: number) => MovedState,
  step: number,
  temperatureK: number,
): Sensitivity {
  let best = FLAT;
  let straightest = Number.POSITIVE_INFINITY;
  for (let k = 0, by = step; k < TRIES; k++, by /= SHORTER) {
    const up = moved(by);
    const down = moved(-by);
    const way = up.number - down.number;
    if (way === 0) return FLAT;
    const enthalpy = (up.enthalpyJPerMol - down.enthalpyJPerMol) / way;
    const entropy = (up.entropyJPerMolK - down.entropyJPerMolK) / way;
    const bend = bentBy(up, centre, down, temperatureK);
    if (bend < straightest) {
      straightest = bend;
      best = { enthalpy, entropy, gibbs: enthalpy - temperatureK * entropy };
    }
    if (straightest <= BENT) break;
  }
  return best;
}

/** |f(+) - 2 f(0) + f(-)| over |f(+) - f(-)| of G; 0 where both are rounding. */
function bentBy(up: State, centre: State, down: State, temperatureK: number): number {
  const gibbs = (s: State): number =>
    s.enthalpyJPerMol - centre.enthalpyJPerMol - temperatureK * (s.entropyJPerMolK - centre.entropyJPerMolK);
  const [a, b] = [gibbs(up), gibbs(down)];
  const rounding = 1e-12 * (Math.abs(centre.enthalpyJPerMol) + temperatureK * Math.abs(centre.entropyJPerMolK));
  const second = Math.abs(a + b);
  return second <= rounding ? 0 : second / Math.abs(a - b);
}

/** One number behind G: its sensitivity and its own standard uncertainty, SI. */
export interface Weighable {
  readonly sensitivity: Sensitivity;
  readonly u: number;
}

/** What one number's own error does to G. */
export interface GibbsWeight<Of extends Weighable> {
  readonly of: Of;
  /** |dG/dx| u(x) [J/mol]. */
  readonly weightJPerMol: number;
  /** Its square over u(G)^2; null where u(G) is 0. */
  readonly share: number | null;
}

/**
 * Weights of independent numbers in G, largest first; among equal ones (an exact number has none) the larger |dG/dx|. The
 * shares add up to less than 1 where G owes some of its uncertainty to other things: the way between the rows, a common
 * calibration.
 */
export function gibbsWeights<Of extends Weighable>(numbers: readonly Of[], uGibbsJPerMol: number): GibbsWeight<Of>[] {
  return numbers
    .map((of) => {
      const weightJPerMol = Math.abs(of.sensitivity.gibbs) * of.u;
      return { of, weightJPerMol, share: uGibbsJPerMol > 0 ? (weightJPerMol / uGibbsJPerMol) ** 2 : null };
    })
    .sort(
      (a, b) =>
        b.weightJPerMol - a.weightJPerMol || Math.abs(b.of.sensitivity.gibbs) - Math.abs(a.of.sensitivity.gibbs),
    );
}
