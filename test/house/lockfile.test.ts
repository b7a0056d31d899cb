import { expect, it } from "vitest";
import { read } from "./files.ts";

interface Entry {
  readonly version?: string;
  readonly integrity?: string;
  readonly dependencies?: Record<string, string>;
  readonly optionalDependencies?: Record<string, string>;
}

const lock = JSON.parse(read("package-lock.json")) as { packages: Record<string, Entry> };

it("names no address, so that any registry can serve the packages", () => {
  expect(read("package-lock.json")).not.toMatch(/"resolved"|https?:\/\/[^"]*\.tgz/);
});

it("holds every package by version and checksum", () => {
  const loose = Object.entries(lock.packages).filter(
    ([path, entry]) => path !== "" && (entry.version === undefined || entry.integrity === undefined),
  );
  expect(loose.map(([path]) => path)).toEqual([]);
  expect(Object.keys(lock.packages).length).toBeGreaterThan(10);
});

it("holds everything that a package in it asks for, the optional included", () => {
  const missing = Object.entries(lock.packages).flatMap(([path, entry]) =>
    Object.keys({ ...entry.dependencies, ...entry.optionalDependencies }).filter(
      (name) => !isLocked(path, name),
    ),
  );
  expect(missing).toEqual([]);
});

/** Looked for as Node does: beside what the package holds itself, then ever further out. */
function isLocked(path: string, name: string): boolean {
  for (let at = path; ; at = at.slice(0, Math.max(0, at.lastIndexOf("node_modules/") - 1))) {
    if (`${at === "" ? "" : `${at}/`}node_modules/${name}` in lock.packages) return true;
    if (at === "") return false;
  }
}

it("answers to package.json", () => {
  const wanted = JSON.parse(read("package.json"));
  const locked = lock.packages[""] as Record<string, unknown>;
  for (const part of ["dependencies", "devDependencies"]) expect(locked[part]).toEqual(wanted[part]);
});
