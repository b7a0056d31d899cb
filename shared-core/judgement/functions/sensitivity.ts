import type { AnswerArguments } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Expression } from "../../syntax/tree.ts";
import type { Quantity } from "../../units/dimension.ts";
import { number } from "../../units/quantity.ts";
import type { Found } from "../found.ts";
import type { Trial } from "../trial.ts";
import { argument } from "./arguments.ts";

/** Relative change of a quantity per relative change of a `let`. */
export function sensitivity(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const quantity = argument(args, "quantity", "expression");
  if (!quantity.ok) return quantity;
  const parameter = argument(args, "parameter", "let");
  if (!parameter.ok) return parameter;
  const found = relativeDerivative(trial, quantity.value.expression, parameter.value.name);
  return found.ok ? succeed(number(found.value)) : found;
}

/**
 * Relative step. Two central differences, of one and half this step, are extrapolated (Richardson): the error is
 * of the fourth order in it, and a response as sharp as 0.1 % of damping still looks smooth over it.
 */
const STEP = 1e-4;

/** (p / y) dy/dp. */
export function relativeDerivative(trial: Trial, expression: Expression, name: string): Found<number> {
  const parameter = trial.instance.parameters.get(name);
  if (parameter === undefined) return fail(`there is no parameter \`${name}\``);
  if (parameter.value === 0) return fail(`\`${name}\` is zero, so it has no relative change`);
  const here = trial.evaluate(expression);
  if (!here.ok) return here;
  if (here.value.value === 0) return fail("the quantity is zero, so it has no relative change");
  const at = (share: number): Found<number> => {
    const moved = trial.with({ parameters: new Map([[name, parameter.value * (1 + share)]]) });
    const value = moved.evaluate(expression);
    return value.ok ? succeed(value.value.value) : value;
  };
  const wide = central(at, STEP);
  if (!wide.ok) return wide;
  const narrow = central(at, STEP / 2);
  if (!narrow.ok) return narrow;
  return succeed((4 * narrow.value - wide.value) / (3 * here.value.value));
}

function central(at: (share: number) => Found<number>, step: number): Found<number> {
  const up = at(step);
  if (!up.ok) return up;
  const down = at(-step);
  return down.ok ? succeed((up.value - down.value) / (2 * step)) : down;
}
