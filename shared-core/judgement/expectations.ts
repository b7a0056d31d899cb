/** Judging the expectations of one case: value, limit, margin, tolerance, what matters and what would cure it. */
import { CODES } from "../diagnostics/codes.ts";
import type { Expectation, HistoryAsk, Instance } from "../model/model.ts";
import type { Kind, Quantity } from "../units/dimension.ts";
import { NUMBER } from "../units/quantity.ts";
import { siUnit } from "../units/show.ts";
import { curesOf } from "./cure.ts";
import { names } from "./expression-nodes.ts";
import type { Found } from "./found.ts";
import { type Influence, influences, readsHistory } from "./matters-most.ts";
import type { Verdict } from "./report.ts";
import type { Judged } from "./rule.ts";
import { marginOf, type Sides, sidesOf } from "./sides.ts";
import type { Steps } from "./steps.ts";
import { judgeTolerances, type ToleranceFound } from "./tolerance/judge-tolerances.ts";
import type { Remark, Trial } from "./trial.ts";

/** `trial` is the case as it stands; `remarks` is where it writes what it finds out. */
export function* judgeExpectations(
  trial: Trial,
  remarks: Remark[],
  expectations: readonly Expectation[],
): Steps<readonly Judged[]> {
  const read: { expectation: Expectation; sides: Found<Sides>; remarks: Remark[] }[] = [];
  for (const expectation of expectations) {
    remarks.length = 0;
    read.push({ expectation, sides: sidesOf(trial, expectation), remarks: [...remarks] });
    yield;
  }
  const computed = read.filter(({ sides }) => sides.ok).map(({ expectation }) => expectation);
  const tolerances = yield* judgeTolerances(trial, computed);
  const asked = read.filter(({ expectation, sides }) =>
    wantsInfluences(trial, expectation, sides, tolerances),
  );
  const followed = yield* influences(
    trial,
    asked.map(({ expectation }) => expectation),
  );
  const judged: Judged[] = [];
  for (const { expectation, sides, remarks: found } of read) {
    const influence = followed.get(expectation) ?? [];
    const fails = sides.ok && !sides.value.holds;
    judged.push({
      verdict: sides.ok
        ? verdictOf(expectation, sides.value, tolerances.get(expectation), influence[0])
        : noVerdict(expectation, sides.reason, trial.evaluate(expectation.right)),
      expectation,
      cures: fails ? yield* curesOf(trial, expectation, influence) : [],
      remarks: found,
      explained:
        sides.ok ||
        found.some(({ code }) => CODES[code] === "error") ||
        isExplained(trial, expectation, sides.reason),
    });
  }
  return judged;
}

/** What stands for an expectation that a fault of Thrum kept from being judged: it does not hold in silence. */
export function unjudged(expectation: Expectation): Judged {
  const verdict = noVerdict(expectation, "a fault of Thrum kept it from being judged");
  return { verdict, expectation, cures: [], remarks: [], explained: false };
}

/** A history is integrated anew for every parameter: only where the expectation is in trouble. */
function wantsInfluences(
  trial: Trial,
  expectation: Expectation,
  sides: Found<Sides>,
  tolerances: ReadonlyMap<Expectation, ToleranceFound>,
): boolean {
  if (!sides.ok) return false;
  const histories = trial.instance.asks.filter((ask): ask is HistoryAsk => ask.kind === "history");
  const thin = tolerances.get(expectation)?.holds === false;
  return !sides.value.holds || thin || !readsHistory(expectation, histories);
}

/** The limit stands where it is known; the unit is its. */
function noVerdict(expectation: Expectation, reason: string, limit?: Found<Quantity>): Verdict {
  const known = limit?.ok ? limit.value : undefined;
  const kind = known === undefined ? NUMBER : { dimension: known.dimension, rate: known.rate };
  return {
    name: expectation.name,
    expectation,
    holds: null,
    reason,
    value: null,
    limit: known?.value ?? null,
    kind,
    unit: siUnit(kind),
    margin: null,
  };
}

function verdictOf(
  expectation: Expectation,
  sides: Sides,
  tolerance: ToleranceFound | undefined,
  mattersMost: Influence | undefined,
): Verdict {
  const { value, limit, holds } = sides;
  const kind: Kind = { dimension: value.dimension, rate: value.rate };
  return {
    name: expectation.name,
    expectation,
    holds,
    value: value.value,
    limit: limit.value,
    kind,
    unit: siUnit(kind),
    margin: marginOf(sides),
    tolerance,
    mattersMost,
  };
}

/** True when an error said elsewhere is why nothing came of it. */
function isExplained(trial: Trial, { node, left, right }: Expectation, reason: string): boolean {
  const { instance } = trial;
  const error = ({ severity }: Instance["diagnostics"][number]): boolean => severity === "error";
  const inside = instance.model.diagnostics.some(
    (diagnostic) =>
      error(diagnostic) && node.span.start <= diagnostic.span.start && diagnostic.span.end <= node.span.end,
  );
  const later = new Set(instance.asks.filter((ask) => ask.kind === "later").map((ask) => ask.name));
  const readsLater = [left, right].some((side) => names(side, later));
  return reason === trial.noSteadyAnswer || instance.diagnostics.some(error) || inside || readsLater;
}
