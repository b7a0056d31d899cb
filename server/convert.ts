/** Between the plain types of the core and those of the protocol. Ranges are in UTF-16 units on both sides. */
import {
  DiagnosticSeverity,
  DiagnosticTag,
  type Diagnostic as LspDiagnostic,
  type TextEdit as LspTextEdit,
  type Range,
  SymbolKind,
} from "vscode-languageserver";
import type {
  Diagnostic,
  DocumentSymbol,
  LineIndex,
  Position,
  Severity,
  Span,
  TextEdit,
} from "../shared-core/index.ts";

export const toRange = (lines: LineIndex, span: Span): Range => lines.range(span);

/** Places that a client made up are clamped into the text. */
export const toSpan = (lines: LineIndex, { start, end }: Range): Span => {
  const [a, b] = [lines.offset(start), lines.offset(end)];
  return { start: Math.min(a, b), end: Math.max(a, b) };
};

export const toOffset = (lines: LineIndex, position: Position): number => lines.offset(position);

export const toEdits = (lines: LineIndex, edits: readonly TextEdit[]): LspTextEdit[] =>
  edits.map(({ span, text }) => ({ range: lines.range(span), newText: text }));

const SEVERITIES: Readonly<Record<Severity, DiagnosticSeverity>> = {
  error: DiagnosticSeverity.Error,
  warning: DiagnosticSeverity.Warning,
  hint: DiagnosticSeverity.Hint,
};

export interface DiagnosticContext {
  readonly uri: string;
  readonly lines: LineIndex;
  /** URI and lines of another file that a diagnostic speaks of; undefined where it cannot be had. */
  readonly other: (file: string) => { readonly uri: string; readonly lines: LineIndex } | undefined;
  /** Where docs/ lies, ending in `/`. */
  readonly docs: string | undefined;
  /** What the client understands. */
  readonly related: boolean;
  readonly tags: boolean;
  readonly descriptions: boolean;
  readonly data: boolean;
}

/** What travels with a diagnostic: the edits that cure it, for clients that act on them by themselves. */
export interface DiagnosticData {
  readonly fixes: readonly {
    readonly title: string;
    readonly safe: boolean;
    readonly edits: LspTextEdit[];
  }[];
}

export function toDiagnostic(diagnostic: Diagnostic, context: DiagnosticContext): LspDiagnostic {
  const { code, severity, message, hint, span, related, fixes, tag } = diagnostic;
  const { lines, docs } = context;
  const where = diagnostic.case === undefined ? "" : ` (case ${diagnostic.case})`;
  const converted: LspDiagnostic = {
    range: toRange(lines, span),
    severity: SEVERITIES[severity],
    code,
    source: "thrum",
    message: `${message}${where}${hint === undefined ? "" : `\n${hint}`}`,
  };
  if (context.descriptions && docs !== undefined) converted.codeDescription = { href: pageOf(docs, code) };
  if (context.tags && tag === "unnecessary") converted.tags = [DiagnosticTag.Unnecessary];
  if (context.related && related && related.length > 0) {
    converted.relatedInformation = related.flatMap((place) => {
      const at = place.file === undefined ? context : context.other(place.file);
      if (at === undefined) return [];
      return [{ location: { uri: at.uri, range: toRange(at.lines, place.span) }, message: place.message }];
    });
  }
  if (context.data && fixes && fixes.length > 0) {
    converted.data = {
      fixes: fixes.map(({ title, safe, edits }) => ({ title, safe, edits: toEdits(lines, edits) })),
    } satisfies DiagnosticData;
  }
  return converted;
}

export const pageOf = (docs: string, code: string): string => `${docs}diagnostics/${code}.md`;

/** The protocol's kinds are of programs; these are the nearest in the icons that editors show. */
const FAMILIES: Readonly<Record<DocumentSymbol["family"], SymbolKind>> = {
  file: SymbolKind.File,
  numbers: SymbolKind.Constant,
  moves: SymbolKind.Object,
  joins: SymbolKind.Interface,
  drives: SymbolKind.Event,
  asks: SymbolKind.Function,
  holds: SymbolKind.Boolean,
};

export function toSymbolKind({ keyword, family }: Pick<DocumentSymbol, "keyword" | "family">): SymbolKind {
  if (keyword === "kit") return SymbolKind.Class;
  if (keyword === "case") return SymbolKind.EnumMember;
  return FAMILIES[family];
}
