/** Everything that can be asked of one instance, each thing computed once, when it is first asked for. */
import type { LinearForm } from "../mechanics/assembly.ts";
import type { HistoryAsk, Instance, SweepAsk } from "../model/model.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { Analysis, FrequencyResponse, StaticResponse, TimeResponse } from "./analysis.ts";
import type { HistoryAnswer, ModeTable, SweepAnswer } from "./answer.ts";
import { excitationOf } from "./excitation.ts";
import { type HistorySolution, historySolution } from "./history.ts";
import { modeTable } from "./modes.ts";
import { type ModalBasis, modalBasis } from "./modes-basis.ts";
import { type FrequencySensitivity, frequencySensitivity } from "./sensitivity.ts";
import { staticResponse } from "./statics.ts";
import { type SteadyModel, steadyModel, steadyResponse, sweepAnswer } from "./sweep.ts";
import { hasAddedDamping } from "./time-damping.ts";

/** The analysis of an instance. Cheap to make: nothing is computed before it is asked for. */
export function analyse(instance: Instance): Analysis {
  return new InstanceAnalysis(instance);
}

class InstanceAnalysis implements Analysis {
  readonly instance: Instance;
  #basis: Outcome<ModalBasis> | undefined;
  #modes: Outcome<ModeTable> | undefined;
  #statics: Outcome<StaticResponse> | undefined;
  #sensitivity: Outcome<FrequencySensitivity> | undefined;
  #steady: Outcome<SteadyModel> | undefined;
  readonly #responses = new Map<string, Outcome<FrequencyResponse>>();
  readonly #sweeps = new Map<SweepAsk, Outcome<SweepAnswer>>();
  readonly #histories = new Map<HistoryAsk, Outcome<HistorySolution>>();
  readonly #answers = new Map<HistoryAsk, Outcome<HistoryAnswer>>();

  constructor(instance: Instance) {
    this.instance = instance;
  }

  modes(): Outcome<ModeTable> {
    this.#modes ??= through(this.#modalBasis(), modeTable);
    return this.#modes;
  }

  sensitivity(): Outcome<FrequencySensitivity> {
    this.#sensitivity ??= through(this.#modalBasis(), (basis) => succeed(frequencySensitivity(basis)));
    return this.#sensitivity;
  }

  frequencyResponse(by: readonly number[]): Outcome<FrequencyResponse> {
    return keep(this.#responses, by.join(), () =>
      through(this.#steadyModel(), (model) => steadyResponse(model, by)),
    );
  }

  sweep(ask: SweepAsk): Outcome<SweepAnswer> {
    return keep(this.#sweeps, ask, () => through(this.#steadyModel(), (model) => sweepAnswer(model, ask)));
  }

  timeResponse(ask: HistoryAsk): Outcome<TimeResponse> {
    return through(this.#history(ask), ({ response }) => succeed(response));
  }

  history(ask: HistoryAsk): Outcome<HistoryAnswer> {
    return keep(this.#answers, ask, () => {
      const solved = this.#history(ask);
      if (solved.ok) return solved.value.answer();
      const found = solved.upTo?.answer();
      return fail(solved.reason, found?.ok ? found.value : found?.upTo);
    });
  }

  statics(): Outcome<StaticResponse> {
    this.#statics ??= staticResponse(this.instance.assembly);
    return this.#statics;
  }

  excites(form: LinearForm, modeIndex: number): number {
    const basis = this.#modalBasis();
    const table = this.modes();
    if (!basis.ok || !table.ok) return 0;
    const number = table.value.modes[modeIndex]?.number;
    if (number === undefined || number === null) return 0;
    const { free, held } = basis.value.undamped;
    return excitationOf(basis.value, form, number === 0 ? modeIndex : free + held + number - 1);
  }

  #modalBasis(): Outcome<ModalBasis> {
    this.#basis ??= modalBasis(this.instance.assembly);
    return this.#basis;
  }

  #steadyModel(): Outcome<SteadyModel> {
    this.#steady ??= through(this.#modalBasis(), (basis) =>
      through(this.modes(), (table) => steadyModel(this.instance.assembly, basis, table)),
    );
    return this.#steady;
  }

  #history(ask: HistoryAsk): Outcome<HistorySolution> {
    return keep(this.#histories, ask, () => {
      const { assembly } = this.instance;
      const basis = this.#modalBasis();
      // Histories need the modes for their damping, and take them for their digits where they are to be had.
      if (!basis.ok && hasAddedDamping(assembly, true)) return fail(basis.reason);
      return historySolution(assembly, basis.ok ? basis.value : undefined, ask);
    });
  }
}

/** The next stage's outcome; a failure goes through with its reason. */
function through<A, B>(outcome: Outcome<A>, next: (value: A) => Outcome<B>): Outcome<B> {
  return outcome.ok ? next(outcome.value) : fail(outcome.reason);
}

function keep<K, V>(known: Map<K, V>, key: K, compute: () => V): V {
  const found = known.get(key);
  if (found !== undefined) return found;
  const made = compute();
  known.set(key, made);
  return made;
}
