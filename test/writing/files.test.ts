import { describe, expect, it } from "vitest";
import { answerFiles } from "../../shared-core/writing/answer-files.ts";
import { csvText } from "../../shared-core/writing/csv.ts";
import { outlineText } from "../../shared-core/writing/outline.ts";
import { systemFiles } from "../../shared-core/writing/system-files.ts";
import { sampleAssembly, sampleReport } from "./sample.ts";

describe("CSV", () => {
  it("quotes what needs it and leaves out what has no value", () => {
    const text = csvText([
      { head: 'a, "b"', values: [1, Number.NaN, null] },
      { head: "c", values: ["x\ny", "plain", ""] },
    ]);
    expect(text).toBe('"a, ""b""",c\r\n1,"x\ny"\r\n,plain\r\n,\r\n');
  });

  it("writes answers in SI, amplitude and phase beside the parts", () => {
    const files = answerFiles(sampleReport(), { asks: ["run", "modes", "noise"], as: "csv", units: "inch" });
    expect(files.map((file) => file.name)).toEqual(["modes.csv", "run.csv"]);
    const rows = files[1].text.split("\r\n");
    expect(rows[0]).toBe(
      "frequency [Hz],unit.velocity amplitude [m/s],unit.velocity phase [deg],unit.velocity real [m/s],unit.velocity imaginary [m/s]",
    );
    expect(rows[1]).toBe("1,0.001,0,0.001,0");
    expect(Number(rows[2].split(",")[1])).toBeCloseTo(Math.hypot(2e-3, 1e-3), 15);
  });
});

describe("the matrices of a system", () => {
  const files = new Map(systemFiles(sampleAssembly()).map((file) => [file.name, file.text]));

  it("stand in Matrix Market form, symmetric ones as their lower triangle", () => {
    expect(files.get("stiffness.mtx")).toBe(
      [
        "%%MatrixMarket matrix coordinate real symmetric",
        "% SI units; rows as in coordinates.csv",
        "2 2 3",
        "1 1 26500",
        "2 1 -26500",
        "2 2 11226500",
        "",
      ].join("\n"),
    );
    expect(files.get("mass.mtx")).toMatch(/\n2 2 2\n1 1 420\n2 2 9600\n$/);
  });

  it("come with drives, support motions and the names of rows and columns", () => {
    expect(files.get("drive.mtx")).toMatch(/real general\n.*\n2 1 1\n1 1 1\n$/);
    expect(files.get("stiffness-support.mtx")).toMatch(/\n2 1 1\n2 1 -11200000\n$/);
    expect(files.has("damping-support.mtx")).toBe(false);
    expect(files.get("coordinates.csv")).toBe("row,coordinate,unit\r\n1,unit,m\r\n2,slab,m\r\n");
    expect(files.get("columns.csv")).toBe(
      "matrix,column,name,unit\r\ndrive,1,imbalance,N\r\nsupport,1,floor,m\r\n",
    );
  });
});

describe("an outline", () => {
  const { model, cases } = sampleReport();

  it("says one resolved fact a line, in SI, sorted by name", () => {
    const lines = outlineText(model, [cases[0].instance]).split("\n");
    expect(lines).toContain("let mount = 26500 N/m");
    expect(lines).toContain("let mount band = 23850 to 29150 N/m");
    expect(lines).toContain("spring mounts travel = -slab + unit");
    expect(lines).toContain("spring beams travel = -floor + slab");
    expect(lines).toContain("expect quiet = peak(run, unit.velocity) <= 0.012 m/s");
    expect(lines).toContain("expect damped = damping_ratio(1) >= 0.05");
    const expected = lines.filter((line) => line.startsWith("expect"));
    expect(expected).toEqual([...expected].sort());
  });

  it("is there for a model that cannot be built", () => {
    expect(outlineText(model, [])).toContain("unresolved: the model has errors");
  });
});
