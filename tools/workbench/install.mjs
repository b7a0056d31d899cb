/**
 * Puts a real VS Code workbench (the npm package code-server with VS Code 1.100.3) into the user's cache folder,
 * where every clone finds it. Only from package registries; takes about a minute, once.
 */
import { spawnSync } from "node:child_process";
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { homedir } from "node:os";
import { delimiter, join } from "node:path";

const VERSION = "4.100.3";

const cache = join(process.env.XDG_CACHE_HOME ?? join(homedir(), ".cache"), "thrum");
const home = join(cache, `workbench-${VERSION}`);

/** The program to start, when the workbench is complete. */
export const workbenchProgram = join(home, "node_modules", "code-server", "out", "node", "entry.js");

const complete = join(home, "complete");

/** Installs it when it is not there yet. Throws with the output of the step that failed. */
export function ensureWorkbench() {
  if (existsSync(complete)) {
    linkSearch(join(home, "node_modules", "code-server", "lib", "vscode"));
    return;
  }
  console.error(`Installing the workbench for editor tests into ${home}`);
  mkdirSync(cache, { recursive: true });
  // A half-made folder of an interrupted run is made anew.
  const fresh = `${home}.${process.pid}`;
  rmSync(fresh, { recursive: true, force: true });
  mkdirSync(fresh, { recursive: true });
  writeFileSync(join(fresh, "package.json"), '{ "private": true }\n');
  // Its install scripts would download a search program from elsewhere, so each native part is built by name.
  npm(fresh, ["install", `code-server@${VERSION}`, "--ignore-scripts"]);
  const editor = join(fresh, "node_modules", "code-server", "lib", "vscode");
  npm(editor, ["install", "--omit=dev", "--ignore-scripts"]);
  npm(editor, ["rebuild", "@vscode/spdlog", "native-watchdog"]);
  symlinkSync("node_modules", join(editor, "node_modules.asar"));
  npm(fresh, ["rebuild", "argon2"]);
  linkSearch(editor);
  writeFileSync(join(fresh, "complete"), `${VERSION}\n`);
  rmSync(home, { recursive: true, force: true });
  renameSync(fresh, home);
  for (const left of readdirSync(cache)) {
    if (left.startsWith(`workbench-${VERSION}.`)) rmSync(join(cache, left), { recursive: true, force: true });
  }
}

/** The editor looks for files with ripgrep, which its package would download; the system's own does as well. */
function linkSearch(editor) {
  const program = (process.env.PATH ?? "").split(delimiter).map((folder) => join(folder, "rg"));
  const found = program.find((path) => existsSync(path));
  if (!found) throw new Error("No ripgrep found: apt-get install -y ripgrep");
  const folder = join(editor, "node_modules", "@vscode", "ripgrep", "bin");
  mkdirSync(folder, { recursive: true });
  rmSync(join(folder, "rg"), { force: true });
  symlinkSync(found, join(folder, "rg"));
}

function npm(folder, args) {
  const run = spawnSync("npm", [...args, "--no-audit", "--no-fund", "--loglevel=error"], {
    cwd: folder,
    encoding: "utf8",
    env: { ...process.env, npm_config_ignore_scripts: args[0] === "rebuild" ? "false" : "true" },
  });
  if (run.status !== 0) {
    throw new Error(`npm ${args.join(" ")} in ${folder} failed:\n${run.stdout}\n${run.stderr}`);
  }
}
