import type { JudgedTransition, ReconciledCase } from '../../schemas/checked.js';
import type { Crossing, PhaseCurve } from '../../schemas/curves.js';
import type { StatedTransition } from '../../schemas/harmonised.js';
import { gibbsInDiagram } from '../core/physics/diagram.js';
import { gasTerm } from '../core/physics/pressure-terms.js';
import { figure, plusMinus, sayFinding, sayPlace, saySuspects } from '../report/report.js';
import { type SketchCurve, sketch } from './sketch.js';
import { count, table, wrap } from './text.js';

const WIDTH = 80;

/** One substance for the terminal: phases, transitions stated and computed, findings, and sketches of G against T. */
export function showLines(shown: ReconciledCase, pressurePa: number): string[] {
  const { assembled, judged } = shown.checked;
  const { substance } = assembled.examined.harmonised;
  const mass = Number.isFinite(substance.molarMassGPerMol) ? `, ${figure(substance.molarMassGPerMol)} g/mol` : '';
  return [
    ...wrap(
      `${substance.name} (${substance.id}), ${substance.formula || 'no formula'}${mass}: ${shown.verdict}`,
      WIDTH,
    ),
    ...section('Phases', phaseLines(assembled.curves)),
    ...section('Transitions, stated and computed; ΔS of the curves in J/(mol K)', transitionLines(judged)),
    ...section('Crossings of the curves that nobody states', unstatedLines(assembled.crossings, judged, pressurePa)),
    ...section(`Findings (${count(shown.findings.length, 'finding')})`, findingLines(shown)),
    ...sketchLines(shown, pressurePa),
  ];
}

function section(title: string, lines: readonly string[]): string[] {
  return lines.length === 0 ? [] : ['', title, ...lines.map((line) => `  ${line}`)];
}

function phaseLines(curves: readonly PhaseCurve[]): string[] {
  if (curves.length === 0) return ['no phase has a curve'];
  const rows = curves.map((curve) => [
    curve.phase,
    `${figure(curve.measuredFromK)} to ${figure(curve.measuredToK)}`,
    curve.enthalpyLevelFrom === 'none' ? '–' : curve.enthalpyLevelFrom,
    curve.entropyLevelFrom === 'none' ? '–' : curve.entropyLevelFrom,
    curve.family.isobarPa === null ? 'standard state' : `${figure(curve.family.isobarPa)} Pa`,
  ]);
  return table([['phase', 'data/K', 'H from', 'S from', 'pressure'], ...rows]);
}

function transitionLines(judged: readonly JudgedTransition[]): string[] {
  if (judged.length === 0) return ['none is stated'];
  const rows = judged.map((one) => {
    const { stated, computedK, uComputedK, outcome, evidence } = one;
    const computed = computedK === null ? '–' : plusMinus(computedK, uComputedK ?? 0);
    return [
      `${stated.from} → ${stated.to}`,
      figure(stated.temperature.value),
      computed,
      computedK === null ? '–' : difference(computedK, stated, uComputedK),
      one.curveEntropyJPerMolK === null ? '–' : figure(one.curveEntropyJPerMolK, 0.1),
      `${outcome}${evidence === null ? '' : ` (${evidence})`}${stated.order === 'first' ? '' : `, ${stated.order}`}`,
    ];
  });
  return table([['', 'stated/K', 'computed/K', 'diff.', 'ΔS', ''], ...rows], [1, 2, 3, 4]);
}

function difference(computedK: number, { temperature }: StatedTransition, uK: number | null): string {
  const value = computedK - temperature.value;
  return `${value > 0 ? '+' : ''}${figure(value, uK)}`;
}

/** Stable crossings at the diagram's pressure that no stated transition joins. */
function unstatedLines(
  crossings: readonly Crossing[],
  judged: readonly JudgedTransition[],
  pressurePa: number,
): string[] {
  const stated = new Set(judged.flatMap(({ stated: { from, to } }) => [`${from}>${to}`, `${to}>${from}`]));
  return crossings
    .filter(({ stable, from, to }) => stable && !stated.has(`${from}>${to}`))
    .filter((crossing) => crossing.pressurePa === pressurePa && crossing.gas !== 'ideal')
    .map(
      ({ from, to, temperatureK, uK, measured }) =>
        `${from} → ${to} at ${plusMinus(temperatureK, uK)} K${measured ? '' : ', beyond the data'}`,
    );
}

function findingLines({ findings, suspects }: ReconciledCase): string[] {
  return findings.flatMap((finding) => {
    const own = suspects.filter((suspect) => suspect.finding === finding.id);
    const place = finding.address === null ? '' : `  ${sayPlace(finding.address)}`;
    return [
      `${finding.severity}  ${finding.rule}${place}  [${finding.id.slice(0, 8)}]`,
      ...wrap(sayFinding(finding), WIDTH - 6).map((line) => `    ${line}`),
      ...saySuspects(own).flatMap((line) =>
        wrap(line, WIDTH - 8).map((part, i) => (i === 0 ? `    ${part}` : `      ${part}`)),
      ),
    ];
  });
}

function sketchLines(shown: ReconciledCase, pressurePa: number): string[] {
  const { assembled } = shown.checked;
  const isobars = [...new Set(assembled.curves.map(({ family }) => family.isobarPa))];
  return isobars.flatMap((isobarPa) => {
    const levelled = assembled.curves.filter(
      (curve) => curve.family.isobarPa === isobarPa && curve.hasEnthalpyLevel && curve.hasEntropyLevel,
    );
    if (levelled.length < 2) return [];
    const [lowK, highK] = rangeOf(levelled, assembled.crossings, isobarPa ?? pressurePa);
    const lines = sketch(
      levelled.map((curve) => sampled(curve, shown, pressurePa, lowK, highK)),
      WIDTH,
    );
    const at = isobarPa === null ? pressurePa : isobarPa;
    return lines.length === 0 ? [] : ['', `G against T at ${figure(at)} Pa`, ...lines];
  });
}

/** Around the stable crossings where there are any, else all of the data. */
function rangeOf(curves: readonly PhaseCurve[], crossings: readonly Crossing[], pressurePa: number): [number, number] {
  const stable = crossings
    .filter((crossing) => crossing.stable && crossing.pressurePa === pressurePa && crossing.gas !== 'ideal')
    .map(({ temperatureK }) => temperatureK);
  const low = Math.max(1, Math.min(...curves.map(({ measuredFromK }) => measuredFromK)));
  const high = Math.max(...curves.map(({ measuredToK }) => measuredToK));
  if (stable.length === 0) return [low, high];
  return [Math.max(low, 0.7 * Math.min(...stable)), Math.min(high, 1.2 * Math.max(...stable))];
}

function sampled(
  curve: PhaseCurve,
  shown: ReconciledCase,
  pressurePa: number,
  lowK: number,
  highK: number,
): SketchCurve {
  const { substance, transitions } = shown.checked.assembled.examined.harmonised;
  const gas = curve.phase === 'g' || curve.phase.startsWith('g-');
  const boilingK = transitions.find(({ to }) => to === 'g')?.temperature.value ?? 500;
  const phase = {
    curve,
    lowK: Math.max(lowK, curve.knotK[0]!),
    highK: Math.min(highK, curve.knotK[curve.knotK.length - 1]!),
    shift: gas && curve.family.isobarPa === null ? gasTerm(substance, 'real', pressurePa, boilingK).shift : null,
    formulaUnits: gas ? (substance.vapourSpecies?.formulaUnits ?? 1) : 1,
  };
  const points = phase.highK > phase.lowK ? 160 : 0;
  const temperatureK = Float64Array.from(
    { length: points },
    (_, i) => phase.lowK + ((phase.highK - phase.lowK) * i) / (points - 1),
  );
  return {
    phase: curve.phase,
    temperatureK,
    gibbsEnergyJPerMol: temperatureK.map((one) => gibbsInDiagram(phase, one)),
  };
}
