import { init } from "es-module-lexer";
import { beforeAll, describe, expect, it } from "vitest";
import { breach, type Import, importsOf } from "./direction.ts";
import { projectFiles, read } from "./files.ts";

beforeAll(() => init);

describe("imports go one way", () => {
  it("holds in every source file", () => {
    const sources = projectFiles().filter((file) => /^(shared-core|server|client)\/.*\.ts$/.test(file));
    const imports = sources.flatMap((file) => importsOf(file, read(file)));
    expect(imports.length).toBeGreaterThan(20);
    expect(imports.map(breach).filter((message) => message !== undefined)).toEqual([]);
  });

  it("reads every form of import", () => {
    const text = [
      'import type { A } from "./a.ts";',
      'import { type B } from "../b.ts";',
      'export * from "./c.ts";',
      'const d = await import("./d.ts");',
      'type E = import("./e.ts").E;',
    ].join("\n");
    expect(importsOf("shared-core/model/x.ts", text).map((line) => line.to)).toEqual([
      "shared-core/model/a.ts",
      "shared-core/b.ts",
      "shared-core/model/c.ts",
      "shared-core/model/d.ts",
      "shared-core/model/e.ts",
    ]);
  });

  it.each<[string, string, boolean]>([
    ["shared-core/model/model.ts", "shared-core/syntax/tree.ts", true],
    ["shared-core/syntax/tree.ts", "shared-core/model/model.ts", false],
    ["shared-core/numerics/lu.ts", "shared-core/text/span.ts", false],
    ["shared-core/writing/json.ts", "shared-core/index.ts", false],
    ["shared-core/writing/json.ts", "node:fs", false],
    ["shared-core/writing/figure.ts", "d3-scale", true],
    ["shared-core/index.ts", "shared-core/writing/json.ts", true],
    ["client/terminal/check.ts", "shared-core/index.ts", true],
    ["client/terminal/check.ts", "shared-core/model/model.ts", false],
    ["client/terminal/check.ts", "server/session.ts", false],
    ["client/terminal/main.ts", "server/session.ts", true],
    ["client/terminal/check.ts", "client/sheet/page.ts", false],
    ["client/terminal/check.ts", "node:fs", true],
  ])("%s -> %s: allowed %s", (from, to, allowed) => {
    const line: Import = { from, to, own: to.includes("/") };
    expect(breach(line) === undefined).toBe(allowed);
    if (!allowed) expect(breach(line)).toMatch(new RegExp(`${from}.*${to}`));
  });
});
