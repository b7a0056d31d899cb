import { mkdirSync, writeFileSync } from "node:fs";
import { join, resolve } from "node:path";
import type { TextFile } from "../../shared-core/index.ts";
import { UsageError } from "./call.ts";
import type { Host } from "./host.ts";
import { shownPath } from "./workspace.ts";

/** Writes files into a folder, which is made when it is not there; hands back their paths as they are shown. */
export function writeFiles(folder: string, files: readonly TextFile[], host: Host): string[] {
  const target = resolve(host.cwd, folder);
  attempt(() => mkdirSync(target, { recursive: true }), shownPath(target, host.cwd));
  return files.map(({ name, text }) => {
    const path = join(target, name);
    const shown = shownPath(path, host.cwd);
    attempt(() => writeFileSync(path, text), shown);
    return shown;
  });
}

/** Does something to a file; what the system refuses is told with the path. */
export function attempt(act: () => void, shown: string): void {
  try {
    act();
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    throw new UsageError(`${shown} cannot be written: ${REASONS[code ?? ""] ?? message}`);
  }
}

const REASONS: Readonly<Record<string, string>> = {
  EACCES: "no permission",
  EPERM: "no permission",
  EROFS: "the file system takes no writing",
  ENOSPC: "no space is left",
  EEXIST: "a file of that name is in the way",
  ENOTDIR: "a file is in the way",
  EISDIR: "a folder is in the way",
};
