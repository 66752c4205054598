/** The front door of the checks: tables first (`examine`), then curves and transitions (`checkCurves`). */
export { checkCurves } from './check-curves.js';
export { examine } from './examine.js';
