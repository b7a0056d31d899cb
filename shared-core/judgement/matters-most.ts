import type { Expectation, HistoryAsk } from "../model/model.ts";
import type { Expression } from "../syntax/tree.ts";
import { names } from "./expression-nodes.ts";
import type { Steps } from "./steps.ts";
import type { Trial } from "./trial.ts";

/** A `let` and the relative change of a value per relative change of it. */
export interface Influence {
  readonly name: string;
  readonly sensitivity: number;
}

/** Relative step of the central difference: its error, of the order of its square, is beyond what is shown. */
const STEP = 1e-3;
/** Smaller than this a value does not follow the parameter. */
const NONE = 1e-7;

/**
 * For each expectation the parameters that its value follows, the strongest first. Each parameter is moved once
 * up and once down for all of them.
 */
export function* influences(
  base: Trial,
  expectations: readonly Expectation[],
): Steps<ReadonlyMap<Expectation, readonly Influence[]>> {
  const found = new Map<Expectation, Influence[]>(expectations.map((expectation) => [expectation, []]));
  const here = new Map(expectations.map(({ left }) => [left, nominalOf(base, left)]));
  for (const { name, value } of base.instance.parameters.values()) {
    if (expectations.length === 0 || (yield)) break;
    if (value === 0 || !Number.isFinite(value)) continue;
    const [up, down] = [1 + STEP, 1 - STEP].map((times) =>
      base.with({ parameters: new Map([[name, value * times]]) }),
    );
    for (const expectation of expectations) {
      const nominal = here.get(expectation.left) ?? Number.NaN;
      const change = nominalOf(up, expectation.left) - nominalOf(down, expectation.left);
      const sensitivity = change / (2 * STEP * nominal);
      if (Math.abs(sensitivity) > NONE && Number.isFinite(sensitivity)) {
        found.get(expectation)?.push({ name, sensitivity });
      }
    }
  }
  for (const list of found.values()) list.sort((a, b) => sizeOf(b) - sizeOf(a));
  return found;
}

/** To three digits: among equals the one that the file gives first comes first. */
const sizeOf = ({ sensitivity }: Influence): number => Number(Math.abs(sensitivity).toPrecision(3));

function nominalOf(trial: Trial, expression: Expression): number {
  const value = trial.evaluate(expression);
  return value.ok ? value.value.value : Number.NaN;
}

/** Whether an expectation reads a history, which takes far longer than modes and sweeps. */
export function readsHistory({ left, right }: Expectation, histories: readonly HistoryAsk[]): boolean {
  const asked = new Set(histories.map((ask) => ask.name));
  return [left, right].some((side) => names(side, asked));
}
