/** Two digits exchanged, neighbours more often than others. */
import { changeOf, withCharacters } from './printed-number.js';
import type { Candidate, Slip } from './slip.js';

const NEIGHBOURS_SHARE = 0.9;

export const digitsExchanged: Slip = {
  code: 'digits-exchanged',
  weight: 0.12,
  ofDigits: true,
  propose: ({ number, value, lastPlace }) => {
    if (number === null) return [];
    const { digits, text } = number;
    const neighbours = digits.length - 1;
    const others = (digits.length * (digits.length - 1)) / 2 - neighbours;
    const candidates: Candidate[] = [];
    for (let i = 0; i < digits.length; i++) {
      for (let j = i + 1; j < digits.length; j++) {
        const [a, b] = [digits[i], digits[j]];
        if (text[a] === text[b]) continue;
        const change = changeOf(number, i, Number(text[b])) + changeOf(number, j, Number(text[a]));
        const printed = () => withCharacters(text, [a, b], [text[b], text[a]]);
        const share = j === i + 1 ? NEIGHBOURS_SHARE / neighbours : (1 - NEIGHBOURS_SHARE) / others;
        candidates.push({ value: value + change, step: lastPlace, share, printed });
      }
    }
    return candidates;
  },
};
