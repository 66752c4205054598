/** Anchors in SI, gas entropies at 1 bar, counted from 298.15 K where the way there is short. */
import type { Finding } from '../../schemas/finding.js';
import type { Anchor } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { RawRow } from '../../schemas/raw.js';
import { REFERENCE_TEMPERATURE_K } from '../core/constants.js';
import { datumOf, moved } from './datum.js';
import type { Draft } from './draft.js';
import { isGas, standardPressureTerm } from './gas-pressure.js';
import { heatCapacityNear } from './heat-capacity-near.js';
import { readingFinding } from './reading-finding.js';
import type { UnitBook } from './unit-book.js';

/** The farthest that an anchor is moved with one heat capacity [K]. */
const LONGEST_MOVE_K = 30;
/** Share of a move that its heat capacity may be off by. */
const MOVE_DOUBT = 0.005;
/** A formation reaction's heat capacity and entropy are seldom larger [J/(mol K)]: bounds for a move without them. */
const FORMATION_HEAT_CAPACITY = 50;
const FORMATION_ENTROPY = 300;

export function harmoniseAnchor(
  row: RawRow,
  substance: string,
  drafts: readonly Draft[],
  book: UnitBook,
  policy: Policy,
  findings: Finding[],
): Anchor | null {
  const { table } = row;
  const phase = row.words.phase;
  if (phase === undefined) return null;
  const entropy = datumOf(row, 'entropy', book, policy);
  const term = isGas(phase) && table.isobarPa === null ? standardPressureTerm(table.standardPressurePa) : 0;
  const stated = datumOf(row, 'temperature', book, policy);
  const anchor: Anchor = {
    table,
    phase,
    referenceTemperatureK: stated?.value ?? table.referenceTemperatureK,
    enthalpyOfFormation: datumOf(row, 'enthalpy-of-formation', book, policy),
    entropy: entropy === null || term === 0 ? entropy : moved(entropy, term),
    gibbsEnergyOfFormation: datumOf(row, 'gibbs-energy-of-formation', book, policy),
    enthalpyFromZero: datumOf(row, 'enthalpy-from-zero', book, policy),
    heatCapacity: datumOf(row, 'heat-capacity', book, policy),
  };
  const way = REFERENCE_TEMPERATURE_K - anchor.referenceTemperatureK;
  if (way === 0) return anchor;
  const middle = anchor.referenceTemperatureK + way / 2;
  const heatCapacity = heatCapacityNear(drafts, phase, table.source, middle) ?? anchor.heatCapacity?.value ?? null;
  const needed = anchor.entropy !== null || anchor.enthalpyFromZero !== null;
  if (Math.abs(way) > LONGEST_MOVE_K || (needed && heatCapacity === null)) {
    findings.push(leftWhereItIs(row, substance, phase, anchor.referenceTemperatureK));
    return anchor;
  }
  return atReference(anchor, way, heatCapacity ?? 0);
}

/** S by Cp ln(T2/T1), H - H(0) by Cp (T2 - T1); formation quantities by what their row says, else by a bound in u. */
function atReference(anchor: Anchor, way: number, heatCapacity: number): Anchor {
  const from = anchor.referenceTemperatureK;
  const { entropy, enthalpyFromZero, enthalpyOfFormation, gibbsEnergyOfFormation } = anchor;
  const dS = heatCapacity * Math.log(REFERENCE_TEMPERATURE_K / from);
  const dH = heatCapacity * way;
  const formationEntropy =
    enthalpyOfFormation !== null && gibbsEnergyOfFormation !== null
      ? (enthalpyOfFormation.value - gibbsEnergyOfFormation.value) / from
      : null;
  const bound = (perKelvin: number): number => (perKelvin * Math.abs(way)) / Math.sqrt(3);
  const byDefinition = (value: number): boolean => value === 0;
  return {
    ...anchor,
    referenceTemperatureK: REFERENCE_TEMPERATURE_K,
    entropy: entropy && moved(entropy, dS, MOVE_DOUBT * Math.abs(dS)),
    enthalpyFromZero: enthalpyFromZero && moved(enthalpyFromZero, dH, MOVE_DOUBT * Math.abs(dH)),
    enthalpyOfFormation:
      enthalpyOfFormation && !byDefinition(enthalpyOfFormation.value)
        ? moved(enthalpyOfFormation, 0, bound(FORMATION_HEAT_CAPACITY))
        : enthalpyOfFormation,
    gibbsEnergyOfFormation:
      gibbsEnergyOfFormation && !byDefinition(gibbsEnergyOfFormation.value)
        ? moved(
            gibbsEnergyOfFormation,
            formationEntropy === null ? 0 : -formationEntropy * way,
            formationEntropy === null ? bound(FORMATION_ENTROPY) : 0,
          )
        : gibbsEnergyOfFormation,
  };
}

function leftWhereItIs(row: RawRow, substance: string, phase: string, referenceK: number): Finding {
  return readingFinding({
    substance,
    table: row.table,
    problem: 'required-missing',
    read: `The way from ${referenceK} K to ${REFERENCE_TEMPERATURE_K} K`,
    wanted: `an anchor at ${REFERENCE_TEMPERATURE_K} K, or one within ${LONGEST_MOVE_K} K of it and a heat capacity of ${phase} in between`,
    remedy: 'Give the heat capacity (a column or a table), or the anchor at 298.15 K; until then it stays where it is.',
    line: row.line,
    column: '',
    fromPhase: phase,
  });
}
