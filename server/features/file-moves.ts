import type { TextDocumentEdit, WorkspaceEdit } from "vscode-languageserver";
import { moveEdits } from "../../shared-core/index.ts";
import { toEdits } from "../convert.ts";
import type { Serving } from "../serving.ts";
import { keyOf, pathBelow } from "../uris.ts";

/** Before files or folders move: the edits that keep `use` and record paths leading to the same files. */
export function registerFileMoves(serving: Serving): void {
  const { connection, closed, schedule, guard } = serving;
  connection.workspace.onWillRenameFiles(
    guard("workspace/willRenameFiles", null, async ({ files }): Promise<WorkspaceEdit | null> => {
      const changes: TextDocumentEdit[] = [];
      for (const at of await closed.files()) {
        const moves = files.flatMap(({ oldUri, newUri }) => {
          const [from, to] = [pathBelow(at.folder, oldUri), pathBelow(at.folder, newUri)];
          return from !== undefined && to !== undefined ? [{ from, to }] : [];
        });
        if (moves.length === 0 || !(await mayName(serving, at))) continue;
        await closed.visit(at.uri, async (session) => {
          const view = schedule.view(session);
          const edits = moveEdits(view, moves);
          if (edits.length === 0) return;
          const open = schedule.session(keyOf(at.uri));
          const version = open && !open.hidden ? open.document.version : null;
          const textDocument = { uri: session.uri, version };
          changes.push({ textDocument, edits: toEdits(view.lines, edits) });
        });
      }
      if (changes.length === 0) return null;
      if (serving.client.capabilities.workspace?.workspaceEdit?.documentChanges)
        return { documentChanges: changes };
      const byUri = changes.map(({ textDocument, edits }) => [textDocument.uri, edits] as const);
      return { changes: Object.fromEntries(byUri) as WorkspaceEdit["changes"] };
    }),
  );
}

/** A text without quotes names no file. */
async function mayName(
  { closed }: Serving,
  at: { readonly folder: string; readonly file: string },
): Promise<boolean> {
  const content = await closed.contentOf(at);
  return content.ok && content.text.includes('"');
}
