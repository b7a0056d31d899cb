import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { keepExtremes } from "../../shared-core/writing/decimate.ts";
import { modesFigure, sweepFigure } from "../../shared-core/writing/figure/answer-figures.ts";
import { figureSvg } from "../../shared-core/writing/figure/svg.ts";
import { scaleBetween, scaleOver } from "../../shared-core/writing/scales.ts";
import { width } from "../../shared-core/writing/table.ts";
import { terminalPlot } from "../../shared-core/writing/terminal-plot.ts";
import { unitView } from "../../shared-core/writing/units/unit-view.ts";
import { sampleReport } from "./sample.ts";

const values = fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 400 });

describe("leaving samples out", () => {
  it("keeps the lowest and the highest, in ascending order", () => {
    fc.assert(
      fc.property(values, fc.integer({ min: 1, max: 50 }), (list, columns) => {
        const kept = keepExtremes((i) => (i / list.length) * columns, list, columns);
        const shown = kept.map((i) => list[i]);
        expect(Math.max(...shown)).toBe(Math.max(...list));
        expect(Math.min(...shown)).toBe(Math.min(...list));
        expect(kept).toEqual([...kept].sort((a, b) => a - b));
        expect(kept.length).toBeLessThanOrEqual(4 * columns);
      }),
    );
  });

  it("keeps one sample of a gap", () => {
    expect(keepExtremes((i) => i / 2, [1, Number.NaN, Number.NaN, 2], 2)).toEqual([0, 1, 3]);
  });
});

describe("scales", () => {
  it.each([
    ["flat", "linear", [3, 3, 3]],
    ["flat", "log", [3, 3, 3]],
    ["empty", "linear", []],
    ["empty", "log", []],
    ["zero and below", "log", [0, -1, Number.NaN, 2, 20]],
    ["all zero", "log", [0, 0]],
    ["infinite", "linear", [1, Number.POSITIVE_INFINITY, 2]],
  ] as const)("stand on %s data (%s)", (_, kind, data) => {
    const scale = scaleOver(kind, data);
    expect(scale.from).toBeLessThan(scale.to);
    expect(scale.place(scale.from)).toBeCloseTo(0, 12);
    expect(scale.place(scale.to)).toBeCloseTo(1, 12);
    expect(scale.ticks(5).length).toBeGreaterThan(0);
  });

  it("put ticks at round values, labelled shortly", () => {
    expect(
      scaleBetween("log", 2, 40)
        .ticks(8)
        .map((tick) => tick.label),
    ).toEqual(["2", "5", "10", "20"]);
    expect(
      scaleBetween("log", 1e-6, 1e2)
        .ticks(4)
        .map((tick) => tick.label),
    ).toEqual(["1e-6", "1e-4", "0.01", "1", "100"]);
    expect(
      scaleBetween("linear", 0, 1)
        .ticks(4)
        .map((tick) => tick.label),
    ).toEqual(["0", "0.2", "0.4", "0.6", "0.8", "1"]);
  });
});

describe("a plot in the terminal", () => {
  /** One sample of 100,000 stands out: a resonance far narrower than a dot. */
  const x = Float64Array.from({ length: 100_000 }, (_, i) => 1 + i / 1000);
  const y = x.map((_, i) => (i === 43_210 ? 1000 : 1));

  it("shows a peak narrower than a dot at its full height", () => {
    const frame = { x: scaleOver("log", x), y: scaleOver("log", y), width: 60, height: 6, xUnit: "Hz" };
    const lines = terminalPlot({ x, y }, frame);
    expect(lines[0]).toMatch(/[\u2801-\u28ff]/);
    expect(Math.max(...lines.map(width))).toBeLessThanOrEqual(60);
    expect(lines).toHaveLength(8);
  });

  it("stands on what cannot be drawn", () => {
    const empty = { x: [1, 2], y: [Number.NaN, Number.NaN] };
    const frame = {
      x: scaleBetween("log", 1, 2),
      y: scaleOver("log", empty.y),
      width: 20,
      height: 3,
      xUnit: "Hz",
    };
    expect(terminalPlot(empty, frame).join("")).not.toMatch(/[\u2801-\u28ff]|NaN/);
  });
});

describe("an SVG picture", () => {
  const [report] = sampleReport().cases;
  const units = unitView("as-written");
  const size = { width: 400, height: 300 };

  it("draws a sweep with its peak between samples, and says it in words", () => {
    const result = report.answers.get("run");
    if (!result?.ok || result.value.kind !== "sweep") throw new Error("the sample holds a sweep");
    const svg = figureSvg(sweepFigure("run", result.value, units), size);
    expect(svg).toContain("500 mm/s at 2.5 Hz");
    expect(svg).toMatch(/<desc>.*unit\.velocity peaks at 500 mm\/s at 2\.5 Hz/);
    expect(svg).toContain("amplitude in mm/s");
    expect(svg).not.toMatch(/NaN|undefined|<style|<script|href/);
    expect(balanced(svg)).toBe(true);
  });

  it("draws shapes as bars and makes hostile names harmless", () => {
    if (!report.modes.ok) throw new Error("the sample holds modes");
    const svg = figureSvg(modesFigure(report.modes.table, ['</svg><script x="', "a\u0000b"], units), size);
    expect(svg).not.toContain("<script");
    expect(svg).not.toContain("\u0000");
    expect(balanced(svg)).toBe(true);
  });
});

/** Every element opened is closed in its order, and no quote or bracket is left over. */
function balanced(svg: string): boolean {
  const open: string[] = [];
  for (const [, close, name, attributes] of svg.matchAll(
    /<(\/?)([a-z]+)((?:\s+[a-zA-Z-]+="[^"<]*")*)\s*\/?>/g,
  )) {
    if (close) {
      if (open.pop() !== name) return false;
    } else if (!svg.includes(`<${name}${attributes}/>`)) open.push(name);
  }
  return open.length === 0 && !/<(?![/a-z])/.test(svg);
}
