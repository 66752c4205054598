/** Every sentence that people read about findings is made here, and nowhere else. */

import type { Finding, FindingDetail } from '../../schemas/finding.js';
import type { Address } from '../../schemas/harmonised.js';
import { sayExplanation } from './explanations.js';
import { figure, plusMinus, unitInWords } from './figures.js';
import { READING } from './reading-words.js';
import { statedPlace, symbol } from './symbols.js';

type Detail<Code extends FindingDetail['code']> = Extract<FindingDetail, { code: Code }>;

/**
 * What was found, what was expected, where, and what to do next, with the numbers: one line of plain text.
 * A pure function of the finding; it computes nothing.
 */
export function sayFinding(finding: Finding): string {
  return join(told(finding), where(finding), gravity(finding), finding.accepted ? 'Accepted by a curator.' : '');
}

/** `lead-study/points.csv line 412, column S`; a line of 0 is the descriptor or the whole file. */
export function sayAddress({ source, file, line, column }: Address): string {
  const path = source === '' || file === '' ? source + file : `${source}/${file}`;
  const what = /^character \d+$/.test(column) ? column : `column ${column}`;
  return `${path}${line > 0 ? ` line ${line}` : ''}${column === '' ? '' : `, ${what}`}`;
}

/** `lead-study/points.csv:412 S`, as editors and terminals like it. */
export function sayPlace({ source, file, line, column }: Address): string {
  const path = source === '' || file === '' ? source + file : `${source}/${file}`;
  return `${path}${line > 0 ? `:${line}` : ''}${column === '' ? '' : ` ${column}`}`;
}

function told(finding: Finding): string {
  const { detail } = finding;
  switch (detail.code) {
    case 'reading':
      return reading(detail);
    case 'rows-disagree':
      return (
        `Two rows at ${kelvin(finding.temperatureK)} disagree: ${symbol(detail.quantity)} is ${detail.first} here and ` +
        `${detail.second} on line ${detail.otherLine}. Withdraw the wrong one by a correction; if they are the two sides of a transition, state it.`
      );
    case 'temperatures-fall':
      return (
        `The temperature goes from ${kelvin(detail.previousK)} to ${kelvin(finding.temperatureK)} where it should rise. ` +
        'Look for a wrong digit, or for a row in the wrong place.'
      );
    case 'impossible':
      return `${subject(detail.quantity)}${ofPhase(finding)} is ${detail.read}${at(finding)}, which cannot be; expected was ${detail.wanted}. Compare the cell with the original.`;
    case 'interval':
      return interval(finding, detail);
    case 'cell':
      return cell(finding, detail);
    case 'column':
      return column(finding, detail);
    case 'anomaly':
      return (
        `${between(detail)} ${symbol(detail.quantity)}${ofPhase(finding)} stands off its neighbours${by(finding)}, and no single cell explains it: ` +
        'a step or an anomaly. State a transition if there is one, or compare these rows with the original.'
      );
    case 'transition':
      return transition(finding, detail);
    case 'phase-order':
      return (
        `${between(detail)} ${detail.lower} has the lowest Gibbs energy${by(finding)}, where the transitions say that ${detail.stated} is stable. ` +
        `Look at the entropies and the formation enthalpies of ${detail.lower} and ${detail.stated}, or state the transition that is missing.`
      );
    case 'entropy-order':
      return (
        `S of ${detail.above} lies ${size(finding)} below S of ${detail.below}${at(finding)}; ` +
        `${detail.above} is the phase of higher temperature and should have more. Look at the entropies of both.`
      );
    case 'unstated-jump':
      return (
        `${symbol(detail.quantity)} jumps${by(finding)}${at(finding)}${inside(finding)}, and no transition is stated there. ` +
        (detail.closes === true
          ? 'ΔH = T ΔS, as at a transition: one may have been left out. State it, or compare the rows on both sides with the original.'
          : 'State the transition, or compare the rows on both sides with the original.')
      );
    case 'adjustment':
      return adjustment(finding, detail);
    case 'calculation-failed':
      return (
        `The calculation broke down (${detail.message}), so nothing about this substance was checked. ` +
        'This is a fault of the program, not of the tables: please report it with them'
      );
  }
}

/** All stated numbers together: the one that stands off, or the whole where no single one explains it. */
function adjustment(finding: Finding, { place, cells, w, critical, chiSquare, freedom }: Detail<'adjustment'>): string {
  if (place === '' || w === null) {
    return (
      `Taken together, the transitions, anchors and tables do not close (chi square ${figure(chiSquare)} with ${freedom} degrees of freedom), ` +
      'and no single number explains it. Look at the uncertainties that the sources state.'
    );
  }
  if (cells > 1) {
    return (
      `Taken together with all else that is stated, ${cells} printed cells do not fit as they are, the first of them ` +
      `${statedPlace(place)}; one law for all of them puts them right (normalised residual ${residual(w)}, ` +
      `at most ${residual(critical)} is usual): see the suspects. Compare them with the original.`
    );
  }
  return (
    `Taken together with all else that is stated, ${statedPlace(place)} is ${amount(finding.observed, finding)}; ` +
    `the rest puts it at ${amount(finding.expected, finding)} (normalised residual ${residual(w)}, ` +
    `at most ${residual(critical)} is usual). Compare the cell with the original.`
  );
}

/** To two decimals. */
function residual(w: number): string {
  return figure(Math.round(100 * Math.abs(w)) / 100);
}

function reading({ problem, read, wanted, remedy }: Detail<'reading'>): string {
  return join(
    `${READING[problem](quote(read), read)}${wanted === '' ? '' : `; expected was ${wanted}`}`,
    capital(remedy),
  );
}

function interval(finding: Finding, { quantity, lowK, highK, named }: Detail<'interval'>): string {
  const next = named
    ? 'One cell explains it: see the suspects.'
    : 'No single cell explains it: compare these rows with the original.';
  const found = amount(finding.observed, finding);
  const expected = expectation(finding);
  const subject = `${symbol(quantity)}${ofPhase(finding)}`;
  if (finding.rule === 'entropy-rises') {
    return `${subject} falls from ${amount(finding.expected, finding)} at ${kelvin(lowK)} to ${found} at ${kelvin(highK)}, where it should rise. Compare these rows with the original.`;
  }
  if (finding.rule === 'functions-close') {
    return `${subject} at ${kelvin(highK)} is ${found}; the row’s other functions put it at ${expected}. ${next}`;
  }
  const integral = finding.rule === 'enthalpy-follows-heat-capacity' ? '∫Cp dT' : '∫(Cp/T) dT';
  return `From ${kelvin(lowK)} to ${kelvin(highK)} ${subject} rises by ${found}; ${integral} of the printed heat capacities gives ${expected}. ${next}`;
}

function cell(finding: Finding, { quantity, proposed, uProposed, explanation }: Detail<'cell'>): string {
  const witness = {
    'heat-capacity': 'the neighbouring rows and the printed H and S put it at',
    entropy: 'the heat capacity and the neighbouring rows put it at',
  }[quantity as 'entropy'];
  const question =
    explanation === null ? 'Compare the cell with the original.' : `${capital(sayExplanation(explanation))}?`;
  const unit = finding.unit === null ? '' : ` ${unitInWords(finding.unit)}`;
  return (
    `${symbol(quantity)}${ofPhase(finding)}${at(finding)} is ${cellText(finding, uProposed)}${unit}${printed(finding)}; ` +
    `${witness ?? 'the row’s other functions and its neighbours put it at'} ${plusMinus(proposed, uProposed)}. ${question}`
  );
}

function column(finding: Finding, { quantity, cells, factor, shift, explanation }: Detail<'column'>): string {
  const unit = finding.unit === null ? '' : ` ${unitInWords(finding.unit)}`;
  const { expected, tolerance } = finding;
  const place = quantity === 'temperature' ? '' : at(finding);
  const right = expected === null ? '' : `, this one at ${figure(expected, tolerance)}${unit}`;
  const cause =
    explanation === null
      ? 'Compare the heading and the unit of the column with the original.'
      : `${capital(sayExplanation(explanation))}?`;
  return (
    `${symbol(quantity)}${ofPhase(finding)}${place} is ${cellText(finding, tolerance)}${unit}${printed(finding)}: this and ` +
    `${cells - 1} more cells of the column do not agree with the rest of the table; ${law(factor, shift, unit)} puts ` +
    `all of them right${right}. ${cause}`
  );
}

function law(factor: number | null, shift: number | null, unit: string): string {
  const times = factor === null ? [] : [`× ${figure(factor)}`];
  const plus = shift === null ? [] : [`${shift < 0 ? '−' : '+'} ${figure(Math.abs(shift))}${unit}`];
  const parts = [...times, ...plus];
  return parts.length === 0 ? 'a change that goes with 1/T' : parts.join(' ');
}

/** The finding's own cell as printed where that is what was read, else what was read. */
function cellText(finding: Finding, uncertainty: number | null): string {
  const { observed } = finding;
  const text = printedText(finding);
  if (observed === null) return 'unreadable';
  return text !== undefined && Number(text) === observed ? text.replace('-', '−') : figure(observed, uncertainty);
}

function transition(finding: Finding, detail: Detail<'transition'>): string {
  const [found, next] = transitionParts(finding, detail);
  // A note decides nothing, so there is nothing to look for.
  return finding.severity === 'note' ? found : `${found} ${next}`;
}

function transitionParts(finding: Finding, { what, of, statedK, computedK }: Detail<'transition'>): [string, string] {
  const { fromPhase: from, toPhase: to } = finding;
  const name = `${from} → ${to}`;
  const crossing =
    computedK === null ? 'the two curves do not cross near it' : `the two curves cross at ${kelvin(computedK)}`;
  switch (what) {
    case 'gap': {
      const gap = finding.observed ?? 0;
      return [
        `At the stated ${name} temperature of ${kelvin(statedK)} G of ${from} lies ${amount(Math.abs(gap), finding)} ` +
          `${gap < 0 ? 'below' : 'above'} G of ${to}; expected was ${expectation(finding, 0)}, and ${crossing}.`,
        'Look at the entropies, the formation enthalpies and this temperature.',
      ];
    }
    case 'crossing':
      return [
        `The ${name} transition is stated at ${kelvin(statedK)}${printed(finding)}; ${crossing}${allowed(finding)}.`,
        'Look at the stated temperature, and at the entropies and enthalpies of both phases.',
      ];
    case 'not-crossed':
      return [
        `The ${name} transition is stated at ${kelvin(statedK)}${printed(finding)}, and the Gibbs energies of ${from} and ${to} cross nowhere in the range of the data.`,
        'Look at the formation enthalpies and entropies of both phases.',
      ];
    case 'closure':
      return closure(`${name} at ${kelvin(statedK)}`, of ?? 'stated', finding);
    case 'jump':
      return [
        `${name} at ${kelvin(statedK)} is stated as a transition without latent heat, and the entropy jumps by ${amount(finding.observed, finding)}; ` +
          `expected was ${expectation(finding, 0)}.`,
        'If it has a latent heat, state the order "first"; else look at the rows on both sides.',
      ];
    case 'no-jump':
      return [
        `${name} at ${kelvin(statedK)} is stated as a first-order transition, and its jump of entropy, ${amount(finding.observed, finding)}, cannot be told from none.`,
        'Look at the rows on both sides and at the stated ΔH and ΔS; if it has no latent heat, state its order.',
      ];
    case 'falls':
      return [
        `Heating through ${name} at ${kelvin(statedK)} should raise enthalpy and entropy, and the change is ${amount(finding.observed, finding)}.`,
        'Look for a lost sign, or for from and to exchanged.',
      ];
  }
}

/** The stated ΔH and ΔS of a transition, with each other or with what the curves give. */
function closure(name: string, of: NonNullable<Detail<'transition'>['of']>, finding: Finding): [string, string] {
  const found = amount(finding.observed, finding);
  const expected = expectation(finding);
  const text = printedText(finding);
  switch (of) {
    case 'stated':
      return [
        `${name}: the stated ΔH is ${found}${printed(finding)}; T times the stated ΔS gives ${expected}.`,
        'Look at ΔH, ΔS and the temperature.',
      ];
    case 'enthalpy':
      return [
        `${name}: the stated ΔH is ${found}${printed(finding)}; the curves of both phases give ${expected}.`,
        'Look at ΔH, and at the enthalpies and the heat capacities of both phases.',
      ];
    case 'entropy':
      return [
        `${name}: T times the stated ΔS${text === undefined ? '' : ` (printed ${text})`} is ${found}; ` +
          `T times the ΔS of the curves of both phases gives ${expected}.`,
        'Look at ΔS, and at the entropies and the heat capacities of both phases.',
      ];
  }
}

/** Significance and materiality, where the finding was judged by both. */
function gravity({ severity, detail, tolerance, unit, difference }: Finding): string {
  if (
    detail.code === 'reading' ||
    detail.code === 'calculation-failed' ||
    detail.code === 'rows-disagree' ||
    detail.code === 'impossible'
  )
    return '';
  if (detail.code === 'transition' && detail.what === 'no-jump') return '';
  const known = detail.code === 'transition' ? detail.smallestDetectable : null;
  // What many numbers are off by together is no difference of the first of them.
  const many = detail.code === 'adjustment' && detail.cells > 1;
  const limit =
    tolerance === null || difference === null || many
      ? ''
      : `: ${difference < 0 ? '−' : ''}${figure(Math.abs(difference), tolerance)} against ${figure(tolerance, tolerance)}${unit === null ? '' : ` ${unitInWords(unit)}`}`;
  switch (severity) {
    case 'fault':
      return `Outside what the uncertainties allow, and large enough to matter${limit}.`;
    case 'doubt':
      return `Outside what the uncertainties allow, yet too small to matter${limit}.`;
    case 'note':
      if (known === null) return '';
      return `The data are too uncertain to decide; an error below ${figure(known, known)}${unit === null ? '' : ` ${unitInWords(unit)}`} would not show.`;
  }
}

function where({ address, cause }: Finding): string {
  return join(address === null ? '' : sayAddress(address), cause === null ? '' : `It follows from finding ${cause}`);
}

function at({ temperatureK }: Finding): string {
  return temperatureK === null ? '' : ` at ${kelvin(temperatureK)}`;
}

function between({ lowK, highK }: { readonly lowK: number; readonly highK: number }): string {
  return lowK === highK ? `At ${kelvin(lowK)}` : `Between ${kelvin(lowK)} and ${kelvin(highK)}`;
}

function inside({ fromPhase, toPhase }: Finding): string {
  return fromPhase === null || toPhase !== null ? '' : ` inside ${fromPhase}`;
}

function by(finding: Finding): string {
  return finding.difference === null && finding.observed === null ? '' : ` by ${size(finding)}`;
}

function size(finding: Finding): string {
  const value = finding.difference ?? finding.observed;
  return amount(value === null ? null : Math.abs(value), finding);
}

/** The phase of a finding inside one table. */
function ofPhase({ fromPhase, toPhase }: Finding): string {
  return fromPhase === null || toPhase !== null ? '' : ` of ${fromPhase}`;
}

function allowed({ tolerance, unit }: Finding): string {
  return tolerance === null || unit === null
    ? ''
    : `, where ± ${figure(tolerance, tolerance)} ${unitInWords(unit)} is allowed`;
}

/** What the finding's own cell says, as printed. */
function printedText({ address, evidence }: Finding): string | undefined {
  return evidence.find(
    ({ source, file, line, column }) =>
      source === address?.source && file === address.file && line === address.line && column === address.column,
  )?.printed;
}

function printed(finding: Finding): string {
  const text = printedText(finding);
  return text === undefined || Number(text) === finding.observed ? '' : ` (printed ${text})`;
}

function amount(value: number | null, { unit, tolerance }: Finding): string {
  if (value === null) return 'unknown';
  return `${figure(value, tolerance)}${unit === null ? '' : ` ${unitInWords(unit)}`}`;
}

function expectation({ expected, tolerance, unit }: Finding, otherwise: number | null = null): string {
  const value = expected ?? otherwise;
  if (value === null) return 'something else';
  const text = tolerance === null ? figure(value) : plusMinus(value, tolerance);
  return `${text}${unit === null ? '' : ` ${unitInWords(unit)}`}`;
}

function kelvin(temperatureK: number | null): string {
  return temperatureK === null ? 'an unknown temperature' : `${figure(Math.round(temperatureK * 1000) / 1000)} K`;
}

function quote(text: string): string {
  if (text.startsWith('"')) return text;
  return /^[A-Za-z][\w.+-]*$/.test(text) ? text : `“${text}”`;
}

/** At the head of a sentence: words take a capital, the letter of a quantity stays what it is. */
function subject(quantity: string): string {
  const text = symbol(quantity);
  return text.length === 1 ? text : capital(text);
}

function capital(text: string): string {
  return text.startsWith('∫') || text.startsWith('Δ') ? text : text.charAt(0).toUpperCase() + text.slice(1);
}

/** Sentences one after another, each with its full stop. */
function join(...sentences: readonly string[]): string {
  return sentences
    .filter((sentence) => sentence !== '')
    .map((sentence) => (/[.?!]$/.test(sentence) ? sentence : `${sentence}.`))
    .join(' ');
}
