/**
 * Writes docs/command-line.md from the command table. Usage: node tools/write-command-line.mjs [--check]
 */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { transform } from "esbuild";
import { root } from "./root.mjs";

const target = join(root, "docs", "command-line.md");
const { COMMANDS } = await load("client/terminal/commands.ts");
const { commandLinePage } = await load("client/terminal/help.ts");
const text = commandLinePage(COMMANDS);

if (!process.argv.includes("--check")) writeFileSync(target, text);
else if (readFileSync(target, "utf8") !== text) {
  console.error("docs/command-line.md is not what tools/write-command-line.mjs writes");
  process.exitCode = 1;
}

/** Loads one file alone: what it imports are types, and commands that are only loaded when they run. */
async function load(file) {
  const { code } = await transform(readFileSync(join(root, file), "utf8"), { loader: "ts", format: "esm" });
  return import(`data:text/javascript,${encodeURIComponent(code)}`);
}
