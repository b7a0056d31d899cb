import type { DocumentSymbol as LspSymbol, SymbolInformation, WorkspaceSymbol } from "vscode-languageserver";
import { type DocumentSymbol, documentSymbols, LineIndex, searchSymbols } from "../../shared-core/index.ts";
import { toRange, toSymbolKind } from "../convert.ts";
import { type Serving, sessionOf } from "../serving.ts";

export function registerSymbols(serving: Serving): void {
  const { connection, schedule, closed, client, guard } = serving;
  connection.onDocumentSymbol(
    guard(
      "textDocument/documentSymbol",
      null,
      ({ textDocument }): LspSymbol[] | SymbolInformation[] | null => {
        const session = sessionOf(serving, textDocument);
        if (session === undefined) return null;
        const view = schedule.view(session);
        const symbols = documentSymbols(view);
        const nested = client.capabilities.textDocument?.documentSymbol?.hierarchicalDocumentSymbolSupport;
        return nested
          ? symbols.map((symbol) => toSymbol(symbol, view.lines))
          : symbols.map((symbol) => ({
              name: symbol.name,
              kind: toSymbolKind(symbol),
              location: { uri: session.uri, range: toRange(view.lines, symbol.span) },
            }));
      },
    ),
  );
  connection.onWorkspaceSymbol(
    guard("workspace/symbol", null, async ({ query }): Promise<WorkspaceSymbol[]> => {
      const files = await closed.symbols();
      const home = new Map(
        files.flatMap(({ at, symbols }) => symbols.map((symbol) => [symbol, at] as const)),
      );
      const lines = new Map<string, LineIndex>();
      const found: WorkspaceSymbol[] = [];
      for (const symbol of searchSymbols([...home.keys()], query)) {
        const at = home.get(symbol);
        if (at === undefined) continue;
        let index = lines.get(at.uri);
        if (index === undefined) {
          const content = await closed.contentOf(at);
          index = new LineIndex(content.ok ? content.text : "");
          lines.set(at.uri, index);
        }
        const { name, container } = symbol;
        const uri = schedule.byUri(at.uri)?.uri ?? at.uri;
        const location = { uri, range: toRange(index, symbol.span) };
        found.push({ name, kind: toSymbolKind(symbol), containerName: container, location });
      }
      return found;
    }),
  );
}

function toSymbol(symbol: DocumentSymbol, lines: LineIndex): LspSymbol {
  const { name, detail, span, nameSpan, children } = symbol;
  return {
    name,
    detail,
    kind: toSymbolKind(symbol),
    range: toRange(lines, span),
    selectionRange: toRange(lines, nameSpan),
    children: children.map((child) => toSymbol(child, lines)),
  };
}
