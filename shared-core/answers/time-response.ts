/** The `TimeResponse` of a linear motion: exact at any instant, its extremes kept once found. */
import type { QuantityRef } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { TimeResponse } from "./analysis.ts";
import type { Peak } from "./answer.ts";
import { crossingsOf, extreme, meanSquareRoot, Prober } from "./time-extremes.ts";
import { demandedGrid, surveyDemands } from "./time-grid.ts";
import type { LinearMotion } from "./time-linear.ts";
import { settledValue } from "./time-settled.ts";
import { followTrace, QuantityReader, type Trace } from "./time-trace.ts";

/** Traces kept at a time; an expectation asks several things of one quantity. */
const KEPT_TRACES = 4;

interface Traced {
  readonly reader: QuantityReader;
  readonly prober: Prober;
  readonly trace: Trace;
}

/** `accuracy` is the relative error of each peak; roots that make up less are not followed. */
export function timeResponseOf(linear: LinearMotion, accuracy: number): TimeResponse {
  const { motion } = linear;
  const kept = new Map<string, Outcome<Traced>>();
  const peaks = new Map<string, Outcome<Peak>>();

  const traced = (quantity: QuantityRef): Outcome<Traced> => {
    let found = kept.get(quantity.text);
    if (found === undefined) {
      found = makeTrace(linear, quantity, accuracy);
      if (kept.size >= KEPT_TRACES) kept.delete(kept.keys().next().value as string);
      kept.set(quantity.text, found);
    }
    return found;
  };
  const peak = (quantity: QuantityRef, sign: 1 | -1): Outcome<Peak> => {
    const key = `${sign} ${quantity.text}`;
    let found = peaks.get(key);
    if (found === undefined) {
      const got = traced(quantity);
      found = got.ok ? succeed(extreme(got.value.trace, 0, got.value.prober, sign)) : fail(got.reason);
      peaks.set(key, found);
    }
    return found;
  };

  return {
    at(quantity, time) {
      if (!(0 <= time && time <= motion.duration)) {
        return fail(`the history runs from 0 to ${motion.duration} s and holds nothing at ${time} s`);
      }
      const prober = new Prober(motion, new QuantityReader(motion.modal, linear.quantity(quantity)));
      const value = prober.value(time, time < motion.duration ? "after" : "before");
      return prober.reason === undefined ? succeed(value) : fail(prober.reason);
    },
    highest: (quantity) => peak(quantity, 1),
    lowest: (quantity) => peak(quantity, -1),
    rms(quantity) {
      const got = traced(quantity);
      return got.ok ? meanSquareRoot(motion, got.value.trace, got.value.reader) : fail(got.reason);
    },
    finalValue: (quantity) => settledValue(motion, linear.quantity(quantity)),
    crossings(quantity, level, direction) {
      const got = traced(quantity);
      if (!got.ok) return fail(got.reason);
      return crossingsOf(got.value.trace, 0, got.value.prober, level, direction);
    },
  };
}

function makeTrace(linear: LinearMotion, quantity: QuantityRef, accuracy: number): Outcome<Traced> {
  const { motion } = linear;
  const modal = linear.quantity(quantity);
  const reader = new QuantityReader(motion.modal, modal);
  const demands = surveyDemands(motion, [modal], 0.1 * accuracy);
  if (!demands.ok) return fail(demands.reason);
  const grid = demandedGrid(motion, demands.value, new Float64Array(0));
  if (!grid.ok) return fail(grid.reason);
  const trace = followTrace(motion, grid.value, [modal]);
  if (!trace.ok) return fail(trace.reason);
  return succeed({ reader, prober: new Prober(motion, reader), trace: trace.value });
}
