/**
 * Runs the commands of README.md on its own model and puts their output below them, so that the page shows what the
 * program prints. Needs a build. Usage: node tools/write-readme.mjs [--check]
 */
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { root } from "./root.mjs";

const target = join(root, "README.md");
const page = readFileSync(target, "utf8");
const folder = mkdtempSync(join(tmpdir(), "thrum-readme-"));
writeFileSync(join(folder, "pump.thrum"), /```thrum\n([\s\S]*?)```/.exec(page)[1]);
const text = page.replace(/```\n\$ thrum (.*)\n[\s\S]*?```/g, (_, call) => {
  const { stdout } = spawnSync(process.execPath, [join(root, "dist/terminal/thrum.js"), ...call.split(" ")], {
    cwd: folder,
    encoding: "utf8",
    env: { ...process.env, FORCE_COLOR: "0" },
  });
  return `\`\`\`\n$ thrum ${call}\n\n${stdout.trimEnd()}\n\`\`\``;
});
rmSync(folder, { recursive: true });

if (!process.argv.includes("--check")) writeFileSync(target, text);
else if (text !== page) {
  console.error("README.md shows other output than the program prints: node tools/write-readme.mjs");
  process.exitCode = 1;
}
