import type { Expectation } from "../../model/model.ts";
import type { Verdict } from "../report.ts";
import type { Steps } from "../steps.ts";
import type { Trial } from "../trial.ts";
import { Explorer, type Positions } from "./explorer.ts";
import { relevantDraws } from "./relevant.ts";
import { shareOfDraws } from "./share.ts";
import { type Worst, worstCases } from "./worst-case.ts";

export type ToleranceFound = NonNullable<Verdict["tolerance"]>;

/** Judges every expectation that asks for more than the nominal numbers. Empty where the work was cancelled. */
export function* judgeTolerances(
  base: Trial,
  expectations: readonly Expectation[],
): Steps<ReadonlyMap<Expectation, ToleranceFound>> {
  const found = new Map<Expectation, ToleranceFound>();
  const worst = expectations.filter(({ tolerance }) => tolerance === "worst_case");
  const shares = expectations.filter(({ tolerance }) => typeof tolerance === "object");
  if ((worst.length === 0 && shares.length === 0) || (yield)) return found;
  const draws = relevantDraws(base, base.instance.model.draws, [...worst, ...shares]);
  const explorer = new Explorer(base, draws);
  (yield* worstCases(explorer, worst)).forEach((result, i) => {
    if (result !== "cancelled") found.set(worst[i], worstFound(explorer, worst[i], result));
  });
  for (const expectation of shares) {
    const wanted = typeof expectation.tolerance === "object" ? expectation.tolerance.share : 1;
    const result = yield* shareOfDraws(explorer, expectation, wanted);
    if (result === "cancelled") continue;
    found.set(
      expectation,
      "reason" in result
        ? { kind: "share", holds: null, worst: null, reason: result.reason }
        : {
            kind: "share",
            holds: result.share >= wanted,
            worst: result.worst,
            share: result.share,
            samples: result.samples,
          },
    );
  }
  return found;
}

function worstFound(
  explorer: Explorer,
  expectation: Expectation,
  result: Exclude<Worst, "cancelled">,
): ToleranceFound {
  if ("reason" in result) return { kind: "worst_case", holds: null, worst: null, reason: result.reason };
  const here = explorer.excess(expectation, result.positions);
  return {
    kind: "worst_case",
    holds: result.excess <= ROUNDING * Math.abs("value" in here ? here.value : 0),
    worst: "value" in here ? here.value : null,
    at: valuesAt(explorer, result.positions),
    how: result.proven ? "proven" : "searched",
  };
}

/** A worst value equal to its limit but for rounding holds. */
const ROUNDING = 1e-12;

/** What each draw's owner stands at, in SI: a `let`, or a property of an element or of what moves. */
function valuesAt(explorer: Explorer, positions: Positions): Readonly<Record<string, number>> {
  const { parameters, assembly } = explorer.trial(positions).instance;
  const values: Record<string, number> = {};
  for (const { owner } of explorer.draws) {
    const dot = owner.lastIndexOf(".");
    const [name, property] = [owner.slice(0, dot), owner.slice(dot + 1)];
    const element = assembly.elements.find((candidate) => candidate.name === name);
    const inertia = assembly.inertias.find((candidate) => candidate.owner === name);
    const value = parameters.get(owner)?.value ?? propertyOf(element, property) ?? inertia?.value;
    if (value !== undefined) values[owner] = value;
  }
  return values;
}

function propertyOf(
  element: { readonly stiffness: number; readonly damping: number; readonly count: number } | undefined,
  property: string,
): number | undefined {
  if (element === undefined) return undefined;
  if (property === "stiffness") return element.stiffness / element.count;
  return property === "damping" ? element.damping / element.count : undefined;
}
