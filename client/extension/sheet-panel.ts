import * as vscode from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import {
  type FromSheet,
  readFromSheet,
  SHEET,
  SHEET_VERSION,
  type SheetParams,
  type SheetResult,
  type SheetRevision,
  type StateParams,
  type ToSheet,
} from "../../shared-core/index.ts";
import { revisionsOf } from "./revisions.ts";
import { saveCsv, savePicture, writeToSource } from "./sheet-acts.ts";
import { sheetPage } from "./sheet-page.ts";
import { namesAt, placeOf } from "./sheet-places.ts";

export const SHEET_VIEW = "thrum.sheet";

export interface SheetEnvironment {
  readonly client: BaseLanguageClient;
  /** Marks the line that is pointed at in the sheet. */
  readonly pointed: vscode.TextEditorDecorationType;
  /** Folder of the page's files. */
  readonly files: vscode.Uri;
  closed(panel: SheetPanel): void;
}

type WithoutVersion<T> = T extends unknown ? Omit<T, "protocol"> : never;

/** A moving cursor is looked up once it rests so long, in ms. */
const CURSOR_REST = 60;
/** The page follows edits when none has come for so long, or the first has waited for so long, in ms. */
const TYPING_REST = 120;
const LONGEST_WAIT = 2500;

/** One sheet. It asks for one content at a time, the newest, and for none while nobody sees it. */
export class SheetPanel implements vscode.Disposable {
  readonly #panel: vscode.WebviewPanel;
  readonly #environment: SheetEnvironment;
  #uri: vscode.Uri;
  #pinned: boolean;
  #choice: Omit<SheetParams, "uri"> = {};
  #ready = false;
  #wanted = false;
  #running = false;
  /** The server is computing: what it says now may not have all answers. */
  #computing = false;
  #posted = "";
  #ask: string | undefined;
  #revisions: readonly SheetRevision[] = [];
  #lastEdit = 0;
  #waitsSince: number | undefined;
  #soon: ReturnType<typeof setTimeout> | undefined;
  #cursor: ReturnType<typeof setTimeout> | undefined;

  constructor(panel: vscode.WebviewPanel, uri: vscode.Uri, pinned: boolean, environment: SheetEnvironment) {
    this.#panel = panel;
    this.#uri = uri;
    this.#pinned = pinned;
    this.#environment = environment;
    const { webview } = panel;
    webview.options = { enableScripts: true, localResourceRoots: [environment.files] };
    webview.onDidReceiveMessage((data: unknown) => {
      const message = readFromSheet(data);
      if (message) void this.#heed(message);
    });
    panel.onDidChangeViewState(() => this.#seen());
    panel.onDidDispose(() => {
      clearTimeout(this.#cursor);
      clearTimeout(this.#soon);
      this.#point(undefined);
      environment.closed(this);
    });
    webview.html = sheetPage(webview, environment.files);
    this.#name();
  }

  get uri(): vscode.Uri {
    return this.#uri;
  }

  get pinned(): boolean {
    return this.#pinned;
  }

  get active(): boolean {
    return this.#panel.active;
  }

  shows(uri: vscode.Uri): boolean {
    return uri.toString() === this.#uri.toString();
  }

  setPinned(pinned: boolean): void {
    this.#pinned = pinned;
    this.#name();
  }

  setModel(uri: vscode.Uri): void {
    if (this.shows(uri)) return;
    this.#point(undefined);
    this.#uri = uri;
    this.#computing = false;
    const { units } = this.#choice;
    this.#choice = units === undefined ? {} : { units };
    this.#name();
    this.refresh();
    void this.#offerRevisions();
  }

  /** Brings the panel to the front without taking the focus, and a card of it into sight. */
  reveal(ask: string | undefined): void {
    this.#panel.reveal(undefined, true);
    this.#ask = ask;
    if (this.#ready && !this.#running) this.#showAsk();
  }

  edited(): void {
    this.#lastEdit = Date.now();
    this.#refreshSoon();
  }

  hear({ state }: StateParams): void {
    this.#computing = state !== "ready";
    // Also where the content came in time: which answers it had cannot be told from here.
    if (!this.#computing) this.#refreshSoon();
  }

  cursorAt(document: vscode.TextDocument, place: vscode.Position): void {
    if (!this.#panel.visible) return;
    clearTimeout(this.#cursor);
    this.#cursor = setTimeout(async () => {
      const names = await namesAt(document.uri, place);
      if (this.shows(document.uri)) this.#post({ type: "highlight", names });
    }, CURSOR_REST);
  }

  /** A page painted at every key would take the time that the keys need: it follows when typing rests. */
  #refreshSoon(): void {
    const now = Date.now();
    this.#waitsSince ??= now;
    const rest = Math.min(this.#lastEdit + TYPING_REST, this.#waitsSince + LONGEST_WAIT) - now;
    clearTimeout(this.#soon);
    if (rest <= 0) this.refresh();
    else this.#soon = setTimeout(() => this.refresh(), rest);
  }

  refresh(): void {
    clearTimeout(this.#soon);
    this.#waitsSince = undefined;
    this.#wanted = true;
    if (!this.#running && this.#ready && this.#panel.visible) void this.#work();
  }

  dispose(): void {
    this.#panel.dispose();
  }

  async #work(): Promise<void> {
    this.#running = true;
    while (this.#wanted && this.#ready && this.#panel.visible) {
      this.#wanted = false;
      this.#post({ type: "state", state: "busy", text: "" });
      // The edit that led here is on its way to the server first.
      await new Promise((done) => setTimeout(done, 0));
      await this.#fetch(this.#uri);
    }
    this.#running = false;
    this.#showAsk();
  }

  async #offerRevisions(): Promise<void> {
    const uri = this.#uri;
    const list = await revisionsOf(uri);
    if (!this.shows(uri)) return;
    this.#revisions = list;
    this.#post({ type: "revisions", list });
    const chosen = this.#choice.earlier;
    const label = list.find(({ id }) => id === chosen?.revision)?.label;
    if (chosen === undefined || label === undefined || label === chosen.label) return;
    this.#choice = { ...this.#choice, earlier: { ...chosen, label } };
    this.refresh();
  }

  async #fetch(uri: vscode.Uri): Promise<void> {
    let result: SheetResult;
    try {
      const params: SheetParams = { uri: uri.toString(), ...this.#choice };
      result = await this.#environment.client.sendRequest<SheetResult>(SHEET, params);
    } catch (error) {
      this.#post({ type: "state", state: "failed", text: (error as Error).message });
      return;
    }
    if (!this.shows(uri)) return;
    if (result.content === null) this.#post({ type: "state", state: "failed", text: result.reason ?? "" });
    else {
      const { content, version } = result;
      // The same once more would only be painted again.
      const posted = `${uri} ${content}`;
      if (posted !== this.#posted) this.#post({ type: "content", uri: uri.toString(), version, content });
      this.#posted = posted;
      if (!this.#computing) this.#post({ type: "state", state: "ready", text: "" });
    }
  }

  async #heed(message: FromSheet): Promise<void> {
    const { client } = this.#environment;
    switch (message.type) {
      case "ready":
        this.#ready = true;
        this.#posted = "";
        this.refresh();
        await this.#offerRevisions();
        break;
      case "show": {
        const { case: of, units, knobs, earlier, motion } = message;
        const found = this.#revisions.find(({ id }) => id === earlier);
        // A page that was restored asks before the list is there.
        const label = found?.label ?? earlier?.slice(0, 7) ?? "";
        this.#choice = {
          case: of,
          units,
          knobs,
          ...(motion !== null && { motion }),
          ...(earlier && { earlier: { revision: earlier, label } }),
        };
        this.refresh();
        break;
      }
      case "reveal":
        await this.#revealLine(message.name);
        break;
      case "point":
        await this.#point(message.name ?? undefined);
        break;
      case "write":
        await writeToSource(client, this.#uri, message.name, message.value);
        break;
      case "csv":
        await saveCsv(client, this.#uri, message.ask, message.case);
        break;
      case "picture":
        await savePicture(this.#uri, message);
        break;
    }
  }

  /** Hidden pages are thrown away; a shown one starts anew and says when it is ready. */
  #seen(): void {
    if (!this.#panel.visible) {
      this.#ready = false;
      void this.#point(undefined);
    } else if (this.#ready) this.refresh();
  }

  async #revealLine(name: string): Promise<void> {
    const range = await placeOf(this.#uri, name);
    if (range === undefined) return;
    const open = this.#editors()[0];
    const column = open?.viewColumn ?? vscode.ViewColumn.One;
    await vscode.window.showTextDocument(this.#uri, { viewColumn: column, selection: range });
  }

  async #point(name: string | undefined): Promise<void> {
    const range = name === undefined ? undefined : await placeOf(this.#uri, name);
    for (const editor of this.#editors())
      editor.setDecorations(this.#environment.pointed, range ? [range] : []);
  }

  #editors(): readonly vscode.TextEditor[] {
    return vscode.window.visibleTextEditors.filter(({ document }) => this.shows(document.uri));
  }

  #showAsk(): void {
    if (this.#ask !== undefined) this.#post({ type: "reveal", name: this.#ask });
    this.#ask = undefined;
  }

  #name(): void {
    const file = this.#uri.path.replace(/^.*\//, "").replace(/\.thrum$/, "");
    this.#panel.title = this.#pinned
      ? vscode.l10n.t("Sheet of {0}, pinned", file)
      : vscode.l10n.t("Sheet of {0}", file);
  }

  #post(message: WithoutVersion<ToSheet>): void {
    void this.#panel.webview.postMessage({ ...message, protocol: SHEET_VERSION });
  }
}
