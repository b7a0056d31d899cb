import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { dirname, join } from "node:path";
import { describe, expect, it } from "vitest";
import { projectFiles, read, root } from "./files.ts";

const pages = projectFiles().filter((file) => file.endsWith(".md"));

describe("pages", () => {
  it("link only to what is there", () => {
    const links = pages.flatMap((page) =>
      [...read(page).matchAll(/\]\((?!https?:)([^)#\s]+)(?:#[^)]*)?\)/g)].map(([, target]) => ({
        page,
        target,
      })),
    );
    expect(links.length).toBeGreaterThan(10);
    expect(links.filter(({ page, target }) => !existsSync(join(root, dirname(page), target)))).toEqual([]);
  });

  it("name only scripts that package.json has", () => {
    const { scripts } = JSON.parse(read("package.json")) as { scripts: Record<string, string> };
    const named = pages.flatMap((page) =>
      [...read(page).matchAll(/`npm run ([a-z:-]+)/g)].map((match) => match[1]),
    );
    expect(named.filter((name) => !(name in scripts))).toEqual([]);
  });

  it("of the command line and of the start show what the program prints", () => {
    for (const script of ["tools/write-command-line.mjs", "tools/write-readme.mjs"]) {
      const { status, stderr } = spawnSync(process.execPath, [script, "--check"], {
        cwd: root,
        encoding: "utf8",
      });
      expect([script, status, stderr]).toEqual([script, 0, ""]);
    }
  });
});

describe("scripts of package.json", () => {
  it("run files that are there", () => {
    const { scripts } = JSON.parse(read("package.json")) as { scripts: Record<string, string> };
    const files = Object.values(scripts).flatMap((line) => line.match(/\S+\.mjs/g) ?? []);
    expect(files.length).toBeGreaterThan(4);
    expect(files.filter((file) => !existsSync(join(root, file)))).toEqual([]);
  });
});
