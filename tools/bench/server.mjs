/** The language server as an editor meets it: a client over its real standard input and output. */
import { spawn } from "node:child_process";
import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { root } from "../root.mjs";
import { benchModel, modelText } from "./model.mjs";

const KEYSTROKES = 40;
const QUESTIONS = 60;
/** A server that says nothing for so long has failed its row, in ms. */
const LONGEST_WAIT = 120_000;

/** A text of about so many lines. */
const longText = (lines) => modelText(benchModel("chain", Math.max(2, Math.floor(lines / 3))));

/** 50 coordinates in a dense net, damped, with an ask. */
const fifty = () =>
  modelText(benchModel("general", 50), {
    ask: "force shake on m1\n    amplitude = 1 N\nask modes\n",
  });

/** Rows of kind "server": what is measured, the unit of the aim, the aim. */
export const SERVER_ROWS = [
  ...[10, 100, 1000, 10_000].map((n) => ({
    kind: "server",
    name: "server: keystroke to diagnostics, lines, p95",
    n,
    aim: { 10: 0.01, 100: 0.01, 1000: 0.06, 10000: 0.15 }[n],
    unit: "s",
    run: () => keystrokes(longText(n)),
  })),
  {
    kind: "server",
    name: "server: keystroke to modes, p95",
    n: 50,
    aim: 0.19,
    unit: "s",
    run: () => toModes(fifty()),
  },
  ...["hover", "completion", "definition"].map((method) => ({
    kind: "server",
    name: `server: ${method}, p95`,
    n: 50,
    aim: 0.05,
    unit: "s",
    run: () => questions(fifty(), method),
  })),
  { kind: "server", name: "server: open to ready", n: 1, aim: 1, unit: "s", run: openToReady },
  {
    kind: "server",
    name: "server: memory, models open",
    n: 0,
    aim: 90,
    unit: "MB",
    run: () => idleMemory(0),
  },
  {
    kind: "server",
    name: "server: memory, models open",
    n: 1,
    aim: 200,
    unit: "MB",
    run: () => idleMemory(1),
  },
  {
    kind: "server",
    name: "server: memory, models and 100,000 other files",
    n: 500,
    aim: 200,
    unit: "MB",
    run: workspaceMemory,
  },
];

/** Starts a server on a folder. */
async function start(folder = root, settings = {}) {
  const { createMessageConnection, StreamMessageReader, StreamMessageWriter } = await import(
    "vscode-jsonrpc/node"
  );
  const core = createRequire(import.meta.url)(join(root, "dist/server/core.cjs"));
  const child = spawn(process.execPath, [join(root, "dist/terminal/thrum.js"), "serve", "--stdio"], {
    stdio: ["pipe", "pipe", "inherit"],
  });
  const connection = createMessageConnection(
    new StreamMessageReader(child.stdout),
    new StreamMessageWriter(child.stdin),
  );
  const waiting = new Set();
  const hear = (message) => {
    for (const each of [...waiting]) if (each.fits(message)) each.done(performance.now());
  };
  connection.onNotification("textDocument/publishDiagnostics", (params) =>
    hear({ ...params, published: true }),
  );
  connection.onNotification("thrum/state", hear);
  connection.onRequest((method, params) =>
    method === "workspace/configuration" ? params.items.map(() => settings) : null,
  );
  connection.listen();
  const uri = pathToFileURL(folder).href;
  await connection.sendRequest("initialize", {
    processId: process.pid,
    rootUri: uri,
    workspaceFolders: [{ uri, name: "work" }],
    capabilities: {
      workspace: { configuration: true, didChangeWatchedFiles: { dynamicRegistration: true } },
      textDocument: { publishDiagnostics: { versionSupport: true }, hover: { contentFormat: ["markdown"] } },
    },
    initializationOptions: { protocol: core.PROTOCOL_VERSION },
  });
  await connection.sendNotification("initialized", {});
  return {
    child,
    connection,
    /** Resolves with the time at which such a message came. */
    heard: (fits) =>
      new Promise((resolve, reject) => {
        const wait = {
          fits,
          done: (at) => {
            clearTimeout(late);
            waiting.delete(wait);
            resolve(at);
          },
        };
        const late = setTimeout(() => {
          child.kill();
          reject(new Error("the server does not answer"));
        }, LONGEST_WAIT);
        waiting.add(wait);
      }),
    open: (path, text) => openDocument(connection, pathToFileURL(join(folder, path)).href, text),
    /** Resident memory in MB, as the system counts it. */
    memory: () => Number(/VmRSS:\s+(\d+)/.exec(readFileSync(`/proc/${child.pid}/status`, "utf8"))[1]) / 1024,
    end: () => child.kill(),
  };
}

function openDocument(connection, uri, text) {
  let version = 1;
  void connection.sendNotification("textDocument/didOpen", {
    textDocument: { uri, languageId: "thrum", version, text },
  });
  return {
    uri,
    get version() {
      return version;
    },
    /** Types one character in a line, or takes it out again. */
    type: (line, character, letter) => {
      version++;
      const at = { line, character };
      const range = { start: at, end: letter === "" ? { line, character: character + 1 } : at };
      void connection.sendNotification("textDocument/didChange", {
        textDocument: { uri, version },
        contentChanges: [{ range, text: letter }],
      });
    },
  };
}

async function keystrokes(text) {
  const server = await start();
  const document = server.open("bench.thrum", text);
  await server.heard(({ uri, state }) => uri === document.uri && state === "ready");
  const times = [];
  for (let i = 0; i < KEYSTROKES; i++) {
    const version = document.version + 1;
    const said = server.heard((m) => m.published && m.uri === document.uri && m.version === version);
    const from = performance.now();
    // A digit of the first mass, typed and taken out.
    document.type(2, "mass m1 = ".length, i % 2 === 0 ? "1" : "");
    times.push((await said) - from);
    await new Promise((done) => setTimeout(done, 20));
  }
  server.end();
  return p95(times) / 1000;
}

async function toModes(text) {
  const server = await start();
  const document = server.open("bench.thrum", text);
  await server.heard(({ uri, state }) => uri === document.uri && state === "ready");
  const times = [];
  for (let i = 0; i < KEYSTROKES; i++) {
    const version = document.version + 1;
    const ready = server.heard((m) => m.uri === document.uri && m.version === version && m.state === "ready");
    const from = performance.now();
    document.type(2, "mass m1 = ".length, i % 2 === 0 ? "1" : "");
    times.push((await ready) - from);
  }
  server.end();
  return p95(times) / 1000;
}

async function questions(text, method) {
  const server = await start();
  const document = server.open("bench.thrum", text);
  await server.heard(({ uri, state }) => uri === document.uri && state === "ready");
  const lines = text.split("\n");
  const times = [];
  for (let i = 0; i < QUESTIONS; i++) {
    const line = 2 + ((i * 7) % (lines.length - 4));
    const character = method === "completion" ? lines[line].length : 8;
    const from = performance.now();
    await server.connection.sendRequest(`textDocument/${method}`, {
      textDocument: { uri: document.uri },
      position: { line, character },
      context: { triggerKind: 1 },
    });
    if (i >= 5) times.push(performance.now() - from);
  }
  server.end();
  return p95(times) / 1000;
}

async function openToReady() {
  const from = performance.now();
  const server = await start();
  const document = server.open("bench.thrum", fifty());
  const at = await server.heard(({ uri, state }) => uri === document.uri && state === "ready");
  server.end();
  return (at - from) / 1000;
}

const exampleNames = () => readdirSync(join(root, "examples")).filter((file) => file.endsWith(".thrum"));
const example = (i) =>
  readFileSync(join(root, "examples", exampleNames()[i % exampleNames().length]), "utf8");

async function idleMemory(open) {
  const server = await start();
  for (let i = 0; i < open; i++) {
    const document = server.open(`examples/bench-${i}.thrum`, example(i));
    await server.heard(({ uri, state }) => uri === document.uri && state === "ready");
  }
  await rest();
  const memory = server.memory();
  server.end();
  return memory;
}

async function workspaceMemory() {
  const folder = mkdtempSync(join(tmpdir(), "thrum-bench-"));
  try {
    // Copies of the examples without their expectations, which would take minutes and no more memory.
    for (let i = 0; i < 500; i++) {
      const text = example(i).replace(/^expect .*\n(?: {4}.*\n)*/gm, "");
      writeFileSync(join(folder, `model-${i}.thrum`), text);
    }
    for (let i = 0; i < 100; i++) {
      mkdirSync(join(folder, `other-${i}`));
      for (let j = 0; j < 1000; j++) writeFileSync(join(folder, `other-${i}`, `file-${j}.log`), "");
    }
    const server = await start(folder, { diagnostics: { closedModels: true } });
    const last = pathToFileURL(join(folder, "model-99.thrum")).href;
    const document = server.open("own.thrum", example(0));
    await server.heard((m) => m.published && m.uri === last);
    await server.connection.sendRequest("workspace/symbol", { query: "mass" });
    await server.connection.sendRequest("textDocument/references", {
      textDocument: { uri: document.uri },
      position: { line: 6, character: 6 },
      context: { includeDeclaration: true },
    });
    await rest();
    const memory = server.memory();
    server.end();
    return memory;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** An editor that nobody types in: threads that have nothing to do give memory back. */
const rest = () => new Promise((done) => setTimeout(done, 15_000));

function p95(times) {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * 0.95))];
}
