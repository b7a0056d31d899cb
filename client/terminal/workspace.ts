import { existsSync, readFileSync, realpathSync, type Stats, statSync } from "node:fs";
import { dirname, isAbsolute, join, relative, resolve, sep } from "node:path";
import type { FileContent, FileReader } from "../../shared-core/index.ts";

/** Largest file that is read; beyond it a text is hardly a model or a record. */
const LARGEST_FILE = 256 * 2 ** 20;

/** The folder that holds a model's files: the nearest one above it with `.git`, else `cwd`, else the file's own. */
export function workspaceOf(file: string, cwd: string): string {
  const folder = dirname(real(file));
  for (let at = folder; ; at = dirname(at)) {
    if (existsSync(join(at, ".git"))) return at;
    if (dirname(at) === at) break;
  }
  const here = real(cwd);
  return isInside(folder, here) ? here : folder;
}

/** Reads used models and records for one model. Paths come relative to `cwd`; links are followed, then judged. */
export function workspaceReader(file: string, cwd: string): FileReader {
  const workspace = workspaceOf(resolve(cwd, file), cwd);
  return {
    read(path) {
      const full = resolve(cwd, path);
      const target = real(full);
      if (!isInside(target, workspace))
        return { ok: false, why: "outside", detail: `the workspace is ${shownPath(workspace, cwd)}` };
      return readText(target);
    },
  };
}

/** The text of a file, or why there is none. A byte order mark is left out. */
export function readText(path: string): FileContent {
  try {
    const info = statSync(path);
    if (info.isDirectory()) return { ok: false, why: "unreadable", detail: "it is a folder" };
    if (info.size > LARGEST_FILE)
      return { ok: false, why: "unreadable", detail: `${info.size} bytes are too many` };
    return decode(readFileSync(path));
  } catch (error) {
    return failure(error as NodeJS.ErrnoException);
  }
}

/** What the system knows of a path; undefined when it is not there or must not be looked at. */
export function statOf(path: string): Stats | undefined {
  try {
    return statSync(path);
  } catch {
    return undefined;
  }
}

/** UTF-8 or nothing: a text in another encoding must not lose characters. */
export function decode(bytes: Uint8Array): FileContent {
  try {
    return { ok: true, text: new TextDecoder("utf-8", { fatal: true }).decode(bytes) };
  } catch {
    return { ok: false, why: "unreadable", detail: "it is not UTF-8 text" };
  }
}

/** A path as it is shown: relative to `cwd`, with `/`. */
export function shownPath(path: string, cwd: string): string {
  return relative(cwd, path).split(sep).join("/") || ".";
}

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: "there is no such file",
  ENOTDIR: "there is no such file",
  EACCES: "no permission to read it",
  EPERM: "no permission to read it",
  ELOOP: "its links go in a circle",
};

function failure(error: NodeJS.ErrnoException): FileContent {
  const code = error.code ?? "";
  const why = code === "ENOENT" || code === "ENOTDIR" ? "missing" : "unreadable";
  return { ok: false, why, detail: REASONS[code] ?? `the system says ${code || error.message}` };
}

/** The path with its links followed, as far as it exists. */
function real(path: string): string {
  try {
    return realpathSync(path);
  } catch {
    const folder = dirname(path);
    return folder === path ? path : join(real(folder), relative(folder, path));
  }
}

function isInside(path: string, folder: string): boolean {
  const way = relative(folder, path);
  return way === "" || (way !== ".." && !way.startsWith(`..${sep}`) && !isAbsolute(way));
}
