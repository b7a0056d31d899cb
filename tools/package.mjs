/**
 * Packs the extension into dist/thrum.vsix: builds, gathers third-party notices, and takes what `files` of package.json
 * lists. Usage: node tools/package.mjs
 */
import {
  cpSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "./build.mjs";
import { root } from "./root.mjs";

export const vsix = join(root, "dist", "thrum.vsix");

const NOTICES = "third-party-notices.txt";

/**
 * @param {{ builds?: boolean, to?: string, host?: "web" }} [options]  `host`: without the entry for Node
 * @returns {Promise<string>} path of the package
 */
export async function packExtension({ builds = true, to = vsix, host } = {}) {
  if (builds) await build();
  const folder = mkdtempSync(join(tmpdir(), "thrum-package-"));
  try {
    stage(folder, host);
    const { createVSIX } = await import("@vscode/vsce");
    mkdirSync(dirname(to), { recursive: true });
    await createVSIX({
      cwd: folder,
      packagePath: to,
      dependencies: false,
      allowMissingRepository: true,
      rewriteRelativeLinks: false,
    });
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  return to;
}

/** Puts everything that is packed into a folder of its own, where nothing changes meanwhile. */
function stage(folder, host) {
  // A browser's extension host takes a package of type `module` for one that it cannot run.
  const { type: _, ...manifest } = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));
  const { scripts, bin, dependencies, devDependencies, sideEffects, ...shipped } = manifest;
  if (host === "web") delete shipped.main;
  for (const entry of shipped.files) {
    if (entry !== NOTICES) cpSync(join(root, entry), join(folder, entry), { recursive: true });
  }
  // The pictures of the page are larger than all else together.
  const page = readFileSync(join(folder, "README.md"), "utf8").replace(/^!\[[^\]]*\]\([^)]*\)\n\n/gm, "");
  writeFileSync(join(folder, "README.md"), page);
  writeFileSync(join(folder, "package.json"), JSON.stringify(shipped, null, 2));
  writeFileSync(join(folder, "dist", "server", "package.json"), '{ "type": "module" }\n');
  writeFileSync(join(folder, NOTICES), notices(Object.keys(dependencies)));
}

/** Licence texts of everything that is bundled: the dependencies and what they bring. */
function notices(dependencies) {
  const seen = new Map();
  const visit = (name) => {
    if (seen.has(name)) return;
    const folder = join(root, "node_modules", name);
    let manifest;
    try {
      manifest = JSON.parse(readFileSync(join(folder, "package.json"), "utf8"));
    } catch {
      return;
    }
    const file = readdirSync(folder).find((entry) => /^licen[cs]e/i.test(entry));
    const text =
      file && statSync(join(folder, file)).isFile() ? readFileSync(join(folder, file), "utf8").trim() : "";
    seen.set(name, `${name} ${manifest.version} (${manifest.license})\n\n${text}\n`);
    for (const next of Object.keys(manifest.dependencies ?? {})) visit(next);
  };
  for (const name of dependencies.sort()) visit(name);
  const rule = `\n${"-".repeat(78)}\n\n`;
  return `Thrum contains parts of the following packages.\n${rule}${[...seen.values()].join(rule)}`;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const path = await packExtension();
  console.log(`${path}, ${(statSync(path).size / 1e3).toFixed(0)} kB`);
}
