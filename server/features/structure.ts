import { FoldingRangeKind, type SelectionRange } from "vscode-languageserver";
import { documentLinks, foldingRanges, selectionRanges } from "../../shared-core/index.ts";
import { toOffset, toRange } from "../convert.ts";
import { type Serving, sessionOf } from "../serving.ts";

/** Folding, growing selections, and paths that lead to files. */
export function registerStructure(serving: Serving): void {
  const { connection, schedule, workspace, guard } = serving;
  connection.onFoldingRanges(
    guard("textDocument/foldingRange", null, ({ textDocument }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      return foldingRanges(schedule.view(session)).map(({ first, last, kind }) => ({
        startLine: first,
        endLine: last,
        kind: kind && FOLDS[kind],
      }));
    }),
  );
  connection.onSelectionRanges(
    guard("textDocument/selectionRange", null, ({ textDocument, positions }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = schedule.view(session);
      const offsets = positions.map((position) => toOffset(view.lines, position));
      return selectionRanges(view, offsets).map((spans) => {
        const grown = spans.reduceRight<SelectionRange | undefined>(
          (parent, span) => ({ range: toRange(view.lines, span), parent }),
          undefined,
        );
        return grown ?? { range: { start: positions[0], end: positions[0] } };
      });
    }),
  );
  connection.onDocumentLinks(
    guard("textDocument/documentLink", null, ({ textDocument }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = schedule.view(session);
      return documentLinks(view).map(({ span, file }) => ({
        range: toRange(view.lines, span),
        target: workspace.uriOf(session, file),
      }));
    }),
  );
}

const FOLDS = { comment: FoldingRangeKind.Comment, imports: FoldingRangeKind.Imports } as const;
