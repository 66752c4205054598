/** The front door of the words: sentences about findings, and figures as people print them. */
export { sayExplanation } from './explanations.js';
export { figure, plusMinus, unitInWords } from './figures.js';
export { sayFinding, sayPlace, sayReason, saySuspect, saySuspects } from './words.js';
