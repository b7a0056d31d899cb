import { Ajv } from "ajv";
import { describe, expect, test } from "vitest";
import {
  answerText,
  checkJson,
  type FileOutcome,
  jsonText,
  judge,
  outlineOf,
  PLAIN,
  understand,
  verdictText,
} from "../../shared-core/index.ts";
import { STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { projectFiles, read } from "../house/files.ts";
import { mangle, tries } from "./mangle.ts";

const reader = { read: () => ({ ok: false, why: "missing", detail: "there is no such file" }) as const };
const validate = new Ajv({ strict: false }).compile(JSON.parse(read("docs/schema/check.json")));

/** Small whole files: those of the statements' descriptions and of the pages of the codes. */
const SMALL = [
  ...STATEMENTS.map((statement) => statement.example).filter((text) => text !== ""),
  ...projectFiles()
    .filter((file) => file.startsWith("docs/diagnostics/"))
    .flatMap((file) => [...read(file).matchAll(/```thrum[^\n]*\n([\s\S]*?)```/g)].map((match) => match[1])),
];

/** Every surface says something of any text, and no rule breaks. */
function saysSomething(text: string): number {
  const report = judge(understand("mangled.thrum", text, reader));
  expect(report.faults).toEqual([]);
  const file: FileOutcome = { readable: true, path: "mangled.thrum", report };
  const document = JSON.parse(jsonText(checkJson([file])));
  expect(validate(document) || validate.errors).toBe(true);
  const options = { ink: PLAIN, units: "as-written", width: 80 } as const;
  const asks = ["modes", ...report.cases.flatMap((each) => [...each.answers.keys()])];
  const texts = [
    verdictText(file, options),
    answerText(report, { ...options, asks }),
    outlineOf(report.model),
  ];
  for (const each of texts) expect(each.endsWith("\n")).toBe(true);
  expect(texts[0]).not.toMatch(/undefined|\[object/);
  return report.cases.length;
}

describe("any text is judged", () => {
  test("whole small files", () => {
    expect(SMALL.length).toBeGreaterThan(50);
    for (const text of SMALL) saysSomething(text);
  });

  test("mangled small files", () => {
    const count = tries(1500);
    let judged = 0;
    for (let seed = 0; seed < count; seed++) {
      const text = mangle(SMALL[seed % SMALL.length], seed);
      try {
        if (saysSomething(text) > 0) judged++;
      } catch (error) {
        throw new Error(`seed ${seed}: ${error instanceof Error ? error.stack : error}\n${text}`);
      }
    }
    // Mangled texts must get as far as numbers, or only the parser was tried.
    expect(judged).toBeGreaterThan(count / 10);
  });
});
