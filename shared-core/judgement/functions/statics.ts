import type { AnswerArguments } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Quantity } from "../../units/dimension.ts";
import { dimension, number, quantity } from "../../units/quantity.ts";
import type { Found } from "../found.ts";
import type { Trial } from "../trial.ts";
import { argument } from "./arguments.ts";

/** Size of the travel of an element when gravity acts. */
export function staticDeflection(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const found = staticOf(trial, args);
  if (!found.ok) return found;
  const { travel, turning } = found.value;
  return succeed(turning ? number(travel) : quantity(travel, dimension(1)));
}

/** Size of the force of an element when gravity acts; the total of its count, of a group that of the sum. */
export function staticForce(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const found = staticOf(trial, args);
  if (!found.ok) return found;
  const { force, turning } = found.value;
  return succeed(quantity(force, turning ? dimension(2, 1, -2) : dimension(1, 1, -2)));
}

function staticOf(
  trial: Trial,
  args: AnswerArguments,
): Found<{ readonly travel: number; readonly force: number; readonly turning: boolean }> {
  const element = argument(args, "element", "element");
  if (!element.ok) return element;
  const { elements, name } = element.value;
  if (elements.length === 0) return fail(`\`${name}\` joins nothing`);
  const statics = trial.analysis.statics();
  if (!statics.ok) return statics;
  let travel = 0;
  let pull = 0;
  for (const index of elements) {
    const found = statics.value.element(index);
    if (!found.ok) return found;
    travel = Math.max(travel, Math.abs(found.value.travel));
    pull += found.value.pull;
  }
  const turning = trial.instance.assembly.elements[elements[0]]?.motion === "turning";
  return succeed({ travel, force: Math.abs(pull), turning });
}
