/** Bundles a script that uses the sheet's harness and runs it: `node tools/run-harness.mjs SCRIPT [ARGUMENT…]`. */
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { root } from "./root.mjs";

const [script, ...rest] = process.argv.slice(2);
if (script === undefined) {
  console.error("Which script? tools/bench/sheet.ts or tools/sheet-pictures.ts");
  process.exit(2);
}
const esbuild = await import("esbuild");
// Two folders deep, as the harness itself, which finds the repository from there.
const outfile = join(root, ".cache", "harness", "run.mjs");
await esbuild.build({
  absWorkingDir: root,
  entryPoints: [script],
  outfile,
  bundle: true,
  platform: "node",
  target: "node20",
  format: "esm",
  packages: "external",
  logLevel: "warning",
});
process.exitCode =
  spawnSync(process.execPath, [outfile, ...rest], { cwd: root, stdio: "inherit" }).status ?? 1;
