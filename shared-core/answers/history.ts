/** Histories of linear models: the stored answer and everything that can be asked of it. */
import type { Assembly } from "../mechanics/assembly.ts";
import type { HistoryAsk } from "../model/model.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { TimeResponse } from "./analysis.ts";
import type { HistoryAnswer, Peak } from "./answer.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { extreme, Prober } from "./time-extremes.ts";
import { type LinearMotion, linearMotion } from "./time-linear.ts";
import { timeResponseOf } from "./time-response.ts";
import {
  type Demands,
  demandedGrid,
  followTrace,
  QuantityReader,
  surveyDemands,
  type Trace,
} from "./time-trace.ts";

export interface HistorySolution {
  readonly response: TimeResponse;
  answer(): Outcome<HistoryAnswer>;
}

/** Wanted error of chirps and laws, as a share of their largest value; the peaks' own check is made on top. */
const DRIVE_TOLERANCE = 1e-10;
/** Times the look at chirps and laws is doubled before a history is given up. */
const MOST_HALVINGS = 3;
/** Points of a stored answer where no step is asked for. */
const USUAL_POINTS = 2000;
const POINTS_A_CYCLE = 16;
const MOST_USUAL_POINTS = 200_000;
const MOST_POINTS = 2_000_000;
/** A root that makes up less of every quantity does not set the spacing of the stored answer. */
const DRAWN_SHARE = 1e-3;
/** Numbers kept in the traces of one march; more quantities are followed in several. */
const TRACE_ROOM = 8_000_000;
const UNASKED = "the model has nothing to move";

/**
 * Solves a history. Without a `basis` the model may have neither modal damping nor loss factors, and slow motions
 * beside fast ones lose digits. Chirps and laws are
 * looked at twice as closely until the peaks of all quantities asked for agree within the ask's accuracy.
 */
export function historySolution(
  assembly: Assembly,
  basis: ModalBasis | undefined,
  ask: HistoryAsk,
): Outcome<HistorySolution> {
  if (assembly.free === 0) return fail(UNASKED);
  if (!(ask.lasting > 0)) return fail(`a history needs a duration above zero, found ${ask.lasting} s`);
  const make = (finer: number) =>
    linearMotion(assembly, { ...ask, tolerance: DRIVE_TOLERANCE, finer }, basis);
  const first = make(1);
  if (!first.ok) return fail(first.reason);
  if (!first.value.interpolated) return succeed(solutionOf(first.value, ask));
  let before = { solution: solutionOf(first.value, ask), peaks: peaksOf(first.value, ask) };
  for (let k = 1; k <= MOST_HALVINGS; k++) {
    const next = make(2 ** k);
    if (!next.ok) return fail(next.reason, before.solution);
    const here = { solution: solutionOf(next.value, ask), peaks: peaksOf(next.value, ask) };
    if (!here.peaks.ok) return fail(here.peaks.reason);
    if (before.peaks.ok && agree(before.peaks.value, here.peaks.value, ask.accuracy)) {
      return succeed(here.solution);
    }
    before = here;
  }
  return fail(
    `its drives change too fast to be followed within a relative error of ${ask.accuracy}`,
    before.solution,
  );
}

function solutionOf(linear: LinearMotion, ask: HistoryAsk): HistorySolution {
  return { response: timeResponseOf(linear, ask.accuracy), answer: () => storedAnswer(linear, ask) };
}

/** Largest absolute value of each quantity asked for. */
function peaksOf(linear: LinearMotion, ask: HistoryAsk): Outcome<number[]> {
  const response = timeResponseOf(linear, ask.accuracy);
  const out: number[] = [];
  for (const quantity of ask.of) {
    const high = response.highest(quantity);
    if (!high.ok) return fail(high.reason);
    const low = response.lowest(quantity);
    if (!low.ok) return fail(low.reason);
    out.push(Math.max(Math.abs(high.value.value), Math.abs(low.value.value)));
  }
  return succeed(out);
}

function agree(a: readonly number[], b: readonly number[], accuracy: number): boolean {
  return a.every((value, i) => Math.abs(value - b[i]) <= accuracy * Math.abs(b[i]));
}

function storedAnswer(linear: LinearMotion, ask: HistoryAsk): Outcome<HistoryAnswer> {
  const { motion } = linear;
  const quantities = ask.of.map((ref) => linear.quantity(ref));
  const demands = surveyDemands(motion, quantities, 0.1 * ask.accuracy);
  const known = demands.ok ? demands.value : demands.upTo;
  if (known === undefined) return fail(demands.ok ? UNASKED : demands.reason);
  const timeS = storedTimes(ask, known);
  if (!timeS.ok) return fail(timeS.reason);
  const grid = demandedGrid(motion, known, timeS.value);
  if (!grid.ok) return fail(grid.reason);
  const series = new Map<string, { unit: string; values: Float64Array }>();
  const peaks = new Map<string, Peak>();
  let reached = timeS.value.length;
  let trouble: string | undefined;
  const together = Math.max(2, Math.floor(TRACE_ROOM / grid.value.times.length));
  for (let from = 0; from < quantities.length; from += together) {
    const batch = quantities.slice(from, from + together);
    const followed = followTrace(motion, grid.value, batch);
    const trace = followed.ok ? followed.value : followed.upTo;
    if (!followed.ok) trouble ??= followed.reason;
    if (trace === undefined) return fail(trouble ?? UNASKED);
    const rows = storedRows(trace, timeS.value);
    reached = Math.min(reached, rows.length);
    batch.forEach((quantity, q) => {
      const { text, unit } = ask.of[from + q];
      series.set(text, { unit, values: gathered(trace.values[q], rows) });
      const prober = new Prober(motion, new QuantityReader(motion.modal, quantity));
      const high = extreme(trace, q, prober, 1);
      const low = extreme(trace, q, prober, -1);
      const most = Math.abs(low.value) > Math.abs(high.value) ? low : high;
      peaks.set(text, { value: Math.abs(most.value), at: most.at });
    });
  }
  const answer: HistoryAnswer = { kind: "history", timeS: timeS.value.slice(0, reached), series, peaks };
  return trouble === undefined ? succeed(answer) : fail(trouble, answer);
}

function storedTimes(ask: HistoryAsk, demands: Demands): Outcome<Float64Array> {
  const { lasting, step } = ask;
  if (step !== undefined) {
    if (!(step > 0)) return fail(`the step of a history must be above zero, found ${step} s`);
    const count = Math.floor((lasting / step) * (1 + 1e-12)) + 1;
    if (count > MOST_POINTS) {
      return fail(`a step of ${step} s over ${lasting} s makes ${count} points; ${MOST_POINTS} is the most`);
    }
    const times = new Float64Array(count);
    for (let i = 0; i < count; i++) times[i] = Math.min(lasting, i * step);
    return succeed(times);
  }
  let fastest = 0;
  for (const { rate, share } of demands.rates) if (share >= DRAWN_SHARE) fastest = Math.max(fastest, rate);
  const wanted = Math.ceil((lasting * fastest * POINTS_A_CYCLE) / (2 * Math.PI));
  const count = Math.min(MOST_USUAL_POINTS, Math.max(USUAL_POINTS, wanted));
  return succeed(Float64Array.from({ length: count + 1 }, (_, i) => (lasting * i) / count));
}

/** The last row of a trace at each stored instant: the value after a jump. Ends where the trace ends. */
function storedRows(trace: Trace, stored: Float64Array): Int32Array {
  const { times, count } = trace;
  const same = 1e-12 * trace.grid.times[trace.grid.times.length - 1];
  const rows = new Int32Array(stored.length);
  let row = 0;
  for (let i = 0; i < stored.length; i++) {
    while (row + 1 < count && times[row + 1] <= stored[i] + same) row++;
    if (times[row] < stored[i] - same) return rows.slice(0, i);
    rows[i] = row;
  }
  return rows;
}

function gathered(values: Float64Array, rows: Int32Array): Float64Array {
  const out = new Float64Array(rows.length);
  for (let i = 0; i < rows.length; i++) out[i] = values[rows[i]];
  return out;
}
