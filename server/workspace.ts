import { folderOf, keyOf, nameOf, pathBelow, schemeOf, uriOf } from "./uris.ts";

/** Where a file stands: its path below the folder that paths of messages and of `use` are relative to. */
export interface Place {
  /** URI of the workspace folder, or of the file's own folder when it lies in none. */
  readonly folder: string;
  readonly file: string;
}

/** The folders that are open in the editor. */
export class Workspace {
  #folders: string[] = [];

  get folders(): readonly string[] {
    return this.#folders;
  }

  change(added: readonly string[], removed: readonly string[] = []): void {
    const gone = new Set(removed.map(keyOf));
    const kept = this.#folders.filter((folder) => !gone.has(keyOf(folder)));
    const known = new Set(kept.map(keyOf));
    this.#folders = [...kept, ...added.filter((folder) => !known.has(keyOf(folder)))];
  }

  /** The innermost folder counts. A file that was never saved stands in the first folder. */
  locate(uri: string): Place {
    let best: Place | undefined;
    for (const folder of this.#folders) {
      const file = pathBelow(folder, uri);
      if (file !== undefined && (best === undefined || file.length < best.file.length))
        best = { folder, file };
    }
    if (best) return best;
    const [first] = this.#folders;
    if (schemeOf(uri) === "untitled" && first) return { folder: first, file: nameOf(uri) };
    return { folder: folderOf(uri), file: nameOf(uri) };
  }

  /** Whether diagnostics of it are shown: never of one side of a comparison, an output, a settings page. */
  shows(uri: string): boolean {
    const scheme = schemeOf(uri);
    if (scheme === "file" || scheme === "untitled") return true;
    return this.#folders.some((folder) => schemeOf(folder) === scheme);
  }

  uriOf({ folder }: Pick<Place, "folder">, path: string): string {
    return uriOf(folder, path);
  }
}
