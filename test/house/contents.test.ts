import { describe, expect, it } from "vitest";
import { projectFiles, read } from "./files.ts";

/** Files that are not prose or code of ours, or hold long numbers only. */
const NOT_READ = /(^|\/)(package-lock\.json|LICENSE)$|\.(png|wasm|ico|vsix)$|^test\/reference\/data\//;

/** What no file may hold. Patterns are put together here so that this file does not hold them either. */
const FORBIDDEN: readonly [what: string, pattern: RegExp][] = [
  ["a path of somebody's machine", new RegExp(["/", "(work|home|root|Users)", "/"].join(""))],
  ["a path outside the repository", new RegExp(["\\.\\./", "shared/"].join(""))],
  [
    "a host of a package registry",
    new RegExp(["registry\\.", "npmjs|unpkg\\.", "com|jsr\\.", "io"].join("")),
  ],
  ["a note of work undone", new RegExp(["\\bTO", "DO\\b|\\bFIX", "ME\\b|\\bX", "XX\\b"].join(""))],
  ["a merge conflict", /^(<{7}|>{7}) \S/m],
];

/** What no test may hold: a test left out, one that runs alone, one that is only planned. */
const FORBIDDEN_IN_TESTS: readonly [what: string, pattern: RegExp][] = [
  [
    "a skipped test",
    new RegExp(
      ["\\b(it|test|describe)\\.(each\\([^)]*\\)\\.)?", "(skip|only|todo|skipIf|runIf|fails)\\b"].join(""),
    ),
  ],
  ["a skip inside a test", new RegExp(["\\b(context|ctx|t)\\.", "skip\\("].join(""))],
];

/** The page of the code that finds them shows one. */
const SHOWN_ON_PURPOSE: ReadonlySet<string> = new Set([
  "docs/diagnostics/merge-conflict.md: a merge conflict",
]);

const files = projectFiles().filter((file) => !NOT_READ.test(file));

describe("what the files hold", () => {
  it("is nothing that does not belong", () => {
    expect(files.length).toBeGreaterThan(20);
    expect(files.flatMap((file) => findings(file, FORBIDDEN))).toEqual([]);
  });

  it("is, in tests, only tests that run", () => {
    const tests = files.filter((file) => file.startsWith("test/"));
    expect(tests.flatMap((file) => findings(file, FORBIDDEN_IN_TESTS))).toEqual([]);
  });

  it("is found when it is there", () => {
    const samples = [
      ["/", "home", "/someone"],
      ["../", "shared", "/x"],
      ["TO", "DO later"],
    ];
    for (const sample of samples) expect(matches(sample.join(""), FORBIDDEN)).toHaveLength(1);
    for (const word of ["skip", "only", "todo"])
      expect(matches(`it.${word}("x")`, FORBIDDEN_IN_TESTS)).toHaveLength(1);
  });
});

function findings(file: string, forbidden: typeof FORBIDDEN): string[] {
  const found = matches(read(file), forbidden);
  return found.filter((what) => !SHOWN_ON_PURPOSE.has(`${file}: ${what}`)).map((what) => `${file}: ${what}`);
}

function matches(text: string, forbidden: typeof FORBIDDEN): string[] {
  return forbidden.filter(([, pattern]) => pattern.test(text)).map(([what]) => what);
}
