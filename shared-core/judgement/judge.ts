/** Judging a model: every case answered, every rule asked, every expectation held against its limit. */
import { analyse } from "../answers/analysis-of.ts";
import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import { evaluateExpression, instantiate } from "../model/instantiate.ts";
import type { Model } from "../model/model.ts";
import { judgeWith } from "./judge-with.ts";
import type { FileReport, JudgeOptions } from "./report.ts";

/**
 * Everything there is to say about a model. Pure: the same model gives the same report. When `cancelled` answers
 * true, the work ends with what is there; see `JudgeOptions`.
 */
export function judge(model: Model, options: JudgeOptions = {}): FileReport {
  return judgeWith({ instantiate, analyse, evaluate: evaluateExpression }, model, options);
}

export type { Diagnostic };
