/**
 * Every published table as data: its fields in order with kind, UCUM unit and description, its key, the words a field may
 * hold. The builders, the Parquet metadata and the Data Package descriptor are all made from this one list.
 */
import type { TableName } from './release.js';

export type FieldKind = 'number' | 'integer' | 'boolean' | 'text';

export interface PublishedField {
  readonly name: string;
  readonly kind: FieldKind;
  /** UCUM code; null for words, flags, counts and numbers whose unit stands in a neighbouring field. */
  readonly unit: string | null;
  readonly description: string;
  /** False where the cell may be empty. */
  readonly required: boolean;
  /** Text fields: the only words that it holds. */
  readonly allowed?: readonly string[];
}

export interface PublishedTable {
  readonly title: string;
  readonly description: string;
  readonly key: readonly string[];
  readonly fields: readonly PublishedField[];
}

const number = <const N extends string>(name: N, unit: string | null, description: string, required = true) =>
  ({ name, kind: 'number', unit, description, required }) as const;
const integer = <const N extends string>(name: N, description: string, required = true) =>
  ({ name, kind: 'integer', unit: null, description, required }) as const;
const flag = <const N extends string>(name: N, description: string, required = true) =>
  ({ name, kind: 'boolean', unit: null, description, required }) as const;
const text = <const N extends string>(name: N, description: string, required = true) =>
  ({ name, kind: 'text', unit: null, description, required }) as const;
const word = <const N extends string>(name: N, allowed: readonly string[], description: string, required = true) =>
  ({ name, kind: 'text', unit: null, description, required, allowed }) as const;

const optional = false;
const PER_MOL_K = 'J/(mol.K)';
const PER_MOL = 'J/mol';

const substance = text('substance', 'Id of the substance');
const phase = text('phase', 'Phase, by the state symbols of the IUPAC Green Book');
const isobar = number(
  'isobar_Pa',
  'Pa',
  'Empty: the standard state. Else the isobar of the real substance that the source tables are for',
  optional,
);
const finding = text('finding', 'Id of the finding');
const address = (what: string) =>
  [
    text('source', `Source folder of ${what}`, optional),
    text('file', `File inside the source folder, of ${what}`, optional),
    integer('line', `Line in the file, the first is 1; 0 is the descriptor; of ${what}`, optional),
    text('column', `Column header as printed, of ${what}`, optional),
  ] as const;

const functions = {
  title: 'Thermal functions',
  description:
    'Heat capacity, entropy, enthalpy and Gibbs energy of each phase at the published temperatures, from the one curve of the phase. G = H - TS on the declared zeros, not a Gibbs energy of formation',
  key: ['substance', 'phase', 'isobar_Pa', 'temperature_K', 'side'],
  fields: [
    substance,
    phase,
    isobar,
    number('temperature_K', 'K', 'Temperature'),
    number('heat_capacity_J_per_mol_K', PER_MOL_K, 'Molar heat capacity at constant pressure'),
    number('entropy_J_per_mol_K', PER_MOL_K, 'Molar entropy; empty where its level is unknown', optional),
    number('enthalpy_J_per_mol', PER_MOL, 'Molar enthalpy; empty where its level is unknown', optional),
    number('gibbs_energy_J_per_mol', PER_MOL, 'Molar Gibbs energy; empty where a level is unknown', optional),
    number('u_heat_capacity_J_per_mol_K', PER_MOL_K, 'Standard uncertainty of the heat capacity (k = 1)'),
    number('u_entropy_J_per_mol_K', PER_MOL_K, 'Standard uncertainty of the entropy (k = 1)', optional),
    number('u_enthalpy_J_per_mol', PER_MOL, 'Standard uncertainty of the enthalpy (k = 1)', optional),
    number('u_gibbs_energy_J_per_mol', PER_MOL, 'Standard uncertainty of the Gibbs energy (k = 1)', optional),
    flag('stable', 'True where no other phase has a lower Gibbs energy at the pressure of the policy'),
    word('basis', ['measured', 'interpolated', 'extrapolated'], 'How the row stands to the raw tables'),
    word('side', ['below', 'above'], 'Side of a two-sided temperature; empty at every other', optional),
  ],
} as const satisfies PublishedTable;

const pieces = {
  title: 'Pieces of the curves',
  description:
    'The curve of each phase: Cp = c0 + c1 x + c2 x^2 + c3 x^3, x = T - low_K, from low_K to high_K; H and S at low_K. Cp, H, S and G follow exactly',
  key: ['substance', 'phase', 'isobar_Pa', 'low_K'],
  fields: [
    substance,
    phase,
    isobar,
    number('low_K', 'K', 'Where the piece begins'),
    number('high_K', 'K', 'Where the piece ends'),
    number('c0', PER_MOL_K, 'Heat capacity at low_K'),
    number('c1', 'J/(mol.K2)', 'Coefficient of x'),
    number('c2', 'J/(mol.K3)', 'Coefficient of x^2'),
    number('c3', 'J/(mol.K4)', 'Coefficient of x^3'),
    number('enthalpy_J_per_mol', PER_MOL, 'Molar enthalpy at low_K; empty where its level is unknown', optional),
    number('entropy_J_per_mol_K', PER_MOL_K, 'Molar entropy at low_K; empty where its level is unknown', optional),
  ],
} as const satisfies PublishedTable;

const phases = {
  title: 'Phases',
  description: 'Range, zeros and conventions of each published phase',
  key: ['substance', 'phase', 'isobar_Pa'],
  fields: [
    substance,
    phase,
    isobar,
    number('measured_from_K', 'K', 'Lowest temperature of the raw tables'),
    number('measured_to_K', 'K', 'Highest temperature of the raw tables'),
    number('cleared_from_K', 'K', 'The measured range where no fault or doubt names the phase; else empty', optional),
    number('cleared_to_K', 'K', 'The measured range where no fault or doubt names the phase; else empty', optional),
    text('enthalpy_zero', 'What the enthalpy counts from', optional),
    text('entropy_zero', 'What the entropy counts from', optional),
    number('standard_pressure_Pa', 'Pa', 'Pressure of the standard state; empty on an isobar', optional),
    word('gas_state', ['ideal', 'real'], 'Whether a gas is the ideal one of the standard state', optional),
    text('vapour_species', 'Species of the vapour where it is not the formula unit', optional),
    number('vapour_formula_units', '1', 'Formula units in a molecule of that species', optional),
    number('molar_volume_m3_per_mol', 'm3/mol', 'Molar volume of a condensed phase', optional),
  ],
} as const satisfies PublishedTable;

const transitions = {
  title: 'Transitions',
  description:
    'Each stated transition beside what the curves give, and crossings of the curves that nobody stated at that pressure. A transition that several sources state has a row for each',
  key: ['substance', 'transition'],
  fields: [
    substance,
    integer('transition', 'Running number within the substance'),
    isobar,
    text('from_phase', 'Phase below the transition'),
    text('to_phase', 'Phase above it'),
    word('order', ['first', 'continuous', 'glass'], 'Order as stated; empty where nothing was stated', optional),
    word('gas', ['real', 'ideal'], 'real: gas imperfection included; ideal: fugacity equals the pressure', optional),
    number('pressure_Pa', 'Pa', 'Pressure of the transition'),
    number('stated_temperature_K', 'K', 'Temperature as stated', optional),
    number('u_stated_temperature_K', 'K', 'Its standard uncertainty (k = 1)', optional),
    number('computed_temperature_K', 'K', 'Temperature where the Gibbs energies are equal', optional),
    number('u_computed_temperature_K', 'K', 'Its standard uncertainty (k = 1)', optional),
    number('difference_K', 'K', 'Computed less stated temperature', optional),
    number('transition_enthalpy_J_per_mol', PER_MOL, 'Enthalpy of transition, from the curves', optional),
    number('transition_entropy_J_per_mol_K', PER_MOL_K, 'Entropy of transition, from the curves', optional),
    number(
      'gibbs_gap_J_per_mol',
      PER_MOL,
      'Gibbs energy of to_phase less from_phase at the stated temperature',
      optional,
    ),
    number('u_gibbs_gap_J_per_mol', PER_MOL, 'Its standard uncertainty (k = 1)', optional),
    number('slope_jump_J_per_mol_K', PER_MOL_K, 'Jump of dG/dT: the entropy of transition, negative', optional),
    flag('stable', 'True where both phases are the lowest there', optional),
    word('outcome', ['agrees', 'disagrees', 'untestable'], 'Stated against computed; empty where unstated', optional),
    word('evidence', ['independent', 'arithmetic'], 'Kind of evidence behind the outcome', optional),
  ],
} as const satisfies PublishedTable;

const substances = {
  title: 'Substances',
  description:
    'Every substance with its verdict. What is withheld stands here, with its findings, and nowhere among the values',
  key: ['substance'],
  fields: [
    substance,
    text('name', 'Name', optional),
    text('formula', 'Chemical formula', optional),
    number('molar_mass_g_per_mol', 'g/mol', 'Molar mass', optional),
    word(
      'verdict',
      ['cleared', 'flagged', 'withheld'],
      'cleared: nothing stands against it; flagged: published with doubts; withheld: not published',
    ),
    integer('faults', 'Number of findings that are faults, accepted ones apart'),
    integer('doubts', 'Number of findings that are doubts, accepted ones apart'),
    integer('notes', 'Number of findings that are notes, accepted ones apart'),
    integer('accepted', 'Number of findings that a curator has accepted'),
  ],
} as const satisfies PublishedTable;

const findings = {
  title: 'Findings',
  description: 'Every disagreement found, and every thing that could not be read',
  key: ['finding'],
  fields: [
    finding,
    text('evidence_hash', 'Hash of the printed cells behind it; an acceptance lapses when it changes'),
    text('substance', 'Id of the substance; empty where the finding belongs to a source or to the run', optional),
    text('rule', 'Name of the rule'),
    word('severity', ['fault', 'doubt', 'note'], 'fault: the substance is withheld; doubt: published and flagged'),
    text('from_phase', 'Phase, or the phase below a transition', optional),
    text('to_phase', 'Phase above a transition', optional),
    number('temperature_K', 'K', 'Where it stands', optional),
    number('observed', null, 'What was found, in the unit of the field unit', optional),
    number('expected', null, 'What was expected', optional),
    number('difference', null, 'Observed less expected', optional),
    number('tolerance', null, 'What the uncertainties allow', optional),
    text('unit', 'UCUM code of observed, expected, difference and tolerance', optional),
    ...address('the cell to look at first'),
    text('message', 'The finding as a sentence'),
    text('cause', 'Id of the finding that this one follows from', optional),
    flag('accepted', 'True where a curator has accepted it'),
  ],
} as const satisfies PublishedTable;

const suspects = {
  title: 'Suspects',
  description: 'The cells under suspicion for a finding, the likeliest first',
  key: ['finding', 'place'],
  fields: [
    finding,
    substance,
    integer('place', 'The likeliest is 1'),
    integer('group', 'Suspects that the data cannot tell apart share a group'),
    integer('cells', 'Number of cells that the hypothesis touches'),
    ...address('the cell'),
    text('printed', 'The cell as printed', optional),
    number('observed', null, 'The cell in SI, in the unit of the field unit'),
    text('unit', 'UCUM code of observed, proposed, u_proposed and smallest_detectable'),
    number('normalised_residual', '1', 'Normalised residual of the cell'),
    number('redundancy', '1', 'Redundancy number: 0 nothing checks the cell, 1 fully checked'),
    number('proposed', null, 'The value that the rest of the data put there, in SI'),
    number('u_proposed', null, 'Its standard uncertainty (k = 1)'),
    text('proposed_printed', 'The proposed value in the unit of the column', optional),
    number('smallest_detectable', null, 'The smallest error in this cell that the data would reveal'),
    text('explanation', 'The usual slip that would explain it', optional),
    text('explained_printed', 'The cell as that slip would have it', optional),
    text('told_apart_by', 'The measurement that would tell it from the next suspect of its group', optional),
  ],
} as const satisfies PublishedTable;

const coverage = {
  title: 'Coverage',
  description: 'What each rule could say at each place, and what it lacked where it could say nothing',
  key: ['substance', 'rule', 'place'],
  fields: [
    substance,
    text('rule', 'Name of the rule'),
    text('place', 'A phase, two phases joined by > for a transition, or empty for the substance', optional),
    word('outcome', ['agrees', 'disagrees', 'untestable'], 'What the rule says'),
    word('evidence', ['independent', 'arithmetic'], 'Separate measurements, or one source against itself', optional),
    text('missing', 'What an untestable rule lacks', optional),
    number(
      'smallest_detectable',
      null,
      'The smallest error that the rule would reveal, in the unit of the rule',
      optional,
    ),
  ],
} as const satisfies PublishedTable;

const evidence = {
  title: 'Evidence',
  description: 'Every printed cell behind a finding',
  key: ['finding', 'source', 'file', 'line', 'column'],
  fields: [finding, ...address('the cell'), text('printed', 'The cell as printed', optional)],
} as const satisfies PublishedTable;

const provenance = {
  title: 'Provenance',
  description: 'Where each stretch of a curve, each anchor and each stated transition was printed',
  key: ['substance', 'phase', 'isobar_Pa', 'quantity', 'low_K', 'source', 'file', 'first_line'],
  fields: [
    substance,
    text('phase', 'Phase, or two phases joined by > for a transition'),
    isobar,
    text('quantity', 'Quantity taken from there'),
    number('low_K', 'K', 'Where the stretch begins', optional),
    number('high_K', 'K', 'Where it ends', optional),
    text('source', 'Source folder'),
    text('file', 'File inside the source folder'),
    integer('first_line', 'First line of the rows used; 0 is the descriptor'),
    integer('last_line', 'Last line of the rows used'),
    integer('corrections', 'Number of corrections in force among them', optional),
    number(
      'step_heat_capacity_J_per_mol_K',
      PER_MOL_K,
      'Heat capacity of this stretch less that of the preferred one where they join',
      optional,
    ),
  ],
} as const satisfies PublishedTable;

const inputs = {
  title: 'Inputs',
  description: 'Every file that the release was made from',
  key: ['source', 'file'],
  fields: [
    text('source', 'Source folder; empty for files that belong to no source', optional),
    text('file', 'File inside the source folder'),
    number('bytes', 'By', 'Size'),
    text('sha256', 'SHA-256 of the file, hexadecimal'),
    text('citation', 'Citation of the source', optional),
    text('licence', 'Licence of the source', optional),
    word('basis', ['measured', 'evaluated', 'computed', 'estimated'], 'What kind of source it is', optional),
  ],
} as const satisfies PublishedTable;

export const RELEASE_TABLES = {
  functions,
  pieces,
  phases,
  transitions,
  substances,
  findings,
  suspects,
  coverage,
  evidence,
  provenance,
  inputs,
} as const satisfies Record<TableName, PublishedTable>;
