import type { InlayHint } from "vscode-languageserver";
import type { InlayKind } from "../../shared-core/index.ts";
import { toSpan } from "../convert.ts";
import { ofThisText, type Serving, sessionOf } from "../serving.ts";
import type { Settings } from "../settings.ts";

export function registerInlayHints(serving: Serving): void {
  const { connection, schedule, settingsOf, guard, client } = serving;
  // A client that asks for lenses again when numbers come shows them all the time.
  const hasLenses = client.capabilities.workspace?.codeLens?.refreshSupport === true;
  connection.languages.inlayHint.on(
    guard("textDocument/inlayHint", null, async ({ textDocument, range }): Promise<InlayHint[] | null> => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const kinds = kindsOf(settingsOf(session), hasLenses);
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

/** A lens above an expectation says its margin: then the hint behind it says the value alone. */
function kindsOf({ inlayHints, codeLens }: Settings, hasLenses: boolean): InlayKind[] {
  const { frequencies, values, margins } = inlayHints;
  const behind = hasLenses && codeLens.expectations ? "found" : "margin";
  return [
    ...(frequencies ? (["frequency"] as const) : []),
    ...(values ? (["value"] as const) : []),
    ...(margins ? ([behind] as const) : []),
  ];
}
