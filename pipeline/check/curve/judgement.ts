import type { EvidenceCell, Finding, Outcome } from '../../../schemas/finding.js';
import type { Datum } from '../../../schemas/harmonised.js';
import type { Policy } from '../../../schemas/policy.js';
import type { Thresholds } from './significance.js';
import type { TransitionView } from './transition-view.js';

/** What a transition rule is given, and what it gives. */
export interface TransitionContext {
  readonly substance: string;
  readonly view: TransitionView;
  readonly policy: Policy;
  readonly limits: Thresholds;
}

export interface Judgement {
  readonly outcome: Outcome;
  readonly findings: readonly Finding[];
}

export function cellOf(datum: Datum): EvidenceCell {
  return { ...datum.address, printed: datum.printed };
}

/** The stated numbers of a transition, as the cells behind a finding. */
export function statedCells(view: TransitionView): EvidenceCell[] {
  const { temperature, enthalpy, entropy } = view.stated;
  const cells = [cellOf(temperature)];
  if (enthalpy !== null) cells.push(cellOf(enthalpy));
  if (entropy !== null) cells.push(cellOf(entropy));
  return cells;
}

/** A transition's name in finding ids: its phases stand there already, so pressure and gas tell the rest. */
export function transitionKey(view: TransitionView): string {
  const { stated } = view;
  return `${stated.pressurePa} ${stated.gas ?? ''} ${stated.order} ${stated.table.table}`;
}

export function isFirstOrder(view: TransitionView): boolean {
  return view.stated.order === 'first' && view.stated.from !== view.stated.to;
}
