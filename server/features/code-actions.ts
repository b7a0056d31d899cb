import type { CodeAction } from "vscode-languageserver";
import { toDiagnostic, toEdits, toSpan } from "../convert.ts";
import { diagnosticContext } from "../diagnostics.ts";
import { ofThisText, type Serving, sessionOf } from "../serving.ts";

export function registerCodeActions(serving: Serving): void {
  const { connection, schedule, client, guard } = serving;
  const can = client.capabilities.textDocument?.codeAction;
  connection.onCodeAction(
    guard("textDocument/codeAction", null, async ({ textDocument, range, context }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const { lines } = schedule.current(session);
      const said = session.diagnostics();
      const found = await ofThisText(
        session,
        schedule.ask(session, "codeActions", toSpan(lines, range), said, context.only),
      );
      const shown = diagnosticContext(serving, session);
      return (found ?? []).flatMap((action): CodeAction[] => {
        if (action.disabled !== undefined && !can?.disabledSupport) return [];
        const converted: CodeAction = { title: action.title, kind: action.kind };
        if (action.disabled !== undefined) converted.disabled = { reason: action.disabled };
        else {
          const edits = toEdits(lines, action.edits);
          const { uri, document } = session;
          converted.edit = client.capabilities.workspace?.workspaceEdit?.documentChanges
            ? { documentChanges: [{ textDocument: { uri, version: document.version }, edits }] }
            : { changes: { [uri]: edits } };
        }
        if (action.preferred && can?.isPreferredSupport) converted.isPreferred = true;
        if (action.cures !== undefined) converted.diagnostics = [toDiagnostic(said[action.cures], shown)];
        return [converted];
      });
    }),
  );
}
