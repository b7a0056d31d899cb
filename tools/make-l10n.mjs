/**
 * Writes l10n/bundle.l10n.json: every text that the extension shows by itself, for those who translate it.
 * Usage: node tools/make-l10n.mjs [--check]
 */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { globSync } from "tinyglobby";
import { root } from "./root.mjs";

const target = join(root, "l10n", "bundle.l10n.json");
const texts = new Set();
for (const file of globSync("client/extension/**/*.ts", { cwd: root })) {
  const source = readFileSync(join(root, file), "utf8");
  for (const [, text] of source.matchAll(/\bl10n\.t\(\s*("(?:[^"\\]|\\.)*")/g)) texts.add(JSON.parse(text));
}
const bundle = Object.fromEntries([...texts].sort().map((text) => [text, text]));
const text = `${JSON.stringify(bundle, null, 2)}\n`;
if (!process.argv.includes("--check")) writeFileSync(target, text);
else if (readFileSync(target, "utf8") !== text) {
  console.error("l10n/bundle.l10n.json is not what tools/make-l10n.mjs writes");
  process.exitCode = 1;
}
