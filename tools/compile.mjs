/**
 * Leaves the engine's compiled form of the terminal program beside it, with all functions that common commands use.
 * It is taken from a run, so this runs as a process of its own. Usage: node tools/compile.mjs FOLDER
 */
import { writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { join, resolve } from "node:path";
import { Readable } from "node:stream";
import { root } from "./root.mjs";

const folder = resolve(process.argv[2]);
const { loadProgram, compiledFile } = createRequire(import.meta.url)(join(folder, "load.js"));

const COMMANDS = [
  ["check", "examples/ventilation-fan.thrum"],
  ["check", "examples/ventilation-fan.thrum", "--json"],
  ["answer", "examples/ventilation-fan.thrum"],
];

const { program, script } = loadProgram(folder);
const silent = { write: () => {}, isTerminal: false, width: 100 };
for (const command of COMMANDS) {
  const host = { cwd: root, env: {}, stdin: Readable.from([]), stdout: silent, stderr: silent };
  await program.runCommand(command, host);
}
writeFileSync(compiledFile(folder), script.createCachedData());
