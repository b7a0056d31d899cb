import type { InlayHint } from "vscode-languageserver";
import type { InlayKind } from "../../shared-core/index.ts";
import { toSpan } from "../convert.ts";
import { ofThisText, type Serving, sessionOf } from "../serving.ts";
import type { Settings } from "../settings.ts";

export function registerInlayHints(serving: Serving): void {
  const { connection, schedule, settingsOf, guard } = serving;
  connection.languages.inlayHint.on(
    guard("textDocument/inlayHint", null, async ({ textDocument, range }): Promise<InlayHint[] | null> => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const kinds = kindsOf(settingsOf(session));
      if (kinds.length === 0) return [];
      const { lines } = schedule.current(session);
      const cursor = session.cursor();
      const asked = schedule.ask(session, "inlayHints", toSpan(lines, range), kinds, cursor);
      const hints = (await ofThisText(session, asked)) ?? [];
      // Two at one place would read as one word.
      return hints.map(({ offset, label, says }, i) => ({
        position: lines.position(offset),
        label: hints[i - 1]?.offset === offset ? `· ${label}` : label,
        tooltip: says,
        paddingLeft: true,
      }));
    }),
  );
}

function kindsOf({ inlayHints: { frequencies, values, margins } }: Settings): InlayKind[] {
  return [
    ...(frequencies ? (["frequency"] as const) : []),
    ...(values ? (["value"] as const) : []),
    ...(margins ? (["margin"] as const) : []),
  ];
}
