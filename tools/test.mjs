/**
 * Everything the tests need, then all of them. The last line says `N passed, N failed`. With arguments
 * (`npm test -- test/units`) only those tests run, without the checks before them.
 */
import { spawnSync } from "node:child_process";
import { mkdirSync, readFileSync, rmSync } from "node:fs";
import { join } from "node:path";
import { ensureInstalled } from "./install.mjs";
import { root } from "./root.mjs";
import { ensureSystemPackages } from "./system-packages.mjs";

const counts = { passed: 0, failed: 0 };
const chosen = process.argv.slice(2);

ensureInstalled();
ensureSystemPackages();
step("build", "tools/build.mjs", []);
if (chosen.length === 0) {
  step("format and lint", "node_modules/@biomejs/biome/bin/biome", ["check", "--error-on-warnings", "."]);
  step("types of shared-core", "node_modules/typescript/bin/tsc", ["-p", "shared-core"]);
  step("types of the rest", "node_modules/typescript/bin/tsc", ["-p", "."]);
}
vitest(chosen);
console.log(`${counts.passed} passed, ${counts.failed} failed`);
process.exitCode = counts.failed === 0 ? 0 : 1;

/** One check that is a program of its own counts as one test. */
function step(name, script, args) {
  const run = spawnSync(process.execPath, [join(root, script), ...args], { cwd: root, stdio: "inherit" });
  const ok = run.status === 0;
  counts[ok ? "passed" : "failed"]++;
  console.log(`${ok ? "passed" : "failed"}: ${name}`);
}

/** Every test that did not pass counts as failed, one that did not run too; so does a file that did not load. */
function vitest(args) {
  const output = join(root, ".cache", "vitest.json");
  mkdirSync(join(root, ".cache"), { recursive: true });
  rmSync(output, { force: true });
  const run = spawnSync(
    process.execPath,
    [
      join(root, "node_modules/vitest/vitest.mjs"),
      "run",
      "--reporter=default",
      "--reporter=json",
      `--outputFile.json=${output}`,
      ...args,
    ],
    { cwd: root, stdio: "inherit", env: plainEnvironment() },
  );
  const before = counts.failed;
  try {
    for (const file of JSON.parse(readFileSync(output, "utf8")).testResults) {
      const passed = file.assertionResults.filter((test) => test.status === "passed").length;
      counts.passed += passed;
      counts.failed += file.assertionResults.length - passed;
      if (file.assertionResults.length === 0) counts.failed++;
    }
  } catch (error) {
    console.log(`The test run left no result: ${error.message}`);
    counts.failed++;
  }
  if (run.status !== 0 && counts.failed === before) counts.failed++;
}

/** No colour where the output is not looked at on a terminal. */
function plainEnvironment() {
  if (process.stdout.isTTY) return process.env;
  const { FORCE_COLOR: _, ...rest } = process.env;
  return { ...rest, NO_COLOR: "1" };
}
