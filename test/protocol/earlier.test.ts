/** The sheet with an earlier revision under it: every file of it comes from the client, as it was then. */
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import {
  PROTOCOL_VERSION,
  READ_FILE,
  type ReadFileParams,
  SHEET,
  type SheetContent,
  type SheetParams,
  type SheetResult,
  unpackContent,
} from "../../shared-core/index.ts";
import { CAPABILITIES, TestClient } from "./client.ts";

const FOLDER = "vscode-vfs://harbour/works";
const MODEL = `${FOLDER}/drum.thrum`;
const KIT = `${FOLDER}/parts/mounts.thrum`;
const mounts = (stiffness: string) => `thrum 1\nlet stiff = ${stiffness}\n`;
/** sqrt(5400/8)/(2 pi) = 4.135 Hz; with a quarter of the stiffness half of it. */
const drum = (more = "") => `thrum 1
use "parts/mounts.thrum"
mass drum = 8 kg
spring feet between drum and ground = stiff
${more}ask modes
expect soft = natural_frequency(1) <= 4.2 Hz
`;

/** By revision ("" is today) and URI. */
const files = new Map([
  [`${MODEL}`, drum()],
  [`${KIT}`, mounts("5.4 N/mm")],
  [`softer ${MODEL}`, drum("# before the move\n")],
  [`softer ${KIT}`, mounts("1.35 N/mm")],
  [`broken ${MODEL}`, drum("mass lid = 3 m\n")],
  [`broken ${KIT}`, mounts("5.4 N/mm")],
]);

let client: TestClient;
const asked: ReadFileParams[] = [];
beforeAll(async () => {
  client = new TestClient({ folder: "/" });
  client.answers.set(READ_FILE, (params: ReadFileParams) => {
    asked.push(params);
    const { uri, revision } = params;
    const text = files.get(revision === undefined ? uri : `${revision} ${uri}`);
    if (text !== undefined) return { text };
    return revision === "gone"
      ? { why: "unreadable", detail: "no such revision" }
      : { why: "missing", detail: "" };
  });
  await client.connection.sendRequest("initialize", {
    processId: null,
    rootUri: FOLDER,
    workspaceFolders: [{ uri: FOLDER, name: "works" }],
    capabilities: CAPABILITIES,
    initializationOptions: { protocol: PROTOCOL_VERSION, readsFiles: true },
  });
  client.notify("initialized", {});
  expect(await client.open(MODEL, drum()).settled()).toEqual([]);
});
afterAll(async () => {
  expect(client.logged).toEqual([]);
  expect(await client.close()).toBe(0);
});

async function sheet(revision?: string): Promise<SheetContent> {
  const earlier = revision === undefined ? {} : { earlier: { revision, label: `at ${revision}` } };
  const params: SheetParams = { uri: MODEL, ...earlier };
  const { content } = await client.request<SheetResult>(SHEET, params);
  if (content === null) throw new Error("no content");
  return unpackContent(content);
}

describe("a revision", () => {
  it("is answered with the files as they were then", async () => {
    const { earlier, ruler, ledger } = await sheet("softer");
    expect(earlier).toEqual({ label: "at softer", summary: "holds 1 of 1 · 2.07 Hz" });
    expect(ruler?.earlier.map(({ label }) => label)).toEqual(["2.067 Hz"]);
    expect(ruler?.modes.map(({ label }) => label)).toEqual(["4.135 Hz"]);
    expect(ledger[0].verdicts[0].earlier).toBe("2.067 Hz, held");
  });

  it("is read once, however often the sheet is asked for", async () => {
    const before = asked.length;
    expect((await sheet("softer")).ruler?.earlier).toHaveLength(1);
    expect(asked.slice(before)).toEqual([]);
  });

  it("that nobody wants is not there", async () => {
    const { earlier, ruler } = await sheet();
    expect([earlier, ruler?.earlier]).toEqual([undefined, []]);
  });

  it("that cannot be read or computed is said to be such, and today's answer stays", async () => {
    for (const [revision, reason] of [
      ["gone", /no such revision/],
      ["before", /did not exist then/],
      ["broken", /errors/],
    ] as const) {
      const { earlier, ruler } = await sheet(revision);
      expect(earlier?.reason, revision).toMatch(reason);
      expect(ruler?.modes.map(({ label }) => label)).toEqual(["4.135 Hz"]);
    }
  });
});
