/**
 * Models that are not open in the editor. Of most of them only names, used files and what was said are kept; whole
 * models are worked out when something crosses files, and few of them are kept.
 */
import { TextDocument } from "vscode-languageserver-textdocument";
import {
  type FileContent,
  type Model,
  symbolIndex,
  understand,
  type WorkspaceSymbol,
} from "../shared-core/index.ts";
import type { Schedule } from "./schedule.ts";
import { Session } from "./session.ts";
import type { Sources } from "./sources.ts";
import { keyOf } from "./uris.ts";
import type { Workspace } from "./workspace.ts";

/** Whole models that are kept; one of a hundred lines takes about 0.3 MB. */
const MOST_MODELS = 32;

export interface ClosedFile {
  readonly uri: string;
  readonly folder: string;
  readonly file: string;
}

interface Known {
  readonly content: FileContent;
  readonly symbols?: readonly WorkspaceSymbol[];
  /** Paths of the models that it uses. */
  readonly uses?: readonly string[];
}

/** URIs of files below a folder that end so; fails with a reason where they cannot be had. */
export type Find = (folder: string, endings: readonly string[]) => Promise<readonly string[]>;

export class ClosedModels {
  readonly #workspace: Workspace;
  readonly #sources: Sources;
  readonly #schedule: Schedule;
  readonly #find: Find;
  readonly #known = new Map<string, Known>();
  /** The most recently needed last. */
  readonly #models = new Map<
    string,
    { readonly model: Model; readonly reads: ReadonlyMap<string, FileContent> }
  >();
  #files: Promise<readonly ClosedFile[]> | undefined;

  constructor(workspace: Workspace, sources: Sources, schedule: Schedule, find: Find) {
    this.#workspace = workspace;
    this.#sources = sources;
    this.#schedule = schedule;
    this.#find = find;
  }

  /** Files have come or gone: folders are looked through again when somebody next asks. */
  forgetFiles(): void {
    this.#files = undefined;
  }

  /** Every model of the workspace folders, open ones among them. */
  files(): Promise<readonly ClosedFile[]> {
    this.#files ??= this.#search(["thrum"]);
    return this.#files;
  }

  /** Every file of the workspace folders that may be a record; looked for when somebody types a path. */
  records(): Promise<readonly ClosedFile[]> {
    return this.#search(["csv", "tsv"]);
  }

  async contentOf({ folder, file }: Pick<ClosedFile, "folder" | "file">): Promise<FileContent> {
    for (;;) {
      const reading = this.#sources.reading({ folder, file });
      const content = reading.read(file);
      if (reading.pending.length === 0 || !(await this.#sources.fetch(reading.pending))) return content;
    }
  }

  /** Whether a model and all it read are still the same texts. */
  isUnchanged(at: Pick<ClosedFile, "folder" | "file">, reads: ReadonlyMap<string, FileContent>): boolean {
    const reading = this.#sources.reading(at);
    return [...reads].every(([path, content]) => reading.read(path) === content);
  }

  /** Models that use, or are used by, a model, through any number of files. */
  async around(session: Session): Promise<readonly Model[]> {
    const files = (await this.files()).filter(({ folder }) => keyOf(folder) === keyOf(session.folder));
    const uses = new Map<string, readonly string[]>();
    for (const file of files) uses.set(file.file, await this.#usesOf(file));
    uses.set(session.file, this.#schedule.current(session).model.files);
    const near = connected(session.file, uses);
    const models: Model[] = [];
    for (const each of files) {
      if (each.file !== session.file && near.has(each.file)) models.push(await this.#modelOf(each));
    }
    return models;
  }

  /** Names of all models, with the file they stand in. */
  async symbols(): Promise<
    readonly { readonly at: ClosedFile; readonly symbols: readonly WorkspaceSymbol[] }[]
  > {
    const found: { at: ClosedFile; symbols: readonly WorkspaceSymbol[] }[] = [];
    for (const at of await this.files()) {
      const content = await this.contentOf(at);
      const known = this.#knownOf(at.uri, content);
      const symbols = known.symbols ?? symbolIndex(await this.#modelOf(at));
      this.#known.set(keyOf(at.uri), { ...known, symbols });
      found.push({ at, symbols });
    }
    return found;
  }

  /** Looks at a model as if it were open, behind those that are. null: it cannot be read. */
  async visit<T>(uri: string, look: (session: Session) => Promise<T>): Promise<T | null> {
    const open = this.#schedule.session(keyOf(uri));
    if (open) return look(open);
    const place = this.#workspace.locate(uri);
    const content = await this.contentOf(place);
    if (!content.ok) return null;
    const now = this.#schedule.session(keyOf(uri));
    if (now) return look(now);
    const session = new Session(TextDocument.create(uri, "thrum", 0, content.text), place, content);
    this.#schedule.open(session);
    try {
      return await look(session);
    } finally {
      this.#schedule.close(session);
    }
  }

  async #search(endings: readonly string[]): Promise<readonly ClosedFile[]> {
    const found = await Promise.all(this.#workspace.folders.map((folder) => this.#find(folder, endings)));
    const keys = new Set<string>();
    const files: ClosedFile[] = [];
    for (const uri of found.flat()) {
      if (keys.has(keyOf(uri))) continue;
      keys.add(keyOf(uri));
      files.push({ uri, ...this.#workspace.locate(uri) });
    }
    return files;
  }

  #knownOf(uri: string, content: FileContent): Known {
    const known = this.#known.get(keyOf(uri));
    return known?.content === content ? known : { content };
  }

  async #usesOf(at: ClosedFile): Promise<readonly string[]> {
    const content = await this.contentOf(at);
    const known = this.#knownOf(at.uri, content);
    if (known.uses) return known.uses;
    // Most models use nothing, and a line that could be a `use` is seen without reading the text.
    const mayUse = content.ok && /^use\b/m.test(content.text);
    const files = mayUse ? (await this.#modelOf(at)).files : [];
    const uses = files.filter((file) => file.endsWith(".thrum"));
    this.#known.set(keyOf(at.uri), { ...known, uses });
    return uses;
  }

  async #modelOf(at: ClosedFile): Promise<Model> {
    const open = this.#schedule.session(keyOf(at.uri));
    if (open && !open.hidden) return this.#schedule.current(open).model;
    const content = await this.contentOf(at);
    const key = keyOf(at.uri);
    const kept = this.#models.get(key);
    this.#models.delete(key);
    if (kept && this.isUnchanged(at, kept.reads)) {
      this.#models.set(key, kept);
      return kept.model;
    }
    const reading = this.#sources.reading(at);
    const model = understand(at.file, content.ok ? content.text : "", reading);
    this.#models.set(key, { model, reads: new Map([[at.file, content], ...reading.reads]) });
    if (this.#models.size > MOST_MODELS) this.#models.delete(this.#models.keys().next().value as string);
    return model;
  }
}

/** Everything that hangs together with a file by `use`, in either direction. */
function connected(from: string, uses: ReadonlyMap<string, readonly string[]>): ReadonlySet<string> {
  const neighbours = new Map<string, string[]>();
  const join = (a: string, b: string) => neighbours.set(a, [...(neighbours.get(a) ?? []), b]);
  for (const [file, used] of uses) {
    for (const other of used) {
      join(file, other);
      join(other, file);
    }
  }
  const seen = new Set([from]);
  for (const file of seen) for (const next of neighbours.get(file) ?? []) seen.add(next);
  return seen;
}
