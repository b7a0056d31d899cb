/** What a client is told while numbers are computed: the state of each model, and progress when it takes long. */
import type { WorkDoneProgressServerReporter } from "vscode-languageserver";
import { STATE, type StateParams } from "../shared-core/index.ts";
import type { Serving } from "./serving.ts";
import type { Session } from "./session.ts";

/** Shorter work is over before anybody could read of it, in ms. */
const WORTH_SAYING = 150;
/** Progress with a way to stop it is shown after so long, in ms. */
const WORTH_PROGRESS = 500;

export class Status {
  readonly #serving: Serving;
  readonly #busy = new Map<Session, ReturnType<typeof setTimeout>[]>();
  readonly #progress = new Map<Session, WorkDoneProgressServerReporter>();
  readonly #sent = new WeakMap<Session, string>();

  constructor(serving: Serving) {
    this.#serving = serving;
  }

  /** Something about a model is another thing now. */
  changed(session: Session): void {
    if (session.hidden) return;
    if (session.numbers === "there" || session.numbers === "stopped") this.#send(session, "ready");
    else if (session.numbers === "modes") this.#send(session, "busy");
    else if (session.summary === undefined) this.#send(session, "warming");
  }

  busy(session: Session, busy: boolean): void {
    if (session.hidden) return;
    this.#end(session);
    if (!busy) return;
    this.#busy.set(session, [
      setTimeout(() => this.#send(session, "busy"), WORTH_SAYING),
      setTimeout(() => void this.#showProgress(session), WORTH_PROGRESS),
    ]);
  }

  gone(session: Session): void {
    this.#end(session);
  }

  end(): void {
    for (const session of [...this.#busy.keys()]) this.#end(session);
  }

  #end(session: Session): void {
    for (const timer of this.#busy.get(session) ?? []) clearTimeout(timer);
    this.#busy.delete(session);
    this.#progress.get(session)?.done();
    this.#progress.delete(session);
  }

  #send(session: Session, state: StateParams["state"]): void {
    const { client, connection } = this.#serving;
    if (!client.ours) return;
    const version = session.document.version;
    const text = session.summary?.state ?? "";
    const params: StateParams = { uri: session.uri, version, state, text };
    const written = JSON.stringify(params);
    if (this.#sent.get(session) === written) return;
    this.#sent.set(session, written);
    void connection.sendNotification(STATE, params);
  }

  async #showProgress(session: Session): Promise<void> {
    const { client, connection, schedule } = this.#serving;
    if (!client.showsProgress) return;
    const timers = this.#busy.get(session);
    const reporter = await connection.window.createWorkDoneProgress().catch(() => undefined);
    if (reporter === undefined) return;
    reporter.begin("Thrum", undefined, `computing ${session.file}`, true);
    if (this.#busy.get(session) !== timers) {
      reporter.done();
      return;
    }
    this.#progress.set(session, reporter);
    reporter.token.onCancellationRequested(() => schedule.stop(session));
  }
}
