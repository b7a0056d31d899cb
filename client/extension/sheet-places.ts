import * as vscode from "vscode";

/** The head of a named statement; undefined when there is none of that name. */
export async function placeOf(uri: vscode.Uri, name: string): Promise<vscode.Range | undefined> {
  const found = (await symbolsOf(uri)).find((symbol) => symbol.name === name);
  return found?.selectionRange;
}

/** Names of the statements around a place, the innermost last. */
export async function namesAt(uri: vscode.Uri, place: vscode.Position): Promise<string[]> {
  return (await symbolsOf(uri)).filter(({ range }) => range.contains(place)).map(({ name }) => name);
}

/** All symbols of a document in one row. */
async function symbolsOf(uri: vscode.Uri): Promise<vscode.DocumentSymbol[]> {
  const symbols = await vscode.commands.executeCommand<vscode.DocumentSymbol[] | undefined>(
    "vscode.executeDocumentSymbolProvider",
    uri,
  );
  const flat = (list: readonly vscode.DocumentSymbol[]): vscode.DocumentSymbol[] =>
    list.flatMap((symbol) => [symbol, ...flat(symbol.children ?? [])]);
  return flat(symbols ?? []);
}
