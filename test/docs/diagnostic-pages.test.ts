import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { CODES, type DiagnosticCode } from "../../shared-core/diagnostics/codes.ts";
import { judge } from "../../shared-core/judgement/judge.ts";
import type { FileReport } from "../../shared-core/judgement/report.ts";
import type { FileReader } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";

/**
 * Codes whose mechanics this version does not compute: their examples run to `not-yet-computed`, and a page that
 * does more than that must leave this list.
 */
const LATER: ReadonlySet<string> = new Set([
  "swing-too-large",
  "no-equilibrium",
  "no-convergence",
  "tune-impossible",
  "not-identifiable",
]);

const folder = new URL("../../docs/diagnostics/", import.meta.url);
const pageOf = (code: string): string => readFileSync(new URL(`${code}.md`, folder), "utf8");
const codes = Object.keys(CODES) as DiagnosticCode[];

interface Block {
  readonly language: string;
  readonly words: readonly string[];
  readonly settings: ReadonlyMap<string, string>;
  readonly text: string;
}

function blocksOf(page: string): readonly Block[] {
  return [...page.matchAll(/^```(\S+)(.*)\n([\s\S]*?)^```$/gm)].map(([, language, attributes, text]) => {
    const all = attributes.trim().split(/\s+/).filter(Boolean);
    const settings = new Map(all.filter((a) => a.includes("=")).map((a) => a.split("=") as [string, string]));
    return { language, words: all.filter((a) => !a.includes("=")), settings, text };
  });
}

/** Files of the page by name; one marked unreadable; a path that leads upwards lies outside the workspace. */
function readerOf(blocks: readonly Block[], example: Block): FileReader {
  const files = new Map(blocks.map((block) => [block.settings.get("file"), block.text]));
  return {
    read(path) {
      if (path.startsWith(".."))
        return { ok: false, why: "outside", detail: "it lies outside the workspace" };
      if (path === example.settings.get("unreadable")) {
        return { ok: false, why: "unreadable", detail: "permission denied" };
      }
      const text = files.get(path);
      return text === undefined ? { ok: false, why: "missing", detail: "no such file" } : { ok: true, text };
    },
  };
}

function judged(code: string, word: "wrong" | "right" | "later"): readonly FileReport[] {
  const blocks = blocksOf(pageOf(code));
  const examples = blocks.filter((block) => block.language === "thrum" && block.words.includes(word));
  return examples.map((example) => {
    const padded = Number(example.settings.get("padded") ?? 0);
    const text = example.text + "# filling\n".repeat(Math.ceil(padded / 10));
    const report = judge(understand(`${code}.thrum`, text, readerOf(blocks, example)));
    expect(report.faults).toEqual([]);
    return report;
  });
}

const said = (report: FileReport, ...severities: readonly string[]): readonly string[] => [
  ...new Set(report.diagnostics.filter((d) => severities.includes(d.severity)).map((d) => d.code)),
];

const messages = (report: FileReport): string =>
  report.diagnostics.map((d) => `${d.code}: ${d.message}`).join("\n");

test("every code has a page and every page a code", () => {
  const pages = readdirSync(folder)
    .filter((file) => file.endsWith(".md"))
    .map((file) => file.slice(0, -3));
  expect(pages.sort()).toEqual([...codes].sort());
});

describe.each(codes)("page of %s", (code) => {
  test("names the code and its severity and has its sections", () => {
    const page = pageOf(code);
    expect(page.startsWith(`# ${code}\n`)).toBe(true);
    expect(page).toContain(`Severity: **${CODES[code]}**`);
    const sections = [...page.matchAll(/^## (.*)$/gm)].map(([, title]) => title);
    expect(sections).toEqual(["What it checks", "Why it matters", "Wrong", "Right", "The fix"]);
  });
});

describe.each(codes.filter((code) => !LATER.has(code)))("example of %s", (code) => {
  test("that is wrong gives exactly that code", () => {
    const reports = judged(code, "wrong");
    expect(reports.length).toBeGreaterThan(0);
    for (const report of reports) {
      if (CODES[code] === "hint") {
        expect(said(report, "error", "warning"), messages(report)).toEqual([]);
        expect(said(report, "hint"), messages(report)).toContain(code);
      } else expect(said(report, "error", "warning"), messages(report)).toEqual([code]);
    }
  });

  test("that is right gives no error, no warning and not that code", () => {
    const reports = judged(code, "right");
    expect(reports.length).toBeGreaterThan(0);
    for (const report of reports) {
      expect(said(report, "error", "warning"), messages(report)).toEqual([]);
      expect(said(report, "hint"), messages(report)).not.toContain(code);
    }
  });

  test("has messages that speak for themselves", () => {
    for (const { diagnostics } of judged(code, "wrong")) {
      for (const { message, hint } of diagnostics) {
        expect(message.startsWith(code)).toBe(false);
        for (const text of [message, hint ?? "-"]) {
          expect(text.trim().length, text).toBeGreaterThan(0);
          expect(/[.!]$|NaN|undefined|null|Infinity/.test(text), text).toBe(false);
        }
      }
    }
  });
});

describe.each([...LATER])("examples of %s", (code) => {
  test("run to not-yet-computed or say nothing wrong, until the mechanics are there", () => {
    const reports = judged(code, "later");
    expect(reports.length).toBe(2);
    for (const report of reports) {
      // What a tune is to mend fails as written.
      const codes = said(report, "error", "warning").filter((each) => each !== "expectation-fails");
      expect(["", "not-yet-computed"], messages(report)).toContain(codes.join());
    }
    expect(said(reports[0], "error"), messages(reports[0])).toContain("not-yet-computed");
  });
});
