import { DocumentHighlightKind, type Location } from "vscode-languageserver";
import {
  definition,
  type FilePlace,
  highlights,
  type LineIndex,
  references,
} from "../../shared-core/index.ts";
import { toOffset, toRange } from "../convert.ts";
import { otherFile, type Serving, sessionOf, wideView } from "../serving.ts";
import type { Session } from "../session.ts";
import { lineIndexOf } from "./other-files.ts";

/** Where names lead: definitions, references, and the same name in this file. */
export function registerNavigation(serving: Serving): void {
  const { connection, schedule, guard } = serving;
  connection.onDefinition(
    guard("textDocument/definition", null, async ({ textDocument, position }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const near = schedule.view(session);
      const places = definition(near, toOffset(near.lines, position));
      return toLocations(serving, session, places);
    }),
  );
  connection.onReferences(
    guard("textDocument/references", null, async ({ textDocument, position, context }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = await wideView(serving, session);
      const places = references(view, toOffset(view.lines, position), context.includeDeclaration);
      return toLocations(serving, session, places);
    }),
  );
  connection.onDocumentHighlight(
    guard("textDocument/documentHighlight", null, ({ textDocument, position }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = schedule.view(session);
      return highlights(view, toOffset(view.lines, position)).map(({ span, kind }) => ({
        range: toRange(view.lines, span),
        kind: kind === "definition" ? DocumentHighlightKind.Write : DocumentHighlightKind.Read,
      }));
    }),
  );
}

async function toLocations(
  serving: Serving,
  session: Session,
  places: readonly FilePlace[],
): Promise<Location[]> {
  const found: Location[] = [];
  for (const { file, span } of places) {
    const at: { uri: string; lines: LineIndex } | undefined =
      otherFile(serving, session, file) ?? (await lineIndexOf(serving, session, file));
    if (at) found.push({ uri: at.uri, range: toRange(at.lines, span) });
  }
  return found;
}
