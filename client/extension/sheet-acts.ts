import * as vscode from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import {
  CSV,
  type CsvParams,
  type FromSheet,
  WRITE_VALUE,
  type WriteValueParams,
  type WriteValueResult,
} from "../../shared-core/index.ts";

/** Puts a moved number into the text: one edit, which one undo takes back. */
export async function writeToSource(
  client: BaseLanguageClient,
  uri: vscode.Uri,
  name: string,
  value: number,
): Promise<void> {
  const params: WriteValueParams = { uri: uri.toString(), name, value };
  await saying(async () => {
    const { edits, refused } = await client.sendRequest<WriteValueResult>(WRITE_VALUE, params);
    if (refused !== undefined) throw new Error(refused);
    const edit = new vscode.WorkspaceEdit();
    for (const { range, newText } of edits) edit.replace(uri, rangeOf(range), newText);
    if (!(await vscode.workspace.applyEdit(edit)))
      throw new Error(vscode.l10n.t("The text cannot be edited"));
  });
}

export async function saveCsv(
  client: BaseLanguageClient,
  uri: vscode.Uri,
  ask: string,
  of: string,
): Promise<void> {
  const params: CsvParams = of === "" ? { uri: uri.toString(), ask } : { uri: uri.toString(), ask, case: of };
  await saying(async () => {
    const text = await client.sendRequest<string>(CSV, params);
    await save(uri, `${ask}.csv`, { CSV: ["csv"] }, new TextEncoder().encode(text));
  });
}

export async function savePicture(
  uri: vscode.Uri,
  { name, format, data }: Extract<FromSheet, { type: "picture" }>,
): Promise<void> {
  const bytes =
    format === "svg"
      ? new TextEncoder().encode(data)
      : Uint8Array.from(atob(data), (character) => character.charCodeAt(0));
  await saying(() => save(uri, `${name}.${format}`, { [format.toUpperCase()]: [format] }, bytes));
}

/** Beside the model, unless somebody chooses another place. */
async function save(
  model: vscode.Uri,
  name: string,
  filters: Record<string, string[]>,
  bytes: Uint8Array,
): Promise<void> {
  const defaultUri = model.with({ path: model.path.replace(/[^/]*$/, name) });
  const target = await vscode.window.showSaveDialog({ defaultUri, filters });
  if (target) await vscode.workspace.fs.writeFile(target, bytes);
}

/** Somebody has clicked; why nothing happened is worth a word. */
async function saying(act: () => Promise<void>): Promise<void> {
  try {
    await act();
  } catch (error) {
    void vscode.window.showWarningMessage((error as Error).message);
  }
}

const rangeOf = ({ start, end }: WriteValueResult["edits"][number]["range"]): vscode.Range =>
  new vscode.Range(start.line, start.character, end.line, end.character);
