/** Whatever a client sends and whatever stands in a text, the server answers and lives on. */
import { spawnSync } from "node:child_process";
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { CSV, ROWS, SHEET, SUMMARY, WRITE_VALUE } from "../../shared-core/index.ts";
import { mangle, tries } from "../fuzz/mangle.ts";
import { Dice } from "../fuzz/random.ts";
import { root } from "../house/files.ts";
import { TestClient, type TestDocument } from "./client.ts";

const EXAMPLES = readdirSync(join(root, "examples"))
  .filter((file) => file.endsWith(".thrum"))
  .sort()
  .map((file) => readFileSync(join(root, "examples", file), "utf8"));

const AT_A_PLACE = [
  "hover",
  "completion",
  "definition",
  "documentHighlight",
  "signatureHelp",
  "prepareRename",
];
const OF_THE_WHOLE = [
  "documentSymbol",
  "foldingRange",
  "codeLens",
  "documentLink",
  "formatting",
  "semanticTokens/full",
];

describe("a server that is thrown everything at", () => {
  let client: TestClient;
  beforeAll(async () => {
    client = await TestClient.start({ settings: { numbers: { delay: 5000 } } });
  });
  afterAll(async () => {
    expect(client.stderr).toBe("");
    // A fault behind a wall would have been logged.
    expect(client.logged).toEqual([]);
    expect(await client.close()).toBe(0);
  });

  it("answers every request at any place of mangled texts", async () => {
    const dice = new Dice(2207);
    for (let seed = 0; seed < tries(150); seed++) {
      const text = mangle(EXAMPLES[seed % EXAMPLES.length], seed);
      const document = client.open(`mangled-${seed}.thrum`, text);
      await Promise.all([
        ...AT_A_PLACE.map((method) => anyhow(document, method, dice)),
        ...OF_THE_WHOLE.map((method) => document.ask(`textDocument/${method}`, undefined, OPTIONS)),
        document.ask("textDocument/inlayHint", undefined, { range: RANGE }),
        document.ask("textDocument/semanticTokens/range", undefined, { range: RANGE }),
        document.ask("textDocument/codeAction", undefined, { range: RANGE, context: { diagnostics: [] } }),
        document.ask("textDocument/selectionRange", undefined, { positions: [{ line: 3, character: 9 }] }),
      ]);
      document.close();
    }
  });

  it("answers nothing about what it does not know", async () => {
    const textDocument = { uri: "file:///nowhere/at-all.thrum" };
    for (const method of [...AT_A_PLACE, ...OF_THE_WHOLE]) {
      const found = await client.request(`textDocument/${method}`, {
        textDocument,
        position: { line: 4, character: 2 },
        ...OPTIONS,
      });
      expect(found === null || JSON.stringify(found) === '{"data":[]}').toBe(true);
    }
    for (const method of [SUMMARY, CSV, WRITE_VALUE, ROWS, SHEET]) {
      const params = { uri: textDocument.uri, ask: "modes", name: "x", value: 1, text: "a\tb" };
      expect([null, "the model cannot be read"]).toContain(reasonOf(await client.request(method, params)));
    }
    await expect(client.request("thrum/nonsense", {})).rejects.toThrow("Unhandled method");
  });

  it("clamps places that the text does not have", async () => {
    const document = client.open("small.thrum", "thrum 1\nmass drum = 4 kg\n");
    for (const position of [
      { line: 99, character: 0 },
      { line: 1, character: 9999 },
      { line: 0, character: 2 ** 31 - 1 },
    ]) {
      for (const method of AT_A_PLACE) await anyhow(document, method, new Dice(1), position);
    }
    document.close();
  });
});

describe("a fault", () => {
  it("costs one answer, is logged with what it was about, and the next one is given", async () => {
    const client = await TestClient.start();
    const document = client.open("fault.thrum", "thrum 1\nmass drum = 4 kg\n");
    // Not what the protocol has: a position without its numbers.
    const broken = await client.request("textDocument/hover", { textDocument: { uri: document.uri } });
    expect(broken).toBeNull();
    await client.until("a word in the log", () =>
      client.logged.some((text) => text.includes("textDocument/hover")),
    );
    expect(await document.ask("textDocument/hover", document.at("mass"))).not.toBeNull();
    expect(await client.close()).toBe(0);
  });
});

describe("the manners of starting and ending", () => {
  it("include a word about how to talk", () => {
    const run = spawnSync(process.execPath, [join(root, "dist/terminal/thrum.js"), "serve"], {
      encoding: "utf8",
    });
    expect([run.status, run.stdout]).toEqual([2, ""]);
    expect(run.stderr).toContain("--stdio");
  });

  it("are those of the protocol", async () => {
    const client = new TestClient();
    await expect(client.request("textDocument/hover", {})).rejects.toThrow();
    await client.initialize({});
    await client.connection.sendRequest("shutdown");
    await expect(client.request("textDocument/hover", {})).rejects.toThrow();
    client.notify("exit", undefined);
    expect(await client.exitCode).toBe(0);
  });

  it("end with 1 when the client goes without a word", async () => {
    const client = await TestClient.start();
    client.open("left.thrum", EXAMPLES[0]);
    client.notify("exit", undefined);
    expect(await client.exitCode).toBe(1);
    const other = await TestClient.start();
    other.process.stdin?.end();
    expect(await other.exitCode).toBe(1);
  });
});

const OPTIONS = { options: { tabSize: 4, insertSpaces: true } };
const RANGE = { start: { line: 0, character: 0 }, end: { line: 30, character: 3 } };

/** A refusal is an answer. */
async function anyhow(
  document: TestDocument,
  method: string,
  dice: Dice,
  position = document.position(dice.below(document.text.length + 1)),
): Promise<void> {
  const answer = document.ask(`textDocument/${method}`, position, { context: { triggerKind: 1 } });
  await answer.catch((error: Error & { code?: number }) => {
    // RequestFailed and ContentModified of the protocol; anything else is a fault.
    if (error.code !== -32803 && error.code !== -32801) throw error;
  });
}

function reasonOf(answer: unknown): unknown {
  if (answer === null || typeof answer !== "object") return answer;
  return "refused" in answer ? answer.refused : "reason" in answer ? answer.reason : answer;
}
