import type { Analysis } from "../answers/analysis.ts";
import type { ModeTable } from "../answers/answer.ts";
import type { DiagnosticCode } from "../diagnostics/codes.ts";
import type { Ask, Instance, Overrides } from "../model/model.ts";
import type { Expression } from "../syntax/tree.ts";
import type { Quantity } from "../units/dimension.ts";
import type { Found } from "./found.ts";

/** Something that came to light about an ask while a function read its answer. */
export interface Remark {
  readonly code: DiagnosticCode;
  readonly ask: Ask;
  readonly message: string;
  readonly hint?: string;
}

/**
 * One instance under judgement: the numbers of a case with some of them replaced. Functions read it, and ask it
 * for others that differ in one parameter.
 */
export interface Trial {
  readonly instance: Instance;
  readonly analysis: Analysis;
  modes(): Found<ModeTable>;
  /** Set when a mode grows: why there is no steady answer. */
  readonly noSteadyAnswer: string | undefined;
  /** The value of an expression, answers included. */
  evaluate(expression: Expression): Found<Quantity>;
  /** The same case with these numbers replaced as well. */
  with(overrides: Overrides): Trial;
  remark(remark: Remark): void;
}
