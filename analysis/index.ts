/** The only door to the science: what main/ and renderer/ may import. */
export {
  checkByRedraws,
  type RedrawCheck,
  type RedrawnQuantity,
  usualDraws,
} from './check-by-redraws.ts';
export type { Doubt } from './doubts/doubt.ts';
export { estimateMissing, type MissingEstimate } from './estimate-missing.ts';
export { programName } from './program.ts';
export { type PreparedSheet, prepare, quantify, quantifyAliquot } from './quantify.ts';
export { embeddedFrom } from './reading/embedded.ts';
export { type ReadOptions, readExport } from './reading/read-export.ts';
export type { Reading, RefusedPart } from './reading/reading.ts';
export { readingToJson } from './reading/reading-to-json.ts';
export { sheetSources } from './reading/sheet-sources.ts';
export { tooLargeReading } from './reading/too-large.ts';
export { Refusal, type RefusalText, refusalSentence } from './refusal.ts';
export { doubtTitles } from './report/doubt-titles.ts';
export { labelSpot } from './report/label-spot.ts';
export {
  figuresText,
  numberText,
  quantifiedText,
} from './report/numbers.ts';
export { reportCsv } from './report/report-csv.ts';
export { reportHtml } from './report/report-html.ts';
export { resultsJson } from './report/results-json.ts';
export { answerText } from './report/sections/answer.ts';
export { separationText } from './report/separation-text.ts';
export { speciesGlyph } from './report/species-glyph.ts';
export { speciesLook } from './report/species-look.ts';
export {
  absorbingSpecies,
  fitSettings,
  productSpecies,
  speciesLabel,
  speciesName,
} from './sheet/defaults.ts';
export {
  addAliquots,
  addNoiseScans,
  addRun,
  addSpecies,
  addStandards,
  addStockFor,
  removeAliquot,
  removeNoiseScans,
  removeRun,
  removeSpecies,
  removeStandard,
  removeStock,
  renameSpecies,
  setFit,
  setReaction,
  setTitle,
  updateAliquot,
  updateRun,
  updateSpecies,
  updateStandard,
  updateStock,
  whyNotRename,
} from './sheet/edits.ts';
export { newSheet } from './sheet/new-sheet.ts';
export { openSheet } from './sheet/open-sheet.ts';
export type {
  EmbeddedSpectrum,
  Sheet,
  SheetAliquot,
  SheetDilution,
  SheetRun,
  SheetSpecies,
  SheetStandard,
} from './sheet/schema.ts';
export { sheetText } from './sheet/sheet-text.ts';
export { embedSpectra, filesOf, knownOf } from './sheet/spectra.ts';
export { budgetAdvice } from './split/budget-advice.ts';
export {
  type AliquotCurves,
  type AliquotResult,
  leftOut,
  type Quantification,
  type Quantified,
  type Results,
  type RunResult,
  type SplitFraction,
  type StandardCurves,
} from './split/results.ts';
export { type WindowMap, type WindowMapCell, windowMap } from './window-map.ts';
