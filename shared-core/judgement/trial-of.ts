import type { Analysis } from "../answers/analysis.ts";
import type { ModeTable } from "../answers/answer.ts";
import type { AnswerFunction, Instance, Model, Overrides } from "../model/model.ts";
import { fail, type Outcome } from "../numerics/outcome.ts";
import type { Expression } from "../syntax/tree.ts";
import type { Quantity } from "../units/dimension.ts";
import type { Found } from "./found.ts";
import { readAnswer } from "./functions/registry.ts";
import { growingModes } from "./growth.ts";
import type { Remark, Trial } from "./trial.ts";
import { rate } from "./wording.ts";

/** What judging takes from the model and the answers; the real ones stand in judge.ts. */
export interface Sources {
  instantiate(model: Model, caseIndex: number, overrides?: Overrides): Instance;
  analyse(instance: Instance): Analysis;
  evaluate(instance: Instance, expression: Expression, answers: AnswerFunction): Outcome<Quantity>;
}

/** Who hears what comes to light while a trial is read. */
export interface Listeners {
  remark(remark: Remark): void;
  /** An exception in a function: a defect of Thrum, which costs that value only. */
  fault(where: string, error: unknown): void;
}

/** A trial of one case. Those derived from it hand on their faults, and keep their remarks to themselves. */
export function trialOf(
  sources: Sources,
  model: Model,
  caseIndex: number,
  listeners: Listeners,
  overrides: Overrides = {},
): Trial {
  const instance = sources.instantiate(model, caseIndex, overrides);
  const analysis = sources.analyse(instance);
  let modes: Outcome<ModeTable> | undefined;
  let growth: { readonly reason: string | undefined } | undefined;
  const readModes = (): Outcome<ModeTable> => {
    modes ??= analysis.modes();
    return modes;
  };
  const trial: Trial = {
    instance,
    analysis,
    modes: readModes,
    get noSteadyAnswer() {
      growth ??= { reason: whyNoSteadyAnswer(readModes()) };
      return growth.reason;
    },
    evaluate: (expression) =>
      sources.evaluate(
        instance,
        expression,
        answersOf(() => trial, listeners),
      ),
    with: (more) =>
      trialOf(sources, model, caseIndex, { ...listeners, remark: () => {} }, joined(overrides, more)),
    remark: listeners.remark,
  };
  return trial;
}

/** The answer functions of a trial, each call behind a wall. */
const answersOf =
  (trial: () => Trial, { fault }: Listeners): AnswerFunction =>
  (call, args) => {
    let read: Found<Quantity>;
    try {
      read = readAnswer(trial(), call, args);
    } catch (error) {
      fault(call.callee.text, error);
      return fail(`a fault of Thrum kept ${call.callee.text} from being computed`);
    }
    return read.ok ? read : fail(read.reason);
  };

function joined(a: Overrides, b: Overrides): Overrides {
  return {
    draws: new Map([...(a.draws ?? []), ...(b.draws ?? [])]),
    parameters: new Map([...(a.parameters ?? []), ...(b.parameters ?? [])]),
  };
}

/** A system with a growing mode has no steady response to speak of. */
function whyNoSteadyAnswer(modes: Outcome<ModeTable>): string | undefined {
  const growing = growingModes(modes)[0];
  if (growing === undefined) return undefined;
  const { number, frequencyHz } = growing;
  return number === null || frequencyHz === null
    ? "the system grows, so there is no steady response"
    : `mode ${number} at ${rate(frequencyHz)} grows, so there is no steady response`;
}
