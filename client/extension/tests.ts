import * as vscode from "vscode";
import { type BaseLanguageClient, State } from "vscode-languageclient";
import {
  type CaseVerdict,
  type ExpectationSummary,
  type StateParams,
  SUMMARY,
  type Summary,
} from "../../shared-core/index.ts";
import { FILE_SCHEMES } from "./connection.ts";

/**
 * Every expectation as a test: file, expectation, and case where there are cases. Ids are made of names, so they
 * stay the same while lines move; the tree follows each edit.
 */
export function registerTests(
  client: BaseLanguageClient,
  onState: vscode.Event<StateParams>,
): vscode.Disposable {
  const controller = vscode.tests.createTestController("thrum", "Thrum");
  const tree = new TestTree(controller, client);
  const watcher = vscode.workspace.createFileSystemWatcher("**/*.thrum");
  const run = (request: vscode.TestRunRequest, token: vscode.CancellationToken) => tree.run(request, token);
  controller.createRunProfile(
    vscode.l10n.t("Judge"),
    vscode.TestRunProfileKind.Run,
    run,
    true,
    undefined,
    true,
  );
  controller.resolveHandler = async (item) => {
    await (item === undefined ? tree.findFiles() : tree.refresh(item));
  };
  controller.refreshHandler = () => tree.findFiles();
  for (const document of vscode.workspace.textDocuments) tree.opened(document);
  return vscode.Disposable.from(
    controller,
    watcher,
    watcher.onDidCreate((uri) => tree.file(uri)),
    watcher.onDidDelete((uri) => controller.items.delete(uri.toString())),
    vscode.workspace.onDidOpenTextDocument((document) => tree.opened(document)),
    onState((state) => {
      if (state.state === "ready") void tree.changed(vscode.Uri.parse(state.uri).toString());
    }),
  );
}

class TestTree {
  readonly #controller: vscode.TestController;
  readonly #client: BaseLanguageClient;
  /** Runs that go on: each change of a file judges it again. */
  readonly #continuous = new Map<vscode.TestRunRequest, vscode.CancellationToken>();

  constructor(controller: vscode.TestController, client: BaseLanguageClient) {
    this.#controller = controller;
    this.#client = client;
  }

  /** The item of a file, made where there is none; its expectations are asked for when it is opened. */
  file(uri: vscode.Uri): vscode.TestItem {
    const id = uri.toString();
    const known = this.#controller.items.get(id);
    if (known) return known;
    const item = this.#controller.createTestItem(id, vscode.workspace.asRelativePath(uri), uri);
    item.canResolveChildren = true;
    this.#controller.items.add(item);
    return item;
  }

  opened({ languageId, uri }: vscode.TextDocument): void {
    if (languageId === "thrum" && FILE_SCHEMES.includes(uri.scheme)) this.file(uri);
  }

  async findFiles(): Promise<void> {
    const found = await vscode.workspace.findFiles("**/*.thrum", "**/node_modules/**");
    for (const uri of found) this.file(uri);
  }

  /** Asks for the expectations of a file and makes its items fit; undefined when the server is not there. */
  async refresh(item: vscode.TestItem): Promise<Summary | undefined> {
    const file = fileOf(item);
    if (file.uri === undefined || this.#client.state !== State.Running) return undefined;
    const summary = await this.#client.sendRequest<Summary | null>(SUMMARY, { uri: file.uri.toString() });
    if (!summary) return undefined;
    file.children.replace(summary.expectations.map((expectation) => this.#expectation(file, expectation)));
    return summary;
  }

  #expectation(
    file: vscode.TestItem,
    { name, range, comparison, verdicts }: ExpectationSummary,
  ): vscode.TestItem {
    const item = this.#controller.createTestItem(`${file.id}#${name}`, name, file.uri);
    item.range = new vscode.Range(
      range.start.line,
      range.start.character,
      range.end.line,
      range.end.character,
    );
    item.description = comparison;
    if (verdicts.length < 2) return item;
    for (const verdict of verdicts) {
      const child = this.#controller.createTestItem(`${item.id}#${verdict.case}`, verdict.case, file.uri);
      child.range = item.range;
      item.children.add(child);
    }
    return item;
  }

  /** Numbers of a file are there: its items follow, results of the earlier text are marked as such. */
  async changed(id: string): Promise<void> {
    const file = this.#controller.items.get(id);
    if (!file) return;
    if (file.children.size > 0 || this.#continuous.size > 0) await this.refresh(file);
    this.#controller.invalidateTestResults(file);
    for (const [request, token] of this.#continuous) {
      if (covers(request, file)) await this.#judge(request, [file], token);
    }
  }

  async run(request: vscode.TestRunRequest, token: vscode.CancellationToken): Promise<void> {
    if (request.continuous) {
      this.#continuous.set(request, token);
      token.onCancellationRequested(() => this.#continuous.delete(request));
      return;
    }
    if (request.include === undefined) await this.findFiles();
    const files = new Set<vscode.TestItem>();
    if (request.include) for (const item of request.include) files.add(fileOf(item));
    else this.#controller.items.forEach((item) => void files.add(item));
    await this.#judge(request, [...files], token);
  }

  async #judge(
    request: vscode.TestRunRequest,
    files: readonly vscode.TestItem[],
    token: vscode.CancellationToken,
  ): Promise<void> {
    const run = this.#controller.createTestRun(request);
    for (const file of files) {
      if (token.isCancellationRequested) break;
      const summary = await this.refresh(file);
      if (!summary) {
        run.errored(file, new vscode.TestMessage(vscode.l10n.t("The file could not be judged")));
        continue;
      }
      for (const expectation of summary.expectations) report(run, request, file, expectation);
    }
    run.end();
  }
}

function fileOf(item: vscode.TestItem): vscode.TestItem {
  let file = item;
  while (file.parent) file = file.parent;
  return file;
}

/** Whether a request speaks of an item, of one above it or of one below it. */
function covers(request: vscode.TestRunRequest, item: vscode.TestItem): boolean {
  const within = (ids: readonly vscode.TestItem[] | undefined) =>
    ids?.some(({ id }) => id === item.id || item.id.startsWith(`${id}#`) || id.startsWith(`${item.id}#`));
  if (request.exclude?.some(({ id }) => id === item.id || item.id.startsWith(`${id}#`))) return false;
  return request.include === undefined || within(request.include) === true;
}

function report(
  run: vscode.TestRun,
  request: vscode.TestRunRequest,
  file: vscode.TestItem,
  expectation: ExpectationSummary,
): void {
  const item = file.children.get(`${file.id}#${expectation.name}`);
  if (!item) return;
  for (const verdict of expectation.verdicts) {
    const target = item.children.get(`${item.id}#${verdict.case}`) ?? item;
    if (!covers(request, target)) continue;
    run.appendOutput(`${lineOf(expectation, verdict)}\r\n`, undefined, target);
    if (verdict.holds === true) run.passed(target);
    else if (verdict.holds === false) run.failed(target, messageOf(target, verdict));
    else run.errored(target, messageOf(target, verdict));
  }
}

/** `fails  soft in heavy: 10.07 Hz <= 9 Hz`, as far as there is something to tell. */
function lineOf({ name, comparison, verdicts }: ExpectationSummary, verdict: CaseVerdict): string {
  const { holds, value } = verdict;
  const word =
    holds === null ? vscode.l10n.t("open") : holds ? vscode.l10n.t("holds") : vscode.l10n.t("fails");
  const where = verdicts.length < 2 ? name : vscode.l10n.t("{0} in {1}", name, verdict.case);
  return `${word}  ${where}: ${value === null ? verdict.message : `${value} ${comparison}`}`;
}

function messageOf(item: vscode.TestItem, verdict: CaseVerdict): vscode.TestMessage {
  const parts = [verdict.message];
  if (verdict.mattersMost) parts.push(vscode.l10n.t("matters most: {0}", verdict.mattersMost));
  const text = parts.join("\n");
  const message =
    verdict.value !== null && verdict.limit !== null
      ? vscode.TestMessage.diff(text, verdict.limit, verdict.value)
      : new vscode.TestMessage(text);
  if (item.uri && item.range) message.location = new vscode.Location(item.uri, item.range);
  return message;
}
