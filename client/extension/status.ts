import * as vscode from "vscode";
import { type BaseLanguageClient, State } from "vscode-languageclient";
import type { StateParams } from "../../shared-core/index.ts";
import { SELECTOR } from "./connection.ts";

/**
 * What the status bar says of the model in front: its verdict in plain sight, the state of the numbers and the
 * units they are shown in with the language.
 */
export function registerStatus(
  client: BaseLanguageClient,
  onState: vscode.Event<StateParams>,
): vscode.Disposable {
  const bar = new StatusBar(client);
  return vscode.Disposable.from(
    bar,
    onState((state) => bar.hear(state)),
    client.onDidChangeState(({ newState }) => bar.serverIs(newState)),
    vscode.workspace.onDidCloseTextDocument(({ uri }) => bar.forget(uri)),
    vscode.window.onDidChangeActiveTextEditor(() => bar.show()),
    vscode.workspace.onDidChangeConfiguration((change) => {
      if (change.affectsConfiguration("thrum.units.system")) bar.show();
    }),
  );
}

class StatusBar implements vscode.Disposable {
  readonly #client: BaseLanguageClient;
  readonly #states = new Map<string, StateParams>();
  readonly #verdict = vscode.window.createStatusBarItem("thrum.verdict", vscode.StatusBarAlignment.Right, 99);
  readonly #numbers = vscode.languages.createLanguageStatusItem("thrum.numbers", SELECTOR);
  readonly #units = vscode.languages.createLanguageStatusItem("thrum.units", SELECTOR);

  constructor(client: BaseLanguageClient) {
    this.#client = client;
    this.#verdict.name = vscode.l10n.t("Verdict of the model");
    this.#verdict.command = "thrum.judgeFile";
    this.#numbers.name = vscode.l10n.t("Numbers");
    this.#units.name = vscode.l10n.t("Units");
    this.#units.command = { title: vscode.l10n.t("Choose"), command: "thrum.chooseUnits" };
    this.show();
  }

  hear(state: StateParams): void {
    this.#states.set(spelled(state.uri), state);
    this.show();
  }

  forget(uri: vscode.Uri): void {
    this.#states.delete(uri.toString());
  }

  /** What an ended server said holds no more. */
  serverIs(state: State): void {
    if (state !== State.Running) this.#states.clear();
    this.show();
  }

  show(): void {
    const document = vscode.window.activeTextEditor?.document;
    const state = document && this.#states.get(document.uri.toString());
    this.#showVerdict(document, state);
    this.#showNumbers(state);
    this.#units.text = unitText(document?.uri);
  }

  #showVerdict(document: vscode.TextDocument | undefined, state: StateParams | undefined): void {
    if (document?.languageId !== "thrum" || !state?.text) {
      this.#verdict.hide();
      return;
    }
    this.#verdict.text = state.state === "ready" ? state.text : `${state.text} …`;
    this.#verdict.tooltip = vscode.l10n.t("Judge this file");
    this.#verdict.show();
  }

  #showNumbers(state: StateParams | undefined): void {
    const runs = this.#client.state === State.Running;
    const command = runs
      ? { title: vscode.l10n.t("Show log"), command: "thrum.showLog" }
      : { title: vscode.l10n.t("Restart"), command: "thrum.restartServer" };
    this.#numbers.command = command;
    this.#numbers.busy = this.#client.state === State.Starting || (runs && state?.state !== "ready");
    if (!runs) this.#numbers.text = vscode.l10n.t("the server is not running");
    else if (state?.state === "ready") this.#numbers.text = vscode.l10n.t("numbers are up to date");
    else if (state?.state === "busy") this.#numbers.text = vscode.l10n.t("computing");
    else this.#numbers.text = vscode.l10n.t("reading the model");
  }

  dispose(): void {
    for (const item of [this.#verdict, this.#numbers, this.#units]) item.dispose();
  }
}

/** The same spelling of a URI as the editor's own. */
const spelled = (uri: string): string => vscode.Uri.parse(uri).toString();

function unitText(uri: vscode.Uri | undefined): string {
  const system = vscode.workspace.getConfiguration("thrum.units", uri).get<string>("system");
  if (system === "si") return vscode.l10n.t("SI units");
  if (system === "inch") return vscode.l10n.t("inch units");
  return vscode.l10n.t("units as written");
}
