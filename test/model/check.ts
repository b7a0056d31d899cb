import { expect } from "vitest";
import type { Diagnostic } from "../../shared-core/diagnostics/diagnostic.ts";
import { instantiate } from "../../shared-core/model/instantiate.ts";
import type { FileReader, Instance, Model } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { applyEdits, LineIndex } from "../../shared-core/text/line-index.ts";

/** Files by path, as a reader would find them; a path under `outside/` lies outside, `broken/` is unreadable. */
export function readerOf(files: Readonly<Record<string, string>> = {}): FileReader {
  return {
    read(path) {
      if (path.startsWith("..") || path.startsWith("/")) return { ok: false, why: "outside", detail: "" };
      if (path.startsWith("broken/")) return { ok: false, why: "unreadable", detail: "it is a folder" };
      const text = files[path];
      return text === undefined ? { ok: false, why: "missing", detail: "" } : { ok: true, text };
    },
  };
}

export function modelOf(
  text: string,
  files: Readonly<Record<string, string>> = {},
  path = "model.thrum",
): Model {
  return understand(path, versioned(text), readerOf(files));
}

/** The model with its numbers put in; its text must be free of errors. */
export function instanceOf(
  text: string,
  caseIndex = 0,
  files: Readonly<Record<string, string>> = {},
): Instance {
  const model = modelOf(text, files);
  expect(
    model.diagnostics.filter(({ severity }) => severity === "error").map(({ message }) => message),
  ).toEqual([]);
  return instantiate(model, caseIndex);
}

export const versioned = (text: string): string =>
  text.startsWith("thrum") ? text : `thrum 1\n${text.trimStart()}`;

/**
 * Holds a text to the marks in it. A comment line of carets under a line marks a range of it and names the code
 * that is said there; words behind the code must stand in the message or its hint. Nothing else may be said.
 *
 *     mass pump = 450 lbf
 *     #               ^^^ weight-as-mass 450 lbm?
 */
export function check(marked: string, files: Readonly<Record<string, string>> = {}): Model {
  const text = versioned(marked);
  const model = modelOf(text, files);
  const found = model.diagnostics.map((diagnostic) => shown(text, diagnostic));
  const wanted = marksOf(text);
  expect(found.map(({ place }) => place).sort()).toEqual(wanted.map(({ place }) => place).sort());
  for (const { place, words } of wanted) {
    if (words === "") continue;
    const at = found.filter((each) => each.place === place);
    expect(
      at.some((each) => each.said.includes(words)),
      `${place}: ${at.map(({ said }) => said)}`,
    ).toBe(true);
  }
  return model;
}

interface Mark {
  readonly place: string;
  readonly words: string;
}

function marksOf(text: string): Mark[] {
  const lines = text.split("\n");
  const marks: Mark[] = [];
  let line = 0;
  lines.forEach((content, i) => {
    const mark = /^#(\s*)(\^+) (\S+) ?(.*)$/.exec(content) ?? /^#()(<\^*) (\S+) ?(.*)$/.exec(content);
    if (mark === null) {
      line = i;
      return;
    }
    const [, blanks, carets, code, words] = mark;
    const start = carets.startsWith("<") ? 0 : 1 + blanks.length;
    const end = carets.startsWith("<") ? carets.length : start + carets.length;
    marks.push({ place: `${line + 1}:${start}-${end} ${code}`, words });
  });
  return marks;
}

function shown(text: string, diagnostic: Diagnostic) {
  const index = new LineIndex(text);
  const start = index.position(diagnostic.span.start);
  const end = index.position(diagnostic.span.end);
  const last = start.line === end.line ? end.character : `line ${end.line + 1}`;
  const place = `${start.line + 1}:${start.character}-${last} ${diagnostic.code}`;
  return { place, said: `${diagnostic.message} | ${diagnostic.hint ?? ""}` };
}

/** Takes the fix with that title and gives the text behind it, without the version line. */
export function fixed(text: string, title: string, files: Readonly<Record<string, string>> = {}): string {
  const whole = versioned(text);
  const model = modelOf(whole, files);
  const fixes = model.diagnostics.flatMap((diagnostic) => diagnostic.fixes ?? []);
  const fix = fixes.find((each) => each.title === title);
  expect(fix, `of ${fixes.map((each) => each.title).join(" | ")}`).toBeDefined();
  const after = applyEdits(whole, fix?.edits ?? []);
  return after.replace(/^thrum 1\n/, "");
}

/** Codes that are said, in order. */
export const codesOf = (text: string, files: Readonly<Record<string, string>> = {}): string[] =>
  modelOf(text, files).diagnostics.map(({ code }) => code);

/** SI value of a let. */
export function siOf(text: string, name: string, caseIndex = 0): number {
  return instanceOf(text, caseIndex).parameters.get(name)?.value ?? Number.NaN;
}
