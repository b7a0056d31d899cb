import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { join } from "node:path";
import { Script } from "node:vm";
import type * as Program from "./program.ts";

const PROGRAM = "program.cjs";
const COMPILED = "program.compiled";

/** The program with what it was compiled from. */
export interface Loaded {
  readonly program: typeof Program;
  readonly script: Script;
}

/**
 * Loads the bundle that lies in a folder. Most of a short command's time would go into compiling it, so the engine's
 * compiled form is taken from a file that the build left beside it (tools/compile.mjs). The engine refuses that form
 * when it was made by another version of itself or of a source of another length; then the source is compiled.
 */
export function loadProgram(folder: string): Loaded {
  const filename = join(folder, PROGRAM);
  // The build wraps the bundle into a function of `require, module, exports`; it is plain ASCII, which this reads fastest.
  const script = new Script(readFileSync(filename, "latin1"), { filename, cachedData: compiledForm(folder) });
  const module = { exports: {} };
  script.runInThisContext()(createRequire(filename), module, module.exports);
  return { program: module.exports as typeof Program, script };
}

export const compiledFile = (folder: string): string => join(folder, COMPILED);

function compiledForm(folder: string): Buffer | undefined {
  try {
    return readFileSync(compiledFile(folder));
  } catch {
    return undefined;
  }
}
