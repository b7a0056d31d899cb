import { resolvePath } from "../model/files.ts";
import type { TextEdit } from "../text/span.ts";
import { insideQuotes, pathsOf } from "./links.ts";
import type { View } from "./view.ts";

/** A file or folder that gets another path; both relative to the root of the workspace. */
export interface Move {
  readonly from: string;
  readonly to: string;
}

/**
 * The edits in a model's text that keep its `use` and record paths leading to the same files when files or folders
 * move, the model's own among them. Only paths that would lead elsewhere are rewritten.
 */
export function moveEdits({ model }: View, moves: readonly Move[]): readonly TextEdit[] {
  const home = moved(model.file, moves);
  return pathsOf(model).flatMap(({ node }) => {
    const { text } = node;
    if (isAbsolute(text)) return [];
    const before = resolvePath(model.file, text);
    const after = moved(before, moves);
    if (resolvePath(home, text) === after) return [];
    const written = relativePath(home, after).replaceAll('"', '""');
    return [{ span: insideQuotes(node), text: written }];
  });
}

const isAbsolute = (path: string): boolean => path.startsWith("/") || /^[a-zA-Z][\w+.-]*:/.test(path);

/** Where a file is after the moves; the longest folder that holds it decides. */
function moved(path: string, moves: readonly Move[]): string {
  let best: Move | undefined;
  for (const move of moves) {
    const holds = path === move.from || path.startsWith(`${move.from}/`);
    if (holds && move.from.length > (best?.from.length ?? -1)) best = move;
  }
  return best ? best.to + path.slice(best.from.length) : path;
}

/** A path as it is written in a file. */
export function relativePath(from: string, to: string): string {
  const [folder, target] = [from.split("/").slice(0, -1), to.split("/")];
  let shared = 0;
  while (shared < folder.length && shared < target.length - 1 && folder[shared] === target[shared]) shared++;
  return [...folder.slice(shared).map(() => ".."), ...target.slice(shared)].join("/");
}
