import { resolve } from "node:path";
import type { FileContent } from "../../shared-core/index.ts";
import { type Call, UsageError } from "./call.ts";
import type { Host } from "./host.ts";
import { decode, readText, shownPath, statOf } from "./workspace.ts";

/** A file to work on. `path` is relative to the working folder, with `/`. */
export interface Source {
  readonly path: string;
  readonly content: FileContent;
  readonly standardInput: boolean;
}

const STANDARD_INPUT = "-";

/** The files that the operands mean, each once, in the order of the operands; `unmatched`: those that mean none. */
export interface Selection {
  readonly sources: readonly Source[];
  readonly unmatched: readonly string[];
}

/** Reads files, folders (every `.thrum` below), patterns and standard input. */
export async function select(call: Call): Promise<Selection> {
  const { host } = call;
  const paths: string[] = [];
  const unmatched: string[] = [];
  for (const operand of call.operands) {
    const found = await expand(operand, host);
    if (found.length === 0) unmatched.push(operand);
    paths.push(...found);
  }
  const sources: Source[] = [];
  for (const path of new Set(paths)) sources.push(await read(path, call));
  return { sources, unmatched };
}

/** The one file that a command works on. */
export async function selectOne(call: Call): Promise<Source> {
  return read(call.operands[0], call);
}

/** Says on stderr which operands matched nothing; true when there were any. */
export function reportUnmatched(selection: Selection, host: Host): boolean {
  for (const operand of selection.unmatched) host.stderr.write(`thrum: no model matches ${operand}\n`);
  return selection.unmatched.length > 0;
}

async function expand(operand: string, host: Host): Promise<readonly string[]> {
  if (operand === STANDARD_INPUT) return [operand];
  const info = statOf(resolve(host.cwd, operand));
  if (info?.isDirectory()) return search("**/*.thrum", resolve(host.cwd, operand));
  if (info) return [resolve(host.cwd, operand)];
  const { isDynamicPattern } = await import("./patterns.ts");
  if (!isDynamicPattern(operand)) return [resolve(host.cwd, operand)];
  return search(operand, host.cwd);
}

async function search(pattern: string, cwd: string): Promise<readonly string[]> {
  const { glob } = await import("./patterns.ts");
  const ignore = ["**/node_modules/**", "**/.git/**"];
  const found = await glob(pattern, {
    cwd,
    absolute: true,
    onlyFiles: true,
    expandDirectories: false,
    ignore,
  });
  return found.sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));
}

async function read(path: string, call: Call): Promise<Source> {
  const { cwd } = call.host;
  if (path !== STANDARD_INPUT) {
    const full = resolve(cwd, path);
    return { path: shownPath(full, cwd), content: readText(full), standardInput: false };
  }
  const name = call.value("stdin-filename") ?? "standard-input.thrum";
  if (name.endsWith("/")) throw new UsageError(`--stdin-filename needs the path of a file, found ${name}`);
  const content = await readStandardInput(call.host);
  return { path: shownPath(resolve(cwd, name), cwd), content, standardInput: true };
}

async function readStandardInput(host: Host): Promise<FileContent> {
  const chunks: Buffer[] = [];
  for await (const chunk of host.stdin) chunks.push(typeof chunk === "string" ? Buffer.from(chunk) : chunk);
  return decode(Buffer.concat(chunks));
}
