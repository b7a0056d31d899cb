import { MarkupKind } from "vscode-languageserver";
import { toOffset, toRange } from "../convert.ts";
import { ofThisText, type Serving, sessionOf } from "../serving.ts";

export function registerHover(serving: Serving): void {
  const { connection, schedule, client, guard, docs } = serving;
  connection.onHover(
    guard("textDocument/hover", null, async ({ textDocument, position }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const { lines } = schedule.current(session);
      const found = await ofThisText(session, schedule.ask(session, "hover", toOffset(lines, position)));
      if (!found) return null;
      const link =
        docs !== undefined && found.page !== undefined ? `\n\n[Read more](${docs}${found.page})` : "";
      const contents = client.markdown
        ? { kind: MarkupKind.Markdown, value: found.markdown + link }
        : { kind: MarkupKind.PlainText, value: found.text };
      return { contents, range: toRange(lines, found.span) };
    }),
  );
}
