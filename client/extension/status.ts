import * as vscode from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import { STATE, type StateParams } from "../../shared-core/index.ts";
import { SELECTOR } from "./connection.ts";

/** What the language status says of the model in front: its verdict, and the units numbers are shown in. */
export function registerStatus(client: BaseLanguageClient): vscode.Disposable {
  const verdict = vscode.languages.createLanguageStatusItem("thrum.verdict", SELECTOR);
  verdict.name = vscode.l10n.t("Verdict");
  const units = vscode.languages.createLanguageStatusItem("thrum.units", SELECTOR);
  units.name = vscode.l10n.t("Units");
  const states = new Map<string, StateParams>();

  const show = () => {
    const uri = vscode.window.activeTextEditor?.document.uri.toString();
    const state = uri === undefined ? undefined : states.get(uri);
    verdict.text = state?.text ?? vscode.l10n.t("reading");
    verdict.busy = state === undefined || state.state !== "ready";
    verdict.detail = state?.state === "busy" ? vscode.l10n.t("computing") : undefined;
    verdict.command = { title: vscode.l10n.t("Show log"), command: "thrum.showLog" };
    units.text = unitText(vscode.window.activeTextEditor?.document.uri);
    units.command = { title: vscode.l10n.t("Choose"), command: "thrum.chooseUnits" };
  };
  show();
  return vscode.Disposable.from(
    verdict,
    units,
    client.onNotification(STATE, (state: StateParams) => {
      states.set(normal(state.uri), state);
      show();
    }),
    vscode.workspace.onDidCloseTextDocument((document) => states.delete(document.uri.toString())),
    vscode.window.onDidChangeActiveTextEditor(show),
    vscode.workspace.onDidChangeConfiguration((change) => {
      if (change.affectsConfiguration("thrum.units.system")) show();
    }),
  );
}

/** The same spelling of a URI as the editor's own. */
const normal = (uri: string): string => vscode.Uri.parse(uri).toString();

function unitText(uri: vscode.Uri | undefined): string {
  const system = vscode.workspace.getConfiguration("thrum.units", uri).get<string>("system");
  if (system === "si") return vscode.l10n.t("SI units");
  if (system === "inch") return vscode.l10n.t("inch units");
  return vscode.l10n.t("units as written");
}
