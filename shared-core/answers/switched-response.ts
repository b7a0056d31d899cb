/** The `TimeResponse` of a history in stretches: each stretch answers for its own time. */
import type { QuantityRef } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { TimeResponse } from "./analysis.ts";
import type { Peak } from "./answer.ts";
import { timeResponseOf } from "./time-response.ts";
import { settledValue } from "./time-settled.ts";
import type { Stretch } from "./time-switched.ts";

/** Share of a knot within which a speed that settles on it counts as inside its piece. */
const ON_THE_KNOT = 1e-9;

export function switchedResponse(stretches: readonly Stretch[], accuracy: number): TimeResponse {
  const parts = stretches.map(({ from, linear }) => ({
    from,
    duration: linear.motion.duration,
    response: timeResponseOf(linear, accuracy),
  }));
  const last = parts[parts.length - 1];
  const whole = last.from + last.duration;

  const peak = (quantity: QuantityRef, sign: 1 | -1): Outcome<Peak> => {
    let best: Peak | undefined;
    for (const { from, response } of parts) {
      const found = sign > 0 ? response.highest(quantity) : response.lowest(quantity);
      if (!found.ok) return found;
      const { value, at } = found.value;
      if (best === undefined || sign * value > sign * best.value) best = { value, at: from + at };
    }
    return best === undefined ? fail("the history is empty") : succeed(best);
  };

  return {
    at(quantity, time) {
      if (!(0 <= time && time <= whole)) {
        return fail(`the history runs from 0 to ${whole} s and holds nothing at ${time} s`);
      }
      const { from, duration, response } = parts[partAt(parts, time)];
      return response.at(quantity, Math.min(duration, time - from));
    },
    highest: (quantity) => peak(quantity, 1),
    lowest: (quantity) => peak(quantity, -1),
    rms(quantity) {
      let sum = 0;
      for (const { duration, response } of parts) {
        const found = response.rms(quantity);
        if (!found.ok) return found;
        sum += found.value ** 2 * duration;
      }
      return succeed(Math.sqrt(sum / whole));
    },
    finalValue: (quantity) => finalValue(stretches[stretches.length - 1], quantity),
    crossings(quantity, level, direction) {
      const found: number[] = [];
      let before: number | undefined;
      for (const { from, duration, response } of parts) {
        const [start, end] = [response.at(quantity, 0), response.at(quantity, duration)];
        const inside = response.crossings(quantity, level, direction);
        if (!start.ok) return fail(start.reason);
        if (!end.ok) return fail(end.reason);
        if (!inside.ok) return fail(inside.reason);
        // Rounding may part the end of one stretch from the start of the next.
        if (before !== undefined && passes(before, start.value, level, direction)) found.push(from);
        for (const time of inside.value) found.push(from + time);
        before = end.value;
      }
      return succeed(Float64Array.from(found));
    },
  };
}

const passes = (a: number, b: number, level: number, direction: "up" | "any"): boolean =>
  direction === "up" ? a < level && level <= b : a < level !== b < level;

/** It settles in the piece of the curves on which it ends, or cannot be told. */
function finalValue({ linear, speeds }: Stretch, quantity: QuantityRef): Outcome<number> {
  for (const { name, speed, range } of speeds) {
    const settled = settledValue(linear.motion, speed);
    if (!settled.ok) return settled;
    const [low, high] = range;
    const slack = ON_THE_KNOT * Math.max(...range.filter(Number.isFinite).map(Math.abs), 0);
    if (settled.value < low - slack || settled.value > high + slack) {
      return fail(
        `the speed under ${name} is still on its way from one row to another when the history ends`,
      );
    }
  }
  return settledValue(linear.motion, linear.quantity(quantity));
}

/** The last part that begins at or before an instant. */
function partAt(parts: readonly { readonly from: number }[], time: number): number {
  let [low, high] = [0, parts.length];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (parts[middle].from <= time) low = middle;
    else high = middle;
  }
  return low;
}
