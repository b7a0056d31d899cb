/** The server where there is no Node: in the client's own thread, over a port, its files from the client. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { MessageChannel, type MessagePort } from "node:worker_threads";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import type { Diagnostic, Hover } from "vscode-languageserver-protocol";
import { PROTOCOL_VERSION, READ_FILE, STATE, SUMMARY, type Summary } from "../../shared-core/index.ts";
import { root } from "../house/files.ts";
import { CAPABILITIES } from "./client.ts";

const PROGRAM = readFileSync(join(root, "dist/server/core.cjs"), "utf8");
const FOLDER = "memfs:/works";

const DRUM = `thrum 1
use "parts/mounts.thrum"
mass drum = 8 kg
spring feet between drum and ground = stiff
expect soft = natural_frequency(1) <= 4 Hz
`;
const FILES: Readonly<Record<string, string>> = {
  [`${FOLDER}/parts/mounts.thrum`]: "thrum 1\nlet stiff = 5.4 N/mm\n",
};

interface Message {
  readonly id?: number;
  readonly method?: string;
  readonly params?: Record<string, unknown>;
  readonly result?: unknown;
}

/** Both ends in one thread, as where an editor refuses workers. */
class PortClient {
  readonly heard: Message[] = [];
  readonly ready: Promise<void>;
  readonly #port: MessagePort;
  readonly #waiting = new Map<number, (result: unknown) => void>();
  #last = 0;

  constructor() {
    const { port1, port2 } = new MessageChannel();
    this.#port = port1;
    this.ready = new Promise((done) => {
      port1.on("message", (message: Message | "ready") =>
        message === "ready" ? done() : this.#hear(message),
      );
    });
    new Function("self", PROGRAM)(port2);
  }

  request<R>(method: string, params: unknown): Promise<R> {
    const id = ++this.#last;
    return new Promise((done) => {
      this.#waiting.set(id, (result) => done(result as R));
      this.#port.postMessage({ jsonrpc: "2.0", id, method, params });
    });
  }

  notify(method: string, params: unknown): void {
    this.#port.postMessage({ jsonrpc: "2.0", method, params });
  }

  open(path: string, text: string): string {
    const uri = `${FOLDER}/${path}`;
    this.notify("textDocument/didOpen", { textDocument: { uri, languageId: "thrum", version: 1, text } });
    return uri;
  }

  async until(look: () => unknown): Promise<void> {
    while (!look()) await new Promise((done) => setTimeout(done, 5));
  }

  said(uri: string): readonly Diagnostic[] | undefined {
    const last = this.heard.findLast(
      ({ method, params }) => method === "textDocument/publishDiagnostics" && params?.uri === uri,
    );
    return last?.params?.diagnostics as readonly Diagnostic[] | undefined;
  }

  state(uri: string): unknown {
    return this.heard.findLast(({ method, params }) => method === STATE && params?.uri === uri)?.params
      ?.state;
  }

  close(): void {
    this.#port.close();
  }

  #hear(message: Message): void {
    if (message.method === undefined) {
      this.#waiting.get(message.id ?? 0)?.(message.result);
      return;
    }
    this.heard.push(message);
    if (message.id === undefined) return;
    const answer = message.method === READ_FILE ? fileOf(message.params?.uri as string) : null;
    this.#port.postMessage({ jsonrpc: "2.0", id: message.id, result: answer });
  }
}

const fileOf = (uri: string) =>
  uri in FILES ? { text: FILES[uri] } : { why: "missing", detail: "there is no such file" };

let client: PortClient;
beforeEach(async () => {
  client = new PortClient();
  await client.ready;
  await client.request("initialize", {
    processId: null,
    rootUri: FOLDER,
    workspaceFolders: [{ uri: FOLDER, name: "works" }],
    capabilities: { ...CAPABILITIES, workspace: { ...CAPABILITIES.workspace, configuration: false } },
    initializationOptions: {
      protocol: PROTOCOL_VERSION,
      readsFiles: true,
      docs: "https://docs.invalid/",
      settings: { units: { system: "inch" } },
    },
  });
  client.notify("initialized", {});
});
afterEach(async () => {
  expect(client.heard.filter(({ method }) => method === "window/logMessage")).toEqual([]);
  expect(await client.request("shutdown", undefined)).toBeNull();
  client.close();
});

describe("a server in the client's thread", () => {
  it("judges, reads files through the client, and shows numbers in the units that are set", async () => {
    const uri = client.open("drum.thrum", DRUM);
    await client.until(() => client.state(uri) === "ready");
    expect(client.said(uri)?.map(({ code, codeDescription }) => [code, codeDescription?.href])).toEqual([
      ["expectation-fails", "https://docs.invalid/diagnostics/expectation-fails.md"],
    ]);
    // sqrt(5400/8)/(2 pi).
    const summary = await client.request<Summary>(SUMMARY, { uri });
    expect(summary.frequencies).toEqual(["4.13 Hz"]);
    const hover = await client.request<Hover>("textDocument/hover", {
      textDocument: { uri },
      position: { line: 2, character: 6 },
    });
    // 8 kg / 0.45359237 kg/lbm (NIST SP 811).
    expect(JSON.stringify(hover.contents)).toContain("17.64 lbm");
  });

  it("answers between the slices of a long computation", async () => {
    const lets = Array.from({ length: 10 }, (_, i) => `let k${i} = ${5 + i} N/mm +/- 10 %\n`).join("");
    const chain = Array.from(
      { length: 10 },
      (_, i) => `mass m${i} = 2 kg\nspring s${i} between m${i} and ${i ? `m${i - 1}` : "ground"} = k${i}\n`,
    ).join("");
    const asked =
      "damper oil between m9 and ground = 9 N*s/m\nforce shake on m9\n    amplitude = 1 N\nask sweep run\n    of = m9.displacement\n    from = 1 Hz\n    to = 60 Hz\nexpect calm = peak(run, m9.displacement) <= 1 m\n    tolerance = worst_case\n";
    const long = client.open("long.thrum", `thrum 1\n${lets}${chain}${asked}`);
    await client.until(() => client.state(long) === "busy");
    const uri = client.open("drum.thrum", DRUM);
    await client.until(() => client.state(uri) === "ready");
    const hover = await client.request<Hover | null>("textDocument/hover", {
      textDocument: { uri },
      position: { line: 2, character: 6 },
    });
    expect(hover).not.toBeNull();
    expect(client.state(long)).toBe("busy");
  });
});
