import { Ajv } from "ajv";
import { describe, expect, it } from "vitest";
import { checkJson } from "../../shared-core/writing/check-json.ts";
import { jsonText } from "../../shared-core/writing/json-text.ts";
import { read } from "../house/files.ts";
import { sampleReport } from "./sample.ts";

const validate = new Ajv({
  strict: true,
  strictTypes: false,
  strictRequired: false,
  allErrors: true,
}).compile(JSON.parse(read("docs/schema/check.json")));

const document = (): string =>
  jsonText(
    checkJson([
      { readable: true, path: "models/drum.thrum", report: sampleReport() },
      { readable: false, path: "models/gone.thrum", reason: "there is no such file" },
    ]),
  );

describe("the JSON of a check", () => {
  it("keeps its published schema", () => {
    expect(validate(JSON.parse(document())) || validate.errors).toBe(true);
  });

  it("is refused by that schema when a null has no reason", () => {
    const broken = JSON.parse(document());
    delete broken.files[0].cases[0].expectations[1].reason;
    expect(validate(broken)).toBe(false);
  });

  it("has its keys in the order of the language's rules", () => {
    const { files } = JSON.parse(document());
    expect(Object.keys(files[0])).toEqual(["file", "diagnostics", "cases"]);
    expect(Object.keys(files[0].cases[0])).toEqual([
      "name",
      "parameters",
      "coordinates",
      "modes",
      "answers",
      "expectations",
    ]);
    expect(Object.keys(files[0].cases[0].expectations[0])).toEqual([
      "name",
      "holds",
      "value",
      "limit",
      "unit",
      "margin",
    ]);
  });

  it("never says NaN: null, with the reason beside it", () => {
    const [report] = JSON.parse(document()).files[0].cases;
    expect(document()).not.toMatch(/NaN|Infinity/);
    expect(report.answers.run.series["unit.velocity"]).toMatchObject({
      im: [0, -1e-3, 0, null],
      reason: "some points have no finite value",
    });
    expect(report.answers.noise).toMatchObject({ kind: "random", series: null, reason: /not computed/ });
    expect(report.modes[2]).toMatchObject({ number: null, frequencyHz: null, reason: /partner/ });
    expect(report.expectations[1]).toMatchObject({ holds: null, value: null, reason: "mode 1 is undamped" });
  });

  it("counts places from 0 and holds a file that could not be read", () => {
    const { holds, files } = JSON.parse(document());
    expect(holds).toBe(false);
    expect(files[0].diagnostics[0].range).toEqual({
      start: { line: 6, character: 7 },
      end: { line: 6, character: 13 },
    });
    expect(files[1]).toMatchObject({ diagnostics: [{ code: "file-unreadable" }], cases: [] });
  });
});

describe("JSON text", () => {
  it("reads back as the value, whatever it holds", () => {
    const value = {
      a: [1, null, 2],
      b: [],
      c: {},
      d: ["x".repeat(80), "y".repeat(80)],
      e: [{ f: '\u2028"' }],
    };
    expect(JSON.parse(jsonText(value))).toEqual(value);
  });

  it("puts a list of numbers on one line and leaves out what is undefined", () => {
    expect(jsonText({ a: [1, 2, 3], b: undefined, c: Number.NaN })).toBe(
      '{\n  "a": [1, 2, 3],\n  "c": null\n}\n',
    );
  });
});
