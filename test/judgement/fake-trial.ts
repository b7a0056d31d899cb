import type { Trial } from "../../shared-core/judgement/trial.ts";
import type { Draw, Expectation, Instance, Overrides } from "../../shared-core/model/model.ts";
import type { Expression } from "../../shared-core/syntax/tree.ts";
import { number } from "../../shared-core/units/quantity.ts";

/** A trial whose left side is a function of the positions of its draws and whose right side is a number. */
export function fakeTrial(
  f: (positions: readonly number[]) => number,
  limit: number,
  draws: readonly Draw[],
): Trial {
  const make = (positions: readonly number[]): Trial => ({
    instance: { model: { draws }, asks: [] } as unknown as Instance,
    analysis: undefined as never,
    modes: () => ({ ok: false, reason: "there are no modes here" }),
    noSteadyAnswer: undefined,
    evaluate: (expression) => {
      const value = expression === LEFT ? f(positions) : limit;
      return Number.isNaN(value)
        ? { ok: false, reason: "no value here" }
        : { ok: true, value: number(value) };
    },
    with: ({ draws: moved }: Overrides) => make(draws.map((draw, i) => moved?.get(draw.id) ?? positions[i])),
    remark: () => {},
  });
  return make(draws.map(() => 0));
}

const LEFT = { kind: "broken", span: { start: 0, end: 1 } } as const satisfies Expression;
const RIGHT = { kind: "broken", span: { start: 2, end: 3 } } as const satisfies Expression;

export const atMost = (tolerance: Expectation["tolerance"]): Expectation =>
  ({ name: "held", left: LEFT, right: RIGHT, operator: "<=", tolerance }) as unknown as Expectation;

export const fakeDraws = (
  count: number,
  distribution: Draw["distribution"] = "uniform",
  copies = 1,
): readonly Draw[] =>
  Array.from({ length: count }, (_, id) => ({
    id,
    owner: `p${id}`,
    span: { start: 0, end: 0 },
    distribution,
    copies,
  }));
