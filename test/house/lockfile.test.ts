import { expect, it } from "vitest";
import { read } from "./files.ts";

interface Entry {
  readonly version?: string;
  readonly integrity?: string;
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

it("answers to package.json", () => {
  const wanted = JSON.parse(read("package.json"));
  const locked = lock.packages[""] as Record<string, unknown>;
  for (const part of ["dependencies", "devDependencies"]) expect(locked[part]).toEqual(wanted[part]);
});
