import type { Analysis } from "../answers/analysis.ts";
import type { ModeTable } from "../answers/answer.ts";
import type { DiagnosticCode } from "../diagnostics/codes.ts";
import type { Fix, RelatedPlace } from "../diagnostics/diagnostic.ts";
import type { Assembly } from "../mechanics/assembly.ts";
import type { Expectation, Instance, Model } from "../model/model.ts";
import type { Outcome } from "../numerics/outcome.ts";
import type { Expression } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Quantity } from "../units/dimension.ts";
import type { Found } from "./found.ts";
import type { AnswerResult, Verdict } from "./report.ts";
import type { Remark } from "./trial.ts";

/**
 * What a rule costs: `text` reads the model only, `modes` needs the mode table (within a keystroke), `answers`
 * needs sweeps, histories or expectations (aside).
 */
export type CostClass = "text" | "modes" | "answers";

/** What a rule has to say at one place; the registry adds code, severity and case. */
export interface Finding {
  readonly span: Span;
  readonly message: string;
  readonly hint?: string;
  readonly related?: readonly RelatedPlace[];
  readonly fixes?: readonly Fix[];
  readonly tag?: "unnecessary";
  /** A case does not say again what the model as written said with the same key; default: message and place. */
  readonly key?: string;
}

/** One rule, one file. `check` sees one case at a time and never throws for what a user can cause. */
export interface Rule {
  readonly code: DiagnosticCode;
  readonly cost: CostClass;
  check(context: RuleContext): readonly Finding[];
}

/** A case with its answers, as far as the cost class of the rule allows: below `answers` both lists are empty. */
export interface RuleContext {
  readonly model: Model;
  readonly instance: Instance;
  readonly assembly: Assembly;
  readonly analysis: Analysis;
  readonly modes: Outcome<ModeTable>;
  readonly answers: ReadonlyMap<string, AnswerResult>;
  readonly judged: readonly Judged[];
  /** The value of an expression with the numbers of the case. */
  evaluate(expression: Expression): Found<Quantity>;
}

/** A verdict with what was learnt on the way to it. */
export interface Judged {
  readonly verdict: Verdict;
  readonly expectation: Expectation;
  /** What would make a failing expectation hold, each `let` alone, the one that has to move least first. */
  readonly cures: readonly Cure[];
  /** What its functions found out about the asks they read. */
  readonly remarks: readonly Remark[];
  /** True when what kept it from being computed is said elsewhere as an error or a warning. */
  readonly explained: boolean;
}

/** SI value (a rate: Hz) of the parameter at which the expectation would hold. */
export interface Cure {
  readonly parameter: string;
  readonly value: number;
  /** Whether values below or above `value` hold. */
  readonly side: "at most" | "at least";
}
