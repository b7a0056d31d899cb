#!/usr/bin/env node
import { version } from "../../package.json";

const args = process.argv.slice(2);
if (args.length === 1 && args[0] === "--version") console.log(`thrum ${version}`);
else {
  const [{ runCommand }, { processHost }] = await Promise.all([import("./run.ts"), import("./host.ts")]);
  // The server is a program of its own beside this one.
  const serve = () => import(new URL("../server/main.js", import.meta.url).href);
  process.exitCode = await runCommand(args, { ...processHost(), serve });
}
