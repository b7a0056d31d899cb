/** What crosses files: `use`, records, closed models, watched files, renames over files, folders. */
import {
  mkdirSync,
  mkdtempSync,
  readFileSync,
  realpathSync,
  renameSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import type {
  Location,
  TextDocumentEdit,
  TextEdit,
  WorkspaceEdit,
  WorkspaceSymbol,
} from "vscode-languageserver-protocol";
import { FIND_MODELS, PROTOCOL_VERSION, READ_FILE, SUMMARY, type Summary } from "../../shared-core/index.ts";
import { CAPABILITIES, type ClientOptions, TestClient } from "./client.ts";

let folder = "";
let client: TestClient;
beforeEach(() => {
  folder = realpathSync(mkdtempSync(join(tmpdir(), "thrum-protocol-")));
});
afterEach(async () => {
  expect(client.stderr).toBe("");
  expect(client.logged).toEqual([]);
  expect(await client.close()).toBe(0);
  rmSync(folder, { recursive: true, force: true });
});

function put(path: string, text: string): void {
  mkdirSync(dirname(join(folder, path)), { recursive: true });
  writeFileSync(join(folder, path), text);
}
const get = (path: string): string => readFileSync(join(folder, path), "utf8");

async function start(options: ClientOptions = {}): Promise<TestClient> {
  client = await TestClient.start({ folder, ...options });
  return client;
}

/** Tells the server as an editor does that watches files. */
function changed(paths: readonly string[], type: 1 | 2 | 3 = 2): void {
  client.notify("workspace/didChangeWatchedFiles", {
    changes: paths.map((path) => ({ uri: client.uri(path), type })),
  });
}

const MOUNTS = "thrum 1\nlet stiff = 5.4 N/mm\nlet spare = 1 mm\n";
/** sqrt(5400/8)/(2 pi) = 4.135 Hz. */
const DRUM = `thrum 1
use "parts/mounts.thrum"
mass drum = 8 kg
spring feet between drum and ground = stiff
expect soft = natural_frequency(1) <= 5 Hz
`;
const frequency = async (path: string): Promise<string> =>
  (await client.request<Summary>(SUMMARY, { uri: client.uri(path) })).frequencies[0];

describe("a used file", () => {
  it("is read from disk, from the editor while it is open there, and again when it changes", async () => {
    put("parts/mounts.thrum", MOUNTS);
    await start();
    const drum = client.open("drum.thrum", DRUM);
    expect(await drum.settled()).toEqual([]);
    expect(await frequency("drum.thrum")).toBe("4.13 Hz");
    // Four times the stiffness, twice the frequency: unsaved, in the editor.
    const mounts = client.open("parts/mounts.thrum", MOUNTS);
    mounts.edit("5.4", "21.6");
    await client.until("the new frequency", () => drum.diagnostics().length > 0);
    expect(await frequency("drum.thrum")).toBe("8.27 Hz");
    expect(drum.diagnostics().map(({ code }) => code)).toEqual(["expectation-fails"]);
    // Closed without being saved: what is on disk counts again.
    mounts.close();
    await client.until("the old frequency", () => drum.diagnostics().length === 0);
    put("parts/mounts.thrum", MOUNTS.replace("5.4", "21.6"));
    changed(["parts/mounts.thrum"]);
    await client.until("the new frequency again", () => drum.diagnostics().length === 1);
    // Gone, and back.
    rmSync(join(folder, "parts/mounts.thrum"));
    changed(["parts/mounts.thrum"], 3);
    await client.until("its absence", () => drum.diagnostics()[0]?.code === "file-missing");
    put("parts/mounts.thrum", MOUNTS);
    changed(["parts/mounts.thrum"], 1);
    await client.until("its return", () => drum.diagnostics().length === 0);
  });

  it("is noticed at the next edit by a client that watches nothing", async () => {
    put("parts/mounts.thrum", MOUNTS);
    await start({ capabilities: { workspace: {} } });
    const drum = client.open("drum.thrum", DRUM);
    await drum.settled();
    put("parts/mounts.thrum", MOUNTS.replace("5.4", "21.6"));
    drum.edit("mass drum", "mass  drum");
    await drum.settled();
    expect(await frequency("drum.thrum")).toBe("8.27 Hz");
  });

  it("is renamed in with the file that uses it, gone to, and found by its names", async () => {
    put("parts/mounts.thrum", MOUNTS);
    put("drum.thrum", DRUM);
    put("other/hoist.thrum", DRUM.replace("parts/", "../parts/").replaceAll("drum", "hoist"));
    put("else.thrum", "thrum 1\nlet stiff = 3 N/m\nmass m = stiff / 1 N * 1 m * 1 kg\n");
    await start();
    const drum = client.open("drum.thrum", DRUM);
    const [place] = await drum.ask<Location[]>("textDocument/definition", drum.at("= stiff", 3));
    expect(place).toEqual({
      uri: client.uri("parts/mounts.thrum"),
      range: { start: { line: 1, character: 4 }, end: { line: 1, character: 9 } },
    });
    const all = await drum.ask<Location[]>("textDocument/references", drum.at("= stiff", 3), {
      context: { includeDeclaration: true },
    });
    const edit = await drum.ask<WorkspaceEdit>("textDocument/rename", drum.at("= stiff", 3), {
      newName: "k",
    });
    const edited = (edit.documentChanges as TextDocumentEdit[]).map(({ textDocument: { uri, version } }) => [
      uri,
      version,
    ]);
    expect(edited.sort()).toEqual([
      [client.uri("drum.thrum"), 1],
      [client.uri("other/hoist.thrum"), null],
      [client.uri("parts/mounts.thrum"), null],
    ]);
    expect(all).toHaveLength(3);
    const symbols = await client.request<WorkspaceSymbol[]>("workspace/symbol", { query: "hois" });
    expect(symbols.map(({ name, location }) => [name, location.uri])).toEqual([
      ["hoist", client.uri("other/hoist.thrum")],
    ]);
    const refused = drum.ask("textDocument/rename", drum.at("= stiff", 3), { newName: "spare" });
    await expect(refused).rejects.toThrow("already, in `parts/mounts.thrum`");
  });

  it("keeps being found when files or folders move", async () => {
    put("parts/mounts.thrum", MOUNTS);
    put("drum.thrum", DRUM);
    put("runs/shake.csv", "time,force\n0,1\n");
    put("plain.thrum", "thrum 1\nmass m = 1 kg\n");
    await start();
    const text = `${DRUM}force shake on drum\n    record = "runs/shake.csv"\n`;
    const drum = client.open("drum.thrum", text);
    const edit = await client.request<WorkspaceEdit>("workspace/willRenameFiles", {
      files: [
        { oldUri: client.uri("parts"), newUri: client.uri("catalogue/parts") },
        { oldUri: client.uri("runs/shake.csv"), newUri: client.uri("runs/shake-2.csv") },
      ],
    });
    const [{ textDocument, edits }, ...more] = edit.documentChanges as TextDocumentEdit[];
    expect(more).toEqual([]);
    expect(textDocument).toEqual({ uri: drum.uri, version: 1 });
    expect((edits as TextEdit[]).map(({ newText }) => newText)).toEqual([
      "catalogue/parts/mounts.thrum",
      "runs/shake-2.csv",
    ]);
  });

  it("outside the workspace is not read, through a link neither", async () => {
    const outside = realpathSync(mkdtempSync(join(tmpdir(), "thrum-outside-")));
    writeFileSync(join(outside, "far.thrum"), MOUNTS);
    symlinkSync(outside, join(folder, "link"));
    await start();
    const drum = client.open("drum.thrum", DRUM.replace("parts/mounts", "link/far"));
    await drum.settled();
    expect(drum.diagnostics().map(({ code }) => code)).toContain("file-outside");
    rmSync(outside, { recursive: true });
  });
});

describe("models that are not open", () => {
  it("are said nothing of, unless the settings want it; then all of them, and no longer when it ends", async () => {
    put("good.thrum", DRUM.replace('use "parts/mounts.thrum"', "let stiff = 5.4 N/mm"));
    put("bad.thrum", "thrum 1\nmass m = 4 lbf\n");
    put("node_modules/x/bad.thrum", "thrum 1\nmass m = 4 lbf\n");
    await start();
    const own = client.open("own.thrum", "thrum 1\nmass m = 4 lbf\n");
    await own.settled();
    expect(client.published.filter(({ uri }) => uri !== own.uri)).toEqual([]);
    client.settings = { diagnostics: { closedModels: true } };
    client.notify("workspace/didChangeConfiguration", { settings: null });
    const said = (path: string) => client.published.findLast(({ uri }) => uri === client.uri(path));
    await client.until("what is said of both", () => said("bad.thrum") && said("good.thrum"));
    expect(said("bad.thrum")?.diagnostics.map(({ code }) => code)).toContain("weight-as-mass");
    expect(said("good.thrum")?.diagnostics).toEqual([]);
    expect(said("node_modules/x/bad.thrum")).toBeUndefined();
    put("bad.thrum", "thrum 1\nmass m = 4 kg\nspring s between m and ground = 1 kN/m\n");
    changed(["bad.thrum"]);
    await client.until("the cure", () => said("bad.thrum")?.diagnostics.length === 0);
    put("bad.thrum", "thrum 1\nmass m = 4 lbf\n");
    changed(["bad.thrum"]);
    await client.until("the relapse", () => (said("bad.thrum")?.diagnostics.length ?? 0) > 0);
    client.settings = {};
    client.notify("workspace/didChangeConfiguration", { settings: null });
    await client.until("silence", () => said("bad.thrum")?.diagnostics.length === 0);
  });

  it("have a summary all the same", async () => {
    put("drum.thrum", DRUM);
    put("parts/mounts.thrum", MOUNTS);
    await start();
    const summary = await client.request<Summary>(SUMMARY, { uri: client.uri("drum.thrum") });
    expect([summary.version, summary.frequencies, summary.expectations[0].verdicts[0].holds]).toEqual([
      null,
      ["4.13 Hz"],
      true,
    ]);
    expect(client.published).toEqual([]);
    expect(await client.request(SUMMARY, { uri: client.uri("none.thrum") })).toBeNull();
  });

  it("are all fresh after a switch of branches over 50 of them", async () => {
    const name = (i: number) => `models/m${i}.thrum`;
    const text = (i: number, kilograms: number) =>
      `thrum 1\nuse "../parts/mounts.thrum"\nmass m${i} = ${kilograms} kg\nspring s between m${i} and ground = stiff\nexpect soft = natural_frequency(1) <= 5 Hz\n`;
    put("parts/mounts.thrum", MOUNTS);
    for (let i = 0; i < 50; i++) put(name(i), text(i, 8));
    await start({ settings: { diagnostics: { closedModels: true } } });
    const said = (i: number) =>
      client.published.findLast(({ uri }) => uri === client.uri(name(i)))?.diagnostics;
    await client.until("all of the first branch", () =>
      Array.from({ length: 50 }, (_, i) => said(i)?.length === 0).every(Boolean),
    );
    // The other branch: a quarter of the mass, twice the frequency, which fails. Ten models are gone, one moved.
    for (let i = 0; i < 39; i++) put(name(i), text(i, 2));
    for (let i = 39; i < 49; i++) rmSync(join(folder, name(i)));
    renameSync(join(folder, name(49)), join(folder, "models/moved.thrum"));
    changed(Array.from({ length: 39 }, (_, i) => name(i)));
    changed(
      Array.from({ length: 11 }, (_, i) => name(39 + i)),
      3,
    );
    changed(["models/moved.thrum"], 1);
    const fails = (i: number) => said(i)?.[0]?.code === "expectation-fails";
    await client.until("all of the other branch", () =>
      Array.from({ length: 39 }, (_, i) => fails(i)).every(Boolean),
    );
    await client.until("the moved one", () =>
      client.published.some(({ uri }) => uri === client.uri("models/moved.thrum")),
    );
    for (let i = 39; i < 50; i++) expect(said(i)).toEqual([]);
  });
});

describe("other places than disks", () => {
  const remote = "vscode-vfs://harbour/works";
  const files = new Map([
    [`${remote}/drum.thrum`, DRUM],
    [`${remote}/parts/mounts.thrum`, MOUNTS],
  ]);

  it("are read through the client", async () => {
    client = new TestClient({ folder });
    client.answers.set(READ_FILE, ({ uri }: { uri: string }) => {
      const text = files.get(uri);
      return text === undefined ? { why: "missing", detail: "" } : { text };
    });
    client.answers.set(FIND_MODELS, () => [...files.keys()]);
    await client.connection.sendRequest("initialize", {
      processId: null,
      rootUri: remote,
      workspaceFolders: [{ uri: remote, name: "works" }],
      capabilities: CAPABILITIES,
      initializationOptions: { protocol: PROTOCOL_VERSION, readsFiles: true },
    });
    client.notify("initialized", {});
    const drum = client.open(`${remote}/drum.thrum`, DRUM);
    expect(await drum.settled()).toEqual([]);
    // Not once was it said that a file is missing which was on its way.
    expect(client.published.flatMap(({ diagnostics }) => diagnostics)).toEqual([]);
    const [place] = await drum.ask<Location[]>("textDocument/definition", drum.at("= stiff", 3));
    expect(place.uri).toBe(`${remote}/parts/mounts.thrum`);
    const symbols = await client.request<WorkspaceSymbol[]>("workspace/symbol", { query: "spare" });
    expect(symbols.map(({ location }) => location.uri)).toEqual([`${remote}/parts/mounts.thrum`]);
  });

  it("publish only where models live: never for one side of a comparison", async () => {
    await start();
    const text = "thrum 1\nmass m = 4 lbf\n";
    const old = client.open("git:/works/drum.thrum?ref=HEAD", text);
    const unsaved = client.open("untitled:Untitled-1", text);
    await client.until("what is said", () => unsaved.diagnostics().length > 0);
    await old.settled();
    expect(client.published.filter(({ uri }) => uri === old.uri)).toEqual([]);
    // It is a text to look at all the same.
    expect(await old.ask("textDocument/hover", old.at("mass m"))).not.toBeNull();
  });
});

describe("folders", () => {
  it("that come and go take their models along", async () => {
    put("a/parts/mounts.thrum", MOUNTS);
    put("b/drum.thrum", DRUM);
    await start({ folder: join(folder, "a") });
    folder = dirname(client.folder);
    const drum = client.open(`file://${join(folder, "b/drum.thrum")}`, DRUM.replace("parts/", "../a/parts/"));
    // In no folder of the workspace: its own folder is all it may read.
    await drum.settled();
    expect(drum.diagnostics().map(({ code }) => code)).toContain("file-outside");
    client.notify("workspace/didChangeWorkspaceFolders", {
      event: { added: [{ uri: `file://${folder}`, name: "all" }], removed: [] },
    });
    await client.until("the file", () => drum.diagnostics().length === 0);
    expect(get("b/drum.thrum")).toBe(DRUM);
  });
});
