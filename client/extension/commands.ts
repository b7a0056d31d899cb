import * as vscode from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import { CSV, type CsvParams, NEW_MODELS, newModel } from "../../shared-core/index.ts";
import type { Supervisor } from "./keep-running.ts";

/** Every command of the manifest that is not the sheet's. */
export function registerCommands(
  client: BaseLanguageClient,
  supervisor: Supervisor,
  output: vscode.LogOutputChannel,
): vscode.Disposable[] {
  const add = vscode.commands.registerCommand;
  return [
    add("thrum.newModel", createModel),
    add("thrum.restartServer", () => supervisor.restart()),
    add("thrum.showLog", () => output.show()),
    add("thrum.chooseUnits", chooseUnits),
    add("thrum.writeCsv", (uri?: string, ask?: string) => writeCsv(client, uri, ask)),
    add("thrum.judgeFile", () => vscode.commands.executeCommand("testing.runCurrentFile")),
  ];
}

async function createModel(): Promise<void> {
  const kinds = NEW_MODELS.map(({ kind, title, says }) => ({ model: kind, label: title, description: says }));
  const chosen = await vscode.window.showQuickPick(kinds, {
    placeHolder: vscode.l10n.t("What is it a model of?"),
  });
  if (!chosen) return;
  const content = newModel(chosen.model);
  const document = await vscode.workspace.openTextDocument({ language: "thrum", content });
  await vscode.window.showTextDocument(document);
}

async function chooseUnits(): Promise<void> {
  const systems = [
    { label: vscode.l10n.t("As written"), system: "as-written" },
    { label: vscode.l10n.t("SI units"), system: "si" },
    { label: vscode.l10n.t("Inch units"), system: "inch" },
  ];
  const chosen = await vscode.window.showQuickPick(systems, {
    placeHolder: vscode.l10n.t("Show numbers in"),
  });
  if (!chosen) return;
  const target = vscode.workspace.workspaceFolders
    ? vscode.ConfigurationTarget.Workspace
    : vscode.ConfigurationTarget.Global;
  await vscode.workspace.getConfiguration("thrum.units").update("system", chosen.system, target);
}

/** Writes the answer of an ask beside the model; the lens above the ask calls it. */
async function writeCsv(client: BaseLanguageClient, uri?: string, ask?: string): Promise<void> {
  const model = uri ?? vscode.window.activeTextEditor?.document.uri.toString();
  if (model === undefined || ask === undefined) return;
  const params: CsvParams = { uri: model, ask };
  let text: string;
  try {
    text = await client.sendRequest<string>(CSV, params);
  } catch (error) {
    // The reason why there is no answer, in the server's words; somebody has asked for it with a click.
    void vscode.window.showWarningMessage((error as Error).message);
    return;
  }
  const from = vscode.Uri.parse(model);
  const target = await vscode.window.showSaveDialog({
    defaultUri: from.with({ path: from.path.replace(/[^/]*$/, `${ask}.csv`) }),
    filters: { CSV: ["csv"] },
  });
  if (target) await vscode.workspace.fs.writeFile(target, new TextEncoder().encode(text));
}
