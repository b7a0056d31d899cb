/** An editor as far as a server can tell: a client over the real standard input and output of `thrum serve`. */
import { type ChildProcess, spawn } from "node:child_process";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import {
  createMessageConnection,
  type MessageConnection,
  StreamMessageReader,
  StreamMessageWriter,
} from "vscode-jsonrpc/node";
import type {
  ClientCapabilities,
  Diagnostic,
  DocumentDiagnosticReport,
  InitializeResult,
  Position,
  PublishDiagnosticsParams,
  Range,
} from "vscode-languageserver-protocol";
import { PROTOCOL_VERSION, STATE, type StateParams } from "../../shared-core/index.ts";
import { root } from "../house/files.ts";

const PROGRAM = join(root, "dist", "terminal", "thrum.js");

export interface ClientOptions {
  readonly folder?: string;
  readonly capabilities?: ClientCapabilities;
  readonly initializationOptions?: unknown;
  /** What it answers when it is asked for the section `thrum`. */
  readonly settings?: Record<string, unknown>;
}

/** What a capable editor of today says it can do. */
export const CAPABILITIES: ClientCapabilities = {
  general: { positionEncodings: ["utf-16"] },
  workspace: {
    configuration: true,
    workspaceFolders: true,
    didChangeConfiguration: { dynamicRegistration: true },
    didChangeWatchedFiles: { dynamicRegistration: true },
    workspaceEdit: { documentChanges: true },
    inlayHint: { refreshSupport: true },
    codeLens: { refreshSupport: true },
    diagnostics: { refreshSupport: true },
    fileOperations: { willRename: true },
  },
  window: { workDoneProgress: true },
  textDocument: {
    publishDiagnostics: {
      relatedInformation: true,
      tagSupport: { valueSet: [1, 2] },
      codeDescriptionSupport: true,
      dataSupport: true,
      versionSupport: true,
    },
    hover: { contentFormat: ["markdown", "plaintext"] },
    completion: { completionItem: { snippetSupport: true, insertReplaceSupport: true } },
    rename: { prepareSupport: true },
    documentSymbol: { hierarchicalDocumentSymbolSupport: true },
    rangeFormatting: { rangesSupport: true },
    codeAction: {
      codeActionLiteralSupport: { codeActionKind: { valueSet: ["quickfix", "refactor", "source.fixAll"] } },
      disabledSupport: true,
      dataSupport: true,
      isPreferredSupport: true,
    },
  },
};

/** The same, but it asks for diagnostics instead of waiting for them. */
export const PULLING: ClientCapabilities = {
  ...CAPABILITIES,
  textDocument: { ...CAPABILITIES.textDocument, diagnostic: { relatedDocumentSupport: true } },
};

export interface Published extends PublishDiagnosticsParams {
  readonly at: number;
}

/** A server process with a client on its streams. End it with `close`. */
export class TestClient {
  readonly process: ChildProcess;
  readonly connection: MessageConnection;
  readonly folder: string;
  readonly published: Published[] = [];
  readonly states: StateParams[] = [];
  readonly logged: string[] = [];
  readonly registered: string[] = [];
  readonly refreshed: string[] = [];
  readonly progress: { readonly token: string | number; readonly kind: string }[] = [];
  result: InitializeResult = { capabilities: {} };
  settings: Record<string, unknown>;
  stderr = "";
  exitCode: Promise<number | null>;
  /** Answers requests that the server sends beside the usual ones. */
  readonly answers = new Map<string, (params: never) => unknown>();
  readonly #waiting = new Set<() => void>();
  #ended = false;

  constructor(options: ClientOptions = {}) {
    this.folder = options.folder ?? root;
    this.settings = options.settings ?? {};
    this.process = spawn(process.execPath, [PROGRAM, "serve", "--stdio"], {
      cwd: this.folder,
      stdio: ["pipe", "pipe", "pipe"],
    });
    const { stdin, stdout, stderr } = this.process;
    if (!stdin || !stdout || !stderr) throw new Error("no streams");
    stderr.on("data", (data: Buffer) => {
      this.stderr += data.toString();
    });
    this.exitCode = new Promise((done) => this.process.once("exit", done));
    stdin.on("error", () => {});
    this.connection = createMessageConnection(
      new StreamMessageReader(stdout),
      new StreamMessageWriter(stdin),
    );
    this.#listen();
  }

  static async start(options: ClientOptions = {}): Promise<TestClient> {
    const client = new TestClient(options);
    client.result = await client.initialize(options);
    await client.connection.sendNotification("initialized", {});
    return client;
  }

  initialize({ capabilities, initializationOptions }: ClientOptions): Promise<InitializeResult> {
    const uri = pathToFileURL(this.folder).href;
    return this.connection.sendRequest("initialize", {
      processId: process.pid,
      rootUri: uri,
      workspaceFolders: [{ uri, name: "work" }],
      capabilities: capabilities ?? CAPABILITIES,
      initializationOptions: initializationOptions ?? { protocol: PROTOCOL_VERSION },
    });
  }

  uri(path: string): string {
    return pathToFileURL(join(this.folder, path)).href;
  }

  open(path: string, text: string): TestDocument {
    const document = new TestDocument(this, path.includes(":") ? path : this.uri(path), text);
    void this.connection.sendNotification("textDocument/didOpen", {
      textDocument: { uri: document.uri, languageId: "thrum", version: document.version, text },
    });
    return document;
  }

  request<R>(method: string, params: unknown): Promise<R> {
    return this.connection.sendRequest<R>(method, params);
  }

  /** Waits until something that the server said makes it true. */
  async until<T>(what: string, look: () => T | undefined | false): Promise<T> {
    const end = Date.now() + PATIENCE;
    for (;;) {
      const found = look();
      if (found) return found;
      if (Date.now() > end) {
        throw new Error(`waited in vain for ${what}\n${this.logged.join("\n")}\n${this.stderr}`);
      }
      await new Promise<void>((done) => {
        const timer = setTimeout(wake, 100);
        const waiting = this.#waiting;
        function wake() {
          clearTimeout(timer);
          waiting.delete(wake);
          done();
        }
        waiting.add(wake);
      });
    }
  }

  /** Shuts down as an editor does; hands back the exit code. */
  async close(): Promise<number | null> {
    await this.connection.sendRequest("shutdown");
    await this.connection.sendNotification("exit");
    const code = await this.exitCode;
    this.#ended = true;
    this.connection.dispose();
    return code;
  }

  /** Notifications after the end go nowhere. */
  notify(method: string, params: unknown): void {
    if (!this.#ended) void this.connection.sendNotification(method, params).catch(() => {});
  }

  #listen(): void {
    const { connection } = this;
    const wake = () => {
      for (const each of [...this.#waiting]) each();
    };
    connection.onNotification("textDocument/publishDiagnostics", (params: PublishDiagnosticsParams) => {
      this.published.push({ ...params, at: performance.now() });
      wake();
    });
    connection.onNotification(STATE, (params: StateParams) => {
      this.states.push(params);
      wake();
    });
    connection.onNotification("window/logMessage", ({ message }: { message: string }) => {
      this.logged.push(message);
      wake();
    });
    connection.onNotification(
      "$/progress",
      ({ token, value }: { token: string; value: { kind: string } }) => {
        this.progress.push({ token, kind: value.kind });
        wake();
      },
    );
    connection.onRequest((method: string, params: unknown) => {
      const own = this.answers.get(method) as ((params: unknown) => unknown) | undefined;
      if (own) return own(params);
      if (method === "client/registerCapability") {
        const { registrations } = params as { registrations: { method: string }[] };
        this.registered.push(...registrations.map((each) => each.method));
      }
      if (method.endsWith("/refresh")) this.refreshed.push(method);
      if (method === "workspace/configuration") {
        const { items } = params as { items: unknown[] };
        return items.map(() => this.settings);
      }
      wake();
      return null;
    });
    connection.onError(([error]) => this.logged.push(`connection: ${error.message}`));
    connection.listen();
  }
}

/** Longest wait for anything, in ms; a loaded machine is slow, and a wait that ends is never this long. */
const PATIENCE = 45_000;

export class TestDocument {
  readonly client: TestClient;
  readonly uri: string;
  version = 1;
  text: string;

  constructor(client: TestClient, uri: string, text: string) {
    this.client = client;
    this.uri = uri;
    this.text = text;
  }

  /** Replaces a stretch, as an editor sends it: positions of the text before. */
  replace(start: number, end: number, text: string): void {
    const range = { start: this.position(start), end: this.position(end) };
    this.text = this.text.slice(0, start) + text + this.text.slice(end);
    this.version++;
    this.client.notify("textDocument/didChange", {
      textDocument: { uri: this.uri, version: this.version },
      contentChanges: [{ range, text }],
    });
  }

  /** Replaces the first place where `was` stands. */
  edit(was: string, now: string): void {
    const at = this.text.indexOf(was);
    if (at < 0) throw new Error(`${was} does not stand in the text`);
    this.replace(at, at + was.length, now);
  }

  /** Lines end as the protocol has it: at `\n`, `\r\n` or a lone `\r`. */
  position(offset: number): Position {
    const before = this.text.slice(0, offset);
    const lines = before.split(/\r\n|\n|\r(?!$)/);
    // An offset between `\r` and `\n` is no place of its own.
    return { line: lines.length - 1, character: lines[lines.length - 1].replace(/\r$/, "").length };
  }

  /** Where a stretch of the text starts, `into` characters further. */
  at(piece: string, into = 0): Position {
    const offset = this.text.indexOf(piece);
    if (offset < 0) throw new Error(`${piece} does not stand in the text`);
    return this.position(offset + into);
  }

  textIn({ start, end }: Range): string {
    return this.text.slice(this.offset(start), this.offset(end));
  }

  offset({ line, character }: Position): number {
    const starts = [0, ...[...this.text.matchAll(/\r\n|\n|\r/g)].map((m) => m.index + m[0].length)];
    return starts[line] + character;
  }

  ask<R>(method: string, position?: Position, more: Record<string, unknown> = {}): Promise<R> {
    const params = { textDocument: { uri: this.uri }, ...(position ? { position } : {}), ...more };
    return this.client.request<R>(method, params);
  }

  /** The last thing said about this document, when it is about the text as it stands and nothing more will come. */
  async settled(): Promise<readonly Diagnostic[]> {
    const { uri, version, client } = this;
    await client.until(`numbers of ${uri}, version ${version}`, () =>
      client.states.some(
        (state) => state.uri === uri && state.version === version && state.state === "ready",
      ),
    );
    return this.diagnostics();
  }

  diagnostics(): readonly Diagnostic[] {
    return this.client.published.findLast(({ uri }) => uri === this.uri)?.diagnostics ?? [];
  }

  async pulled(): Promise<DocumentDiagnosticReport> {
    return this.ask("textDocument/diagnostic", undefined, { identifier: "thrum" });
  }

  close(): void {
    this.client.notify("textDocument/didClose", {
      textDocument: { uri: this.uri },
    });
  }
}
