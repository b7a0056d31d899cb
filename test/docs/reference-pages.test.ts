import { spawnSync } from "node:child_process";
import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { expect, test } from "vitest";
import { type FileReader, understand } from "../../shared-core/index.ts";
import { ASKS, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";

const folder = new URL("../../docs/reference/", import.meta.url);

test("the pages are what their script writes", () => {
  const script = fileURLToPath(new URL("../../tools/make-reference.mjs", import.meta.url));
  const run = spawnSync(process.execPath, [script, "--check"], { encoding: "utf8" });
  expect(run.stderr).toBe("");
  expect(run.status).toBe(0);
});

/** Files that an example reads beside itself. */
function readerOf(example: string): FileReader {
  const files = [...STATEMENTS, ...ASKS].find(
    (each) => each.example.trimEnd() === example.trimEnd(),
  )?.exampleFiles;
  return {
    read(path) {
      const text = files?.[path];
      return text === undefined ? { ok: false, why: "missing", detail: "" } : { ok: true, text };
    },
  };
}

const pages = readdirSync(folder).filter((name) => !["README.md", "functions.md", "units.md"].includes(name));

test.each(pages)("the example of %s stands as a model, or says honestly what is not computed", (page) => {
  const text = readFileSync(new URL(page, folder), "utf8");
  const [, example] = /```thrum\n([\s\S]*?)```/.exec(text) ?? [];
  expect(example).toBeDefined();
  const allowed = new Set(["not-yet-computed"]);
  const codes = understand(`${page}.thrum`, example, readerOf(example)).diagnostics.map(({ code }) => code);
  expect(codes.filter((code) => !allowed.has(code))).toEqual([]);
});
