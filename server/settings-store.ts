import type { Connection } from "vscode-languageserver";
import type { Client } from "./client.ts";
import { DEFAULTS, readSettings, type Settings } from "./settings.ts";
import { keyOf } from "./uris.ts";

/** Settings as the client has them for each file, asked for when a file is opened and when they change. */
export class SettingsStore {
  readonly #connection: Connection;
  readonly #client: Client;
  readonly #byKey = new Map<string, Settings>();
  #general: Settings;

  constructor(connection: Connection, client: Client) {
    this.#connection = connection;
    this.#client = client;
    this.#general = client.settings === undefined ? DEFAULTS : readSettings(client.settings);
  }

  of({ uri }: { readonly uri: string }): Settings {
    return this.#byKey.get(keyOf(uri)) ?? this.#general;
  }

  forget(uri: string): void {
    this.#byKey.delete(keyOf(uri));
  }

  /** Asks the client for the settings of some files, and the general ones. True when something is different now. */
  async load(uris: readonly string[]): Promise<boolean> {
    if (!this.#client.pullsSettings) return false;
    const items = [{ section: "thrum" }, ...uris.map((scopeUri) => ({ scopeUri, section: "thrum" }))];
    const sent: unknown = await this.#connection.workspace.getConfiguration(items).catch(() => undefined);
    if (!Array.isArray(sent)) return false;
    const before = JSON.stringify([this.#general, ...uris.map((uri) => this.of({ uri }))]);
    const [general, ...each] = sent.map((one: unknown) => readSettings(one));
    this.#general = general ?? DEFAULTS;
    for (const [i, uri] of uris.entries()) this.#byKey.set(keyOf(uri), each[i] ?? this.#general);
    return JSON.stringify([this.#general, ...uris.map((uri) => this.of({ uri }))]) !== before;
  }

  /** A client that answers no questions about settings sends them with each change. */
  take(sent: unknown): void {
    if (this.#client.pullsSettings || typeof sent !== "object" || sent === null) return;
    this.#general = readSettings("thrum" in sent ? sent.thrum : sent);
  }
}
