import type { FileContent, FileReader } from "../shared-core/index.ts";
import type { Disk } from "./host.ts";
import { keyOf, uriOf } from "./uris.ts";
import type { Place } from "./workspace.ts";

/** Asks the client for a file. */
export type ClientRead = (uri: string) => Promise<FileContent>;

/** What one understanding of one model read. */
export interface Reading extends FileReader {
  /** By path. */
  readonly reads: ReadonlyMap<string, FileContent>;
  /** URIs that only the client can read and whose text is not here yet; to the model they are missing. */
  readonly pending: readonly string[];
}

/**
 * Texts of files that are not open. What is open in the editor stands for what is on disk; what is on disk is read
 * again when its stamp changes; what only the client can read is asked for once, until somebody says it changed.
 */
export class Sources {
  readonly #disk: Disk | undefined;
  readonly #opened: (key: string) => FileContent | undefined;
  readonly #askClient: ClientRead | undefined;
  readonly #read = new Map<string, { readonly stamp: string; readonly content: FileContent }>();
  readonly #fetched = new Map<string, FileContent>();
  readonly #ids = new WeakMap<FileContent, number>();
  #lastId = 0;

  constructor(
    opened: (key: string) => FileContent | undefined,
    disk: Disk | undefined,
    askClient: ClientRead | undefined,
  ) {
    this.#opened = opened;
    this.#disk = disk;
    this.#askClient = askClient;
  }

  reading({ folder, file }: Place): Reading {
    const reads = new Map<string, FileContent>();
    const pending: string[] = [];
    const read = (path: string): FileContent => {
      const known = reads.get(path);
      if (known) return known;
      const content = this.#contentOf({ folder, file }, path, pending);
      reads.set(path, content);
      return content;
    };
    return { read, reads, pending };
  }

  /** Asks the client for files; resolves when all have come, true when one of them is new. */
  async fetch(uris: readonly string[]): Promise<boolean> {
    const ask = this.#askClient;
    if (ask === undefined) return false;
    const fetched = await Promise.all(uris.map(async (uri) => [keyOf(uri), await ask(uri)] as const));
    for (const [key, content] of fetched) this.#fetched.set(key, content);
    return fetched.length > 0;
  }

  /** A file changed: what the client sent of it no longer counts. */
  forget(uri: string): void {
    this.#fetched.delete(keyOf(uri));
  }

  /** The same number for the same content as long as it is here. */
  idOf(content: FileContent): number {
    let id = this.#ids.get(content);
    if (id === undefined) {
      id = ++this.#lastId;
      this.#ids.set(content, id);
    }
    return id;
  }

  #contentOf(place: Place, path: string, pending: string[]): FileContent {
    const { folder } = place;
    const uri = uriOf(folder, path);
    const climbs = path.startsWith("..") || path.startsWith("/") || path.includes(":");
    const opened = climbs ? undefined : this.#opened(keyOf(uri));
    if (opened) return opened;
    const { content, from } = this.#closedContent(place, path, uri, climbs, pending);
    if (!climbs || (!content.ok && content.why === "outside") || from === "client") return content;
    return this.#opened(keyOf(uri)) ?? content;
  }

  #closedContent(
    place: Place,
    path: string,
    uri: string,
    climbs: boolean,
    pending: string[],
  ): { readonly content: FileContent; readonly from: "disk" | "client" } {
    if (this.#disk?.reads(place.folder))
      return { content: this.#fromDisk(this.#disk, place, path), from: "disk" };
    if (climbs) {
      return {
        content: { ok: false, why: "outside", detail: "it lies above the workspace" },
        from: "client",
      };
    }
    const fetched = this.#fetched.get(keyOf(uri));
    if (fetched) return { content: fetched, from: "client" };
    if (this.#askClient) pending.push(uri);
    return { content: { ok: false, why: "missing", detail: "" }, from: "client" };
  }

  #fromDisk(disk: Disk, { folder, file }: Place, path: string): FileContent {
    const stamp = disk.stamp(folder, path);
    const key = `${folder}\n${file}\n${path}`;
    const known = this.#read.get(key);
    if (known && known.stamp === stamp) return known.content;
    const read = disk.reader(folder, file).read(path);
    // Models that read the same record share its text.
    const shared = this.#read.get(`${folder}\n\n${path}`);
    const content = shared && same(shared.content, read) ? shared.content : read;
    this.#read.set(key, { stamp, content });
    this.#read.set(`${folder}\n\n${path}`, { stamp, content });
    return content;
  }
}

const same = (a: FileContent, b: FileContent): boolean =>
  a.ok && b.ok ? a.text === b.text : !a.ok && !b.ok && a.why === b.why && a.detail === b.detail;
