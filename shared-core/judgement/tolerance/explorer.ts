import type { Draw, Expectation } from "../../model/model.ts";
import { readsHistory } from "../matters-most.ts";
import { sidesOf } from "../sides.ts";
import type { Trial } from "../trial.ts";

/** Positions of the draws that matter, each in [-1, 1] for a band (beyond it for the tails of a normal draw). */
export type Positions = readonly number[];

/** What an expectation was at one point of the bands: beyond its limit by `excess`, or the reason why unknown. */
export type Excess = { readonly excess: number; readonly value: number } | { readonly reason: string };

/**
 * Evaluates expectations at points of the tolerance bands of one case. Points that several expectations visit in
 * turn share their trial: the latest ones are kept.
 */
export class Explorer {
  readonly draws: readonly Draw[];
  /** Trials made so far. */
  count = 0;
  readonly #base: Trial;
  readonly #kept = new Map<string, Trial>();
  readonly #known = new Map<Expectation, Map<string, Excess>>();

  constructor(base: Trial, draws: readonly Draw[]) {
    this.#base = base;
    this.draws = draws;
  }

  /** Whether an expectation reads a history, so that each point costs an integration. */
  isDear(expectation: Expectation): boolean {
    const histories = this.#base.instance.asks.filter((ask) => ask.kind === "history");
    return readsHistory(expectation, histories);
  }

  excess(expectation: Expectation, positions: Positions): Excess {
    const key = positions.join();
    let known = this.#known.get(expectation);
    if (known === undefined) {
      known = new Map();
      this.#known.set(expectation, known);
    }
    let found = known.get(key);
    if (found === undefined) {
      found = this.#evaluate(expectation, positions, key);
      known.set(key, found);
    }
    return found;
  }

  trial(positions: Positions, key = positions.join()): Trial {
    let trial = this.#kept.get(key);
    if (trial === undefined) {
      this.count++;
      trial = this.#base.with({ draws: new Map(this.draws.map((draw, i) => [draw.id, positions[i]])) });
      this.#kept.set(key, trial);
      if (this.#kept.size > KEPT) this.#kept.delete(this.#kept.keys().next().value as string);
    }
    return trial;
  }

  #evaluate(expectation: Expectation, positions: Positions, key: string): Excess {
    const sides = sidesOf(this.trial(positions, key), expectation);
    return sides.ok
      ? { excess: sides.value.excess, value: sides.value.value.value }
      : { reason: sides.reason };
  }
}

/** Trials kept for the next expectation: those along all lines through one point. */
const KEPT = 256;
