import type { Draw, Expectation, Instance } from "../../model/model.ts";
import { sidesOf } from "../sides.ts";
import type { Trial } from "../trial.ts";

/**
 * The draws that an expectation could feel. One that moves neither the system, nor a limit, nor the expectation
 * itself at either end of its band is left out of the search.
 */
export function relevantDraws(
  base: Trial,
  draws: readonly Draw[],
  expectations: readonly Expectation[],
): readonly Draw[] {
  const here = expectations.map((expectation) => excessOf(base, expectation));
  return draws.filter((draw) =>
    [-1, 1].some((position) => {
      const moved = base.with({ draws: new Map([[draw.id, position]]) });
      return (
        !sameNumbers(base.instance, moved.instance) ||
        expectations.some((expectation, i) => excessOf(moved, expectation) !== here[i])
      );
    }),
  );
}

function excessOf(trial: Trial, expectation: Expectation): number | string {
  const sides = sidesOf(trial, expectation);
  return sides.ok ? sides.value.excess : sides.reason;
}

/** Whether two instances of a model are the same system, bit for bit. Laws and records cannot be compared. */
function sameNumbers(a: Instance, b: Instance): boolean {
  const opaque = a.assembly.drives.some(({ shape }) => shape.kind === "law" || shape.kind === "record");
  return !opaque && numbersOf(a) === numbersOf(b);
}

function numbersOf({ assembly, limits, asks }: Instance): string {
  return JSON.stringify([assembly, [...limits.values()], asks.map((ask) => ({ ...ask, node: undefined }))]);
}
