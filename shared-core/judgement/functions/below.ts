import type { FrequencyResponse } from "../../answers/analysis.ts";
import type { QuantityRef } from "../../mechanics/assembly.ts";
import type { AnswerArguments, LimitCurve, SweepAsk } from "../../model/model.ts";
import { minimise } from "../../numerics/minimise.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Quantity } from "../../units/dimension.ts";
import { number } from "../../units/quantity.ts";
import type { Found } from "../found.ts";
import { endsOf, limitAt } from "../limit-curve.ts";
import type { Trial } from "../trial.ts";
import { rate } from "../wording.ts";
import { extremeOf, inTime, steady } from "./answer-values.ts";
import { argument, seriesOf } from "./arguments.ts";
import { remarkUndamped } from "./remarks.ts";

/** Largest ratio of an answer to a limit curve inside its ends, found between samples too. */
export function below(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const series = seriesOf(args);
  if (!series.ok) return series;
  const found = argument(args, "limit", "limit");
  if (!found.ok) return found;
  const { limit } = found.value;
  const { ask, quantity } = series.value;
  if (ask.kind === "sweep") return belowInSweep(trial, ask, quantity, limit);
  if (typeof limit.points !== "number") {
    return fail(`\`${limit.name}\` is a curve over frequency, and \`${ask.name}\` is a history`);
  }
  if (limit.of === "rms") {
    const mean = inTime(trial, ask);
    const rms = mean.ok ? mean.value.rms(quantity) : mean;
    return rms.ok ? ratio(rms.value, limit.points, limit) : rms;
  }
  const peak = extremeOf(trial, ask, quantity, "peak");
  return peak.ok ? ratio(peak.value.value, limit.points, limit) : peak;
}

function ratio(value: number, limit: number, { name }: LimitCurve): Found<Quantity> {
  return limit > 0 ? succeed(number(value / limit)) : fail(`\`${name}\` is not above zero everywhere`);
}

function belowInSweep(
  trial: Trial,
  ask: SweepAsk,
  quantity: QuantityRef,
  limit: LimitCurve,
): Found<Quantity> {
  if (limit.bands !== "none") return fail(`\`${limit.name}\` is over bands, which a sweep does not have`);
  const [low, high] = endsOf(limit);
  const from = Math.max(low, ask.fromHz);
  const to = Math.min(high, ask.toHz);
  if (!(from <= to)) {
    return fail(
      `\`${limit.name}\` judges from ${rate(low)} to ${rate(high)}, and \`${ask.name}\` runs from ${rate(ask.fromHz)} to ${rate(ask.toHz)}`,
    );
  }
  const response = steady(trial, ask);
  if (!response.ok) return response;
  const peak = response.value.peak(quantity, from, to);
  if (!peak.ok) {
    remarkUndamped(trial, ask);
    return fail(peak.reason);
  }
  const scale = limit.of === "rms" ? Math.SQRT1_2 : 1;
  if (typeof limit.points === "number") return ratio(scale * peak.value.value, limit.points, limit);
  const grid = gridOf(trial, ask, limit, [from, to, peak.value.at]);
  const largest = largestRatio(response.value, quantity, limit, grid);
  return largest.ok ? succeed(number(scale * largest.value)) : largest;
}

/** Frequencies of the sweep's own answer, which is refined at resonances, and the corners of the limit. */
function gridOf(trial: Trial, ask: SweepAsk, limit: LimitCurve, more: readonly number[]): Float64Array {
  const [from, to] = more;
  const sweep = trial.analysis.sweep(ask);
  const own = sweep.ok ? [...sweep.value.frequencyHz] : [];
  const corners = typeof limit.points === "number" ? [] : limit.points.map((point) => point.atHz);
  const all = [...own, ...corners, ...more].filter((hertz) => from <= hertz && hertz <= to);
  return Float64Array.from(new Set(all)).sort();
}

/** Largest samples around which the ratio is refined between samples. */
const REFINED = 3;

function largestRatio(
  response: FrequencyResponse,
  quantity: QuantityRef,
  limit: LimitCurve,
  grid: Float64Array,
): Found<number> {
  let failed: string | undefined;
  const ratioAt = (hertz: number): number => {
    const at = response.at(quantity, hertz);
    const allowed = limitAt(limit, hertz);
    if (!at.ok) failed = at.reason;
    else if (allowed !== undefined && !(allowed > 0))
      failed = `\`${limit.name}\` is not above zero at ${rate(hertz)}`;
    return at.ok && allowed !== undefined ? Math.hypot(...at.value) / allowed : 0;
  };
  const ratios = grid.map(ratioAt);
  if (failed !== undefined) return fail(failed);
  const peaks = [...ratios.keys()]
    .filter((i) => ratios[i] >= (ratios[i - 1] ?? 0) && ratios[i] >= (ratios[i + 1] ?? 0))
    .sort((a, b) => ratios[b] - ratios[a])
    .slice(0, REFINED);
  let largest = Math.max(0, ...ratios);
  for (const i of peaks) {
    for (const [a, b] of [
      [grid[i - 1], grid[i]],
      [grid[i], grid[i + 1]],
    ]) {
      if (a === undefined || b === undefined) continue;
      const found = minimise((hertz) => -ratioAt(hertz), a, b);
      if (found.ok) largest = Math.max(largest, -found.value.value);
    }
  }
  return failed === undefined ? succeed(largest) : fail(failed);
}
