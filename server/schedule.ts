/**
 * Two tiers. What the text alone says is worked out at once, here; numbers are computed aside once typing rests.
 * Every result carries the serial of the text it belongs to; a late one is dropped, for the newer run will publish.
 */
import {
  judge,
  LineIndex,
  learnedUnits,
  learnUnits,
  type Model,
  summaryOf,
  understand,
  type View,
} from "../shared-core/index.ts";
import type { AskMessage, EarlierMessage, Engine, FromEngine, ReadFile } from "./engine.ts";
import { errorText, withState } from "./numbers.ts";
import type { NumericArgs, NumericFeature, NumericResult } from "./numeric-features.ts";
import type { Change, Session, Understood } from "./session.ts";
import type { Settings } from "./settings.ts";
import type { Sources } from "./sources.ts";
import { Texts } from "./texts.ts";
import { keyOf } from "./uris.ts";

/** Codes of what may be a unit that is not known yet. */
const MAY_BE_UNIT: ReadonlySet<string> = new Set(["unknown-unit", "unknown-name"]);
/** Rounds of asking the client for files that lead to more files. */
const MOST_ROUNDS = 20;

export interface ScheduleHost {
  readonly sources: Sources;
  startEngine(): Engine;
  settingsOf(of: { readonly uri: string }): Settings;
  /** Something about a session is another thing now: text, modes, answers. */
  changed(session: Session): void;
  /** Numbers of a session begin or end to be computed. */
  busy(session: Session, busy: boolean): void;
  log(text: string): void;
}

export class Schedule {
  readonly #host: ScheduleHost;
  readonly #sessions = new Map<string, Session>();
  readonly #texts = new Texts((session) => this.#behindWall(session.file, () => this.#workOut(session)));
  readonly #timers = new Map<Session, ReturnType<typeof setTimeout>>();
  readonly #questions = new Map<number, (value: unknown) => void>();
  /** Which session or closed model uses which content of the engine. */
  readonly #sent = new Map<number, Set<string>>();
  #engine: Engine | undefined;
  #engines = 1;
  #lastQuestion = 0;

  constructor(host: ScheduleHost) {
    this.#host = host;
  }

  get sessions(): Iterable<Session> {
    return this.#sessions.values();
  }

  session(key: string): Session | undefined {
    return this.#sessions.get(key);
  }

  /** The session of a document that is open in the editor. */
  byUri(uri: string): Session | undefined {
    const session = this.#sessions.get(keyOf(uri));
    return session?.hidden ? undefined : session;
  }

  open(session: Session): void {
    this.#sessions.get(session.key)?.close();
    this.#sessions.set(session.key, session);
    this.touch(session, []);
  }

  close(session: Session): void {
    this.#texts.forget(session);
    this.#stopTimer(session);
    session.close();
    if (this.#sessions.get(session.key) !== session) return;
    this.#sessions.delete(session.key);
    this.#forget(session.uri);
  }

  /** The text of a session, or a file that it reads, has changed. */
  touch(session: Session, changes: readonly Change[]): void {
    session.changed(changes);
    this.#host.busy(session, false);
    this.#stopTimer(session);
    this.#texts.add(session);
  }

  /** Of the text as it stands now. */
  current(session: Session): Understood {
    const { understood } = session;
    if (understood?.serial === session.serial) return understood;
    this.#workOut(session);
    return session.understood as Understood;
  }

  view(session: Session, others: () => readonly Model[] = () => []): View {
    const { model, lines } = this.current(session);
    const { units } = this.#host.settingsOf(session);
    return {
      model,
      lines,
      units,
      stale: false,
      get others() {
        return others();
      },
    };
  }

  /** Resolves when the numbers of the text as it stands are there, or will not come. Does not wait for typing to rest. */
  async settled(session: Session): Promise<void> {
    await this.#textTold(session);
    if (session.numbers === "awaited" && this.#timers.has(session)) this.#judge(session);
    return session.settled();
  }

  /** Resolves when the first numbers of the text as it stands are there. Does not wait for typing to rest either. */
  async begun(session: Session): Promise<void> {
    await this.#textTold(session);
    if (session.numbers === "awaited" && this.#timers.has(session)) this.#judge(session);
    return session.begun();
  }

  /** Asks the side that computes. undefined where it could not answer, which has been logged. */
  async ask<F extends NumericFeature>(
    session: Session,
    feature: F,
    ...args: NumericArgs<F>
  ): Promise<NumericResult<F> | undefined> {
    await this.#textTold(session);
    const id = ++this.#lastQuestion;
    return new Promise((done) => {
      this.#questions.set(id, (value) => done(value as NumericResult<F> | undefined));
      this.engine.tell({
        say: "ask",
        id,
        uri: session.uri,
        feature,
        args: args as unknown as AskMessage["args"],
      });
    });
  }

  /** Somebody stops the numbers of the text as it stands. */
  stop(session: Session): void {
    this.#stopTimer(session);
    this.engine.tell({ say: "stop", uri: session.uri });
  }

  tellEarlier(message: Omit<EarlierMessage, "learned">): void {
    this.engine.tell({ ...message, learned: learnedUnits() });
  }

  /** How many engines there have been: a new one knows nothing of what was told to the one before. */
  get engines(): number {
    return this.#engines;
  }

  unitsChanged(session: Session): void {
    this.engine.tell({ say: "units", uri: session.uri, units: this.#host.settingsOf(session).units });
  }

  #forget(uri: string): void {
    if (this.#engine === undefined) return;
    const unused: number[] = [];
    for (const [id, users] of this.#sent) {
      if (!users.delete(uri) || users.size > 0) continue;
      unused.push(id);
      this.#sent.delete(id);
    }
    this.#engine.tell({ say: "forget", uri, contents: unused });
  }

  end(): void {
    for (const timer of this.#timers.values()) clearTimeout(timer);
    this.#engine?.end();
  }

  get engine(): Engine {
    if (this.#engine === undefined) {
      this.#engine = this.#host.startEngine();
      this.#engine.onSaid = (message) => this.#behindWall(message.say, () => this.#hear(message));
    }
    return this.#engine;
  }

  /** The side that computes knows the text as it stands. */
  async #textTold(session: Session): Promise<void> {
    for (;;) {
      this.current(session);
      if (session.settling === undefined) return;
      await session.settling;
    }
  }

  #workOut(session: Session): void {
    this.#texts.forget(session);
    const { serial } = session;
    const start = performance.now();
    const text = session.document.getText();
    const reading = this.#host.sources.reading(session);
    session.understood = this.#understood(session, text, serial, reading);
    session.cost = performance.now() - start;
    if (reading.pending.length > 0) this.#settleLater(session, this.#fetch(session, reading.pending));
    else if (session.understood.said.some(({ code }) => MAY_BE_UNIT.has(code))) {
      this.#settleLater(session, this.#learn(session));
    } else this.#settleText(session);
  }

  /** The text cannot be spoken of before something has come that may change what it means. */
  #settleLater(session: Session, coming: Promise<boolean>): void {
    const { serial } = session;
    const settling = coming
      .catch((error: unknown) => {
        this.#fault("looking around", session, error);
        return false;
      })
      .then((changes) => {
        if (session.settling === settling) session.settling = undefined;
        if (session.serial !== serial || this.#sessions.get(session.key) !== session) return;
        if (changes) this.touch(session, []);
        else this.#settleText(session);
      });
    session.settling = settling;
  }

  /** Files that only the client can read; true when there is something to read anew. */
  async #fetch(session: Session, pending: readonly string[]): Promise<boolean> {
    return ++session.rounds < MOST_ROUNDS && (await this.#host.sources.fetch(pending));
  }

  /** Units that the language does not spell itself are looked up before anything is said of them. */
  #learn(session: Session): Promise<boolean> {
    return learnUnits((session.understood as Understood).model);
  }

  #settleText(session: Session): void {
    session.rounds = 0;
    const understood = this.current(session);
    this.#tellText(session, session.document.getText(), understood, this.#host.settingsOf(session).units);
    if (understood.model.buildable) this.#plan(session);
    else session.withoutNumbers("there");
    this.#host.changed(session);
  }

  #understood(
    session: Session,
    text: string,
    serial: number,
    reading: Parameters<typeof understand>[2] & Pick<Understood, "reads">,
  ): Understood {
    const lines = new LineIndex(text);
    try {
      const model = understand(session.file, text, reading);
      const report = judge(model, { upTo: "text" });
      for (const { where, error } of report.faults)
        this.#fault(`${where} in ${session.file}`, session, error);
      const { units } = this.#host.settingsOf(session);
      const summary = () => withState(summaryOf(report, units));
      return { serial, model, lines, said: report.diagnostics, reads: reading.reads, summary };
    } catch (error) {
      this.#fault(`understanding ${session.file}`, session, error);
      const model = session.understood?.model ?? understand(session.file, "", reading);
      const nothing = { cases: [], frequencies: [], expectations: [], errors: 0, warnings: 0 };
      const summary = () => withState(nothing);
      return { serial, model, lines, said: [], reads: reading.reads, summary };
    }
  }

  #tellText(
    { uri, file }: { readonly uri: string; readonly file: string },
    text: string,
    { serial, reads }: Understood,
    units: Settings["units"],
  ): void {
    const sent: ReadFile[] = [...reads].map(([path, content]) => {
      const id = this.#host.sources.idOf(content);
      const users = this.#sent.get(id);
      if (users) {
        users.add(uri);
        return { path, id };
      }
      this.#sent.set(id, new Set([uri]));
      return { path, id, content };
    });
    this.engine.tell({ say: "text", uri, serial, file, text, reads: sent, units, learned: learnedUnits() });
  }

  #plan(session: Session): void {
    const first = session.summary === undefined;
    const delay = first ? 0 : this.#host.settingsOf(session).delay;
    this.#stopTimer(session);
    if (delay === 0) this.#judge(session);
    else
      this.#timers.set(
        session,
        setTimeout(() => this.#judge(session), delay),
      );
  }

  #judge(session: Session): void {
    this.#stopTimer(session);
    this.engine.tell({ say: "judge", uri: session.uri, serial: session.serial, open: !session.hidden });
  }

  #stopTimer(session: Session): void {
    clearTimeout(this.#timers.get(session));
    this.#timers.delete(session);
  }

  #hear(message: FromEngine): void {
    if (message.say === "answer" || message.say === "fault") {
      if (message.say === "fault") this.#host.log(`${message.where}\n${message.error}`);
      if (message.id === undefined) return;
      const done = this.#questions.get(message.id);
      this.#questions.delete(message.id);
      done?.(message.say === "answer" ? message.value : undefined);
    } else if (message.say === "restarted") this.#restart(message);
    else this.#hearOf(message);
  }

  #hearOf(message: Exclude<FromEngine, { say: "answer" | "fault" | "restarted" }>): void {
    const session = this.#sessions.get(keyOf(message.uri));
    if (session === undefined || message.serial !== session.serial) return;
    if (message.say === "started") this.#host.busy(session, true);
    else if (message.say === "stopped") {
      session.withoutNumbers("stopped");
      this.#host.busy(session, false);
      this.#host.changed(session);
    } else {
      for (const { where, error } of message.judged.faults) {
        this.#host.log(`${where} in ${session.file}, version ${session.document.version}\n${error}`);
      }
      session.accept(message.judged);
      if (message.judged.upTo === "answers") this.#host.busy(session, false);
      this.#host.changed(session);
    }
  }

  /** Everything the engine knew is told again; what broke it is not tried a second time. */
  #restart({ uri, error }: Extract<FromEngine, { say: "restarted" }>): void {
    this.#host.log(`the side that computes broke down and was started anew\n${error}`);
    for (const done of this.#questions.values()) done(undefined);
    this.#questions.clear();
    this.#sent.clear();
    this.#engines++;
    for (const session of this.#sessions.values()) {
      const { understood, numbers } = session;
      if (understood === undefined) continue;
      const { units } = this.#host.settingsOf(session);
      this.#tellText(session, session.document.getText(), understood, units);
      if (session.uri === uri && numbers !== "there") {
        session.withoutNumbers("stopped");
        this.#host.busy(session, false);
        this.#host.changed(session);
      } else if (understood.model.buildable && numbers !== "stopped") this.#judge(session);
    }
  }

  /** A defect costs what stands behind the wall; the server lives on. */
  #behindWall(where: string, run: () => void): void {
    try {
      run();
    } catch (error) {
      this.#host.log(`${where}\n${errorText(error)}`);
    }
  }

  #fault(where: string, session: Session, error: unknown): void {
    this.#host.log(`${where}, version ${session.document.version}\n${errorText(error)}`);
  }
}
