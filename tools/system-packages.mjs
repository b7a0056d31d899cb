/** Programs that some tests drive and that come from the system, not from npm. */
import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { delimiter, join } from "node:path";
import { root } from "./root.mjs";

/** `tests`: the folder that needs the program; while it does not exist, nothing is installed. */
const NEEDED = [
  { command: "git", apt: "git", tests: "test/house" },
  { command: "chromium", apt: "chromium", tests: "test/workbench" },
  { command: "rg", apt: "ripgrep", tests: "test/workbench" },
  { command: "nvim", apt: "neovim", tests: "test/protocol" },
];

/**
 * Installs what is missing when the user may (root on a Debian system); otherwise prints the one line that does it.
 * The tests that need a missing program are not left out: they run, and fail.
 */
export function ensureSystemPackages() {
  const missing = NEEDED.filter((need) => existsSync(join(root, need.tests)) && !onPath(need.command));
  if (missing.length === 0) return;
  const names = missing.map((need) => need.apt);
  if (process.getuid?.() === 0 && onPath("apt-get")) {
    console.error(`Installing ${names.join(", ")}`);
    apt(["update", "-qq"]);
    apt(["install", "-y", "-qq", "--no-install-recommends", ...names]);
  }
  const left = missing.filter((need) => !onPath(need.command));
  if (left.length === 0) return;
  console.error(`Tests in ${left.map((need) => need.tests).join(", ")} will fail until this has run:`);
  console.error(`  sudo apt-get install -y ${left.map((need) => need.apt).join(" ")}`);
}

function apt(args) {
  spawnSync("apt-get", args, {
    stdio: ["ignore", 2, 2],
    env: { ...process.env, DEBIAN_FRONTEND: "noninteractive" },
  });
}

function onPath(command) {
  return (process.env.PATH ?? "").split(delimiter).some((folder) => existsSync(join(folder, command)));
}
