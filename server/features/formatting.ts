import type { TextEdit } from "vscode-languageserver";
import { formatDocument, formatRanges } from "../../shared-core/index.ts";
import { toEdits, toSpan } from "../convert.ts";
import { type Serving, sessionOf } from "../serving.ts";

/** The canonical layout has no options: what an editor says of tabs is not looked at. */
export function registerFormatting(serving: Serving): void {
  const { connection, schedule, guard } = serving;
  const inRanges = (
    uri: { readonly uri: string },
    ranges: readonly Parameters<typeof toSpan>[1][],
  ): TextEdit[] | null => {
    const session = sessionOf(serving, uri);
    if (session === undefined) return null;
    const view = schedule.view(session);
    const spans = ranges.map((range) => toSpan(view.lines, range));
    return toEdits(view.lines, formatRanges(view, spans));
  };
  connection.onDocumentFormatting(
    guard("textDocument/formatting", null, ({ textDocument }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = schedule.view(session);
      return toEdits(view.lines, formatDocument(view));
    }),
  );
  connection.onDocumentRangeFormatting(
    guard("textDocument/rangeFormatting", null, ({ textDocument, range }) => inRanges(textDocument, [range])),
  );
  connection.onDocumentRangesFormatting(
    guard("textDocument/rangesFormatting", null, ({ textDocument, ranges }) =>
      inRanges(textDocument, ranges),
    ),
  );
}
