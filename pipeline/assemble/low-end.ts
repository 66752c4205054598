import type { CurveDraft } from './curve-draft.js';
import type { DebyeTail } from './debye-tail.js';
import { limitPieces } from './limit-interval.js';

/** A cubic from 0 K that would dip below zero gives way to the two pieces of `limitPieces`. */
export function keepPositive(draft: CurveDraft): void {
  const high = draft.view('knotK')[1];
  const c0 = draft.view('c0')[0];
  const c1 = draft.view('c1')[0];
  const c2 = draft.view('c2')[0];
  const c3 = draft.view('c3')[0];
  const dips = [0.02, 0.05, 0.1, 0.2, 0.3].some((f) => {
    const x = f * high;
    return c0 + x * (c1 + x * (c2 + x * c3)) < 0;
  });
  if (!dips) return;
  const h = draft.view('h');
  const s = draft.view('s');
  const pieces = limitPieces(high, draft.view('c0')[1], h[1] - h[0], s[1] - s[0]);
  if (pieces === null) return;
  const { thetaK, beta } = pieces;
  // So little lies below theta that its state errs as that at 0 K does.
  const below = (name: 'varH' | 'covHS' | 'varS'): number => draft.view(name)[0];
  draft.splitFirst(
    { c0: 0, c1: 0, c2: 0, c3: beta },
    {
      knotK: thetaK,
      c0: pieces.c0,
      c1: pieces.c1,
      c2: pieces.c2,
      c3: pieces.c3,
      h: h[0] + (beta * thetaK ** 4) / 4,
      s: s[0] + (beta * thetaK ** 3) / 3,
      varH: below('varH'),
      covHS: below('covHS'),
      varS: below('varS'),
      kind: 1,
      uCp: draft.view('uCp')[1],
    },
  );
}

/** What a tail adds up to from 0 K to T, and what its dropped terms cost: a few per cent of Cp at 20 K, so of its integrals. */
export function tailIntegrals(tail: DebyeTail, temperatureK: number): { h: number; s: number; uH: number; uS: number } {
  const h = (tail.gamma * temperatureK ** 2) / 2 + (tail.beta * temperatureK ** 4) / 4;
  const s = tail.gamma * temperatureK + (tail.beta * temperatureK ** 3) / 3;
  return { h, s, uH: 0.03 * h, uS: 0.03 * s };
}

/** The Debye tail below the first row; by the third law S counts from its end, exactly. */
export function addTail(draft: CurveDraft, tail: DebyeTail, thirdLaw: boolean): void {
  const h = draft.view('h');
  const s = draft.view('s');
  const below = tailIntegrals(tail, draft.view('knotK')[0]);
  if (thirdLaw) for (let i = 0; i < s.length; i++) s[i] += below.s;
  draft.addFront({
    knotK: 0,
    c0: 0,
    c1: tail.gamma,
    c2: 0,
    c3: tail.beta,
    h: h[0] - below.h,
    s: s[0] - below.s,
    varH: draft.view('varH')[0] + below.uH ** 2,
    covHS: thirdLaw ? 0 : draft.view('covHS')[0],
    varS: thirdLaw ? 0 : draft.view('varS')[0] + below.uS ** 2,
    kind: 1,
    uCp: 0,
  });
  if (thirdLaw) draft.freeFrontEntropy();
}
