/** Reading the arguments of an answer function. The model has checked their kinds; what is missing is a reason. */

import type { QuantityRef } from "../../mechanics/assembly.ts";
import type { AnswerArgument, AnswerArguments, Ask, HistoryAsk, SweepAsk } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Quantity } from "../../units/dimension.ts";
import type { Found } from "../found.ts";

type Of<K extends AnswerArgument["is"]> = Extract<AnswerArgument, { is: K }>;

export function argument<K extends AnswerArgument["is"]>(
  args: AnswerArguments,
  name: string,
  ...kinds: readonly K[]
): Found<Of<K>> {
  const found = args[name];
  if (found === undefined) return fail(`\`${name}\` is missing`);
  return (kinds as readonly string[]).includes(found.is)
    ? succeed(found as Of<K>)
    : fail(`\`${name}\` cannot be used here`);
}

export function numberOf(args: AnswerArguments, name: string): Found<Quantity> {
  const found = argument(args, name, "number");
  return found.ok ? succeed(found.value.quantity) : found;
}

/** An ask with a series: a sweep or a history, and the quantity read from it. */
export function seriesOf(
  args: AnswerArguments,
): Found<{ readonly ask: SweepAsk | HistoryAsk; readonly quantity: QuantityRef }> {
  const ask = askOf(args);
  if (!ask.ok) return ask;
  const quantity = argument(args, "quantity", "series", "element");
  if (!quantity.ok) return quantity;
  const read = quantity.value.is === "series" ? quantity.value.quantity : quantity.value.force;
  return succeed({ ask: ask.value, quantity: read });
}

export function askOf(args: AnswerArguments): Found<SweepAsk | HistoryAsk> {
  const found = argument(args, "ask", "ask");
  if (!found.ok) return found;
  const { ask } = found.value;
  if (ask.kind === "sweep" || ask.kind === "history") return succeed(ask);
  return fail(whyNoSeries(ask));
}

export function sweepOf(args: AnswerArguments): Found<SweepAsk> {
  const found = askOf(args);
  if (!found.ok || found.value.kind === "sweep") return found as Found<SweepAsk>;
  return fail(`\`${found.value.name}\` is a history, and this is read from a sweep`);
}

export function historyOf(args: AnswerArguments): Found<HistoryAsk> {
  const found = askOf(args);
  if (!found.ok || found.value.kind === "history") return found as Found<HistoryAsk>;
  return fail(`\`${found.value.name}\` is a sweep, and this is read from a history`);
}

function whyNoSeries(ask: Ask): string {
  return ask.kind === "later"
    ? `\`${ask.name}\` asks for ${ask.askKind}, which this version does not compute`
    : `\`${ask.name}\` asks for modes and holds no series`;
}
