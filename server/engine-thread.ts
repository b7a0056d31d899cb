import { type MessagePort, receiveMessageOnPort, Worker } from "node:worker_threads";
import type { Engine, FromEngine, ToEngine } from "./engine.ts";
import { errorText, Numbers } from "./numbers.ts";

/** What the thread sends beside what it says: that it has looked at its messages. */
type FromThread = FromEngine | { readonly say: "seen"; readonly count: number };

/** A thread that has not looked at its messages for so long is given up, in ms. */
const PATIENCE = 10_000;
/** Breakdowns one behind the other after which no new thread is started until there is something new to do. */
const MOST_BREAKDOWNS = 3;

/** Computes in a thread of its own, which is started anew when it breaks down or hangs. */
export class ThreadEngine implements Engine {
  onSaid: (message: FromEngine) => void = () => {};
  readonly #script: URL;
  #worker: Worker;
  #told = 0;
  #seen = 0;
  #patience: NodeJS.Timeout | undefined;
  /** What it is computing. */
  #at: string | undefined;
  #breakdowns = 0;
  #ended = false;

  constructor(script: URL) {
    this.#script = script;
    this.#worker = this.#start();
  }

  tell(message: ToEngine): void {
    this.#told++;
    this.#worker.postMessage(message);
    this.#watch();
  }

  end(): void {
    this.#ended = true;
    clearTimeout(this.#patience);
    void this.#worker.terminate();
  }

  #start(): Worker {
    // Its standard output must not end up between the messages of the protocol.
    const worker = new Worker(this.#script, { stdout: true, name: "thrum numbers" });
    worker.stdout.pipe(process.stderr, { end: false });
    worker.unref();
    let failed = "";
    worker.on("message", (message: FromThread) => {
      if (worker === this.#worker) this.#hear(message);
    });
    worker.on("error", (error) => {
      failed = errorText(error);
    });
    worker.on("exit", (code) => {
      if (worker === this.#worker && !this.#ended) this.#breakDown(failed || `it ended with ${code}`);
    });
    return worker;
  }

  #hear(message: FromThread): void {
    if (message.say === "seen") {
      this.#seen += message.count;
      clearTimeout(this.#patience);
      this.#patience = undefined;
      if (this.#seen < this.#told) this.#watch();
      return;
    }
    if (message.say === "started") this.#at = message.uri;
    else if (message.say === "stopped" || message.say === "judged") {
      this.#breakdowns = 0;
      if (message.say === "stopped" || message.judged.upTo === "answers") this.#at = undefined;
    }
    this.onSaid(message);
  }

  #watch(): void {
    this.#patience ??= setTimeout(() => {
      const worker = this.#worker;
      this.#breakDown(`it did not look up for ${PATIENCE / 1000} s`);
      void worker.terminate();
    }, PATIENCE).unref();
  }

  #breakDown(error: string): void {
    clearTimeout(this.#patience);
    this.#patience = undefined;
    this.#told = 0;
    this.#seen = 0;
    const uri = this.#at;
    this.#at = undefined;
    this.#worker = this.#start();
    if (++this.#breakdowns <= MOST_BREAKDOWNS) this.onSaid({ say: "restarted", uri, error });
  }
}

/** The thread's side: works step by step and looks at its messages in between. */
export function runThread(port: MessagePort): void {
  const numbers = new Numbers(
    (message) => port.postMessage(message satisfies FromThread),
    () => performance.now(),
  );
  const look = (first?: ToEngine): void => {
    let count = 0;
    for (let message = first ?? next(port); message !== undefined; message = next(port)) {
      numbers.handle(message);
      count++;
    }
    if (count > 0) port.postMessage({ say: "seen", count } satisfies FromThread);
  };
  port.on("message", (message: ToEngine) => {
    look(message);
    while (numbers.step()) look();
  });
}

const next = (port: MessagePort): ToEngine | undefined => receiveMessageOnPort(port)?.message;
