/** The facade: what other packages may use of the core, read as a list of what it can do. */

// A text, understood and judged.
export { judge } from "./judgement/judge.ts";
export type { CaseReport, FileReport, JudgeOptions, Verdict } from "./judgement/report.ts";
export type { FileContent, FileReader, Model } from "./model/model.ts";
export { understand } from "./model/understand.ts";

// One case of a model with its numbers, and what can be asked of it.
export type { Analysis } from "./answers/analysis.ts";
export { analyse } from "./answers/analysis-of.ts";
export { instantiate } from "./model/instantiate.ts";
export type { Ask, HistoryAsk, Instance, Overrides, SweepAsk } from "./model/model.ts";

// The same text in its canonical layout, and the canonical text of what it means.
export { format } from "./writing/layout.ts";
export { outlineOf } from "./writing/outline.ts";

// Reports for people.
export type { UnitSystem } from "./units/show.ts";
export { type AnswerTextOptions, answerText } from "./writing/answer-text.ts";
export { type Ink, PLAIN } from "./writing/ink.ts";
export { diagnosticLines, oneLine } from "./writing/places-text.ts";
export { summaryLine, verdictText } from "./writing/verdict-text.ts";

// Reports for programs, and files of answers.
export { answerFiles, withAsks } from "./writing/answer-files.ts";
export { checkJson } from "./writing/check-json.ts";
export { type FileOutcome, holds } from "./writing/file-outcome.ts";
export { jsonText } from "./writing/json-text.ts";
export { systemFiles, type TextFile } from "./writing/system-files.ts";

// The word somebody meant.
export { nearest } from "./text/nearest.ts";

// The text in an editor: where names lead, what they are called, how the text is laid out and coloured.
export { type FoldingRange, foldingRanges } from "./features/fold.ts";
export { formatDocument, formatRange, formatRanges } from "./features/format.ts";
export { type DocumentLink, documentLinks } from "./features/links.ts";
export { type Move, moveEdits } from "./features/move.ts";
export {
  definition,
  type FileEdits,
  type FilePlace,
  type Highlight,
  highlights,
  references,
} from "./features/navigate.ts";
export { type Prepared, prepareRename, type Renamed, rename } from "./features/rename.ts";
export { selectionRanges } from "./features/select.ts";
export {
  type DocumentSymbol,
  documentSymbols,
  type WorkspaceSymbol,
  workspaceSymbols,
} from "./features/symbols.ts";
export {
  encodeTokens,
  type SemanticToken,
  semanticTokens,
  TOKEN_MODIFIERS,
  TOKEN_TYPES,
} from "./features/tokens.ts";
