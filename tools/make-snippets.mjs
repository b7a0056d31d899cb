/** Writes snippets/thrum.json from the vocabulary. Usage: node tools/make-snippets.mjs [--check] */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { loadCore } from "./load-core.mjs";
import { root } from "./root.mjs";

const target = join(root, "snippets", "thrum.json");
const { STATEMENTS, ASKS } = await loadCore("shared-core/vocabulary/registry.ts");
const snippets = {};
for (const { keyword, variant, says, snippet } of [
  ...STATEMENTS.filter((s) => s.keyword !== "ask"),
  ...ASKS,
]) {
  const name = variant ? `${keyword} ${variant}` : keyword;
  snippets[name] = { prefix: name, description: says, body: snippet.split("\n") };
}
const text = `${JSON.stringify(snippets, null, 2)}\n`;
if (process.argv.includes("--check")) {
  if (readFileSync(target, "utf8") !== text) {
    console.error("snippets/thrum.json is not what tools/make-snippets.mjs writes");
    process.exit(1);
  }
} else {
  writeFileSync(target, text);
}
