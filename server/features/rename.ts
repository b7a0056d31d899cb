import type { TextDocumentEdit, WorkspaceEdit } from "vscode-languageserver";
import { type FileEdits, prepareRename, rename } from "../../shared-core/index.ts";
import { toEdits, toOffset, toRange } from "../convert.ts";
import { type Serving, sessionOf, wideView } from "../serving.ts";
import type { Session } from "../session.ts";
import { refusal } from "../wall.ts";
import { lineIndexOf } from "./other-files.ts";

export function registerRename(serving: Serving): void {
  const { connection, guard } = serving;
  connection.onPrepareRename(
    guard("textDocument/prepareRename", null, async ({ textDocument, position }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = await wideView(serving, session);
      const prepared = prepareRename(view, toOffset(view.lines, position));
      if ("refused" in prepared) throw refusal(prepared.refused);
      return { range: toRange(view.lines, prepared.span), placeholder: prepared.name };
    }),
  );
  connection.onRenameRequest(
    guard("textDocument/rename", null, async ({ textDocument, position, newName }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = await wideView(serving, session);
      const renamed = rename(view, toOffset(view.lines, position), newName);
      if ("refused" in renamed) throw refusal(renamed.refused);
      return toWorkspaceEdit(serving, session, renamed.files);
    }),
  );
}

/** With versions where the client takes them, so that it can refuse what no longer fits. */
export async function toWorkspaceEdit(
  serving: Serving,
  session: Session,
  files: readonly FileEdits[],
): Promise<WorkspaceEdit> {
  const changes: TextDocumentEdit[] = [];
  for (const { file, edits } of files) {
    const at = await lineIndexOf(serving, session, file);
    if (at === undefined || edits.length === 0) continue;
    const { uri, lines, version } = at;
    changes.push({ textDocument: { uri, version }, edits: toEdits(lines, edits) });
  }
  if (serving.client.capabilities.workspace?.workspaceEdit?.documentChanges)
    return { documentChanges: changes };
  const byUri = changes.map(({ textDocument, edits }) => [textDocument.uri, edits] as const);
  return { changes: Object.fromEntries(byUri) as WorkspaceEdit["changes"] };
}
