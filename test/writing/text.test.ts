import { describe, expect, it } from "vitest";
import { answerText } from "../../shared-core/writing/answer-text.ts";
import { PLAIN } from "../../shared-core/writing/ink.ts";
import { tableLines } from "../../shared-core/writing/table.ts";
import { summaryLine, verdictText } from "../../shared-core/writing/verdict-text.ts";
import { sampleReport } from "./sample.ts";

const drum = { readable: true, path: "models/drum.thrum", report: sampleReport() } as const;
const gone = { readable: false, path: "gone.thrum", reason: "there is no such file" } as const;

describe("the verdict of a file", () => {
  it("shows expectations, then places, then one line", () => {
    expect(verdictText(drum, { ink: PLAIN, units: "as-written" })).toBe(
      [
        "A drum on a slab",
        "",
        "  holds  soft    1.264 Hz  ≤ 6 Hz    79 % left  mount +10 %: +5 %",
        "  open   quiet  mode 1 is undamped",
        "  fails  damped     3.1 %  ≥ 5 %   38 % beyond",
        "",
        "models/drum.thrum:7:8: warning not-damped mode 1 at 1.264 Hz has no damping",
        "    hint: add a damper or a loss factor",
        "",
        "models/drum.thrum: holds 1 of 3, 1 warning",
        "",
      ].join("\n"),
    );
  });

  it("tells of a file that cannot be read on one line", () => {
    expect(verdictText(gone, { ink: PLAIN, units: "si" })).toBe(
      "gone.thrum:1:1: error file-unreadable there is no such file\n",
    );
    expect(summaryLine([drum, gone])).toBe("2 files: 2 fail\n");
  });

  it("puts no control character of a model on the terminal", () => {
    const report = sampleReport();
    const hostile = { ...report, model: { ...report.model, title: "a\u001b[31mb\u0007" } };
    const text = verdictText({ ...drum, report: hostile }, { ink: PLAIN, units: "si" });
    for (const control of ["\u001b", "\u0007"]) expect(text).not.toContain(control);
  });
});

describe("answers as text", () => {
  const text = (units: "as-written" | "inch") =>
    answerText(sampleReport(), { ink: PLAIN, units, width: 70, asks: ["modes", "run", "noise"] });

  it("shows modes, peaks and curves", () => {
    const lines = text("as-written").split("\n");
    expect(lines).toContain("  mode  frequency        damping  moves most          strains most");
    expect(lines).toContain("     1   1.264 Hz          3.1 %  unit 1, slab −0.25  mounts 100 %");
    expect(lines.find((line) => line.includes("unit.velocity"))).toMatch(/peak 500 mm\/s {2}at 2\.5 Hz/);
    expect(lines.some((line) => /[\u2801-\u28ff]/.test(line))).toBe(true);
    expect(Math.max(...lines.map((line) => [...line].length))).toBeLessThanOrEqual(100);
    expect(lines).toContain("noise  random, not computed: random answers are not computed by this version");
  });

  it("shows them in inch units too", () => {
    expect(text("inch")).toContain("19.69 in/s");
  });
});

it("a table is as wide as its widest cells", () => {
  const columns = [
    { head: "a", align: "left" },
    { head: "b", align: "right" },
  ] as const;
  expect(
    tableLines(columns, [
      ["xx", "1"],
      ["y", "100"],
    ]),
  ).toEqual(["a     b", "xx    1", "y   100"]);
});
