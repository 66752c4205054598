import type { RuleName } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';

/** One rule as the curator reads it. */
export interface RulePage {
  readonly group: 'reading' | 'tables' | 'limits' | 'transitions' | 'across';
  /** One line for the list. */
  readonly holds: string;
  readonly formula: string;
  /** With the numbers of the policy in force. */
  readonly tolerance: (policy: Policy) => string;
  readonly agrees: string;
  readonly disagrees: string;
  readonly untestable: string;
  /** What would make it testable. */
  readonly wants: string;
}

const rounding =
  'The rounding of the printed digits and the interpolation error of the integral, as a worst case; never a fixed percentage.';

const significance = ({ alphaFault, alphaDoubt }: Policy) =>
  `Significant: outside the propagated uncertainty at ${percent(alphaFault)} for a fault and ${percent(alphaDoubt)} for a doubt, shared over the substance's tests.`;

const cells = ({ cell }: Policy) =>
  `A cell is named when its normalised residual exceeds ${cell.threshold} and the change is at least ${cell.lastPlaces} units of its last place.`;

export const RULE_PAGES: Readonly<Record<RuleName, RulePage>> = {
  'row-readable': {
    group: 'reading',
    holds: 'each row parses to finite numbers in known units',
    formula: 'every declared cell is one number of a strict grammar, in a unit that is known and fits the quantity',
    tolerance: () => 'None.',
    agrees: 'Every declared cell of the table was read.',
    disagrees:
      'A cell, a row, a column, a file or a descriptor could not be read; the substances it touches are withheld.',
    untestable: 'There is no table to read.',
    wants: 'A table, and a descriptor that names each of its columns.',
  },
  'rows-distinct': {
    group: 'reading',
    holds: 'no two rows of a series at one temperature disagree; evaluated tables rise in temperature',
    formula:
      'T(i) < T(i+1), and rows at one T equal within their digits, two-sided rows aside; a measured series may repeat and return',
    tolerance: () => 'The rounding of the printed digits.',
    agrees: 'The rows are in order and none contradicts another.',
    disagrees: 'Two rows at one temperature differ, or the temperature falls.',
    untestable: 'The table has a single row.',
    wants: 'A second row.',
  },
  'value-possible': {
    group: 'reading',
    holds: 'T ≥ 0, Cp > 0 above 0 K, S ≥ 0 where its zero is absolute, p > 0, and orders of magnitude',
    formula: 'T ≥ 0 K;  Cp > 0 for T > 0;  S ≥ 0 (absolute zero only);  p > 0',
    tolerance: () => 'None; a limit row at 0 K is ordinary.',
    agrees: 'Every value is one that nature allows.',
    disagrees: 'A value is impossible, or orders of magnitude from any substance.',
    untestable: 'There are no values.',
    wants: 'A table.',
  },
  'entropy-follows-heat-capacity': {
    group: 'tables',
    holds: 'S rises from row to row by the integral of Cp/T',
    formula: 'S(T2) − S(T1) = ∫ Cp/T dT  from T1 to T2',
    tolerance: (policy) => `${rounding} ${cells(policy)} Material: ${entropyLimit(policy)}.`,
    agrees: 'Every interval closes.',
    disagrees: 'An interval does not close; the cell that explains it is named among the suspects, where one does.',
    untestable: 'The table prints no S beside Cp, or has a single row.',
    wants: 'A table of one phase that prints both Cp and S.',
  },
  'enthalpy-follows-heat-capacity': {
    group: 'tables',
    holds: 'H rises from row to row by the integral of Cp',
    formula: 'H(T2) − H(T1) = ∫ Cp dT  from T1 to T2',
    tolerance: (policy) =>
      `${rounding} ${cells(policy)} Material: ${policy.material.enthalpyJPerMol} J/mol in H − H(Tr).`,
    agrees: 'Every interval closes.',
    disagrees: 'An interval does not close; the cell that explains it is named among the suspects, where one does.',
    untestable: 'The table prints no H − H(Tr) beside Cp, or has a single row.',
    wants: 'A table of one phase that prints both Cp and H − H(Tr).',
  },
  'functions-close': {
    group: 'tables',
    holds: 'S, H and the Gibbs function of one row belong together',
    formula: 'S = −[G − H(Tr)]/T + [H − H(Tr)]/T',
    tolerance: (policy) =>
      `The rounding of the three printed numbers, as a worst case. ${cells(policy)} Material: ${entropyLimit(policy)}.`,
    agrees: 'Every row closes.',
    disagrees: 'A row does not close; one of its three numbers is wrong.',
    untestable: 'The table does not print all three of S, H − H(Tr) and −[G − H(Tr)]/T.',
    wants: 'The third of the three columns.',
  },
  'heat-capacity-smooth': {
    group: 'tables',
    holds: 'no heat capacity stands off the curve through its neighbours',
    formula: '|Cp(T) − curve through the other rows| ≤ u',
    tolerance: (policy) => `${cells(policy)} And at least ${percent(policy.material.heatCapacityRelative)} of Cp.`,
    agrees: 'Every point lies on the curve through the others.',
    disagrees: 'A point stands off. A first or last row, which nothing checks from the other side, gives a note only.',
    untestable: 'Fewer than five heat capacities of one phase.',
    wants: 'More points.',
  },
  'entropy-rises': {
    group: 'limits',
    holds: 'S rises with T, and from phase to phase on heating',
    formula: 'S(T2) ≥ S(T1) from row to row;  S_to(Tt) > S_from(Tt) at each first-order transition',
    tolerance: (policy) => significance(policy),
    agrees: 'Entropies rise with temperature and from phase to phase.',
    disagrees: 'An entropy falls, or the phase of higher temperature has less of it.',
    untestable: 'No entropies, or levels that were carried through the transition itself.',
    wants: 'A column of S; for two phases, levels of S that do not rest on the transition between them.',
  },
  'gibbs-continuous': {
    group: 'transitions',
    holds: 'G of both phases is equal at the stated transition',
    formula: 'G_from(Tt, p) = G_to(Tt, p),  G = H − T S,  gas imperfection included for a real boiling point',
    tolerance: (policy) =>
      `${significance(policy)} Material: ${policy.material.transitionTemperatureK} K times |ΔS| of the transition.`,
    agrees: 'The gap lies within its uncertainty.',
    disagrees: 'The gap lies outside it; the suspects say which datum closes it best.',
    untestable: 'One phase has no curve with H and S on the other one’s zeros.',
    wants:
      'H and S of both phases on one zero: a formation enthalpy and an entropy of each, or ΔH and ΔS of a transition between them.',
  },
  'crossing-agrees': {
    group: 'transitions',
    holds: 'the two Gibbs curves cross at the stated temperature',
    formula: 'T where G_from(T, p) = G_to(T, p)  equals  Tt stated',
    tolerance: (policy) =>
      `${significance(policy)} u(T) = u(ΔG)/|ΔS| at the crossing, and the stated temperature's own. Material: ${policy.material.transitionTemperatureK} K.`,
    agrees: 'A crossing lies at the stated temperature.',
    disagrees: 'The nearest crossing lies elsewhere, or there is none.',
    untestable: 'One phase has no curve with H and S on the other one’s zeros, or none that reaches the temperature.',
    wants: 'H and S of both phases on one zero, and heat capacities up to the transition.',
  },
  'transition-entropy-closes': {
    group: 'transitions',
    holds: 'the stated ΔH is T times the stated ΔS',
    formula: 'ΔH = Tt ΔS',
    tolerance: (policy) => `${significance(policy)} Material: ${policy.material.transitionTemperatureK} K times |ΔS|.`,
    agrees: 'The three stated numbers belong together.',
    disagrees: 'One of ΔH, ΔS and Tt is wrong.',
    untestable: 'ΔH or ΔS is not stated.',
    wants: 'The other one of ΔH and ΔS, from the same source.',
  },
  'slope-jumps-only-at-transitions': {
    group: 'transitions',
    holds: 'S and H do not jump inside a phase where no transition is stated',
    formula: 'S(T+) = S(T−) and H(T+) = H(T−) between two rows at one T, where no transition is stated',
    tolerance: () => 'Twice the rounding of both rows.',
    agrees: 'There is no jump inside the phase.',
    disagrees: 'S or H jumps: a transition is missing, or rows on one side are wrong.',
    untestable: 'The table prints neither S nor H − H(Tr).',
    wants: 'A table with S or H − H(Tr).',
  },
  'stated-transition-jumps': {
    group: 'transitions',
    holds: 'a first-order transition has a jump; a continuous one and a glass transition have none',
    formula: 'first order: S_to(Tt) − S_from(Tt) = ΔS ≠ 0;  continuous, glass: = 0',
    tolerance: (policy) => `${significance(policy)} Material: ${policy.material.entropyJPerMolK} J/(mol K).`,
    agrees: 'There is a jump where one is stated, and none where none is.',
    disagrees: 'A stated jump cannot be told from none, or the entropy jumps where none is stated.',
    untestable: 'Neither ΔS nor ΔH is stated, and the levels of the two phases rest on the transition itself.',
    wants: 'ΔS or ΔH of the transition, or an entropy of both phases.',
  },
  'heating-raises-entropy': {
    group: 'transitions',
    holds: 'enthalpy and entropy rise from the low- to the high-temperature phase',
    formula: 'ΔH > 0 and ΔS > 0 at equilibrium, on heating',
    tolerance: (policy) => significance(policy),
    agrees: 'Both rise.',
    disagrees: 'One falls: a lost sign, or from and to exchanged.',
    untestable: 'Neither ΔH nor ΔS is stated, and the curves give none.',
    wants: 'ΔH or ΔS, or curves of both phases.',
  },
  'lowest-curve-is-the-stated-phase': {
    group: 'transitions',
    holds: 'the phase of lowest G is the one that the transitions say',
    formula:
      'argmin over phases of G(T, p) = the stated phase, where the gap exceeds its uncertainty; no crossing without a stated transition',
    tolerance: (policy) => significance(policy),
    agrees: 'The diagram of the curves is the stated one, over the whole range of the data.',
    disagrees: 'Another phase is lowest, or the curves cross where no transition is stated.',
    untestable: 'Fewer than two phases have curves on one zero.',
    wants: 'H and S of two phases on one zero.',
  },
  'adjustment-closes': {
    group: 'across',
    holds: 'all that is stated about a substance, taken together: transitions, anchors, vapour pressures and tables',
    formula:
      'y = 0 with covariance Q; global test yᵀQ⁻¹y against χ²; w(i) = d(i)ᵀQ⁻¹y / √(d(i)ᵀQ⁻¹d(i)) for each number (Baarda 1968)',
    tolerance: (policy) =>
      `${significance(policy)} Material: what would move a transition by ${policy.material.transitionTemperatureK} K, or the number itself beyond its limit.`,
    agrees:
      'The numbers close within their uncertainties; the smallest error that would have shown stands beside each.',
    disagrees: 'A number, or the whole, lies farther off than the uncertainties allow.',
    untestable: 'Nothing else that is stated bears on the number.',
    wants: 'What the coverage names beside it: a transition, an anchor or a table that is independent of it.',
  },
};

function entropyLimit({ material }: Policy): string {
  return `the larger of ${percent(material.entropyRelative)} and ${material.entropyJPerMolK} J/(mol K)`;
}

function percent(share: number): string {
  return `${Number((share * 100).toPrecision(6))} %`;
}
