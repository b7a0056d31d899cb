/**
 * 200 seeded random models against SciPy (numbers made by tools/reference/make_random_models.py and stored).
 * Each error is relative to what rounding in either program allows; the worst of each group is printed.
 */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import {
  type CaseReport,
  type HistoryAsk,
  judge,
  type SweepAsk,
  understand,
} from "../../shared-core/index.ts";

interface RandomModel {
  readonly group: string;
  readonly index: number;
  readonly coordinates: number;
  readonly text: string;
  readonly frequencyHz: readonly number[];
  readonly roots?: readonly (readonly [number, number])[];
  readonly rootScale?: number;
  readonly sweep?: {
    readonly frequencyHz: readonly number[];
    readonly response: readonly (readonly (readonly [number, number])[])[];
  };
  readonly history?: { readonly timeS: readonly number[]; readonly values: readonly (readonly number[])[] };
}

const data = JSON.parse(readFileSync(new URL("data/random-models.json", import.meta.url), "utf8"));
const models: readonly RandomModel[] = data.models;
const groups = [...new Set(models.map((m) => m.group))];

const nothing = { read: () => ({ ok: false, why: "missing", detail: "" }) as const };

/** Worst relative errors, for the printed line. */
interface Worst {
  frequency: number;
  root: number;
  sweep: number;
  history: number;
}

function compareFrequencies(model: RandomModel, report: CaseReport, worst: Worst): void {
  if (!report.modes.ok) throw new Error(report.modes.reason);
  const ours = report.modes.table.modes.flatMap((m) =>
    m.number === null || m.frequencyHz === null ? [] : [m.frequencyHz],
  );
  ours.sort((a, b) => a - b);
  expect(ours.length).toBe(model.frequencyHz.length);
  model.frequencyHz.forEach((wanted, i) => {
    if (wanted === 0) {
      expect(ours[i]).toBe(0);
      return;
    }
    worst.frequency = Math.max(worst.frequency, Math.abs(ours[i] - wanted) / wanted);
  });
}

function rootsOf(report: CaseReport): (readonly [number, number])[] {
  if (!report.modes.ok) throw new Error(report.modes.reason);
  return report.modes.table.modes.flatMap((m) =>
    m.realRoots
      ? m.realRoots.map((r) => [r, 0] as const)
      : [[m.eigenvalue[0], Math.abs(m.eigenvalue[1])] as const],
  );
}

function compareRoots(model: RandomModel, report: CaseReport, worst: Worst): void {
  if (!model.roots || !model.rootScale) return;
  const ours = rootsOf(report);
  for (const [re, im] of model.roots) {
    const size = Math.hypot(re, im);
    const distance = Math.min(...ours.map(([a, b]) => Math.hypot(a - re, b - im)));
    // A free mode is a double root at zero, which any program finds to the root of its rounding only.
    if (size < 1e-6 * model.rootScale) expect(distance).toBeLessThan(1e-6 * model.rootScale);
    else worst.root = Math.max(worst.root, distance / (size + 1e-6 * model.rootScale));
  }
}

function compareSweep(model: RandomModel, report: CaseReport, worst: Worst): void {
  if (!model.sweep) return;
  const ask = report.instance.asks.find((a): a is SweepAsk => a.kind === "sweep");
  const response = ask && report.analysis.frequencyResponse(ask.by);
  if (!ask || !response?.ok) throw new Error("no sweep");
  model.sweep.frequencyHz.forEach((hz, i) => {
    const wanted = model.sweep?.response[i] ?? [];
    const scale = Math.max(...wanted.map((z) => Math.hypot(...z)));
    ask.of.forEach((quantity, j) => {
      const found = response.value.at(quantity, hz);
      if (!found.ok) throw new Error(found.reason);
      worst.sweep = Math.max(
        worst.sweep,
        Math.hypot(found.value[0] - wanted[j][0], found.value[1] - wanted[j][1]) / scale,
      );
    });
  });
}

function compareHistory(model: RandomModel, report: CaseReport, worst: Worst): void {
  if (!model.history) return;
  const ask = report.instance.asks.find((a): a is HistoryAsk => a.kind === "history");
  const response = ask && report.analysis.timeResponse(ask);
  if (!ask || !response?.ok)
    throw new Error(`no history: ${response && !response.ok ? response.reason : "no ask"}`);
  ask.of.forEach((quantity, j) => {
    const wanted = model.history?.values.map((row) => row[j]) ?? [];
    const scale = Math.max(...wanted.map(Math.abs));
    model.history?.timeS.forEach((time, i) => {
      const found = response.value.at(quantity, time);
      if (!found.ok) throw new Error(found.reason);
      worst.history = Math.max(worst.history, Math.abs(found.value - wanted[i]) / scale);
    });
  });
}

/**
 * What rounding allows: a frequency loses half the digits of the squared stiffness ratio; the response of a
 * model with a ratio r of its stiffnesses loses about r times the rounding of either program.
 */
const ALLOWED: Readonly<Record<string, Worst>> = {
  stiff: { frequency: 1e-7, root: 1e-6, sweep: 1e-5, history: 1e-5 },
};
const USUAL: Worst = { frequency: 1e-9, root: 1e-8, sweep: 1e-8, history: 1e-7 };

describe("random models against SciPy", () => {
  test.each(groups)("%s", (group) => {
    const worst: Worst = { frequency: 0, root: 0, sweep: 0, history: 0 };
    const own = models.filter((m) => m.group === group);
    expect(own.length).toBeGreaterThanOrEqual(20);
    for (const model of own) {
      const report = judge(understand(`${group}-${model.index}.thrum`, model.text, nothing));
      const errors = report.diagnostics.filter((d) => d.severity === "error" && d.code !== "unstable-mode");
      expect(errors, `${group} ${model.index}`).toEqual([]);
      const before = { ...worst };
      compareFrequencies(model, report.cases[0], worst);
      compareRoots(model, report.cases[0], worst);
      compareSweep(model, report.cases[0], worst);
      compareHistory(model, report.cases[0], worst);
      for (const key of Object.keys(worst) as (keyof Worst)[]) {
        const allowed = (ALLOWED[group] ?? USUAL)[key];
        if (worst[key] !== before[key])
          expect(worst[key], `${group} ${model.index}: ${key}`).toBeLessThan(allowed);
      }
    }
    const line = Object.entries(worst).map(([key, value]) => `${key} ${value.toExponential(1)}`);
    process.stdout.write(`${group} (${own.length} models), worst relative errors: ${line.join(", ")}\n`);
  });
});
