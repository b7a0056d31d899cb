import type { Engine, FromEngine, ToEngine } from "./engine.ts";
import { Numbers } from "./numbers.ts";
import { nextTurn } from "./turns.ts";

/** How long computing may keep everything else waiting, in ms. */
const SLICE = 12;

/** Computes in the same thread, a slice at a time: for places that have no other thread. */
export class LocalEngine implements Engine {
  onSaid: (message: FromEngine) => void = () => {};
  readonly #numbers = new Numbers(
    (message) => this.onSaid(message),
    () => performance.now(),
  );
  #running = false;
  #ended = false;

  tell(message: ToEngine): void {
    this.#numbers.handle(message);
    if (!this.#running) {
      this.#running = true;
      void this.#run();
    }
  }

  end(): void {
    this.#ended = true;
  }

  async #run(): Promise<void> {
    let more = true;
    while (more && !this.#ended) {
      await nextTurn();
      const start = performance.now();
      while (more && performance.now() - start < SLICE) more = this.#numbers.step();
    }
    this.#running = false;
  }
}
