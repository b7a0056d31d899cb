import type { Expectation } from "../model/model.ts";
import { findRoot } from "../numerics/roots.ts";
import type { Influence } from "./matters-most.ts";
import type { Cure } from "./rule.ts";
import { sidesOf } from "./sides.ts";
import type { Steps } from "./steps.ts";
import type { Trial } from "./trial.ts";

/** Factors by which a parameter is moved until the expectation holds. Beyond ten it would be another design. */
const FACTORS = [1.02, 1.05, 1.1, 1.2, 1.4, 1.7, 2, 3, 5, 10];
/** Parameters that are tried, the one that matters most first. */
const TRIED = 3;
/** Relative closeness of the value found, and evaluations spent on it. */
const CLOSE = 1e-5;
const EVALUATIONS = 24;

/** The value of the parameter that matters most at which a failing expectation would hold. */
export function* cureOf(
  base: Trial,
  expectation: Expectation,
  followed: readonly Influence[],
): Steps<Cure | undefined> {
  const upper = expectation.operator === "<=" || expectation.operator === "<";
  const value = base.evaluate(expectation.left);
  for (const { name, sensitivity } of followed.slice(0, TRIED)) {
    if ((yield) || !value.ok) return undefined;
    const lessValue = sensitivity * value.value.value > 0 ? -1 : 1;
    const found = moveUntilItHolds(base, expectation, name, upper ? lessValue : -lessValue);
    if (found !== undefined) return found;
  }
  return undefined;
}

/** `direction` 1: away from zero; -1: towards it. */
function moveUntilItHolds(
  base: Trial,
  expectation: Expectation,
  name: string,
  direction: number,
): Cure | undefined {
  const parameter = base.instance.parameters.get(name);
  if (parameter === undefined) return undefined;
  const excessAt = (times: number): number => {
    const moved = base.with({ parameters: new Map([[name, parameter.value * times]]) });
    const sides = sidesOf(moved, expectation);
    return sides.ok ? sides.value.excess : Number.NaN;
  };
  let last = 1;
  for (const factor of FACTORS) {
    const times = direction > 0 ? factor : 1 / factor;
    const excess = excessAt(times);
    if (Number.isNaN(excess)) return undefined;
    if (excess <= 0) {
      const root = findRoot(excessAt, last, times, { tolerance: CLOSE * last, evaluations: EVALUATIONS });
      const at = root.ok ? root.value.x : (root.upTo?.x ?? times);
      const value = parameter.value * at;
      return { parameter: name, value, side: value > parameter.value ? "at least" : "at most" };
    }
    last = times;
  }
  return undefined;
}
