import { expect, it } from "vitest";
import { read } from "./files.ts";

interface Package {
  readonly dependencies: Record<string, string>;
  readonly devDependencies: Record<string, string>;
}

const { dependencies, devDependencies } = JSON.parse(read("package.json")) as Package;
const names = [...Object.keys(dependencies), ...Object.keys(devDependencies)];

/** Rows of the tables with a licence column: names in the first cell, the licence in the second. */
const rows = read("docs/dependencies.md")
  .split("\n## Looked at")[0]
  .split("\n")
  .filter((line) => line.startsWith("| ") && !line.startsWith("| package"))
  .map((line) => line.split("|").map((cell) => cell.trim()))
  .flatMap(([, cell, licence]) => cell.split(", ").map((name) => ({ name, licence })));

it("docs/dependencies.md lists every direct dependency, and no other", () => {
  expect(rows.map((row) => row.name).sort()).toEqual([...names].sort());
});

it("says the licence that each package states", () => {
  const stated = rows.map(({ name }) => ({
    name,
    licence: (JSON.parse(read(`node_modules/${name}/package.json`)) as { license: string }).license,
  }));
  expect(rows).toEqual(stated);
});
