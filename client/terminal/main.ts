#!/usr/bin/env node
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { version } from "../../package.json";
import { loadProgram } from "./load.ts";

async function start(args: readonly string[]): Promise<void> {
  const { runCommand, processHost } = loadProgram(__dirname).program;
  // The server is a program of its own beside this one.
  const serve = () => import(pathToFileURL(join(__dirname, "../server/main.js")).href);
  const host = Object.assign(processHost(), { serve });
  const status = await runCommand(args, host);
  await host.flush();
  // Nothing is left to wait for: taking everything down piece by piece would take longer than a short command.
  process.exit(status);
}

const args = process.argv.slice(2);
if (args.length === 1 && args[0] === "--version") console.log(`thrum ${version}`);
else void start(args);
