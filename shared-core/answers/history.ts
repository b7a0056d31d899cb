/** Histories of linear models: the stored answer and everything that can be asked of it. */
import type { Assembly } from "../mechanics/assembly.ts";
import type { HistoryAsk } from "../model/model.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { TimeResponse } from "./analysis.ts";
import type { HistoryAnswer, Peak } from "./answer.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { switchedResponse } from "./switched-response.ts";
import { extreme, Prober, rangeOf } from "./time-extremes.ts";
import { type Demands, demandedGrid, surveyDemands } from "./time-grid.ts";
import { linearMotion } from "./time-linear.ts";
import { timeResponseOf } from "./time-response.ts";
import { type Stretch, speedCurvesOf, switchedMotion } from "./time-switched.ts";
import { followTrace, QuantityReader, type Trace } from "./time-trace.ts";

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
  const make = (finer: number) => followed(assembly, basis, ask, finer);
  const first = make(1);
  if (!first.ok) return fail(first.reason, first.upTo?.length ? solutionOf(first.upTo, ask) : undefined);
  if (!first.value.some(({ linear }) => linear.interpolated)) return succeed(solutionOf(first.value, ask));
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

/** One linear motion, or with torques over speed one after the other. */
type Stretches = readonly Pick<Stretch, "from" | "linear" | "speeds">[];

function followed(
  assembly: Assembly,
  basis: ModalBasis | undefined,
  ask: HistoryAsk,
  finer: number,
): Outcome<Stretches> {
  const options = { ...ask, tolerance: DRIVE_TOLERANCE, finer };
  if (speedCurvesOf(assembly, ask.by).length > 0) return switchedMotion(assembly, options, basis);
  const linear = linearMotion(assembly, options, basis);
  return linear.ok ? succeed([{ from: 0, linear: linear.value, speeds: [] }]) : fail(linear.reason);
}

function solutionOf(stretches: Stretches, ask: HistoryAsk): HistorySolution {
  return { response: responseOf(stretches, ask), answer: () => storedAnswer(stretches, ask) };
}

function responseOf(stretches: Stretches, { accuracy }: HistoryAsk): TimeResponse {
  const [first] = stretches;
  const isPlain = stretches.length === 1 && first.speeds.length === 0;
  return isPlain ? timeResponseOf(first.linear, accuracy) : switchedResponse(stretches, accuracy);
}

/** Largest absolute value of each quantity asked for. */
function peaksOf(stretches: Stretches, ask: HistoryAsk): Outcome<number[]> {
  const response = responseOf(stretches, ask);
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

function storedAnswer(stretches: Stretches, ask: HistoryAsk): Outcome<HistoryAnswer> {
  const demands: Demands[] = [];
  for (const { linear } of stretches) {
    const quantities = ask.of.map((ref) => linear.quantity(ref));
    const found = surveyDemands(linear.motion, quantities, 0.1 * ask.accuracy);
    const known = found.ok ? found.value : found.upTo;
    if (known === undefined) return fail(found.ok ? UNASKED : found.reason);
    demands.push(known);
  }
  const timeS = storedTimes(ask, demands);
  if (!timeS.ok) return fail(timeS.reason);
  const stored = new Stored(ask, timeS.value);
  for (let i = 0; i < stretches.length; i++) {
    const last = i + 1 === stretches.length;
    const goesOn = stored.add(
      stretches[i],
      demands[i],
      last ? Number.POSITIVE_INFINITY : stretches[i + 1].from,
    );
    if (!goesOn.ok) return fail(goesOn.reason, stored.answer());
  }
  return succeed(stored.answer());
}

/** A stored answer while its stretches are followed one by one. */
class Stored {
  readonly #ask: HistoryAsk;
  readonly #timeS: Float64Array;
  readonly #values: readonly Float64Array[];
  readonly #peaks = new Map<string, Peak>();
  #reached = 0;

  constructor(ask: HistoryAsk, timeS: Float64Array) {
    this.#ask = ask;
    this.#timeS = timeS;
    this.#values = ask.of.map(() => new Float64Array(timeS.length));
  }

  answer(): HistoryAnswer {
    const { of } = this.#ask;
    const whole = this.#reached === this.#timeS.length;
    const values = (i: number) => (whole ? this.#values[i] : this.#values[i].slice(0, this.#reached));
    const series = new Map(of.map(({ text, unit }, i) => [text, { unit, values: values(i) }]));
    return {
      kind: "history",
      timeS: whole ? this.#timeS : this.#timeS.slice(0, this.#reached),
      series,
      peaks: this.#peaks,
    };
  }

  /** Follows a stretch to the instants before `until`. What was reached before a failure stands. */
  add({ from, linear }: Stretches[number], demands: Demands, until: number): Outcome<true> {
    const { motion } = linear;
    const start = this.#reached;
    let end = start;
    while (end < this.#timeS.length && this.#timeS[end] < until) end++;
    const local = localTimes(this.#timeS.subarray(start, end), from, motion.duration);
    const grid = demandedGrid(motion, demands, local);
    if (!grid.ok) return fail(grid.reason);
    let reached = local.length;
    let trouble: string | undefined;
    const { of } = this.#ask;
    const together = Math.max(2, Math.floor(TRACE_ROOM / grid.value.times.length));
    for (let first = 0; first < of.length; first += together) {
      const batch = of.slice(first, first + together).map((ref) => linear.quantity(ref));
      const followed = followTrace(motion, grid.value, batch);
      const trace = followed.ok ? followed.value : followed.upTo;
      if (!followed.ok) trouble ??= followed.reason;
      if (trace === undefined) return fail(trouble ?? UNASKED);
      const rows = storedRows(trace, local);
      reached = Math.min(reached, rows.length);
      batch.forEach((quantity, q) => {
        gather(trace.values[q], rows, this.#values[first + q], start);
        const prober = new Prober(motion, new QuantityReader(motion.modal, quantity));
        const range = rangeOf(trace, q);
        this.#peak(of[first + q].text, from, extreme(trace, q, prober, 1, range));
        this.#peak(of[first + q].text, from, extreme(trace, q, prober, -1, range));
      });
    }
    this.#reached = start + reached;
    return trouble === undefined ? succeed(true) : fail(trouble);
  }

  #peak(text: string, from: number, { value, at }: Peak): void {
    const known = this.#peaks.get(text);
    if (known === undefined || Math.abs(value) > known.value) {
      this.#peaks.set(text, { value: Math.abs(value), at: from + at });
    }
  }
}

/** Times of a stretch that begins at `from`, none outside it. */
function localTimes(times: Float64Array, from: number, duration: number): Float64Array {
  const inside = from === 0 && times[0] >= 0 && times[times.length - 1] <= duration;
  return inside ? times : times.map((time) => Math.min(duration, Math.max(0, time - from)));
}

function storedTimes(ask: HistoryAsk, demands: readonly Demands[]): Outcome<Float64Array> {
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
  for (const { rates } of demands) {
    for (const { rate, share } of rates) if (share >= DRAWN_SHARE) fastest = Math.max(fastest, rate);
  }
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

function gather(values: Float64Array, rows: Int32Array, into: Float64Array, at: number): void {
  for (let i = 0; i < rows.length; i++) into[at + i] = values[rows[i]];
}
