/** Brings node_modules to the state the lock file asks for, and only when it is not there yet. */
import { spawnSync } from "node:child_process";
import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./root.mjs";

/** True when every package of the lock file stands in node_modules in its version. */
export function isInstalled() {
  const installed = packagesOf(join(root, "node_modules", ".package-lock.json"));
  const wanted = packagesOf(join(root, "package-lock.json"));
  if (installed === undefined || wanted === undefined) return false;
  return Object.entries(wanted).every(
    ([path, entry]) => path === "" || entry.optional || installed[path]?.version === entry.version,
  );
}

/** Runs `npm ci` when node_modules is missing or stale. Ends the process when that fails. */
export function ensureInstalled() {
  if (isInstalled()) return;
  console.error("Installing the packages of package-lock.json");
  const run = spawnSync("npm", ["ci", "--no-audit", "--no-fund", "--loglevel=error"], {
    cwd: root,
    stdio: ["ignore", 2, 2],
    shell: process.platform === "win32",
  });
  if (run.status !== 0) {
    console.error("npm ci failed: the packages could not be installed");
    process.exit(2);
  }
}

function packagesOf(file) {
  return existsSync(file) ? JSON.parse(readFileSync(file, "utf8")).packages : undefined;
}
