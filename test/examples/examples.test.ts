/**
 * The bundled examples: each is a real job, gets the verdict it is meant to get, and has the frequencies and steady
 * responses that SciPy finds in its text (numbers made by tools/reference/make_examples.py with a reader of its own).
 */
import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { type FileReport, format, judge, understand } from "../../shared-core/index.ts";

const folder = new URL("../../examples/", import.meta.url);
const nothing = { read: () => ({ ok: false, why: "missing", detail: "" }) as const };
const names = readdirSync(folder)
  .filter((file) => file.endsWith(".thrum"))
  .map((file) => file.slice(0, -".thrum".length));
const textOf = (name: string) => readFileSync(new URL(`${name}.thrum`, folder), "utf8");
const reports = new Map<string, FileReport>();
const reportOf = (name: string): FileReport => {
  const known = reports.get(name) ?? judge(understand(`${name}.thrum`, textOf(name), nothing));
  reports.set(name, known);
  return known;
};

const reference: {
  readonly examples: Readonly<
    Record<
      string,
      { readonly frequencyHz: readonly number[]; readonly expectations: Readonly<Record<string, number>> }
    >
  >;
} = JSON.parse(readFileSync(new URL("../reference/data/examples.json", import.meta.url), "utf8"));

/** The one that fails on purpose: its expectation, and the diagnostics that go with it. */
const FAILING: Readonly<
  Record<string, { readonly fails: readonly string[]; readonly codes: readonly string[] }>
> = {
  "quay-generator": { fails: ["clear_of_half_order"], codes: ["near-resonance", "expectation-fails"] },
};

test("there are at least six, and one fails on purpose", () => {
  expect(names.length).toBeGreaterThanOrEqual(6);
  expect(Object.keys(FAILING).every((name) => names.includes(name))).toBe(true);
});

describe.each(names)("%s", (name) => {
  test("is a job of its size, with a tolerance on its numbers and a source in its notes", () => {
    const { model, cases } = reportOf(name);
    const { assembly, asks } = cases[0].instance;
    expect(assembly.coordinates.length).toBeGreaterThanOrEqual(8);
    expect(assembly.drives.length).toBeGreaterThanOrEqual(2);
    expect(asks.length).toBeGreaterThanOrEqual(2);
    expect(model.expectations.length).toBeGreaterThanOrEqual(4);
    const lets = model.tree.statements.filter(({ keyword }) => keyword.text === "let");
    const sourced = lets.filter(({ notes }) => notes.some(({ tag }) => tag?.key === "source"));
    expect(model.draws.length).toBeGreaterThanOrEqual(8);
    expect(sourced.length).toBeGreaterThanOrEqual(lets.length - 1);
  });

  test("gets its verdict", () => {
    const { diagnostics, cases } = reportOf(name);
    const fails = cases[0].verdicts
      .filter((verdict) => verdict.holds !== true)
      .map((verdict) => verdict.name);
    expect(fails).toEqual(FAILING[name]?.fails ?? []);
    expect(diagnostics.map(({ code }) => code)).toEqual(FAILING[name]?.codes ?? []);
    const cures = diagnostics.flatMap(({ code, hint }) => (code === "expectation-fails" ? [hint] : []));
    if (name === "quay-generator")
      expect(cures[0]).toMatch(/with `engine_speed` at most .*with `mount` at most /);
    for (const diagnostic of diagnostics.filter(({ code }) => code === "expectation-fails")) {
      expect(diagnostic.hint, "says what would have to change").toMatch(
        /would hold with `\w+` at (most|least)/,
      );
    }
  });

  test("has the frequencies and steady responses that SciPy finds", () => {
    const { frequencyHz, expectations } = reference.examples[name];
    const [{ modes, verdicts }] = reportOf(name).cases;
    if (!modes.ok) throw new Error(modes.reason);
    const elastic = modes.table.modes.flatMap((mode) =>
      mode.number === null || mode.number === 0 ? [] : [mode.frequencyHz],
    );
    expect(elastic.length).toBe(frequencyHz.length);
    frequencyHz.forEach((hz, i) => void expect(Math.abs((elastic[i] ?? 0) / hz - 1)).toBeLessThan(1e-10));
    for (const [wanted, value] of Object.entries(expectations)) {
      const found = verdicts.find((verdict) => verdict.name === wanted)?.value ?? Number.NaN;
      expect(Math.abs(found / value - 1), wanted).toBeLessThan(1e-9);
    }
  });

  test("stands in the canonical layout", () => {
    expect(format(textOf(name))).toBe(textOf(name));
  });
});
