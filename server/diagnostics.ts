/**
 * What is said about models, to clients that pull it and to those that do not. A client that pulls is told when
 * numbers have come; to the others everything is pushed, the empty list too, with the version it belongs to.
 */
import {
  type Diagnostic,
  type DocumentDiagnosticReport,
  DocumentDiagnosticReportKind,
  type FullDocumentDiagnosticReport,
  type PreviousResultId,
  type WorkspaceDocumentDiagnosticReport,
} from "vscode-languageserver";
import type { FileContent } from "../shared-core/index.ts";
import type { ClosedFile } from "./closed.ts";
import { type DiagnosticContext, toDiagnostic } from "./convert.ts";
import { otherFile, type Serving, sessionOf } from "./serving.ts";
import type { Session } from "./session.ts";
import { keyOf } from "./uris.ts";

export const IDENTIFIER = "thrum";

/** A pulling client is asked to pull again at most so often, in ms. */
const REFRESH_EVERY = 50;
/** While nothing changes, a pull of the whole workspace is answered after so long, in ms. */
const WORKSPACE_EVERY = 2000;

/** How diagnostics of a model are told to this client. */
export function diagnosticContext(serving: Serving, session: Session): DiagnosticContext {
  const { client, docs, schedule } = serving;
  const { publishDiagnostics: push, diagnostic: pull } = client.capabilities.textDocument ?? {};
  const can = client.pullsDiagnostics ? { ...push, ...pull } : push;
  return {
    uri: session.uri,
    lines: schedule.current(session).lines,
    docs,
    other: (file) => otherFile(serving, session, file),
    related: can?.relatedInformation === true,
    tags: can?.tagSupport !== undefined,
    descriptions: can?.codeDescriptionSupport === true,
    data: can?.dataSupport === true,
  };
}

export class Diagnostics {
  readonly #serving: Serving;
  #refresh: ReturnType<typeof setTimeout> | undefined;
  /** What was said of closed models, by key. */
  readonly #closed = new Map<string, ClosedReport>();
  #reports = 0;
  #closedRun: Promise<void> | undefined;
  #again = false;

  constructor(serving: Serving) {
    this.#serving = serving;
    if (serving.client.pullsDiagnostics) this.#answerPulls();
  }

  /** Something about an open model is another thing now. */
  changed(session: Session): void {
    const { client, workspace } = this.#serving;
    if (!workspace.shows(session.uri) || session.hidden) return;
    if (!client.pullsDiagnostics) this.#push(session.uri, session.document.version, this.#itemsOf(session));
    // After an edit the client asks by itself; it cannot know when numbers come, or what another file has changed.
    else if (session.numbers !== "awaited" || !session.edited) this.#askToPull();
  }

  /** A model is no longer open: nothing is said of it, or what is said of closed ones. */
  gone(uri: string): void {
    const { client, workspace } = this.#serving;
    if (!workspace.shows(uri)) return;
    this.#closed.delete(keyOf(uri));
    if (!client.pullsDiagnostics) this.#push(uri, undefined, []);
    void this.judgeClosed();
  }

  /** Judges what is not open, one model behind the other, when the settings want it. */
  judgeClosed(): Promise<void> {
    // A run that is under way may have passed what has changed since.
    if (this.#closedRun) this.#again = true;
    this.#closedRun ??= this.#judgeAllClosed().finally(() => {
      this.#closedRun = undefined;
    });
    return this.#closedRun;
  }

  end(): void {
    clearTimeout(this.#refresh);
  }

  #push(uri: string, version: number | undefined, diagnostics: Diagnostic[]): void {
    void this.#serving.connection.sendDiagnostics({ uri, version, diagnostics });
  }

  #itemsOf(session: Session): Diagnostic[] {
    const context = diagnosticContext(this.#serving, session);
    return session.diagnostics().map((diagnostic) => toDiagnostic(diagnostic, context));
  }

  #askToPull(): void {
    this.#refresh ??= setTimeout(() => {
      this.#refresh = undefined;
      void this.#serving.connection.languages.diagnostics.refresh().catch(() => {});
    }, REFRESH_EVERY);
  }

  #answerPulls(): void {
    const { connection, guard } = this.#serving;
    const nothing: DocumentDiagnosticReport = { kind: DocumentDiagnosticReportKind.Full, items: [] };
    connection.languages.diagnostics.on(
      guard("textDocument/diagnostic", nothing, ({ textDocument, previousResultId }) =>
        this.#pulled(textDocument.uri, previousResultId),
      ),
    );
    connection.languages.diagnostics.onWorkspace(
      guard("workspace/diagnostic", { items: [] }, async ({ previousResultIds }, token) => {
        await this.judgeClosed();
        let items = this.#closedReports(previousResultIds);
        const until = performance.now() + WORKSPACE_EVERY;
        while (items.length === 0 && performance.now() < until && !token.isCancellationRequested) {
          await new Promise((done) => setTimeout(done, WORKSPACE_EVERY / 10));
          items = this.#closedReports(previousResultIds);
        }
        return { items };
      }),
    );
  }

  #pulled(uri: string, previous: string | undefined): DocumentDiagnosticReport {
    const session = sessionOf(this.#serving, { uri });
    if (session === undefined || !this.#serving.workspace.shows(uri)) {
      return { kind: DocumentDiagnosticReportKind.Full, items: [] };
    }
    const report = this.#fullReport(session);
    const related = this.#related(session);
    if (report.resultId !== previous) return { ...report, ...related };
    return { kind: DocumentDiagnosticReportKind.Unchanged, resultId: previous, ...related };
  }

  #fullReport(session: Session): FullDocumentDiagnosticReport & { readonly resultId: string } {
    this.#serving.schedule.current(session);
    const resultId = `${session.serial} ${session.numbers}`;
    return { kind: DocumentDiagnosticReportKind.Full, resultId, items: this.#itemsOf(session) };
  }

  /** Open models that read this one: an edit here is what changed there. */
  #related(session: Session): { relatedDocuments?: { [uri: string]: FullDocumentDiagnosticReport } } {
    const { client, schedule, workspace } = this.#serving;
    if (!client.relatedDocuments) return {};
    const related: { [uri: string]: FullDocumentDiagnosticReport } = {};
    for (const other of schedule.sessions) {
      if (other === session || other.hidden || !workspace.shows(other.uri)) continue;
      const reads = schedule.current(other).model.files.map((file) => keyOf(workspace.uriOf(other, file)));
      if (reads.includes(session.key)) related[other.uri] = this.#fullReport(other);
    }
    return Object.keys(related).length > 0 ? { relatedDocuments: related } : {};
  }

  #closedReports(previous: readonly PreviousResultId[]): WorkspaceDocumentDiagnosticReport[] {
    const known = new Map(previous.map(({ uri, value }) => [keyOf(uri), value]));
    const items: WorkspaceDocumentDiagnosticReport[] = [];
    const add = (uri: string, found: Diagnostic[], resultId?: string) =>
      items.push({ kind: DocumentDiagnosticReportKind.Full, uri, version: null, resultId, items: found });
    for (const [key, { uri, resultId, items: found }] of this.#closed) {
      if (known.get(key) !== resultId) add(uri, found, resultId);
    }
    for (const { uri, value } of previous) {
      const gone = value.startsWith(CLOSED) && !this.#closed.has(keyOf(uri));
      if (gone && sessionOf(this.#serving, { uri }) === undefined) add(uri, []);
    }
    return items;
  }

  async #judgeAllClosed(): Promise<void> {
    do {
      this.#again = false;
      await this.#judgeClosed();
    } while (this.#again);
  }

  async #judgeClosed(): Promise<void> {
    const { closed, schedule, settingsOf, workspace } = this.#serving;
    const before = new Set(this.#closed.keys());
    const wanted = new Set(workspace.folders.filter((uri) => settingsOf({ uri }).closedModels));
    // Nothing is looked through that nobody wants.
    const files = wanted.size === 0 ? [] : await closed.files();
    for (const at of files) {
      const key = keyOf(at.uri);
      if (!wanted.has(at.folder) || schedule.byUri(at.uri) || !workspace.shows(at.uri)) continue;
      const known = this.#closed.get(key);
      if ((known && closed.isUnchanged(at, known.reads)) || (await this.#judgeOne(at))) before.delete(key);
    }
    for (const key of before) this.#forgetClosed(key);
  }

  async #judgeOne(at: ClosedFile): Promise<boolean> {
    const { closed, schedule, client } = this.#serving;
    const report = await closed.visit(at.uri, async (session): Promise<ClosedReport | null> => {
      await schedule.settled(session);
      if (!session.hidden || session.numbers !== "there") return null;
      const reads = new Map([[at.file, session.content], ...schedule.current(session).reads]);
      return {
        uri: at.uri,
        resultId: `${CLOSED}${++this.#reports}`,
        items: this.#itemsOf(session),
        reads,
      };
    });
    if (report === null) return false;
    this.#closed.set(keyOf(at.uri), report);
    if (!client.pullsDiagnostics) this.#push(at.uri, undefined, report.items);
    return true;
  }

  #forgetClosed(key: string): void {
    const uri = this.#closed.get(key)?.uri;
    this.#closed.delete(key);
    const isOpen = sessionOf(this.#serving, { uri: key }) !== undefined;
    if (uri && !isOpen && !this.#serving.client.pullsDiagnostics) this.#push(uri, undefined, []);
  }
}

interface ClosedReport {
  readonly uri: string;
  readonly resultId: string;
  readonly items: Diagnostic[];
  /** Its own text and all it read. */
  readonly reads: ReadonlyMap<string, FileContent>;
}

const CLOSED = "closed ";
