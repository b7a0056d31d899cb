/**
 * The side that computes: holds the models with their reports, judges them step by step, and answers what needs
 * both. It knows nothing of editors, threads and clocks; who runs it calls `step` as long as there is work, and
 * looks at its messages in between.
 */
import {
  type Diagnostic,
  type FileContent,
  type FileReport,
  judgeAgain,
  judgeInSteps,
  LineIndex,
  learnUnit,
  type Model,
  type ModelSummary,
  type Steps,
  sameMeaning,
  stateText,
  summaryOf,
  type UnitSystem,
  understand,
  type View,
} from "../shared-core/index.ts";
import type {
  AskMessage,
  EarlierMessage,
  FromEngine,
  Judged,
  SummaryOfModel,
  TextMessage,
  ToEngine,
} from "./engine.ts";
import { type EarlierModel, NUMERIC, type Views } from "./numeric-features.ts";

/** Modes come first where everything together took longer than this the last time, in ms. */
const AT_ONCE = 40;

export class Numbers {
  readonly #say: (message: FromEngine) => void;
  readonly #now: () => number;
  readonly #entries = new Map<string, Entry>();
  readonly #contents = new Map<number, FileContent>();
  readonly #earlier = new Map<string, EarlierModel>();
  /** Work to be done, the last first: the newest of what is open; what is not open lies at the bottom. */
  #jobs: Job[] = [];

  constructor(say: (message: FromEngine) => void, now: () => number) {
    this.#say = say;
    this.#now = now;
  }

  handle(message: ToEngine): void {
    switch (message.say) {
      case "text":
        this.#take(message);
        break;
      case "earlier":
        this.#earlier.set(message.uri, earlierModel(message));
        break;
      case "judge":
        this.#want(message.uri, message.serial, message.open);
        break;
      case "stop":
        this.#stop(message.uri);
        break;
      case "units": {
        const entry = this.#entries.get(message.uri);
        if (entry && entry.units !== message.units) this.#show(entry, message.units);
        break;
      }
      case "forget":
        this.#drop(message.uri);
        this.#entries.delete(message.uri);
        this.#earlier.delete(message.uri);
        for (const id of message.contents) this.#contents.delete(id);
        break;
      case "ask":
        this.#answer(message);
        break;
    }
  }

  /** Carries the work one step further; false when there is none left. */
  step(): boolean {
    const job = this.#jobs.at(-1);
    if (job === undefined) return false;
    try {
      if (job.steps.next(false).done) this.#drop(job.entry.uri);
    } catch (error) {
      this.#drop(job.entry.uri);
      this.#fault(`judging ${job.entry.file}`, error);
      this.#say({ say: "stopped", uri: job.entry.uri, serial: job.entry.serial });
    }
    return this.#jobs.length > 0;
  }

  #take({ uri, serial, file, text, reads, units, learned }: TextMessage): void {
    for (const unit of learned) learnUnit(unit);
    for (const { id, content } of reads) if (content) this.#contents.set(id, content);
    this.#drop(uri);
    const before = this.#entries.get(uri);
    this.#entries.set(uri, {
      uri,
      serial,
      file,
      text,
      units,
      reads: new Map(reads.map(({ path, id }) => [path, id])),
      whole: before?.whole,
      took: before?.took ?? Number.POSITIVE_INFINITY,
    });
  }

  /** What was said in other units is said again. */
  #show(entry: Entry, units: UnitSystem): void {
    entry.units = units;
    const { uri, serial, whole } = entry;
    if (whole?.serial !== serial) return;
    this.#say({ say: "judged", uri, serial, judged: judgedOf(whole.report, "answers", units) });
  }

  #want(uri: string, serial: number, open: boolean): void {
    const entry = this.#entries.get(uri);
    if (entry === undefined || entry.serial !== serial) return;
    this.#drop(uri);
    const job = { entry, steps: this.#work(entry) };
    if (open) this.#jobs.push(job);
    else this.#jobs.unshift(job);
  }

  #stop(uri: string): void {
    const dropped = this.#drop(uri);
    if (dropped) this.#say({ say: "stopped", uri, serial: dropped.entry.serial });
  }

  /** Ends the work on a model, begun or not; hands back what it was. */
  #drop(uri: string): Job | undefined {
    const at = this.#jobs.findIndex(({ entry }) => entry.uri === uri);
    return at < 0 ? undefined : this.#jobs.splice(at, 1)[0];
  }

  *#work(entry: Entry): Steps<void> {
    const { uri, serial, units } = entry;
    this.#say({ say: "started", uri, serial });
    const model = understood(entry, this.#contents);
    const start = this.#now();
    const before = this.#unchanged(entry);
    if (before !== undefined) {
      const report = yield* judgeAgain(model, before);
      entry.whole = { report, serial, reads: entry.reads };
      this.#say({ say: "judged", uri, serial, judged: judgedOf(report, "answers", units) });
      return;
    }
    const asks = model.expectations.length > 0 || model.tree.statements.some(isAsk);
    if (asks && entry.took > AT_ONCE) {
      const report = yield* judgeInSteps(model, "modes");
      entry.modes = report;
      this.#say({ say: "judged", uri, serial, judged: judgedOf(report, "modes", units) });
    }
    const report = yield* judgeInSteps(model);
    entry.whole = { report, serial, reads: entry.reads };
    entry.modes = undefined;
    entry.took = this.#now() - start;
    this.#say({ say: "judged", uri, serial, judged: judgedOf(report, "answers", units) });
  }

  /** The report of an earlier text that means the same: a comment or a note was written, blanks were moved. */
  #unchanged({ whole, model, reads }: Entry): FileReport | undefined {
    if (whole === undefined || model === undefined || whole.report.faults.length > 0) return undefined;
    const sameFiles =
      reads.size === whole.reads.size && [...reads].every(([path, id]) => whole.reads.get(path) === id);
    return sameFiles && sameMeaning(model.tree, whole.report.model.tree) ? whole.report : undefined;
  }

  #answer({ id, uri, feature, args }: AskMessage): void {
    const entry = this.#entries.get(uri);
    try {
      const run = NUMERIC[feature] as (views: Views, ...args: readonly unknown[]) => unknown;
      const value =
        entry && run({ ...viewsOf(entry, this.#contents), earlier: this.#earlier.get(uri) }, ...args);
      this.#say({ say: "answer", id, value });
    } catch (error) {
      this.#fault(`${feature} in ${entry?.file ?? uri}`, error, id);
    }
  }

  #fault(where: string, error: unknown, id?: number): void {
    this.#say({ say: "fault", id, where, error: errorText(error) });
  }
}

interface Entry {
  readonly uri: string;
  readonly serial: number;
  readonly file: string;
  readonly text: string;
  readonly reads: ReadonlyMap<string, number>;
  units: UnitSystem;
  model?: Model;
  lines?: LineIndex;
  /** Of this text, while its answers are being computed. */
  modes?: FileReport;
  /** The newest report with everything, of this text or an earlier one. */
  whole?: {
    readonly report: FileReport;
    readonly serial: number;
    readonly reads: ReadonlyMap<string, number>;
  };
  /** How long everything took the last time, in ms. */
  took: number;
}

interface Job {
  readonly entry: Entry;
  readonly steps: Steps<void>;
}

const isAsk = ({ keyword }: Model["tree"]["statements"][number]): boolean => keyword.text === "ask";

/** Reads exactly what the server's own model read. */
function understood(entry: Entry, contents: ReadonlyMap<number, FileContent>): Model {
  entry.model ??= understand(entry.file, entry.text, {
    read: (path) =>
      contents.get(entry.reads.get(path) ?? -1) ?? { ok: false, why: "missing", detail: "it was not read" },
  });
  return entry.model;
}

function earlierModel({ file, text, revision, reads, learned }: EarlierMessage): EarlierModel {
  for (const unit of learned) learnUnit(unit);
  const known = new Map(reads);
  const model = understand(file, text, {
    read: (path) => known.get(path) ?? { ok: false, why: "missing", detail: "it was not read" },
  });
  return { revision, model };
}

function viewsOf(entry: Entry, contents: ReadonlyMap<number, FileContent>): Omit<Views, "earlier"> {
  entry.lines ??= new LineIndex(entry.text);
  const { lines, units, whole, modes, serial } = entry;
  const base = { model: understood(entry, contents), lines, units, others: [] };
  const view: View = {
    ...base,
    report: whole?.report,
    stale: whole !== undefined && whole.serial !== serial,
  };
  return { whole: view, now: modes === undefined ? view : { ...base, report: modes, stale: false } };
}

function judgedOf(report: FileReport, upTo: Judged["upTo"], units: UnitSystem): Judged {
  return {
    upTo,
    diagnostics: report.diagnostics.map(plain),
    accepted: report.accepted.map(({ diagnostic, reason }) => ({ diagnostic: plain(diagnostic), reason })),
    faults: report.faults.map(({ where, case: of, error }) => ({ where, case: of, error: errorText(error) })),
    summary: withState(summaryOf(report, units)),
  };
}

export const withState = (summary: ModelSummary): SummaryOfModel => ({
  ...summary,
  state: stateText(summary),
});

/** Without what a rule may have left on it beside its fields. */
function plain({
  code,
  severity,
  message,
  hint,
  span,
  related,
  fixes,
  case: of,
  tag,
}: Diagnostic): Diagnostic {
  return { code, severity, message, hint, span, related, fixes, case: of, tag };
}

export const errorText = (error: unknown): string =>
  error instanceof Error ? (error.stack ?? error.message) : String(error);
