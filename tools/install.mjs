/** Brings node_modules to the state the lock file asks for, and only when it is not there yet. */
import { spawnSync } from "node:child_process";
import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./root.mjs";

/**
 * True when every package of the lock file stands in node_modules in its version.
 * @param {"all" | "build"} wanted  `build`: without what only tests and checks need
 */
export function isInstalled(wanted) {
  const installed = packagesOf(join(root, "node_modules", ".package-lock.json"));
  const locked = packagesOf(join(root, "package-lock.json"));
  if (installed === undefined || locked === undefined) return false;
  return Object.entries(locked).every(
    ([path, entry]) =>
      path === "" ||
      entry.optional ||
      entry.devOptional ||
      (wanted === "build" && entry.dev) ||
      installed[path]?.version === entry.version,
  );
}

/**
 * Installs what is wanted when it is missing or stale; ends the process when that fails. A first installation for a
 * build takes only what a build needs; what is there already is never made less.
 */
export function ensureInstalled(wanted = "all") {
  if (isInstalled(wanted)) return;
  console.error("Installing the packages of package-lock.json");
  const less = wanted === "build" && !existsSync(join(root, "node_modules")) ? ["--omit=dev"] : [];
  const run = spawnSync("npm", ["ci", ...less, "--no-audit", "--no-fund", "--loglevel=error"], {
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
