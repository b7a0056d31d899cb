import * as vscode from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import type { StateParams } from "../../shared-core/index.ts";
import { SELECTOR } from "./connection.ts";
import { SHEET_VIEW, type SheetEnvironment, SheetPanel } from "./sheet-panel.ts";

/** Which models have a sheet of their own, over a reload. */
const PINNED = "thrum.sheet.pinned";

/** Response sheets beside the text: one that follows the model in front, and as many as are pinned to theirs. */
export function registerSheet(
  context: vscode.ExtensionContext,
  client: BaseLanguageClient,
  states: vscode.Event<StateParams>,
): vscode.Disposable {
  const sheets = new Sheets(context, client);
  const add = vscode.commands.registerCommand;
  return vscode.Disposable.from(
    sheets,
    add("thrum.openSheet", (uri?: string | vscode.Uri, ask?: string) => sheets.open(uri, ask)),
    add("thrum.pinSheet", () => sheets.pin()),
    vscode.window.registerWebviewPanelSerializer(SHEET_VIEW, {
      deserializeWebviewPanel: async (panel, state) => sheets.restore(panel, state),
    }),
    vscode.window.onDidChangeActiveTextEditor((editor) => sheets.follow(editor)),
    vscode.window.onDidChangeTextEditorSelection(({ textEditor }) => sheets.pointAt(textEditor)),
    vscode.workspace.onDidChangeTextDocument(({ document, contentChanges }) => {
      if (contentChanges.length > 0) sheets.edited(document.uri);
    }),
    states((state) => sheets.hear(state)),
  );
}

class Sheets implements vscode.Disposable {
  readonly #context: vscode.ExtensionContext;
  readonly #environment: SheetEnvironment;
  readonly #panels = new Set<SheetPanel>();

  constructor(context: vscode.ExtensionContext, client: BaseLanguageClient) {
    this.#context = context;
    const pointed = vscode.window.createTextEditorDecorationType({
      isWholeLine: true,
      backgroundColor: new vscode.ThemeColor("editor.hoverHighlightBackground"),
    });
    this.#environment = {
      client,
      pointed,
      files: vscode.Uri.joinPath(context.extensionUri, "dist/sheet"),
      closed: (panel) => {
        this.#panels.delete(panel);
        this.#remember();
      },
    };
  }

  open(of?: string | vscode.Uri, ask?: string): void {
    const uri = typeof of === "string" ? vscode.Uri.parse(of) : (of ?? modelInFront());
    if (uri === undefined) return;
    const shown = [...this.#panels].find((panel) => panel.shows(uri)) ?? this.#following();
    if (shown) shown.setModel(uri);
    const panel = shown ?? this.#add(newPanel(this.#environment.files), uri, false);
    panel.reveal(ask);
  }

  /** The sheet in front stays with its model, or follows again. */
  pin(): void {
    const panel = [...this.#panels].find(({ active }) => active);
    if (panel === undefined) return;
    // Only one follows.
    if (panel.pinned) for (const other of this.#panels) if (!other.pinned) other.setPinned(true);
    panel.setPinned(!panel.pinned);
    this.#remember();
  }

  restore(panel: vscode.WebviewPanel, state: unknown): void {
    const kept = typeof state === "object" && state !== null && "uri" in state ? state.uri : undefined;
    if (typeof kept !== "string") {
      panel.dispose();
      return;
    }
    const pinned = this.#context.workspaceState.get<readonly string[]>(PINNED, []).includes(kept);
    this.#add(panel, vscode.Uri.parse(kept), pinned || this.#following() !== undefined);
  }

  follow(editor: vscode.TextEditor | undefined): void {
    if (editor === undefined || !isModel(editor.document)) return;
    this.#following()?.setModel(editor.document.uri);
    this.pointAt(editor);
  }

  pointAt({ document, selection }: vscode.TextEditor): void {
    for (const panel of this.#panels) {
      if (panel.shows(document.uri)) panel.cursorAt(document, selection.active);
    }
  }

  edited(uri: vscode.Uri): void {
    for (const panel of this.#panels) if (panel.shows(uri)) panel.edited();
  }

  hear(state: StateParams): void {
    const uri = vscode.Uri.parse(state.uri);
    for (const panel of this.#panels) if (panel.shows(uri)) panel.hear(state);
  }

  dispose(): void {
    this.#environment.pointed.dispose();
    for (const panel of this.#panels) panel.dispose();
  }

  #following(): SheetPanel | undefined {
    return [...this.#panels].find(({ pinned }) => !pinned);
  }

  #add(view: vscode.WebviewPanel, uri: vscode.Uri, pinned: boolean): SheetPanel {
    const panel = new SheetPanel(view, uri, pinned, this.#environment);
    this.#panels.add(panel);
    return panel;
  }

  #remember(): void {
    const pinned = [...this.#panels].filter((panel) => panel.pinned).map(({ uri }) => uri.toString());
    void this.#context.workspaceState.update(PINNED, pinned);
  }
}

const isModel = (document: vscode.TextDocument): boolean =>
  vscode.languages.match([...SELECTOR], document) > 0;

function modelInFront(): vscode.Uri | undefined {
  const document = vscode.window.activeTextEditor?.document;
  return document && isModel(document) ? document.uri : undefined;
}

/** Beside the text, which keeps the focus; what is not seen is not kept running. */
const newPanel = (files: vscode.Uri): vscode.WebviewPanel =>
  vscode.window.createWebviewPanel(
    SHEET_VIEW,
    vscode.l10n.t("Sheet"),
    { viewColumn: vscode.ViewColumn.Beside, preserveFocus: true },
    { enableScripts: true, retainContextWhenHidden: false, localResourceRoots: [files] },
  );
