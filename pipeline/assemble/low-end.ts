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
  const middle = (name: 'varH' | 'covHS' | 'varS'): number => (draft.view(name)[0] + draft.view(name)[1]) / 2;
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
      varH: middle('varH'),
      covHS: middle('covHS'),
      varS: middle('varS'),
      kind: 1,
      uCp: draft.view('uCp')[1],
    },
  );
}

/** The Debye tail below the first row; by the third law S counts from its end. */
export function addTail(draft: CurveDraft, tail: DebyeTail, thirdLaw: boolean): void {
  const t = draft.view('knotK')[0];
  const h = draft.view('h');
  const s = draft.view('s');
  const varH = draft.view('varH');
  const covHS = draft.view('covHS');
  const varS = draft.view('varS');
  const dH = (tail.gamma * t * t) / 2 + (tail.beta * t ** 4) / 4;
  const dS = tail.gamma * t + (tail.beta * t ** 3) / 3;
  // What the dropped terms cost: a few per cent of the tail's own entropy.
  const uH = 0.03 * dH;
  const uS = 0.03 * dS;
  if (thirdLaw) {
    for (let i = 0; i < s.length; i++) {
      s[i] += dS;
      varS[i] += uS * uS;
    }
  }
  draft.addFront({
    knotK: 0,
    c0: 0,
    c1: tail.gamma,
    c2: 0,
    c3: tail.beta,
    h: h[0] - dH,
    s: s[0] - dS,
    varH: varH[0] + uH * uH,
    covHS: covHS[0],
    varS: thirdLaw ? 0 : varS[0] + uS * uS,
    kind: 1,
    uCp: 0,
  });
}
