/** Packs the extension into dist/thrum.vsix: builds, gathers third-party notices, and takes what `files` lists. */
import { mkdirSync, readdirSync, readFileSync, renameSync, statSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "./build.mjs";
import { root } from "./root.mjs";

export const vsix = join(root, "dist", "thrum.vsix");

/**
 * @param {{ builds?: boolean, to?: string, folder?: string }} [options]  `folder`: a copy to pack instead of the root
 * @returns {Promise<string>} path of the package
 */
export async function packExtension({ builds = true, to = vsix, folder = root } = {}) {
  if (builds) await build();
  // Whole at once: another packing may be reading it.
  const part = join(folder, `third-party-notices.${process.pid}.txt`);
  writeFileSync(part, notices());
  renameSync(part, join(folder, "third-party-notices.txt"));
  const { createVSIX } = await import("@vscode/vsce");
  mkdirSync(dirname(to), { recursive: true });
  await createVSIX({
    cwd: folder,
    packagePath: to,
    dependencies: false,
    allowMissingRepository: true,
    rewriteRelativeLinks: false,
    skipLicense: false,
  });
  return to;
}

/** Licence texts of everything that is bundled: the dependencies and what they bring. */
function notices() {
  const { dependencies } = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));
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
  for (const name of Object.keys(dependencies).sort()) visit(name);
  const rule = `\n${"-".repeat(78)}\n\n`;
  return `Thrum contains parts of the following packages.\n${rule}${[...seen.values()].join(rule)}`;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const path = await packExtension();
  console.log(`${path}, ${(statSync(path).size / 1e3).toFixed(0)} kB`);
}
