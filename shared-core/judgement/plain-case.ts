import { analyse } from "../answers/analysis-of.ts";
import { evaluateExpression, instantiate } from "../model/instantiate.ts";
import type { Expectation, Model, Overrides } from "../model/model.ts";
import { NUMBER } from "../units/quantity.ts";
import { siUnit } from "../units/show.ts";
import { answerOf } from "./judge-with.ts";
import type { AnswerResult, CaseReport, Verdict } from "./report.ts";
import { marginOf, sidesOf } from "./sides.ts";
import type { Trial } from "./trial.ts";
import { trialOf } from "./trial-of.ts";

/**
 * One case with other numbers, as fast as it can be had: modes, answers and values against limits, without
 * tolerances, rules and what matters most. For numbers that are being moved.
 */
export function plainCase(model: Model, caseIndex: number, overrides: Overrides): CaseReport {
  const name = model.cases[caseIndex].name;
  const sources = { instantiate, analyse, evaluate: evaluateExpression };
  const listeners = { remark: () => {}, fault: () => {} };
  const trial = trialOf(sources, model, caseIndex, listeners, overrides);
  const { instance, analysis } = trial;
  const base = { name, instance, analysis };
  if (!instance.sound) {
    const reason = instance.diagnostics[0]?.message ?? "these numbers leave no system to compute";
    return { ...base, modes: { ok: false, reason }, answers: new Map(), verdicts: [] };
  }
  const modes = trial.modes();
  const asks = instance.asks.filter(({ kind }) => kind !== "modes");
  const answers = new Map<string, AnswerResult>(asks.map((ask) => [ask.name, answerOf(trial, ask)]));
  const judged = model.expectations.filter(({ cases }) => cases === undefined || cases.includes(name));
  return {
    ...base,
    modes: modes.ok ? { ok: true, table: modes.value } : { ok: false, reason: modes.reason },
    answers,
    verdicts: judged.map((expectation) => plainVerdict(trial, expectation)),
  };
}

/** Value against limit and nothing more. */
function plainVerdict(trial: Trial, expectation: Expectation): Verdict {
  const sides = sidesOf(trial, expectation);
  const limit = sides.ok ? sides.value.limit : undefined;
  const kind = limit === undefined ? NUMBER : { dimension: limit.dimension, rate: limit.rate };
  const base = { name: expectation.name, expectation, kind, unit: siUnit(kind) };
  if (!sides.ok) {
    return { ...base, holds: null, reason: sides.reason, value: null, limit: null, margin: null };
  }
  const { value, holds } = sides.value;
  return { ...base, holds, value: value.value, limit: limit?.value ?? null, margin: marginOf(sides.value) };
}
