import type { CodeLens as LspLens } from "vscode-languageserver";
import { type CodeLens, codeLenses, type LensKind } from "../../shared-core/index.ts";
import { toRange } from "../convert.ts";
import { type Serving, sessionOf } from "../serving.ts";
import type { Settings } from "../settings.ts";

/** Commands of the client; one that has none of ours shows what a lens says and nothing to click. */
const COMMANDS: Readonly<Record<LensKind, string>> = {
  show: "thrum.openSheet",
  csv: "thrum.writeCsv",
  verdict: "",
  case: "",
};

interface LensData {
  readonly uri: string;
  readonly lens: CodeLens;
}

/** Placed at once from the text alone; what they say is asked for later, so that lines never jump. */
export function registerCodeLens(serving: Serving): void {
  const { connection, schedule, settingsOf, client, guard } = serving;
  connection.onCodeLens(
    guard("textDocument/codeLens", null, ({ textDocument }): LspLens[] | null => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const settings = settingsOf(session);
      const view = schedule.view(session);
      return codeLenses(view)
        .filter(({ kind }) => isWanted(kind, settings) && (client.ours || COMMANDS[kind] === ""))
        .map((lens) => ({
          range: toRange(view.lines, lens.span),
          data: { uri: session.uri, lens } satisfies LensData,
        }));
    }),
  );
  connection.onCodeLensResolve(async (lens, token) => {
    const empty = { ...lens, command: { title: "", command: "" } };
    const resolve = guard(
      "codeLens/resolve",
      empty,
      async (): Promise<LspLens & { command: { title: string; command: string } }> => {
        const { uri, lens: placed } = lens.data as LensData;
        const session = sessionOf(serving, { uri });
        const found = session && (await schedule.ask(session, "resolveLens", placed));
        if (!found) return empty;
        const command = COMMANDS[placed.kind];
        const args = command === "" ? {} : { arguments: [uri, placed.name] };
        return { ...lens, command: { title: found.title, command, ...args } };
      },
    );
    const resolved = await resolve(undefined, token);
    return "range" in resolved ? resolved : empty;
  });
}

function isWanted(kind: LensKind, { codeLens }: Settings): boolean {
  if (kind === "verdict") return codeLens.expectations;
  return kind === "case" ? codeLens.cases : codeLens.asks;
}
