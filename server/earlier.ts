/** Models as they were at a revision. Only the client knows revisions; files are asked of it one by one. */
import {
  type FileContent,
  type FileReader,
  learnUnits,
  type SheetParams,
  understand,
} from "../shared-core/index.ts";
import type { Schedule } from "./schedule.ts";
import type { Session } from "./session.ts";
import type { Workspace } from "./workspace.ts";

export type Revision = NonNullable<SheetParams["earlier"]>["revision"];
/** Asks the client for a file as it was. */
export type ReadAt = (uri: string, revision: Revision) => Promise<FileContent>;

/** Rounds of asking for files that lead to more files. */
const MOST_ROUNDS = 20;

interface Told {
  readonly revision: Revision;
  /** Engines that were started before it was told. */
  readonly engine: number;
  /** Why it cannot be read; undefined when the side that computes has it. */
  readonly reason: Promise<string | undefined>;
}

export class EarlierModels {
  readonly #schedule: Schedule;
  readonly #workspace: Workspace;
  readonly #readAt: ReadAt | undefined;
  readonly #told = new WeakMap<Session, Told>();

  constructor(schedule: Schedule, workspace: Workspace, readAt: ReadAt | undefined) {
    this.#schedule = schedule;
    this.#workspace = workspace;
    this.#readAt = readAt;
  }

  /** Lets the side that computes know what a model was at a revision; a reason where it cannot be read. */
  tell(session: Session, revision: Revision): Promise<string | undefined> {
    const known = this.#told.get(session);
    if (known?.revision === revision && known.engine === this.#schedule.engines) return known.reason;
    const reason = this.#tellAnew(session, revision);
    this.#told.set(session, { revision, engine: this.#schedule.engines, reason });
    return reason;
  }

  async #tellAnew(session: Session, revision: Revision): Promise<string | undefined> {
    const readAt = this.#readAt;
    if (readAt === undefined) return "this editor reads no revisions";
    const { uri, file } = session;
    const own = await readAt(uri, revision);
    if (!own.ok) return own.why === "missing" ? "it did not exist then" : own.detail;
    const reads = new Map<string, FileContent>();
    for (let round = 0; round < MOST_ROUNDS; round++) {
      const pending = new Set<string>();
      const model = understand(file, own.text, readerOf(reads, pending));
      if (pending.size === 0) {
        await learnUnits(model);
        break;
      }
      for (const path of pending)
        reads.set(path, await readAt(this.#workspace.uriOf(session, path), revision));
    }
    this.#schedule.tellEarlier({ say: "earlier", uri, revision, file, text: own.text, reads: [...reads] });
    return undefined;
  }
}

const readerOf = (reads: ReadonlyMap<string, FileContent>, pending: Set<string>): FileReader => ({
  read(path) {
    const known = reads.get(path);
    if (known === undefined) pending.add(path);
    return known ?? { ok: false, why: "missing", detail: "it has not been read yet" };
  },
});
