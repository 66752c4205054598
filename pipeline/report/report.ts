/** The front door of the words: sentences about findings, and figures as people print them. */
export { sayExplanation } from './explanations.js';
export { figure, plusMinus, unitInWords } from './figures.js';
export { sayReason, saySuspect, saySuspects } from './suspect-words.js';
export { sayFinding, sayPlace } from './words.js';
