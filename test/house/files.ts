import { execFileSync } from "node:child_process";
import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

/** The folder of the repository. */
export const root = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

/** Every file that belongs to the project, relative to the root, in order: known to git or not yet, but not ignored. */
export function projectFiles(): string[] {
  const listed = execFileSync("git", ["ls-files", "--cached", "--others", "--exclude-standard"], {
    cwd: root,
    encoding: "utf8",
    maxBuffer: 1 << 26,
  });
  return listed
    .split("\n")
    .filter((file) => file !== "" && existsSync(join(root, file)))
    .sort();
}

export const read = (file: string): string => readFileSync(join(root, file), "utf8");
