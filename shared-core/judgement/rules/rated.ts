/** What travel-exceeded and force-exceeded share: the largest travel or force of an element in each answer. */
import type { ElementInfo, QuantityRef } from "../../mechanics/assembly.ts";
import type { Ask, HistoryAsk, SweepAsk } from "../../model/model.ts";
import { nameSpan, placeOf } from "../places.ts";
import type { Finding, RuleContext } from "../rule.ts";
import { force, length, rate, time } from "../wording.ts";

/** Findings for every element whose rated `measure` is passed in a sweep or a history. */
export function passedRatings(context: RuleContext, measure: "travel" | "force"): readonly Finding[] {
  return context.assembly.elements.flatMap((element, index) => {
    const rated = measure === "travel" ? element.ratedTravel : element.ratedForce;
    if (rated === undefined || !(rated > 0)) return [];
    return context.instance.asks.flatMap((ask) => {
      const largest = largestOf(context, ask, quantityOf(element, index, measure));
      if (largest === undefined) return [];
      const value = measure === "force" ? largest.value / element.count : largest.value;
      if (!(value > rated * (1 + 1e-9))) return [];
      return [finding(context, { element, ask, measure, rated, value, at: largest.at })];
    });
  });
}

function finding(
  context: RuleContext,
  found: {
    readonly element: ElementInfo;
    readonly ask: Ask;
    readonly measure: "travel" | "force";
    readonly rated: number;
    readonly value: number;
    readonly at: number;
  },
): Finding {
  const { element, ask, measure, rated, value, at } = found;
  const show = (size: number): string =>
    measure === "travel" ? length(size, element.motion) : force(size, element.motion);
  const where = ask.kind === "sweep" ? rate(at) : time(at);
  const each = `${measure === "force" && element.count > 1 ? "each of " : ""}\`${element.name}\``;
  const word = measure === "travel" ? "travels" : "carries";
  return {
    span: placeOf(context.model, element.name, measure === "travel" ? "rated_travel" : "rated_force"),
    message: `${each} ${word} ${show(value)} at ${where} in \`${ask.name}\`, rated for ${show(rated)}`,
    hint:
      measure === "travel" ? "what moves this far meets its stops" : "choose a larger one or more of them",
    related: [{ span: nameSpan(ask.node), message: `the answer in which it is passed` }],
  };
}

function quantityOf(element: ElementInfo, index: number, measure: "travel" | "force"): QuantityRef {
  return {
    text: `${element.name}.${measure}`,
    terms: [{ of: "element", element: index, measure, factor: 1 }],
    unit: measure === "travel" ? "m" : "N",
  };
}

function largestOf(
  context: RuleContext,
  ask: Ask,
  quantity: QuantityRef,
): { value: number; at: number } | undefined {
  if (!context.answers.get(ask.name)?.ok) return undefined;
  if (ask.kind === "sweep") return largestInSweep(context, ask, quantity);
  return ask.kind === "history" ? largestInHistory(context, ask, quantity) : undefined;
}

/** A drive without amplitude counts as one unit: its sweep says nothing about ratings. */
function largestInSweep(
  { assembly, analysis }: RuleContext,
  ask: SweepAsk,
  quantity: QuantityRef,
): { value: number; at: number } | undefined {
  const shapes = ask.by.map((index) => assembly.drives[index]?.shape);
  if (!shapes.every((shape) => shape?.kind === "unbalance" || shape?.kind === "sine")) return undefined;
  if (shapes.some((shape) => shape?.kind === "sine" && shape.amplitude === undefined)) return undefined;
  const response = analysis.frequencyResponse(ask.by);
  if (!response.ok) return undefined;
  const peak = response.value.peak(quantity, ask.fromHz, ask.toHz);
  return peak.ok ? peak.value : undefined;
}

function largestInHistory(
  { analysis }: RuleContext,
  ask: HistoryAsk,
  quantity: QuantityRef,
): { value: number; at: number } | undefined {
  const response = analysis.timeResponse(ask);
  if (!response.ok) return undefined;
  const high = response.value.highest(quantity);
  const low = response.value.lowest(quantity);
  if (!high.ok || !low.ok) return undefined;
  return Math.abs(high.value.value) >= Math.abs(low.value.value)
    ? { value: Math.abs(high.value.value), at: high.value.at }
    : { value: Math.abs(low.value.value), at: low.value.at };
}
