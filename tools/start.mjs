/** Shows what Thrum does: installs and builds what is missing, then answers and judges a bundled example. */
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { build } from "./build.mjs";
import { root } from "./root.mjs";

const EXAMPLE = "examples/ventilation-fan.thrum";
const program = join(root, "dist", "terminal", "thrum.js");

await build();
const answered = run("answer", EXAMPLE, "modes");
const judged = run("check", EXAMPLE);
console.log(
  "\nMore: npx thrum help, README.md, every file in examples/; npm run editor shows them as you type",
);
// A model with a failed expectation (1) has been judged all the same; 2 means that nothing was shown.
process.exitCode = [answered, judged].every((status) => status === 0 || status === 1) ? 0 : 1;

function run(...args) {
  console.log(`\n$ thrum ${args.join(" ")}\n`);
  return spawnSync(process.execPath, [program, ...args], { cwd: root, stdio: "inherit" }).status;
}
