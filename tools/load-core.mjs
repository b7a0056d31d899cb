/** Bundles a module of the core and loads it, for scripts that write files from what the core knows. */
import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { root } from "./root.mjs";

/** @param {string} path  relative to the repository, as `shared-core/vocabulary/registry.ts` */
export async function loadCore(path) {
  const esbuild = await import("esbuild");
  const folder = join(root, ".cache", "core");
  mkdirSync(folder, { recursive: true });
  const outfile = join(folder, `${path.replaceAll("/", "-")}.${process.pid}.mjs`);
  await esbuild.build({
    absWorkingDir: root,
    entryPoints: [path],
    outfile,
    bundle: true,
    platform: "neutral",
    format: "esm",
    logLevel: "warning",
  });
  return import(pathToFileURL(outfile).href);
}
