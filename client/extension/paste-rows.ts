import * as vscode from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import { ROWS, type RowsParams, type RowsResult } from "../../shared-core/index.ts";
import { SELECTOR } from "./connection.ts";

const KIND = vscode.DocumentDropOrPasteEditKind.Text.append("thrum", "rows");

/** Rows copied from a table become statements; pasting the text as it is stays the other choice. */
export function registerRowPaste(client: BaseLanguageClient): vscode.Disposable {
  const provider: vscode.DocumentPasteEditProvider = {
    async provideDocumentPasteEdits(document, _ranges, transfer) {
      const text = await transfer.get("text/plain")?.asString();
      if (!text?.includes("\t")) return undefined;
      const params: RowsParams = { uri: document.uri.toString(), text };
      const made = await client.sendRequest<RowsResult>(ROWS, params);
      if (made.text === null) return undefined;
      return [new vscode.DocumentPasteEdit(made.text, vscode.l10n.t("Paste rows as statements"), KIND)];
    },
  };
  const options = { providedPasteEditKinds: [KIND], pasteMimeTypes: ["text/plain"] };
  return vscode.languages.registerDocumentPasteEditProvider(SELECTOR, provider, options);
}
