#!/usr/bin/env node
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { version } from "../../package.json";
import { loadProgram } from "./load.ts";

async function start(args: readonly string[]): Promise<void> {
  const { runCommand, processHost } = loadProgram(__dirname).program;
  // The server is a program of its own beside this one.
  const serve = () => import(pathToFileURL(join(__dirname, "../server/main.js")).href);
  process.exitCode = await runCommand(args, Object.assign(processHost(), { serve }));
}

const args = process.argv.slice(2);
if (args.length === 1 && args[0] === "--version") console.log(`thrum ${version}`);
else void start(args);
