import type { Diagnostic, RelatedPlace, Severity } from "../diagnostics/diagnostic.ts";
import type { FileReport } from "../judgement/report.ts";
import { LineIndex } from "../text/line-index.ts";
import type { Span } from "../text/span.ts";
import type { Ink } from "./ink.ts";

/**
 * Everything said about a file, one place a line: `path:line:column: severity code message`, counted from 1, in
 * the order of the text. Hints and related places stand indented below.
 */
export function diagnosticLines(path: string, report: FileReport, ink: Ink): string[] {
  const lines = new LineIndex(report.model.tree.text);
  const place = (span: Span, file = path): string => {
    if (file !== path) return `${file}:`;
    const { line, character } = lines.position(span.start);
    return `${file}:${line + 1}:${character + 1}:`;
  };
  const open = report.diagnostics.map((diagnostic) => ({
    start: diagnostic.span.start,
    lines: linesOf(diagnostic, place, ink),
  }));
  const accepted = report.accepted.map(({ diagnostic, reason }) => ({
    start: diagnostic.span.start,
    lines: [
      `${place(diagnostic.span)} ${ink.quiet("accepted")} ${diagnostic.code} ${diagnostic.message}`,
      ink.quiet(`    because: ${reason}`),
    ],
  }));
  return [...open, ...accepted].sort((a, b) => a.start - b.start).flatMap((entry) => entry.lines);
}

function linesOf(diagnostic: Diagnostic, place: (span: Span, file?: string) => string, ink: Ink): string[] {
  const { severity, code, message, hint, related = [] } = diagnostic;
  const where = diagnostic.case === undefined ? "" : ` (case ${diagnostic.case})`;
  const below = (each: RelatedPlace): string =>
    ink.quiet(`    ${place(each.span, each.file)} ${oneLine(each.message)}`);
  return [
    `${place(diagnostic.span)} ${severityInk(severity, ink)(severity)} ${code} ${oneLine(message)}${where}`,
    ...(hint === undefined ? [] : [`    ${ink.hint("hint:")} ${oneLine(hint)}`]),
    ...related.map(below),
  ];
}

function severityInk(severity: Severity, ink: Ink): (text: string) => string {
  if (severity === "error") return ink.bad;
  return severity === "warning" ? ink.warn : ink.hint;
}

/** A message may quote the file; control characters of a hostile one must not reach a terminal. */
export function oneLine(text: string): string {
  return text.replace(CONTROL, " ");
}

// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is to be left out
const CONTROL = /[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g;
