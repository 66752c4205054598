/**
 * Names by which levels and conditions know a stated number, by its index among the substance's. Each is made once: equal
 * names are one string, and comparing them costs nothing.
 */
export const datumKey = {
  temperature: named((i) => `T of transition ${i}`),
  enthalpy: named((i) => `dH of transition ${i}`),
  entropy: named((i) => `dS of transition ${i}`),
  transitionPressure: named((i) => `p of transition ${i}`),
  formationEnthalpy: named((i) => `H of anchor ${i}`),
  anchorEntropy: named((i) => `S of anchor ${i}`),
  formationGibbsEnergy: named((i) => `G of anchor ${i}`),
  fromZero: named((i) => `H0 of anchor ${i}`),
  heatCapacity: named((i) => `Cp of anchor ${i}`),
  saturationTemperature: named((i) => `T of pressure ${i}`),
  saturationPressure: named((i) => `p of pressure ${i}`),
} as const;

function named(make: (index: number) => string): (index: number) => string {
  const made: string[] = [];
  return (index) => {
    made[index] ??= make(index);
    return made[index];
  };
}
