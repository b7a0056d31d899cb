/**
 * Throws broken text at everything that reads text, ten times as long as the tests do: `npm run fuzz`, or
 * `npm run fuzz -- 50` for fifty times. Seeds are fixed, so a find can be looked at again.
 */
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { ensureInstalled } from "./install.mjs";
import { root } from "./root.mjs";

const DAY = 24 * 3600 * 1000;

const times = Number(process.argv[2] ?? 10);
if (!(times > 0)) {
  console.error(`fuzz takes how many times as long as the tests, found ${process.argv[2]}`);
  process.exit(2);
}
ensureInstalled();
const vitest = join(root, "node_modules", "vitest", "vitest.mjs");
const run = spawnSync(process.execPath, [vitest, "run", "test/fuzz", `--testTimeout=${DAY}`], {
  cwd: root,
  stdio: "inherit",
  env: { ...process.env, THRUM_FUZZ_TIMES: String(times) },
});
process.exitCode = run.status ?? 1;
