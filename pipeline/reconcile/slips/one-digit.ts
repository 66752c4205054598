/** One printed digit wrong: any of them may have been any of nine others. */
import { withCharacters } from './printed-number.js';
import type { Candidate, Slip } from './slip.js';

export const oneDigitWrong: Slip = {
  code: 'one-digit-wrong',
  weight: 0.3,
  propose: ({ number, value, lastPlace }) => {
    if (number === null) return [];
    const share = 1 / (9 * number.digits.length);
    const candidates: Candidate[] = [];
    for (const place of number.digits) {
      for (let digit = 0; digit <= 9; digit++) {
        if (number.text[place] === String(digit)) continue;
        const changed = withCharacters(number, [place], [String(digit)]);
        candidates.push({ value: value + changed.change, step: lastPlace, share, printed: changed.text });
      }
    }
    return candidates;
  },
};
