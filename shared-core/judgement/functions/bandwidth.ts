import type { AnswerArguments, SweepAsk } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Quantity } from "../../units/dimension.ts";
import { rate } from "../../units/quantity.ts";
import type { Found } from "../found.ts";
import type { Trial } from "../trial.ts";
import { rate as say } from "../wording.ts";
import { extremeOf, steady } from "./answer-values.ts";
import { seriesOf, sweepOf } from "./arguments.ts";

/** Width of the highest peak of a sweep at 1/sqrt(2) of it. */
export function bandwidth(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const ask = sweepOf(args);
  if (!ask.ok) return ask;
  const series = seriesOf(args);
  if (!series.ok) return series;
  const { quantity } = series.value;
  const peak = extremeOf(trial, ask.value, quantity, "peak");
  if (!peak.ok) return peak;
  const response = steady(trial, ask.value);
  if (!response.ok) return response;
  const level = peak.value.value / Math.SQRT2;
  const above = (hertz: number): Found<number> => {
    const at = response.value.at(quantity, hertz);
    return at.ok ? succeed(Math.hypot(...at.value) - level) : fail(at.reason);
  };
  const step = narrowestStep(trial, peak.value.at);
  const low = edge(above, peak.value.at, -step, ask.value);
  if (!low.ok) return low;
  const high = edge(above, peak.value.at, step, ask.value);
  return high.ok ? succeed(rate(high.value - low.value)) : high;
}

/** A quarter of the half-power width of the nearest mode: small enough to stay on one peak. */
function narrowestStep(trial: Trial, peakHz: number): number {
  const table = trial.modes();
  if (!table.ok) return peakHz * 1e-3;
  let nearest = Number.POSITIVE_INFINITY;
  let damping = 0;
  for (const mode of table.value.modes) {
    if (mode.frequencyHz === null || mode.dampingRatio === null) continue;
    const apart = Math.abs(mode.frequencyHz - peakHz);
    if (apart < nearest) {
      nearest = apart;
      damping = mode.dampingRatio;
    }
  }
  return peakHz * Math.min(Math.max(damping / 2, 1e-9), 0.05);
}

/** Steps away from the peak, a tenth longer each time, until the response is below the level; then bisects. */
function edge(
  above: (hertz: number) => Found<number>,
  from: number,
  firstStep: number,
  ask: SweepAsk,
): Found<number> {
  let inside = from;
  let step = firstStep;
  for (let count = 0; count < 400; count++) {
    const outside = Math.min(Math.max(inside + step, ask.fromHz), ask.toHz);
    const value = above(outside);
    if (!value.ok) return value;
    if (value.value < 0) return bisect(above, inside, outside);
    if (outside === ask.fromHz || outside === ask.toHz) break;
    inside = outside;
    step *= 1.1;
  }
  return fail(`the peak at ${say(from)} does not fall to 1/sqrt(2) on both sides within \`${ask.name}\``);
}

function bisect(above: (hertz: number) => Found<number>, inside: number, outside: number): Found<number> {
  let [a, b] = [inside, outside];
  for (let count = 0; count < 60 && Math.abs(b - a) > 1e-13 * Math.abs(b); count++) {
    const middle = (a + b) / 2;
    const value = above(middle);
    if (!value.ok) return value;
    if (value.value >= 0) a = middle;
    else b = middle;
  }
  return succeed((a + b) / 2);
}
