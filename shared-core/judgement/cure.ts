import type { Expectation, HistoryAsk } from "../model/model.ts";
import { findRoot } from "../numerics/roots.ts";
import { type Influence, readsHistory } from "./matters-most.ts";
import type { Cure } from "./rule.ts";
import { sidesOf } from "./sides.ts";
import type { Steps } from "./steps.ts";
import type { Trial } from "./trial.ts";

/** Factors by which a parameter is moved until the expectation holds. Beyond ten it would be another design. */
const FACTORS = [1.02, 1.05, 1.1, 1.2, 1.4, 1.7, 2, 3, 5, 10];
/** Parameters that are tried, the one that matters most first, and cures that are named. */
const TRIED = 8;
const NAMED = 3;
/** Relative closeness of the value found, and trials spent on it. */
const CLOSE = 1e-5;
const EVALUATIONS = 24;
/** Trials spent on one expectation in all; one that reads a history takes far longer each. */
const TRIALS = 120;
const TRIALS_IN_TIME = 36;

/**
 * The parameters that make a failing expectation hold when they alone are moved, the one that has to move least
 * first, with the value at which it begins to hold.
 */
export function* curesOf(
  base: Trial,
  expectation: Expectation,
  followed: readonly Influence[],
): Steps<readonly Cure[]> {
  const upper = expectation.operator === "<=" || expectation.operator === "<";
  const value = base.evaluate(expectation.left);
  const found: (Cure & { readonly times: number })[] = [];
  const budget = { left: readsHistory(expectation, historiesOf(base)) ? TRIALS_IN_TIME : TRIALS };
  for (const { name, sensitivity } of followed.slice(0, TRIED)) {
    if ((yield) || !value.ok || budget.left <= 0) break;
    const lessValue = sensitivity * value.value.value > 0 ? -1 : 1;
    const cure = moveUntilItHolds(base, expectation, name, upper ? lessValue : -lessValue, budget);
    if (cure !== undefined) found.push(cure);
  }
  found.sort((a, b) => movedBy(a) - movedBy(b));
  return found.slice(0, NAMED).map(({ parameter, value, side }) => ({ parameter, value, side }));
}

/** To three digits: among equals the one that matters most comes first. */
const movedBy = ({ times }: { readonly times: number }): number =>
  Number(Math.abs(Math.log(times)).toPrecision(3));

const historiesOf = ({ instance }: Trial): readonly HistoryAsk[] =>
  instance.asks.filter((ask): ask is HistoryAsk => ask.kind === "history");

/**
 * Both ways step by step, `direction` (1: away from zero, -1: towards it) first: where a value has a turning point,
 * as a distance from a resonance has, the way that makes it worse at first may be the shorter one.
 */
function moveUntilItHolds(
  base: Trial,
  expectation: Expectation,
  name: string,
  direction: number,
  budget: { left: number },
): (Cure & { readonly times: number }) | undefined {
  const parameter = base.instance.parameters.get(name);
  if (parameter === undefined) return undefined;
  const excessAt = remembered((times) => {
    if (budget.left-- <= 0) return Number.NaN;
    const moved = base.with({ parameters: new Map([[name, parameter.value * times]]) });
    const sides = sidesOf(moved, expectation);
    return sides.ok ? sides.value.excess : Number.NaN;
  });
  const closed = new Set<number>();
  for (const [i, factor] of FACTORS.entries()) {
    for (const way of [direction, -direction]) {
      if (closed.has(way)) continue;
      const times = factor ** way;
      const excess = excessAt(times);
      if (Number.isNaN(excess)) closed.add(way);
      if (!(excess <= 0)) continue;
      const last = (FACTORS[i - 1] ?? 1) ** way;
      const root = findRoot(excessAt, last, times, { tolerance: CLOSE * last, evaluations: EVALUATIONS });
      const at = root.ok ? root.value.x : (root.upTo?.x ?? times);
      const value = parameter.value * at;
      return { parameter: name, value, side: at > 1 ? "at least" : "at most", times: at };
    }
  }
  return undefined;
}

/** The search for the root asks for both ends of its interval, which are known. */
function remembered(of: (x: number) => number): (x: number) => number {
  const known = new Map<number, number>();
  return (x) => {
    const value = known.get(x) ?? of(x);
    known.set(x, value);
    return value;
  };
}
