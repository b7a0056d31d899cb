import { analyse } from "../answers/analysis-of.ts";
import { judgeWith } from "../judgement/judge-with.ts";
import type { CaseReport } from "../judgement/report.ts";
import { evaluateExpression, instantiate } from "../model/instantiate.ts";
import type { Model } from "../model/model.ts";

/**
 * One case judged anew with other values of some lets.
 * @param knobs SI values by name, rates in Hz; names that are no lets are passed over
 * @returns undefined where these numbers leave nothing to judge
 */
export function movedReport(
  model: Model,
  caseIndex: number,
  knobs: ReadonlyMap<string, number>,
): CaseReport | undefined {
  const only: Model = { ...model, cases: [model.cases[caseIndex]] };
  const sources = {
    instantiate: (_: Model, __: number, overrides = {}) =>
      instantiate(model, caseIndex, withKnobs(overrides, knobs)),
    analyse,
    evaluate: evaluateExpression,
  };
  return judgeWith(sources, only).cases[0];
}

type Overrides = NonNullable<Parameters<typeof instantiate>[2]>;

function withKnobs(overrides: Overrides, knobs: ReadonlyMap<string, number>): Overrides {
  return { ...overrides, parameters: new Map([...knobs, ...(overrides.parameters ?? [])]) };
}
