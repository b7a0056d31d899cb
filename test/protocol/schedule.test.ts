/** Two tiers: the text at once, numbers aside; what is late is dropped, what is stale says so. */

import { afterAll, afterEach, beforeAll, describe, expect, it } from "vitest";
import type { Hover, InlayHint } from "vscode-languageserver-protocol";
import { SUMMARY, type Summary } from "../../shared-core/index.ts";
import { benchModel, modelText } from "../../tools/bench/model.mjs";
import { TestClient, type TestDocument } from "./client.ts";

/** sqrt(k/m)/(2 pi) = sqrt(5400/8)/(2 pi) = 4.135 Hz. */
const DRUM = `thrum 1
let stiffness = 5.4 N/mm
mass drum = 8 kg
spring feet between drum and ground = stiffness
damper oil between drum and ground = 40 N*s/m
force shake on drum
    amplitude = 1 N
    frequency = 12 Hz
ask modes
expect soft = natural_frequency(1) <= 4 Hz
`;

/** Tolerances in a sweep of every corner: ten of them are seconds of work. */
const sweptCorners = (tolerances: number) => `thrum 1
${Array.from({ length: 10 }, (_, i) => `let k${i} = ${5 + i} N/mm${i < tolerances ? " +/- 10 %" : ""}`).join("\n")}
${Array.from({ length: 10 }, (_, i) => `mass m${i} = ${2 + i} kg\nspring s${i} between m${i} and ${i ? `m${i - 1}` : "ground"} = k${i}`).join("\n")}
force shake on m9
    amplitude = 1 N
ask sweep run
    of = m9.displacement
    from = 1 Hz
    to = 60 Hz
damper oil between m9 and ground = 9 N*s/m
expect calm = peak(run, m9.displacement) <= 1 m
    tolerance = worst_case
`;
const LONG = sweptCorners(10);

let client: TestClient;
let document: TestDocument;
let count = 0;
beforeAll(async () => {
  client = await TestClient.start();
});
afterEach(() => document.close());
afterAll(async () => {
  expect(client.logged).toEqual([]);
  expect(await client.close()).toBe(0);
});

const opened = (text: string): TestDocument => {
  document = client.open(`schedule-${++count}.thrum`, text);
  return document;
};
const saidOf = (version: number) =>
  client.published.filter((each) => each.uri === document.uri && each.version === version);
const codes = (list: readonly { code?: number | string }[]) => list.map(({ code }) => code);

describe("the text tier", () => {
  it("speaks before numbers do, with the version it speaks of", async () => {
    opened(LONG);
    document.edit("mass m3 = 5 kg", "mass m3 = 5 kN");
    const [first] = await client.until("an error", () => {
      const said = saidOf(2).filter(({ diagnostics }) => diagnostics.length > 0);
      return said.length > 0 && said;
    });
    expect(first.diagnostics.map(({ code }) => code)).toContain("weight-as-mass");
    document.edit("mass m3 = 5 kN", "mass m3 = 5 kg");
    // The text is sound again at once, long before any number of it can be there.
    const [cured] = await client.until("the cure", () => {
      const said = saidOf(3);
      return said.length > 0 && said;
    });
    expect(cured.diagnostics).toEqual([]);
    const ready = client.states.filter(
      ({ uri, version, state }) => uri === document.uri && version === 3 && state === "ready",
    );
    expect(ready).toEqual([]);
  });

  it("says nothing of an edit that was overtaken: one answer for a burst", async () => {
    opened(DRUM);
    await document.settled();
    for (let i = 0; i < 40; i++) document.edit("mass drum = ", "mass drum =  ");
    await document.settled();
    const said = client.published.filter(({ uri, version }) => uri === document.uri && (version ?? 0) > 1);
    // The last one is there, and most of the others never were.
    expect(said.at(-1)?.version).toBe(41);
    expect(new Set(said.map(({ version }) => version)).size).toBeLessThan(20);
  });
});

describe("numbers", () => {
  it("keep their squiggles while they are computed anew, moved and marked", async () => {
    opened(DRUM);
    expect(codes(await document.settled())).toEqual(["expectation-fails"]);
    // The comparison is below what is edited, so that its squiggle has to move.
    document.edit("mass drum = 8 kg", "# heavier\nmass drum = 8.1 kg");
    const [carried] = await client.until("the text tier", () => saidOf(2).length > 0 && saidOf(2));
    expect(codes(carried.diagnostics)).toEqual(["expectation-fails"]);
    expect(carried.diagnostics[0].message).toContain("(before the last edit)");
    expect(document.textIn(carried.diagnostics[0].range)).toBe("natural_frequency(1) <= 4 Hz");
    expect(await document.settled()).toEqual([
      expect.objectContaining({ message: expect.not.stringContaining("before the last edit") }),
    ]);
  });

  it("are gone from where the text was edited, and from a text with errors", async () => {
    opened(DRUM);
    await document.settled();
    document.edit("<= 4 Hz", "<= 4.5 Hz");
    await client.until("the text tier", () => saidOf(2).length > 0);
    expect(saidOf(2)[0].diagnostics).toEqual([]);
    document.edit("<= 4.5 Hz", "<= 4 Hz");
    await document.settled();
    document.edit("mass drum = 8 kg", "mass drum = 8 km");
    await document.settled();
    expect(codes(document.diagnostics())).toEqual(["unit-mismatch"]);
  });

  it("of an earlier text are shown as such, and never for long", async () => {
    opened(DRUM);
    await document.settled();
    const hint = async (label: string) => {
      const range = { start: { line: 0, character: 0 }, end: { line: 99, character: 0 } };
      const hints = await document.ask<InlayHint[]>("textDocument/inlayHint", undefined, { range });
      return hints.find((each) => String(each.label).includes(label))?.label;
    };
    expect(await hint("Hz alone")).toBe("4.135 Hz alone");
    client.settings = { numbers: { delay: 3000 } };
    await client.connection.sendNotification("workspace/didChangeConfiguration", { settings: null });
    document.edit("5.4 N/mm", "21.6 N/mm");
    await client.until("the text tier", () => saidOf(document.version).length > 0);
    expect(await hint("Hz alone")).toBe("4.135 Hz alone …");
    client.settings = {};
    await client.connection.sendNotification("workspace/didChangeConfiguration", { settings: null });
    // A question about numbers does not wait for typing to rest. Four times the stiffness: twice the frequency.
    const summary = await client.request<Summary>(SUMMARY, { uri: document.uri });
    expect(summary.frequencies).toEqual(["8.27 Hz"]);
    expect(await hint("Hz alone")).toBe("8.27 Hz alone");
  });

  it("stay when only a comment or a note is written: nothing is computed anew", async () => {
    opened(sweptCorners(2).replace("<= 1 m", "<= 1 mm"));
    expect(codes(await document.settled())).toEqual(["expectation-fails"]);
    document.edit("thrum 1\n", "thrum 1\n\n# 𐐀 for the night shift\n> source: ticket 0417\n");
    await client.until("the text tier", () => saidOf(2).length > 0);
    expect(saidOf(2)[0].diagnostics[0].message).not.toContain("before the last edit");
    const [said] = await document.settled();
    expect(document.textIn(said.range)).toBe("peak(run, m9.displacement) <= 1 mm");
    const states = client.states.filter(({ uri, version }) => uri === document.uri && version === 2);
    expect(states.map(({ state }) => state)).toEqual(["ready"]);
  });

  it("come in two steps where they take long: modes, then the rest", async () => {
    opened(LONG);
    await client.until("modes", () =>
      client.states.some(({ uri, state, text }) => uri === document.uri && state === "busy" && text !== ""),
    );
    const hover = await document.ask<Hover>("textDocument/hover", document.at("mass m4", 5));
    expect(JSON.stringify(hover.contents)).toContain("natural frequency with everything else held still");
    const done = client.states.some(({ uri, state }) => uri === document.uri && state === "ready");
    expect(done).toBe(false);
  });

  it("can be stopped from their progress, which still ends in a publish", async () => {
    opened(LONG);
    const begun = client.progress.length;
    const { token } = await client.until("progress", () =>
      client.progress.slice(begun).find(({ kind }) => kind === "begin"),
    );
    const before = client.published.length;
    await client.connection.sendNotification("window/workDoneProgress/cancel", { token });
    await client.until("the end of it", () =>
      client.progress.some((each) => each.token === token && each.kind === "end"),
    );
    await document.settled();
    expect(client.published.slice(before).some(({ uri }) => uri === document.uri)).toBe(true);
    expect(client.states.findLast(({ uri }) => uri === document.uri)?.state).toBe("ready");
    // The next edit computes again.
    document.edit("<= 1 m", "<= 2 m");
    await client.until("new work", () =>
      client.states.some(
        ({ uri, version, state }) => uri === document.uri && version === 2 && state === "busy",
      ),
    );
  });

  it("are dropped when they are late: only the newest text ends ready", async () => {
    opened(LONG);
    for (let i = 0; i < 5; i++) {
      await client.until("work on it", () => saidOf(document.version).length > 0);
      document.edit("<= 1 m", "<= 1 m ");
    }
    document.edit("    tolerance = worst_case\n", "");
    await document.settled();
    const ready = client.states.filter(({ uri, state }) => uri === document.uri && state === "ready");
    expect(ready.map(({ version }) => version)).toEqual([document.version]);
  });
});

describe("what is asked meanwhile", () => {
  it("is answered while a long computation runs", async () => {
    const long = client.open("schedule-long.thrum", LONG);
    await client.until("work on it", () =>
      client.states.some(({ uri, state }) => uri === long.uri && state === "busy"),
    );
    opened(DRUM);
    const hover = await document.ask<Hover>("textDocument/hover", document.at("mass drum", 6));
    expect(JSON.stringify(hover)).toContain("drum");
    // The other model is open too, and its numbers come before the long ones are there.
    await client.until("its numbers", () =>
      client.states.some(({ uri, state }) => uri === document.uri && state === "ready"),
    );
    long.close();
  });

  it("waits for no number when it is about the text: a model of 3,000 lines", async () => {
    opened(modelText(benchModel("general", 1000)));
    const symbols = await document.ask<unknown[]>("textDocument/documentSymbol");
    expect(symbols.length).toBeGreaterThan(3000);
  });
});
