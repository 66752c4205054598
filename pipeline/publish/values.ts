/** The tables of values: functions, pieces, phases, transitions and where they come from. Published substances only. */
import type { ReconciledCase } from '../../schemas/checked.js';
import type { CurveFamily, FunctionRows, PhaseCurve } from '../../schemas/curves.js';
import type { Datum } from '../../schemas/harmonised.js';
import { RELEASE_TABLES } from '../../schemas/release-tables.js';
import { type Builders, buildersFor, type NumberBuilder } from './builders.js';

/** IUPAC's standard pressure since 1982; what gas entropies were converted to when the tables were harmonised. */
const STANDARD_PRESSURE_PA = 100000;
const BASES = ['measured', 'interpolated', 'extrapolated'] as const;
const SIDES = [null, 'below', 'above'] as const;

export type ValueBuilders = ReturnType<typeof valueBuilders>;

export function valueBuilders() {
  return {
    functions: buildersFor(RELEASE_TABLES.functions),
    pieces: buildersFor(RELEASE_TABLES.pieces),
    phases: buildersFor(RELEASE_TABLES.phases),
    provenance: buildersFor(RELEASE_TABLES.provenance),
  };
}

/** Adds one substance that is published. */
export function addValues(to: ValueBuilders, published: ReconciledCase): void {
  const { assembled } = published.checked;
  const substance = assembled.examined.harmonised.substance.id;
  for (const curve of assembled.curves) {
    for (const rows of assembled.functions) {
      if (rows.phase === curve.phase && sameFamily(rows.family, curve.family)) {
        addFunctions(to.functions, substance, curve, rows);
      }
    }
    addPieces(to.pieces, substance, curve);
    addPhase(to.phases, published, curve);
    addOrigins(to.provenance, substance, curve);
  }
  addPrintedData(to.provenance, published);
}

export function sameFamily(a: CurveFamily, b: CurveFamily): boolean {
  return a.isobarPa === b.isobarPa && a.enthalpyZero === b.enthalpyZero && a.entropyZero === b.entropyZero;
}

function addFunctions(
  to: Builders<typeof RELEASE_TABLES.functions>,
  substance: string,
  curve: PhaseCurve,
  rows: FunctionRows,
): void {
  const { hasEnthalpyLevel, hasEntropyLevel } = curve;
  const count = rows.rows;
  const levelled = (builder: NumberBuilder, known: boolean, values: Float64Array) =>
    known ? builder.append(values) : builder.fill(null, count);
  to.substance.fill(substance, count);
  to.phase.fill(rows.phase, count);
  to.isobar_Pa.fill(rows.family.isobarPa, count);
  to.temperature_K.append(rows.temperatureK);
  to.heat_capacity_J_per_mol_K.append(rows.heatCapacityJPerMolK);
  levelled(to.entropy_J_per_mol_K, hasEntropyLevel, rows.entropyJPerMolK);
  levelled(to.enthalpy_J_per_mol, hasEnthalpyLevel, rows.enthalpyJPerMol);
  levelled(to.gibbs_energy_J_per_mol, hasEnthalpyLevel && hasEntropyLevel, rows.gibbsEnergyJPerMol);
  to.u_heat_capacity_J_per_mol_K.append(rows.uHeatCapacityJPerMolK);
  levelled(to.u_entropy_J_per_mol_K, hasEntropyLevel, rows.uEntropyJPerMolK);
  levelled(to.u_enthalpy_J_per_mol, hasEnthalpyLevel, rows.uEnthalpyJPerMol);
  levelled(to.u_gibbs_energy_J_per_mol, hasEnthalpyLevel && hasEntropyLevel, rows.uGibbsEnergyJPerMol);
  to.stable.append(rows.stable);
  to.basis.appendChoice(BASES, rows.basis);
  to.side.appendChoice(SIDES, rows.side);
}

/** A knot given twice (a two-sided temperature) has no interval between its sides, and so no piece. */
function addPieces(to: Builders<typeof RELEASE_TABLES.pieces>, substance: string, curve: PhaseCurve): void {
  const { knotK } = curve;
  for (let from = 0, i = 1; i <= knotK.length; i++) {
    if (i < knotK.length && knotK[i] !== knotK[i - 1]) continue;
    if (i - 1 > from) addRun(to, substance, curve, from, i - 1);
    from = i;
  }
}

/** The pieces between the knots `from` and `last`. */
function addRun(
  to: Builders<typeof RELEASE_TABLES.pieces>,
  substance: string,
  curve: PhaseCurve,
  from: number,
  last: number,
): void {
  const count = last - from;
  to.substance.fill(substance, count);
  to.phase.fill(curve.phase, count);
  to.isobar_Pa.fill(curve.family.isobarPa, count);
  to.low_K.append(curve.knotK.subarray(from, last));
  to.high_K.append(curve.knotK.subarray(from + 1, last + 1));
  to.c0.append(curve.c0.subarray(from, last));
  to.c1.append(curve.c1.subarray(from, last));
  to.c2.append(curve.c2.subarray(from, last));
  to.c3.append(curve.c3.subarray(from, last));
  if (curve.hasEnthalpyLevel) to.enthalpy_J_per_mol.append(curve.enthalpyJPerMol.subarray(from, last));
  else to.enthalpy_J_per_mol.fill(null, count);
  if (curve.hasEntropyLevel) to.entropy_J_per_mol_K.append(curve.entropyJPerMolK.subarray(from, last));
  else to.entropy_J_per_mol_K.fill(null, count);
}

function addPhase(to: Builders<typeof RELEASE_TABLES.phases>, published: ReconciledCase, curve: PhaseCurve): void {
  const { substance } = published.checked.assembled.examined.harmonised;
  const isobarPa = curve.family.isobarPa;
  const gas = isGas(curve.phase);
  const clear = !published.findings.some(
    ({ severity, accepted, fromPhase, toPhase }) =>
      severity !== 'note' && !accepted && (fromPhase === curve.phase || toPhase === curve.phase),
  );
  to.substance.push(substance.id);
  to.phase.push(curve.phase);
  to.isobar_Pa.push(isobarPa);
  to.measured_from_K.push(curve.measuredFromK);
  to.measured_to_K.push(curve.measuredToK);
  to.cleared_from_K.push(clear ? curve.measuredFromK : null);
  to.cleared_to_K.push(clear ? curve.measuredToK : null);
  to.enthalpy_zero.push(curve.hasEnthalpyLevel ? curve.family.enthalpyZero : null);
  to.entropy_zero.push(curve.hasEntropyLevel ? curve.family.entropyZero : null);
  to.standard_pressure_Pa.push(isobarPa === null ? STANDARD_PRESSURE_PA : null);
  to.gas_state.push(gas ? (isobarPa === null ? 'ideal' : 'real') : null);
  to.vapour_species.push(gas && substance.vapourSpecies ? substance.vapourSpecies.formula : null);
  to.vapour_formula_units.push(gas && substance.vapourSpecies ? substance.vapourSpecies.formulaUnits : null);
  to.molar_volume_m3_per_mol.push(null);
}

function isGas(phase: string): boolean {
  return phase === 'g' || phase.startsWith('g-');
}

type Provenance = Builders<typeof RELEASE_TABLES.provenance>;

function addOrigins(to: Provenance, substance: string, curve: PhaseCurve): void {
  for (const origin of curve.origins) {
    to.substance.push(substance);
    to.phase.push(curve.phase);
    to.isobar_Pa.push(curve.family.isobarPa);
    to.quantity.push('heat-capacity');
    to.low_K.push(origin.lowK);
    to.high_K.push(origin.highK);
    to.source.push(origin.source);
    to.file.push(origin.file);
    to.first_line.push(origin.firstLine);
    to.last_line.push(origin.lastLine);
    to.corrections.push(origin.corrections);
    to.step_heat_capacity_J_per_mol_K.push(origin.stepHeatCapacityJPerMolK);
  }
}

function addPrintedData(to: Provenance, published: ReconciledCase): void {
  const { substance, anchors, transitions } = published.checked.assembled.examined.harmonised;
  const add = (phase: string, isobarPa: number | null, quantity: string, atK: number, datum: Datum | null) => {
    if (datum === null) return;
    to.substance.push(substance.id);
    to.phase.push(phase);
    to.isobar_Pa.push(isobarPa);
    to.quantity.push(quantity);
    to.low_K.push(atK);
    to.high_K.push(atK);
    to.source.push(datum.address.source);
    to.file.push(datum.address.file);
    to.first_line.push(datum.address.line);
    to.last_line.push(datum.address.line);
    to.corrections.push(null);
    to.step_heat_capacity_J_per_mol_K.push(null);
  };
  for (const anchor of anchors) {
    const at = anchor.referenceTemperatureK;
    const { phase, table } = anchor;
    add(phase, table.isobarPa, 'enthalpy-of-formation', at, anchor.enthalpyOfFormation);
    add(phase, table.isobarPa, 'entropy', at, anchor.entropy);
    add(phase, table.isobarPa, 'gibbs-energy-of-formation', at, anchor.gibbsEnergyOfFormation);
    add(phase, table.isobarPa, 'enthalpy-from-zero', at, anchor.enthalpyFromZero);
    add(phase, table.isobarPa, 'heat-capacity', at, anchor.heatCapacity);
  }
  for (const stated of transitions) {
    const place = `${stated.from}>${stated.to}`;
    const at = stated.temperature.value;
    add(place, stated.table.isobarPa, 'transition-temperature', at, stated.temperature);
    add(place, stated.table.isobarPa, 'transition-enthalpy', at, stated.enthalpy);
    add(place, stated.table.isobarPa, 'transition-entropy', at, stated.entropy);
  }
}
