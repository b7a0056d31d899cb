/** Numbers of the readouts, as an editor shows them, against the reference cases with their sources. */

import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { CodeLens, Hover, InlayHint } from "vscode-languageserver-protocol";
import { CSV, SUMMARY, type Summary } from "../../shared-core/index.ts";
import { modelsOf, referenceCases } from "../reference/cases.ts";
import { TestClient, type TestDocument } from "./client.ts";

let client: TestClient;
beforeAll(async () => {
  client = await TestClient.start();
});
afterAll(async () => {
  expect(client.logged).toEqual([]);
  expect(await client.close()).toBe(0);
});

async function opened(id: string, part = "", more = ""): Promise<TestDocument> {
  const model = modelsOf(id).find((each) => each.part === part);
  if (model === undefined) throw new Error(`no model of ${id}`);
  const document = client.open(`reference/${id}${part}${more.length}.thrum`, model.text + more);
  await document.settled();
  return document;
}

/** The expected number of a case, which data/cases.json gives with its source. */
function expected(id: string, quantity: string): number {
  const found = referenceCases.find((each) => each.id === id)?.expected.find((e) => e.quantity === quantity);
  if (found === undefined) throw new Error(`${id} has no ${quantity}`);
  return found.value;
}

/** Four digits, as readouts show them. */
const shown = (value: number): string => String(Number(value.toPrecision(4)));

async function hoverText(document: TestDocument, piece: string, into: number): Promise<string> {
  const hover = await document.ask<Hover>("textDocument/hover", document.at(piece, into));
  return (hover.contents as { value: string }).value;
}

describe("hover", () => {
  const id = "p01-sdof-basics";

  it("on a mass: its mode with frequency and damping ratio", async () => {
    const text = await hoverText(await opened(id), "mass block", 6);
    expect(text).toContain(`${shown(expected(id, "undamped natural frequency"))} Hz`);
    expect(text).toContain(`${Number((100 * expected(id, "damping ratio")).toPrecision(3))} %`);
  });

  it("on a spring: how far the first mode moves for 10 % more of it, half of that as f ~ sqrt(k)", async () => {
    // Closed form: df/f = 1/2 dk/k.
    const text = await hoverText(await opened(id), "spring coil", 8);
    expect(text).toContain("+5 %");
    expect(text).toMatch(/100 %/);
  });

  it("on a let: its value, its effect, where it is used", async () => {
    const text = await hoverText(await opened(id), "let m = 8", 4);
    expect(text).toContain("8 kg");
    // Closed form: df/f = -1/2 dm/m.
    expect(text).toMatch(/−5 %|−4.9/);
  });

  it("on a drive: its frequency against the nearest mode", async () => {
    const of = "p10-force-transmissibility";
    const text = await hoverText(await opened(of), "force shake", 7);
    expect(text).toContain(`${Number(expected(of, "frequency ratio").toPrecision(3))}`);
  });

  it("on an ask: its answer with a plot", async () => {
    const of = "p08-resonance-peak-bandwidth";
    const document = await opened(of);
    const name = /ask sweep (\w+)/.exec(document.text)?.[1] ?? "";
    const text = await hoverText(document, `ask sweep ${name}`, 11);
    expect(text).toContain("data:image/svg+xml;base64,");
    expect(text).toContain(shown(expected(of, "displacement-resonance frequency")));
  });

  it("on an expectation: its value", async () => {
    const of = "p10-force-transmissibility";
    const text = await hoverText(await opened(of), "expect share", 8);
    expect(text).toContain(shown(expected(of, "force transmissibility")));
  });
});

describe("hints, lenses and the summary", () => {
  it("show the natural frequency of a mass alone, and of a two-mass chain all of them", async () => {
    const id = "p23-two-mass-frf";
    const document = await opened(id);
    const hints = await document.ask<InlayHint[]>("textDocument/inlayHint", undefined, { range: ALL });
    const labels = hints.map(({ label }) => label);
    // The others held still: sqrt((k1 + k2)/m1)/(2 pi), sqrt((k2 + k3)/m2)/(2 pi).
    expect(labels).toContain(`${shown(Math.sqrt(6000 / 5) / (2 * Math.PI))} Hz alone`);
    expect(labels).toContain(`${shown(Math.sqrt(3000 / 3) / (2 * Math.PI))} Hz alone`);
    const summary = await client.request<Summary>(SUMMARY, { uri: document.uri });
    const three = (value: number) => `${Number(value.toPrecision(3))} Hz`;
    expect(summary.frequencies).toEqual([
      three(expected(id, "natural frequency 1")),
      three(expected(id, "natural frequency 2")),
    ]);
    expect(client.states.findLast(({ uri }) => uri === document.uri)?.text).toBe(
      `holds 6 of 6 · ${summary.frequencies.join(" · ")}`,
    );
  });

  it("say the margin of an expectation once: in its lens, or in its hint where there is none", async () => {
    const id = "p01-sdof-basics";
    const document = await opened(id, "", "expect soft = natural_frequency(1) <= 5 Hz\n");
    // 1 - f/5 Hz, two digits.
    const left = 100 * (1 - expected(id, "undamped natural frequency") / 5);
    const said = `${Number(left.toPrecision(2))} % left`;
    const hints = async () => {
      const found = await document.ask<InlayHint[]>("textDocument/inlayHint", undefined, { range: ALL });
      return found.map(({ label }) => label);
    };
    const value = `${shown(expected(id, "undamped natural frequency"))} Hz`;
    expect(await hints()).toContain(value);
    client.settings = { codeLens: { expectations: false } };
    client.notify("workspace/didChangeConfiguration", { settings: null });
    await expect.poll(hints).toContain(`${value}, ${said}`);
    client.settings = {};
    client.notify("workspace/didChangeConfiguration", { settings: null });
    await expect.poll(hints).not.toContain(`${value}, ${said}`);
    const lenses = await document.ask<CodeLens[]>("textDocument/codeLens");
    const last = lenses[lenses.length - 1];
    const resolved = await client.request<CodeLens>("codeLens/resolve", last);
    expect(resolved.command?.title).toBe(`holds, ${said}`);
  });
});

describe("every reference case that has models", () => {
  const numbers = referenceCases.flatMap(({ id }) =>
    modelsOf(id).flatMap(({ part, text }) =>
      [...text.matchAll(/^> reference: (.*)\nexpect (\w+)/gm)].map(([, quantity, name]) => ({
        id,
        part,
        quantity,
        name,
      })),
    ),
  );

  it("stands in the summary with its verdict and value", async () => {
    expect(numbers.length).toBeGreaterThan(100);
    const found: string[] = [];
    let compared = 0;
    for (const id of new Set(numbers.map((each) => each.id))) {
      for (const { part } of modelsOf(id)) {
        const document = await opened(id, part);
        const summary = await client.request<Summary>(SUMMARY, { uri: document.uri });
        document.close();
        for (const { name, verdicts } of summary.expectations) {
          const [verdict] = verdicts;
          if (!verdict.holds || verdict.value === null) found.push(`${id} ${name}: ${verdict.message}`);
        }
        for (const { name, quantity } of numbers.filter((each) => each.id === id && each.part === part)) {
          const verdict = summary.expectations.find((each) => each.name === name)?.verdicts[0];
          if (verdict === undefined) found.push(`${id} ${name} is missing`);
          const reference = referenceCases.find((each) => each.id === id);
          const wanted = reference?.expected.find((each) => each.quantity === quantity);
          const unit = verdict?.unit === "" ? "1" : verdict?.unit;
          // Where both are in the same unit, they are the same number as far as four digits tell.
          if (verdict === undefined || wanted === undefined || wanted.unit !== unit) continue;
          compared++;
          const said = Number.parseFloat(verdict.value ?? "");
          if (!(Math.abs(said - wanted.value) <= Math.max(6e-4, wanted.rel_tol) * Math.abs(wanted.value)))
            found.push(`${id} ${name}: ${verdict.value} for ${wanted.value} ${wanted.unit}`);
        }
      }
    }
    expect(found).toEqual([]);
    expect(compared).toBeGreaterThan(60);
  });

  it("is written as CSV on request, and refused with a reason", async () => {
    const document = await opened("p23-two-mass-frf");
    const csv = await client.request<string>(CSV, { uri: document.uri, ask: "modes" });
    const first = csv.split("\n").find((line) => line.startsWith("1,"));
    expect(first?.split(",").map(Number)).toContainEqual(
      expect.closeTo(expected("p23-two-mass-frf", "natural frequency 1"), 5),
    );
    await expect(client.request(CSV, { uri: document.uri, ask: "nothing" })).rejects.toThrow("nothing");
  });
});

const ALL = { start: { line: 0, character: 0 }, end: { line: 1000, character: 0 } };
