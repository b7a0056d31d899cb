/** Judging a model: every case answered, every rule asked, every expectation held against its limit. */
import type { Analysis } from "../answers/analysis.ts";
import { movedAnalysis } from "../answers/analysis-moved.ts";
import { analyse } from "../answers/analysis-of.ts";
import { evaluateExpression, instantiate } from "../model/instantiate.ts";
import type { Instance, Model, Overrides } from "../model/model.ts";
import { instanceOf } from "../model/understand.ts";
import { judgeSteps, judgeWith } from "./judge-with.ts";
import type { FileReport, JudgeOptions } from "./report.ts";
import type { CostClass } from "./rule.ts";
import type { Steps } from "./steps.ts";
import type { Sources } from "./trial-of.ts";

/**
 * Everything there is to say about a model. Pure: the same model gives the same report. When `cancelled` answers
 * true, the work ends with what is there; see `JudgeOptions`.
 */
export function judge(model: Model, options: JudgeOptions = {}): FileReport {
  return judgeWith(SOURCES, model, options);
}

/**
 * The same in steps, for who has other things to look at in between: a step is one answer, one corner of a
 * tolerance, one rule. `upTo` says how far to go, as in `JudgeOptions`.
 */
export function judgeInSteps(model: Model, upTo?: CostClass): Steps<FileReport> {
  return judgeSteps(SOURCES, model, upTo);
}

/**
 * A model that means the same as the one of an earlier report (see `sameMeaning`) and read the same files: no
 * answer is computed anew, only what is said gets the places of the new text.
 */
export function judgeAgain(model: Model, before: FileReport): Steps<FileReport> {
  for (const [index, { analysis }] of before.cases.entries()) {
    const instance = SOURCES.instantiate(model, index);
    ANALYSES.set(instance, movedAnalysis(instance, analysis));
  }
  return judgeSteps(
    SOURCES,
    model,
    "answers",
    before.cases.map(({ judged }) => judged),
  );
}

/** The cases of a model as they stand are kept as long as the model: judged further, they go on from there. */
const KEPT = new WeakMap<Model, Instance[]>();
const ANALYSES = new WeakMap<Instance, Analysis>();

const SOURCES: Sources = {
  evaluate: evaluateExpression,
  instantiate(model: Model, caseIndex: number, overrides?: Overrides): Instance {
    if (overrides?.draws?.size || overrides?.parameters?.size) {
      return instantiate(model, caseIndex, overrides);
    }
    const kept = KEPT.get(model) ?? [];
    KEPT.set(model, kept);
    kept[caseIndex] ??= (caseIndex === 0 ? instanceOf(model) : undefined) ?? instantiate(model, caseIndex);
    return kept[caseIndex];
  },
  analyse(instance: Instance): Analysis {
    const isKept = KEPT.get(instance.model)?.[instance.caseIndex] === instance;
    const analysis = ANALYSES.get(instance) ?? analyse(instance);
    if (isKept) ANALYSES.set(instance, analysis);
    return analysis;
  },
};
