/** Types of the demo's generator, for the tests. */
export interface DemoPhase {
  readonly law: readonly number[];
  readonly rangeK: readonly [number, number];
  readonly source: string;
}

export interface DemoStep {
  readonly from: string;
  readonly to: string;
  readonly temperatureK: number;
  readonly entropy: number;
  readonly gas?: 'real' | 'ideal';
  readonly pressurePa?: number;
}

export interface DemoMedium {
  readonly id: string;
  readonly name: string;
  readonly molarMass: number;
  readonly critical?: { readonly temperatureK: number; readonly pressurePa: number; readonly acentricFactor: number };
  readonly phases: Readonly<Record<string, DemoPhase>>;
  readonly steps: readonly DemoStep[];
  readonly source: string;
}

export interface ClosedPhase {
  readonly enthalpyOfFormation: number;
  readonly entropy: number;
  readonly Cp: (temperatureK: number) => number;
  readonly S: (temperatureK: number) => number;
  readonly H: (temperatureK: number) => number;
  readonly G: (temperatureK: number) => number;
}

export interface PlantedSlip {
  readonly medium: string;
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly column: string;
  readonly printed: string;
  readonly clean: string;
  readonly kind: string;
  readonly about: string;
  readonly quantity: string;
}

export interface Demo {
  /** Bytes by path from the repository's root. */
  readonly files: ReadonlyMap<string, Buffer>;
  /** Raw tables as text before slips and misprints. */
  readonly clean: ReadonlyMap<string, string>;
  readonly slips: readonly PlantedSlip[];
  readonly corrections: readonly {
    readonly source: string;
    readonly medium: string;
    readonly correction: {
      readonly file: string;
      readonly line: number;
      readonly column: string;
      readonly printed: string;
      readonly corrected: string;
    };
  }[];
  readonly media: readonly DemoMedium[];
  readonly closed: Readonly<
    Record<
      string,
      {
        readonly phases: Readonly<Record<string, ClosedPhase>>;
        readonly steps: readonly (DemoStep & { readonly enthalpy: number })[];
      }
    >
  >;
}

export function makeDemo(): Demo;
/** What differs from the committed files, one sentence each. */
export function differences(root?: string): string[];
