import type { LinearForm } from "../mechanics/assembly.ts";
import type { Ask, HistoryAsk, Instance, SweepAsk } from "../model/model.ts";
import { fail, type Outcome } from "../numerics/outcome.ts";
import type { Analysis, FrequencyResponse, StaticResponse, TimeResponse } from "./analysis.ts";
import type { HistoryAnswer, ModeTable, SweepAnswer } from "./answer.ts";
import type { FrequencySensitivity } from "./sensitivity.ts";

/**
 * The answers of an analysis under the instance of another text that means the same: the same system, asks and
 * indices, other places in the text.
 */
export function movedAnalysis(instance: Instance, of: Analysis): Analysis {
  return new MovedAnalysis(instance, of instanceof MovedAnalysis ? of.base : of);
}

class MovedAnalysis implements Analysis {
  readonly instance: Instance;
  readonly base: Analysis;

  constructor(instance: Instance, base: Analysis) {
    this.instance = instance;
    this.base = base;
  }

  modes(): Outcome<ModeTable> {
    return this.base.modes();
  }

  sensitivity(): Outcome<FrequencySensitivity> {
    return this.base.sensitivity();
  }

  frequencyResponse(by: readonly number[]): Outcome<FrequencyResponse> {
    return this.base.frequencyResponse(by);
  }

  sweep(ask: SweepAsk): Outcome<SweepAnswer> {
    const own = this.#askNamed(ask);
    return own?.kind === "sweep" ? this.base.sweep(own) : fail(UNKNOWN);
  }

  timeResponse(ask: HistoryAsk): Outcome<TimeResponse> {
    const own = this.#askNamed(ask);
    return own?.kind === "history" ? this.base.timeResponse(own) : fail(UNKNOWN);
  }

  history(ask: HistoryAsk): Outcome<HistoryAnswer> {
    const own = this.#askNamed(ask);
    return own?.kind === "history" ? this.base.history(own) : fail(UNKNOWN);
  }

  statics(): Outcome<StaticResponse> {
    return this.base.statics();
  }

  excites(form: LinearForm, modeIndex: number): number {
    return this.base.excites(form, modeIndex);
  }

  #askNamed({ name }: Ask): Ask | undefined {
    return this.base.instance.asks.find((ask) => ask.name === name);
  }
}

const UNKNOWN = "nothing of that name was asked";
