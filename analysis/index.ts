/** The only door to the science: what main/ and renderer/ may import. */
export { type Doubt, type DoubtCode, doubtCodes } from './doubts/doubt.ts';
export { Refusal, type RefusalText, refusalSentence, type Where } from './refusal.ts';
