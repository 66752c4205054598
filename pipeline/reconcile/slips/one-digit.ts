/** One printed digit wrong: any of them may have been any of nine others. */
import { changeOf, withCharacters } from './printed-number.js';
import type { Candidate, Slip } from './slip.js';

export const oneDigitWrong: Slip = {
  code: 'one-digit-wrong',
  weight: 0.3,
  ofDigits: true,
  propose: ({ number, value, lastPlace }) => {
    if (number === null) return [];
    const { digits, text } = number;
    const share = 1 / (9 * digits.length);
    const candidates: Candidate[] = [];
    for (const [i, place] of digits.entries()) {
      for (let digit = 0; digit <= 9; digit++) {
        if (text[place] === String(digit)) continue;
        const printed = () => withCharacters(text, [place], [String(digit)]);
        candidates.push({ value: value + changeOf(number, i, digit), step: lastPlace, share, printed });
      }
    }
    return candidates;
  },
};
