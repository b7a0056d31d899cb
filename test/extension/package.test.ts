import { mkdtempSync, readFileSync, rmSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { packExtension } from "../../tools/package.mjs";
import { manifest } from "./manifest.ts";
import { unzip } from "./zip.ts";

const folder = mkdtempSync(join(tmpdir(), "thrum-vsix-"));
const vsix = join(folder, "thrum.vsix");
const files = new Map<string, Buffer>();

beforeAll(async () => {
  await packExtension({ builds: false, to: vsix });
  for (const [name, data] of unzip(readFileSync(vsix))) {
    if (name.startsWith("extension/")) files.set(name.slice("extension/".length), data);
  }
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const packed = (name: string) => files.get(name)?.toString("utf8") ?? "";

describe("the package", () => {
  it("is at most 1 MB", () => {
    expect(statSync(vsix).size).toBeLessThan(1e6);
  });

  it("holds what the manifest lists, and nothing else", () => {
    // The packing program writes these three names in small letters, or with an ending.
    const renamed: Readonly<Record<string, string>> = {
      "README.md": "readme.md",
      "CHANGELOG.md": "changelog.md",
      LICENSE: "LICENSE.txt",
    };
    const names = [...files.keys()];
    const listed = [...manifest.files.map((entry) => renamed[entry] ?? entry), "package.json"];
    expect(names.length).toBeGreaterThan(20);
    expect(
      names.filter((name) => !listed.some((entry) => name === entry || name.startsWith(`${entry}/`))),
    ).toEqual([]);
    expect(
      listed.filter((entry) => !names.some((name) => name === entry || name.startsWith(`${entry}/`))),
    ).toEqual([]);
  });

  it("holds no source, no source map and no address of one", () => {
    const names = [...files.keys()];
    expect(names.filter((name) => /\.(ts|map)$/.test(name))).toEqual([]);
    for (const name of names.filter((each) => /\.c?js$/.test(each)))
      expect(packed(name)).not.toMatch(/sourceMappingURL=/);
  });

  it("names the licence of every dependency", () => {
    const notices = packed("third-party-notices.txt");
    for (const name of Object.keys(manifest.dependencies))
      expect(notices).toMatch(new RegExp(`^${name} \\d.*\\(.+\\)$`, "m"));
  });

  it("has an icon of 128 points or more", () => {
    const png = files.get(manifest.icon) ?? Buffer.alloc(24);
    // PNG (ISO/IEC 15948): width and height are the first words of the header.
    expect(png.readUInt32BE(16)).toBeGreaterThanOrEqual(128);
    expect(png.readUInt32BE(20)).toBe(png.readUInt32BE(16));
  });

  it("asks for nothing of Node where there is none", () => {
    for (const name of [manifest.browser.slice(2), "dist/server/core.cjs"]) {
      expect(packed(name).length).toBeGreaterThan(1e5);
      const asked = [...packed(name).matchAll(/\b(?:require|import)\("([^"]+)"\)/g)].map(
        ([, module]) => module,
      );
      expect(
        [...new Set(asked)].filter((module) => module !== "vscode"),
        name,
      ).toEqual([]);
    }
  });

  it("is not of the kind that a browser's host refuses", () => {
    expect(JSON.parse(packed("package.json")).type).toBeUndefined();
    expect(manifest.browser).toMatch(/\.js$/);
    expect(packed("package.json")).not.toMatch(/"(scripts|dependencies|devDependencies)"/);
  });
});
