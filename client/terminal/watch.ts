import { type FSWatcher, watch } from "node:fs";
import { basename, dirname, resolve } from "node:path";
import { type Call, EXIT, UsageError } from "./call.ts";
import { statOf } from "./workspace.ts";

/** What one run of a command read, and how it ended. */
export interface Round {
  readonly status: number;
  /** Paths relative to the working folder. */
  readonly files: readonly string[];
}

/** Runs once; with `--watch` again after every change, until interrupted. */
export async function repeat(call: Call, once: () => Promise<Round>): Promise<number> {
  if (!call.has("watch")) return (await once()).status;
  if (call.operands.includes("-"))
    throw new UsageError("--watch needs files; standard input does not change");
  const changes = new Changes(call.host.cwd);
  let interrupted = false;
  process.once("SIGINT", () => {
    interrupted = true;
    changes.end();
  });
  while (!interrupted) {
    call.host.stderr.write("thrum: checking\n");
    const { files } = await once();
    changes.follow([...call.operands, ...files]);
    call.host.stderr.write(`thrum: watching ${files.length} ${files.length === 1 ? "file" : "files"}\n`);
    await changes.next();
  }
  return EXIT.interrupted;
}

/** Editors write a file in several steps; one change is told when they have been quiet so long, in ms. */
const QUIET = 80;
/** Where the system tells nothing (network drives, containers), files are looked at so often, in ms. */
const POLL = 500;

/** Tells when followed files change, appear or vanish. Folders are watched, for editors replace files. */
export class Changes {
  readonly #cwd: string;
  readonly #polls: boolean;
  readonly #watchers = new Map<string, FSWatcher>();
  readonly #seen = new Map<string, string>();
  #timer: NodeJS.Timeout | undefined;
  #poll: NodeJS.Timeout | undefined;
  #waiting: (() => void) | undefined;
  #changed = false;

  constructor(cwd: string, options: { readonly polls?: boolean } = {}) {
    this.#cwd = cwd;
    this.#polls = options.polls ?? false;
  }

  follow(paths: readonly string[]): void {
    for (const path of new Set(paths.map((each) => resolve(this.#cwd, each)))) {
      if (this.#seen.has(path)) continue;
      this.#seen.set(path, stateOf(path));
      this.#watchFolder(isFolder(path) ? path : dirname(path));
    }
    if (this.#polls) this.#startPolling();
  }

  /** Resolves at the next change, at once when there was one since the last, and when the watch ends. */
  next(): Promise<void> {
    return new Promise((done) => {
      this.#waiting = done;
      if (this.#changed) this.#tell();
    });
  }

  end(): void {
    for (const watcher of this.#watchers.values()) watcher.close();
    clearTimeout(this.#timer);
    clearInterval(this.#poll);
    this.#tell();
  }

  #watchFolder(folder: string): void {
    if (this.#polls || this.#watchers.has(folder)) return;
    try {
      const watcher = watch(folder, (_, name) => {
        if (name === null || this.#concerns(folder, name)) this.#note();
      });
      watcher.on("error", () => this.#startPolling());
      this.#watchers.set(folder, watcher);
    } catch {
      this.#startPolling();
    }
  }

  #concerns(folder: string, name: string): boolean {
    return name.endsWith(".thrum") || this.#seen.has(resolve(folder, basename(name)));
  }

  #startPolling(): void {
    this.#poll ??= setInterval(() => {
      for (const [path, state] of this.#seen) {
        const now = stateOf(path);
        if (now === state) continue;
        this.#seen.set(path, now);
        this.#note();
      }
    }, POLL);
  }

  #note(): void {
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => {
      this.#changed = true;
      this.#tell();
    }, QUIET);
  }

  #tell(): void {
    const waiting = this.#waiting;
    if (waiting === undefined) return;
    this.#waiting = undefined;
    this.#changed = false;
    waiting();
  }
}

function stateOf(path: string): string {
  const info = statOf(path);
  return info ? `${info.mtimeMs} ${info.size}` : "";
}

const isFolder = (path: string): boolean => statOf(path)?.isDirectory() === true;
