import type { Session } from "./session.ts";
import { nextTurn } from "./turns.ts";

/** Texts that take longer than this, in ms, are worked out when typing rests for as long, at most `LONGEST_REST`. */
const SWIFT = 250;
const LONGEST_REST = 400;
/** A burst of edits that wait to be read counts as one, for at most so long, in ms. */
const LONGEST_BURST = 25;
/** Sessions whose text waits to be worked out, each once however many edits have come. */
export class Texts {
  readonly #run: (session: Session) => void;
  /** By session, when its last edit came. */
  readonly #waiting = new Map<Session, number>();
  #edits = 0;
  #running = false;

  constructor(run: (session: Session) => void) {
    this.#run = run;
  }

  add(session: Session): void {
    this.#waiting.delete(session);
    this.#waiting.set(session, performance.now());
    this.#edits++;
    if (!this.#running) void this.#loop();
  }

  forget(session: Session): void {
    this.#waiting.delete(session);
  }

  async #loop(): Promise<void> {
    this.#running = true;
    let since = performance.now();
    while (this.#waiting.size > 0) {
      const seen = this.#edits;
      // Messages are handled one a turn: two turns without an edit mean that none waits.
      await nextTurn();
      await nextTurn();
      const now = performance.now();
      if (seen !== this.#edits && now - since < LONGEST_BURST) continue;
      const rests = [...this.#waiting].map(([session, at]) => ({
        session,
        left: at + restOf(session) - now,
      }));
      const due = rests.find(({ left }) => left <= 0);
      if (due) this.#run(due.session);
      else if (rests.length > 0) await pause(Math.min(...rests.map(({ left }) => left)));
      since = performance.now();
    }
    this.#running = false;
  }
}

const restOf = ({ cost }: Session): number => (cost > SWIFT ? Math.min(cost, LONGEST_REST) : 0);

const pause = (ms: number): Promise<void> => new Promise((done) => setTimeout(done, ms));
