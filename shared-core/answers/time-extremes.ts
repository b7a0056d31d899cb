/** Extremes, mean squares and crossings of a traced quantity, found between the rows too. */
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { findRoot } from "../numerics/roots.ts";
import type { Peak } from "./answer.ts";
import type { Motion } from "./time-motion.ts";
import type { QuantityReader, Trace } from "./time-trace.ts";

/**
 * Share of the whole range by which the parabola through three rows may miss a turning point: a cosine at 18
 * points a cycle is missed by 1e-4 of its amplitude, a product of two by four times that.
 */
const PARABOLA_ERROR = 2e-3;
/** Turning points followed exactly, at most; the best by their parabola come first. */
const MOST_POLISHED = 20_000;

/** Evaluates a quantity and its slope at any instant of a motion. */
export class Prober {
  readonly #motion: Motion;
  readonly #reader: QuantityReader;
  readonly #row: Float64Array;
  readonly #inputs: Float64Array;
  /** The first failure met. */
  reason: string | undefined;

  constructor(motion: Motion, reader: QuantityReader) {
    this.#motion = motion;
    this.#reader = reader;
    this.#row = new Float64Array(motion.width);
    this.#inputs = new Float64Array(motion.signals.length * 5);
  }

  value(time: number, side: "before" | "after" = "after"): number {
    return this.#at(time, side) ? this.#reader.value(this.#row, this.#inputs) : Number.NaN;
  }

  slope(time: number, side: "before" | "after" = "after"): number {
    return this.#at(time, side) ? this.#reader.slope(this.#row, this.#inputs) : Number.NaN;
  }

  curvature(time: number, side: "before" | "after" = "after"): number {
    return this.#at(time, side) ? this.#reader.curvature(this.#row, this.#inputs) : Number.NaN;
  }

  #at(time: number, side: "before" | "after"): boolean {
    const got = this.#motion.rowAt(time, side, this.#row, this.#inputs);
    if (!got.ok) this.reason ??= got.reason;
    return got.ok;
  }
}

/** Rows of the smallest and the largest value, the first of equal ones. */
export interface Range {
  readonly lowest: number;
  readonly highest: number;
}

export function rangeOf({ count, values }: Trace, column: number): Range {
  const y = values[column];
  let lowest = 0;
  let highest = 0;
  for (let r = 1; r < count; r++) {
    if (y[r] < y[lowest]) lowest = r;
    if (y[r] > y[highest]) highest = r;
  }
  return { lowest, highest };
}

/** The largest (sign 1) or smallest (sign -1) value over the trace, exact between rows. */
export function extreme(
  trace: Trace,
  column: number,
  prober: Prober,
  sign: 1 | -1,
  { lowest, highest }: Range = rangeOf(trace, column),
): Peak {
  const { count, times } = trace;
  const y = trace.values[column];
  const best = sign > 0 ? highest : lowest;
  const [low, high] = [y[lowest], y[highest]];
  let peak: Peak = { value: y[best], at: times[best] };
  const margin = PARABOLA_ERROR * (high - low);
  const candidates = turningRows(trace, y, sign, sign * y[best] - margin);
  for (const { row } of candidates.slice(0, MOST_POLISHED)) {
    // Rows of one instant, before and after a jump, share the intervals on both sides.
    let first = row;
    let last = row;
    while (first > 0 && times[first - 1] === times[row]) first--;
    while (last + 1 < count && times[last + 1] === times[row]) last++;
    for (const [from, to] of [
      [first - 1, first],
      [last, last + 1],
    ]) {
      if (from < 0 || to >= count) continue;
      const found = turnBetween(prober, times[from], times[to], sign);
      if (found !== undefined && sign * found.value > sign * peak.value) peak = found;
    }
  }
  return peak;
}

/** Rows no lower than their neighbours whose parabola reaches `floor` (times sign), the most promising first. */
function turningRows(trace: Trace, y: Float64Array, sign: 1 | -1, floor: number): { row: number }[] {
  const { count, times } = trace;
  const found: { row: number; estimate: number }[] = [];
  for (let r = 0; r < count; r++) {
    const here = sign * y[r];
    const left = r > 0 ? sign * y[r - 1] : here;
    if (!(here >= left)) continue;
    const right = r + 1 < count ? sign * y[r + 1] : here;
    if (!(here >= right) || (here === left && here === right)) continue;
    // The estimate is no higher than this.
    if (3 * here - left - right < floor) continue;
    let estimate = here;
    if (0 < r && r + 1 < count) {
      const a = times[r] - times[r - 1];
      const b = times[r + 1] - times[r];
      if (a > 0 && b > 0) {
        const slope = ((here - left) * b) / (a * (a + b)) + ((right - here) * a) / (b * (a + b));
        const bend = (2 * ((right - here) / b - (here - left) / a)) / (a + b);
        if (bend < 0) estimate += Math.min((slope * slope) / (-2 * bend), 2 * here - left - right);
      }
    }
    if (estimate >= floor) found.push({ row: r, estimate });
  }
  return found.sort((p, q) => q.estimate - p.estimate);
}

/** The maximum (times sign) inside a smooth interval whose ends both fall away from it. */
function turnBetween(prober: Prober, from: number, to: number, sign: 1 | -1): Peak | undefined {
  const slope = (t: number) => sign * prober.slope(t, t < to ? "after" : "before");
  if (!(slope(from) > 0 && slope(to) < 0)) return undefined;
  const root = findRoot(slope, from, to, { tolerance: 1e-10 * (to - from) });
  if (!root.ok) return undefined;
  return { value: prober.value(root.value.x), at: root.value.x };
}

/**
 * Root of the mean square over the motion. Between the instants the square is replaced by the quintic with its
 * values, slopes and curvatures: error h^7/100800 times its sixth derivative, 1e-6 of a turning root's share at
 * worst, and far less over whole cycles.
 */
export function meanSquareRoot(motion: Motion, trace: Trace, reader: QuantityReader): Outcome<number> {
  const { grid } = trace;
  let sum = 0;
  let open: { step: number; time: number; f: number; f1: number; f2: number } | undefined;
  const options = { withInputs: true, doubleUpTo: 4 };
  const inputWidth = motion.signals.length * 5;
  const marched = motion.march(grid, options, (chunk) => {
    for (let r = 0; r < chunk.count; r++) {
      const row = chunk.rows.subarray(r * motion.width, (r + 1) * motion.width);
      const inputs = chunk.inputs.subarray(r * inputWidth, (r + 1) * inputWidth);
      const y = reader.value(row, inputs);
      const y1 = reader.slope(row, inputs);
      const here = {
        step: chunk.steps[r],
        time: chunk.times[r],
        f: y * y,
        f1: 2 * y * y1,
        f2: 2 * (y1 * y1 + y * reader.curvature(row, inputs)),
      };
      if (open !== undefined && !chunk.after[r]) {
        const h = here.time - open.time;
        sum +=
          (h / 2) * (open.f + here.f) +
          ((h * h) / 10) * (open.f1 - here.f1) +
          ((h * h * h) / 120) * (open.f2 + here.f2);
      }
      open = here;
    }
  });
  if (!marched.ok) return fail(marched.reason);
  return succeed(Math.sqrt(Math.max(0, sum) / motion.duration));
}

/** Instants at which the quantity passes `level`, ascending; jumps across it count, touching does not. */
export function crossingsOf(
  trace: Trace,
  column: number,
  prober: Prober,
  level: number,
  direction: "up" | "any",
): Outcome<Float64Array> {
  const { count, times } = trace;
  const y = trace.values[column];
  const found: number[] = [];
  const pass = (from: number, to: number, a: number, b: number) => {
    if (a === b || a < level === b < level) return;
    if (direction === "up" && !(a < level)) return;
    if (!(to > from)) {
      found.push(to);
      return;
    }
    const gap = (t: number) => prober.value(t, t < to ? "after" : "before") - level;
    const root = findRoot(gap, from, to, { tolerance: 1e-13 * trace.times[count - 1] });
    found.push(root.ok ? root.value.x : to);
  };
  for (let r = 1; r < count; r++) {
    const a = y[r - 1];
    const b = y[r];
    const turn = hiddenTurn(trace, y, r, level, prober);
    if (turn === undefined) pass(times[r - 1], times[r], a, b);
    else {
      pass(times[r - 1], turn.at, a, turn.value);
      pass(turn.at, times[r], turn.value, b);
    }
  }
  if (prober.reason !== undefined) return fail(prober.reason);
  return succeed(Float64Array.from(found));
}

/** A turning point between rows r - 1 and r, both on one side of the level, that reaches across it. */
function hiddenTurn(
  trace: Trace,
  y: Float64Array,
  r: number,
  level: number,
  prober: Prober,
): Peak | undefined {
  const { times, count } = trace;
  const a = y[r - 1];
  const b = y[r];
  if (a < level !== b < level || !(times[r] > times[r - 1])) return undefined;
  const sign = a < level ? 1 : -1;
  const near = Math.min(Math.abs(a - level), Math.abs(b - level));
  const before = r > 1 ? Math.abs(a - y[r - 2]) : 0;
  const behind = r + 1 < count ? Math.abs(y[r + 1] - b) : 0;
  // A turn cannot rise further above the rows than the neighbouring steps do.
  if (near > Math.abs(b - a) + Math.max(before, behind)) return undefined;
  const turn = turnBetween(prober, times[r - 1], times[r], sign);
  return turn !== undefined && sign * turn.value >= sign * level ? turn : undefined;
}
