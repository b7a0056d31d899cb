/** Rates that an expectation keeps modes clear of: multiples of a rotating speed that need not be drives of the model. */
import type { CaseReport } from "../judgement/report.ts";
import { evaluateExpression } from "../model/instantiate.ts";
import type { AnswerArguments, Expectation } from "../model/model.ts";
import { succeed } from "../numerics/outcome.ts";
import { NUMBER } from "../units/quantity.ts";
import { formatNumber } from "../units/show.ts";

export interface AskedOrder {
  /** Name of the expectation. */
  readonly name: string;
  readonly order: number;
  readonly fromHz: number;
  readonly toHz: number;
  /** `6 × pump_speed`. */
  readonly label: string;
}

/** The orders of every `clear_of_modes` that is judged in a case, each once. */
export function askedOrders({ instance, verdicts }: CaseReport): AskedOrder[] {
  const found = verdicts.flatMap(({ expectation }) => {
    const args = argumentsOf(instance, expectation);
    const band = args && bandOf(args);
    if (band === undefined) return [];
    const [low, high] = band;
    const orders = args?.orders?.is === "list" ? args.orders.values : [1];
    const what = rateText(instance.model.tree.text, expectation);
    return orders
      .filter((order) => order > 0)
      .map((order) => ({
        name: expectation.name,
        order,
        fromHz: order * low,
        toHz: order * high,
        label: order === 1 ? what : `${formatNumber(order)} × ${what}`,
      }));
  });
  const isFirst = ({ fromHz, toHz }: AskedOrder, i: number) =>
    found.findIndex((each) => each.fromHz === fromHz && each.toHz === toHz) === i;
  return found.filter(isFirst);
}

/** What stands between the brackets, with its numbers put in; the value of the call itself is not asked for. */
function argumentsOf(instance: CaseReport["instance"], { left }: Expectation): AnswerArguments | undefined {
  if (left.kind !== "call" || left.callee.text !== "clear_of_modes") return undefined;
  let found: AnswerArguments | undefined;
  evaluateExpression(instance, left, (call, args) => {
    if (call === left) found = args;
    return succeed({ ...NUMBER, value: 0 });
  });
  return found;
}

function bandOf({ rate }: AnswerArguments): readonly [number, number] | undefined {
  const ends =
    rate?.is === "number"
      ? [rate.quantity.value, rate.quantity.value]
      : rate?.is === "range"
        ? [rate.from.value, rate.to.value].sort((a, b) => a - b)
        : [];
  const [low, high] = ends;
  return low > 0 && Number.isFinite(high) ? [low, high] : undefined;
}

/** As it is written; a long one is called after what is kept clear of it. */
function rateText(text: string, { left, name }: Expectation): string {
  const [rate] = left.kind === "call" ? left.positional : [];
  const written = rate === undefined ? "" : text.slice(rate.span.start, rate.span.end).replace(/\s+/g, " ");
  return written !== "" && [...written].length <= LONGEST ? written : name;
}

const LONGEST = 24;
