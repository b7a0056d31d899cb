/** The facade: what other packages may use of the core, read as a list of what it can do. */

// A text, understood and judged.
export type { DiagnosticCode } from "./diagnostics/codes.ts";
export type { Diagnostic, Fix, RelatedPlace, Severity } from "./diagnostics/diagnostic.ts";
export { judge, judgeAgain, judgeInSteps } from "./judgement/judge.ts";
export { sameMeaning } from "./judgement/same-meaning.ts";
export type { CaseReport, FileReport, InternalFault, JudgeOptions, Verdict } from "./judgement/report.ts";
export type { Steps } from "./judgement/steps.ts";
export type { FileContent, FileReader, Model } from "./model/model.ts";
export { learnUnits } from "./model/other-units.ts";
export type { Unit } from "./units/dimension.ts";
export { learnedUnits, learnUnit } from "./units/lookup.ts";
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

// Places in a text, and the word somebody meant.
export { applyEdits, LineIndex } from "./text/line-index.ts";
export { nearest } from "./text/nearest.ts";
export type { Position, Range, Span, TextEdit } from "./text/span.ts";

// What the features of an editor look at.
export type { View } from "./features/view.ts";

// The text in an editor: where names lead, what they are called, how the text is laid out and coloured.
export { type CompleteOptions, type Completion, type CompletionKind, complete } from "./features/complete.ts";
export {
  type CodeAction,
  type ActionOptions,
  type CodeActionKind,
  codeActions,
  fixAll,
  type OfferedAction,
} from "./features/fixes.ts";
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
export { type Signature, type SignatureParameter, signatureHelp } from "./features/signature.ts";
export {
  type DocumentSymbol,
  documentSymbols,
  searchSymbols,
  symbolIndex,
  type WorkspaceSymbol,
  workspaceSymbols,
} from "./features/symbols.ts";
export {
  encodeTokens,
  type SemanticToken,
  semanticTokens,
  TOKEN_MODIFIERS,
  TOKEN_TYPES,
  type TokenType,
} from "./features/tokens.ts";

// Texts to start a new model from, and rows copied from a table as statements.
export { NEW_MODELS, type NewModelKind, newModel } from "./features/new-model.ts";
export { type Rows, rowsToStatements } from "./features/rows.ts";

// A report in a few lines, and a number put back into the text.
export { stateText, summaryOf } from "./features/summary.ts";
export type { ModelSummary } from "./features/summary-content.ts";
export { type WrittenValue, writeValue } from "./features/write-value.ts";

// What server and client say to each other beside the language server protocol.
export * from "./protocol/requests.ts";
export * from "./protocol/sheet.ts";

// Readouts in an editor: what stands at a place, numbers behind numbers, lines above asks, expectations and cases.
export { type Hover, hover } from "./features/hover.ts";
export { type InlayHint, type InlayKind, type InlayOptions, inlayHints } from "./features/inlay.ts";
export { type CodeLens, codeLenses, type LensKind, type ResolvedLens, resolveLens } from "./features/lens.ts";

// The response sheet: everything that it shows, and the drawing as a picture that stands alone.
export { type SheetChoice, sheetContent } from "./features/sheet-content.ts";
export { sceneSvg } from "./writing/figure/scene-svg.ts";

// What a page needs to paint figures itself: the figure as data, its scales and dashes, numbers for people.
export { formatNumber } from "./units/show.ts";
export { type Axis, type CurvePanel, curveWords, DASHES, type Figure } from "./writing/figure/figure.ts";
export { figureSvg } from "./writing/figure/svg.ts";
export { type Scale, scaleBetween, scaleOver, tickLabel } from "./writing/scales.ts";
