/** Wires: what the client says goes to the parts of the server, what they find goes to the client. */
import {
  type Connection,
  DidChangeConfigurationNotification,
  DidChangeWatchedFilesNotification,
  FileChangeType,
  type InitializeResult,
} from "vscode-languageserver";
import {
  FIND_MODELS,
  type FileContent,
  READ_FILE,
  type ReadFileParams,
  type ReadFileResult,
} from "../shared-core/index.ts";
import { capabilitiesFor } from "./capabilities.ts";
import { type Client, clientOf } from "./client.ts";
import { ClosedModels } from "./closed.ts";
import { Diagnostics } from "./diagnostics.ts";
import { followDocuments } from "./documents.ts";
import { registerFeatures } from "./features/registry.ts";
import type { Host } from "./host.ts";
import { errorText } from "./numbers.ts";
import { Schedule } from "./schedule.ts";
import type { Serving } from "./serving.ts";
import { Session, TYPING } from "./session.ts";
import { SettingsStore } from "./settings-store.ts";
import { Sources } from "./sources.ts";
import { Status } from "./status.ts";
import { keyOf } from "./uris.ts";
import { wall } from "./wall.ts";
import { Workspace } from "./workspace.ts";

/** Serves one client on a connection, until it goes. */
export function serve(connection: Connection, host: Host): void {
  let server: Server | undefined;
  connection.onInitialize((params): InitializeResult => {
    const client = clientOf(params);
    server = new Server(connection, client, host);
    const folders =
      params.workspaceFolders?.map(({ uri }) => uri) ?? (params.rootUri ? [params.rootUri] : []);
    server.serving.workspace.change(folders);
    return { capabilities: capabilitiesFor(client), serverInfo: { name: "thrum", version: host.version } };
  });
  connection.onInitialized(() => server?.start());
  connection.onShutdown(() => server?.end());
  connection.onExit(() => server?.end());
  connection.listen();
}

/** What models use and read: watched where the client watches. Records of another ending are noticed at the next edit. */
const WATCHED = ["**/*.thrum", "**/*.csv", "**/*.tsv", "**/*.txt"];
/** A client is asked to look at hints and lenses again at most so often, in ms. */
const REFRESH_EVERY = 50;

class Server {
  readonly serving: Serving;
  readonly #connection: Connection;
  readonly #client: Client;
  readonly #settings: SettingsStore;
  readonly #sources: Sources;
  readonly #diagnostics: Diagnostics;
  readonly #status: Status;
  #refresh: ReturnType<typeof setTimeout> | undefined;
  #ended = false;

  constructor(connection: Connection, client: Client, host: Host) {
    this.#connection = connection;
    this.#client = client;
    this.#settings = new SettingsStore(connection, client);
    const workspace = new Workspace();
    const settingsOf = (of: { readonly uri: string }) => this.#settings.of(of);
    const log = (text: string) => connection.console.error(text);
    const askClient = client.readsFiles ? (uri: string) => this.#readFile(uri) : undefined;
    const opened = (key: string) => {
      const session = schedule.session(key);
      return session?.hidden ? undefined : session?.content;
    };
    this.#sources = new Sources(opened, host.disk, askClient);
    const schedule: Schedule = new Schedule({
      sources: this.#sources,
      startEngine: () => host.startEngine(),
      settingsOf,
      changed: (session) => this.#changed(session),
      busy: (session, busy) => this.#status.busy(session, busy),
      log,
    });
    const closed = new ClosedModels(workspace, this.#sources, schedule, async (folder, endings) => {
      const found = host.disk?.reads(folder)
        ? host.disk.find(folder, endings)
        : this.#findModels(folder, endings);
      return found.catch((error: unknown) => {
        log(`looking through ${folder}\n${errorText(error)}`);
        return [];
      });
    });
    const docs = client.docs ?? host.docs;
    const guard = wall(log, () => this.#ended);
    const readAt = client.readsFiles
      ? (uri: string, revision: string) => this.#readFile(uri, revision)
      : undefined;
    this.serving = { connection, client, workspace, schedule, closed, settingsOf, guard, readAt, docs };
    this.#diagnostics = new Diagnostics(this.serving);
    this.#status = new Status(this.serving);
    registerFeatures(this.serving);
    this.#followEditor();
  }

  start(): void {
    const { connection, workspace } = this.serving;
    if (this.#client.watchesFiles) {
      const watchers = WATCHED.map((globPattern) => ({ globPattern }));
      void connection.client.register(DidChangeWatchedFilesNotification.type, { watchers });
    }
    if (this.#client.capabilities.workspace?.didChangeConfiguration?.dynamicRegistration) {
      void connection.client.register(DidChangeConfigurationNotification.type, { section: "thrum" });
    }
    if (this.#client.capabilities.workspace?.workspaceFolders) {
      connection.workspace.onDidChangeWorkspaceFolders(({ added, removed }) => {
        workspace.change(
          added.map(({ uri }) => uri),
          removed.map(({ uri }) => uri),
        );
        this.#relocate();
      });
    }
    void this.#loadSettings();
  }

  end(): void {
    this.#ended = true;
    clearTimeout(this.#refresh);
    this.#diagnostics.end();
    this.#status.end();
    this.serving.schedule.end();
  }

  #followEditor(): void {
    const { connection, schedule, workspace } = this.serving;
    followDocuments(connection, {
      opened: (document) => {
        schedule.open(new Session(document, workspace.locate(document.uri)));
        void this.#loadSettings(document.uri);
        this.#touchReaders(keyOf(document.uri));
      },
      changed: (uri, changes) => {
        const session = schedule.byUri(uri);
        if (session === undefined) return;
        schedule.touch(session, changes);
        this.#touchReaders(session.key);
      },
      saved: () => this.#filesChanged([]),
      closed: (uri) => {
        const session = schedule.byUri(uri);
        if (session === undefined) return;
        this.#status.gone(session);
        schedule.close(session);
        this.#settings.forget(uri);
        this.#touchReaders(session.key);
        this.#diagnostics.gone(uri);
      },
    });
    connection.onDidChangeWatchedFiles(({ changes }) => {
      const set = changes.some(({ type }) => type !== FileChangeType.Changed);
      if (set) this.serving.closed.forgetFiles();
      this.#filesChanged(changes.map(({ uri }) => uri));
    });
    connection.onDidChangeConfiguration(({ settings }) => {
      this.#settings.take(settings);
      if (this.#client.pullsSettings) void this.#loadSettings();
      else this.#settingsChanged();
    });
  }

  #changed(session: Session): void {
    this.#diagnostics.changed(session);
    this.#status.changed(session);
    if (!session.hidden && session.numbers !== "awaited") this.#refreshSoon(session);
  }

  /** Numbers have come: hints and lenses that were placed without them are asked for again. */
  #refreshSoon({ lastEdit }: Session): void {
    const typing = lastEdit ? TYPING - (performance.now() - lastEdit.at) : 0;
    this.#refresh ??= setTimeout(() => {
      this.#refresh = undefined;
      this.#refreshNow();
      // Hints that were held back from the line somebody typed in.
      if (typing > REFRESH_EVERY) this.#refresh = setTimeout(() => this.#refreshLate(), typing);
    }, REFRESH_EVERY);
  }

  #refreshLate(): void {
    this.#refresh = undefined;
    this.#refreshNow();
  }

  #refreshNow(): void {
    const { workspace } = this.#client.capabilities;
    const { languages } = this.#connection;
    if (workspace?.inlayHint?.refreshSupport) void languages.inlayHint.refresh().catch(() => {});
    if (workspace?.codeLens?.refreshSupport) {
      void this.#connection.sendRequest("workspace/codeLens/refresh").catch(() => {});
    }
  }

  /** Files behind the models are other ones now, or may be. */
  #filesChanged(uris: readonly string[]): void {
    for (const uri of uris) this.#sources.forget(uri);
    for (const session of this.serving.schedule.sessions) {
      const { understood } = session;
      if (understood && !this.serving.closed.isUnchanged(session, understood.reads)) {
        this.serving.schedule.touch(session, []);
      }
    }
    void this.#diagnostics.judgeClosed();
  }

  /** Models that read a document which has just changed in the editor. */
  #touchReaders(key: string): void {
    const { schedule, workspace } = this.serving;
    for (const session of schedule.sessions) {
      const reads = session.understood?.model.files ?? [];
      if (session.key !== key && reads.some((file) => keyOf(workspace.uriOf(session, file)) === key)) {
        schedule.touch(session, []);
      }
    }
  }

  /** Folders were added or removed: open documents may lie below another one now. */
  #relocate(): void {
    const { schedule, workspace, closed } = this.serving;
    closed.forgetFiles();
    for (const session of [...schedule.sessions]) {
      const place = workspace.locate(session.uri);
      if (place.folder === session.folder || session.hidden) continue;
      schedule.close(session);
      schedule.open(new Session(session.document, place));
    }
    void this.#loadSettings();
  }

  async #loadSettings(...more: readonly string[]): Promise<void> {
    const { schedule, workspace } = this.serving;
    const all = () => [...[...schedule.sessions].map(({ uri }) => uri), ...workspace.folders];
    if (await this.#settings.load(more.length > 0 ? more : all())) this.#settingsChanged();
  }

  #settingsChanged(): void {
    const { schedule } = this.serving;
    for (const session of schedule.sessions) if (!session.hidden) schedule.unitsChanged(session);
    this.#refreshNow();
    void this.#diagnostics.judgeClosed();
  }

  async #readFile(uri: string, revision?: string): Promise<FileContent> {
    const params: ReadFileParams = { uri, ...(revision !== undefined && { revision }) };
    const sent = await this.#connection
      .sendRequest<ReadFileResult | null>(READ_FILE, params)
      .catch((error: Error) => ({ why: "unreadable" as const, detail: error.message }));
    if (sent && "text" in sent) return { ok: true, text: sent.text };
    return { ok: false, why: sent?.why ?? "missing", detail: sent?.detail ?? "" };
  }

  async #findModels(folder: string, endings: readonly string[]): Promise<readonly string[]> {
    if (!this.#client.readsFiles || !endings.includes("thrum")) return [];
    const found = await this.#connection.sendRequest<unknown>(FIND_MODELS, { folder });
    return Array.isArray(found) ? found.filter((uri) => typeof uri === "string") : [];
  }
}
