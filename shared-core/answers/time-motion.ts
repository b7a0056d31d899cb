/**
 * The exact motion of a modal system under given signals: marched along a grid of instants, or asked at any one.
 *
 * Every row is exact to rounding whatever the grid: a step is the closed form of time-propagator.ts. Marching
 * leaves checkpoints behind, from which any instant is reached in a few steps. `march` is one long function because
 * it is the loop over all steps.
 */
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { SIGNAL_DERIVATIVES, type Signal, shiftedPolynomial, signalDerivatives } from "./drive-signal.ts";
import { segmentAt, type TimeLine, timeLine } from "./time-line.ts";
import type { ModalOutput, ModalSystem } from "./time-modal.ts";
import {
  advance,
  type InputShape,
  makePropagator,
  type Propagator,
  type StepInputs,
} from "./time-propagator.ts";
import { DIRECT_ORDERS } from "./time-state.ts";

/** Instants of a march. */
export interface Grid {
  /** times[0] = 0 < ... < times[n], s; all edges of the time line are among them. */
  readonly times: Float64Array;
  /** The segment of each of the n steps. */
  readonly segments: Int32Array;
}

/** Consecutive rows of a march. An instant at which an input jumps comes twice: before it and after it. */
export interface Chunk {
  readonly count: number;
  readonly times: Float64Array;
  /** Step that ends (rows before a jump) or begins (rows after) at the row; index into the grid. */
  readonly steps: Int32Array;
  /** 1 for rows that hold the value after the instant. */
  readonly after: Uint8Array;
  /** count rows of `width` modal coordinates. */
  readonly rows: Float64Array;
  /** count rows of J x DIRECT_ORDERS input derivatives; filled when the march was asked to. */
  readonly inputs: Float64Array;
}

export interface MarchOptions {
  /** Whether the visitor reads `inputs`. */
  readonly withInputs: boolean;
  /** Inputs whose derivative of this order or a lower one jumps make double rows. */
  readonly doubleUpTo: number;
}

const CHUNK_ROWS = 512;
/** Steps between checkpoints. */
const STRIDE = 64;
/** Numbers kept in checkpoints, at most; the stride grows beyond. */
const CHECKPOINT_ROOM = 2_000_000;
/** A motion above this is taken to be running away: its square must still be finite. */
const RUNAWAY = 1e140;
/** Step lengths that differ by no more than this many roundings of the time are one. */
const SAME_STEP = 8 * Number.EPSILON;
const KEPT_PROPAGATORS = 12;

export class Motion {
  readonly modal: ModalSystem;
  readonly signals: readonly Signal[];
  readonly line: TimeLine;
  readonly duration: number;
  /** Modal coordinates a row. */
  readonly width: number;
  readonly #start: Float64Array;
  readonly #shapes: readonly InputShape[];
  readonly #inputs: Float64Array[];
  readonly #kept: Propagator[] = [];
  readonly #derivatives = new Float64Array(SIGNAL_DERIVATIVES);
  #checkTimes = new Float64Array(0);
  #checkSegments = new Int32Array(0);
  #checkRows = new Float64Array(0);
  #checks = 0;

  /** `start` is the modal state before t = 0, see `modalState`. */
  constructor(modal: ModalSystem, signals: readonly Signal[], duration: number, start: Float64Array) {
    this.modal = modal;
    this.signals = signals;
    this.duration = duration;
    this.line = timeLine(signals, duration);
    this.width = 2 * modal.count + modal.rest;
    this.#start = start;
    this.#shapes = signals.map(({ order, omega }) => ({ order, omega }));
    this.#inputs = signals.map(({ order }) => new Float64Array(order + 2));
  }

  /** A grid of the edges alone, long segments cut into `pieces` steps. */
  edgeGrid(pieces = 1): Grid {
    const { edges } = this.line;
    const segments = edges.length - 1;
    const times = new Float64Array(segments * pieces + 1);
    const of = new Int32Array(segments * pieces);
    for (let i = 0; i < segments; i++) {
      for (let k = 0; k < pieces; k++) {
        times[i * pieces + k] = edges[i] + ((edges[i + 1] - edges[i]) * k) / pieces;
        of[i * pieces + k] = i;
      }
    }
    times[segments * pieces] = this.duration;
    return { times, segments: of };
  }

  /**
   * Visits the rows of a grid in order. Stops, as a failure with the time reached, where the motion runs away;
   * what was visited before stands. Impulses always make double rows.
   */
  march(grid: Grid, options: MarchOptions, visit: (chunk: Chunk) => void): Outcome<number> {
    const { width, line } = this;
    const steps = grid.segments.length;
    const inputWidth = options.withInputs ? this.signals.length * DIRECT_ORDERS : 0;
    const room = CHUNK_ROWS + 2;
    // Row 0 is the state to go on from; the visitor sees what stands behind it.
    const rows = new Float64Array((room + 1) * width);
    const chunk = {
      count: 0,
      times: new Float64Array(room),
      steps: new Int32Array(room),
      after: new Uint8Array(room),
      rows: rows.subarray(width),
      inputs: new Float64Array(room * inputWidth),
    };
    const add = (time: number, step: number, after: 0 | 1, segment: number) => {
      chunk.times[chunk.count] = time;
      chunk.steps[chunk.count] = step;
      chunk.after[chunk.count] = after;
      if (options.withInputs) this.#readInputs(segment, time, chunk.inputs, chunk.count);
      chunk.count++;
    };
    const flush = () => {
      if (chunk.count === 0) return;
      visit(chunk);
      rows.copyWithin(0, chunk.count * width, (chunk.count + 1) * width);
      chunk.count = 0;
    };
    const stride = this.#beginChecks(steps);
    let reachedBefore = 0;
    rows.set(this.#start, width);
    this.#kick(0, rows, width);
    add(0, 0, 1, 0);
    for (let i = 0; i < steps; i++) {
      const segment = grid.segments[i];
      const from = grid.times[i];
      const to = grid.times[i + 1];
      const at = chunk.count * width;
      if (i % stride === 0) this.#addCheck(from, segment, rows, at);
      const propagator = this.#propagator(to - from, to);
      if (!propagator.ok) {
        flush();
        return fail(propagator.reason, from);
      }
      this.#readStep(segment, from);
      advance(this.modal, this.#shapes, propagator.value, this.#inputs, rows, at, at + width);
      add(to, i, 0, segment);
      const next = grid.segments[i + 1];
      if (i + 1 < steps && next !== segment) {
        const kicked = line.impulses.has(next);
        if (kicked || line.jumps[next] <= options.doubleUpTo) {
          rows.copyWithin((chunk.count + 1) * width, chunk.count * width, (chunk.count + 1) * width);
          this.#kick(next, rows, (chunk.count + 1) * width);
          add(to, i + 1, 1, next);
        }
      }
      if (chunk.count < CHUNK_ROWS && i + 1 < steps) continue;
      // What has run away stays away, so the last row tells for all before it.
      const wild = isCalm(rows, chunk.count * width, width)
        ? chunk.count
        : firstWild(rows, width, chunk.count);
      if (wild < chunk.count) {
        const reached = wild > 0 ? chunk.times[wild - 1] : reachedBefore;
        chunk.count = wild;
        flush();
        return fail(`the motion grows beyond all bounds; it was followed until ${reached} s`, reached);
      }
      reachedBefore = to;
      flush();
    }
    flush();
    return succeed(this.duration);
  }

  /** The modal row at an instant, after it (or before it), into `out`; input derivatives into `inputs`. */
  rowAt(time: number, side: "before" | "after", out: Float64Array, inputs: Float64Array): Outcome<true> {
    if (this.#checks === 0) {
      const marched = this.march(this.edgeGrid(), { withInputs: false, doubleUpTo: -1 }, () => {});
      if (!marched.ok && !(marched.upTo !== undefined && time <= marched.upTo)) return fail(marched.reason);
    }
    const { edges } = this.line;
    let segment = segmentAt(edges, time);
    if (side === "before" && edges[segment] === time && segment > 0) segment--;
    const { width } = this;
    const work = new Float64Array(2 * width);
    const check = this.#checkBefore(time, segment);
    let at = this.#checkTimes[check];
    let current = this.#checkSegments[check];
    work.set(this.#checkRows.subarray(check * width, (check + 1) * width));
    while (current < segment) {
      const moved = this.#move(current, at, edges[current + 1], work);
      if (!moved.ok) return moved;
      at = edges[++current];
      this.#kick(current, work, 0);
    }
    const moved = this.#move(current, at, time, work);
    if (!moved.ok) return moved;
    out.set(work.subarray(0, width));
    this.#readInputs(segment, time, inputs, 0);
    return succeed(true);
  }

  /** The inputs' closed forms about an instant of a segment: powers, then Re S, Im S. Overwritten by any other call. */
  inputsAt(segment: number, time: number): StepInputs {
    this.#readStep(segment, time);
    return this.#inputs;
  }

  #move(segment: number, from: number, to: number, work: Float64Array): Outcome<true> {
    if (to === from) return succeed(true);
    const propagator = this.#propagator(to - from, to);
    if (!propagator.ok) return fail(propagator.reason);
    this.#readStep(segment, from);
    advance(this.modal, this.#shapes, propagator.value, this.#inputs, work, 0, this.width);
    work.copyWithin(0, this.width, 2 * this.width);
    if (!isCalm(work, 0, this.width)) return fail(`the motion grows beyond all bounds before ${to} s`);
    return succeed(true);
  }

  /** Adds the impulses at an edge to a row. */
  #kick(edge: number, rows: Float64Array, at: number): void {
    for (const [j, size] of this.line.impulses.get(edge) ?? []) {
      const { count, rest, inputs } = this.modal;
      for (let k = 0; k < count; k++) {
        rows[at + k] += size * this.modal.inputRe[j * count + k];
        rows[at + count + k] += size * this.modal.inputIm[j * count + k];
      }
      for (let k = 0; k < rest; k++) rows[at + 2 * count + k] += size * this.modal.blockInput[k * inputs + j];
    }
  }

  /** The inputs' closed forms about `time`, into `#inputs`. */
  #readStep(segment: number, time: number): void {
    for (let j = 0; j < this.signals.length; j++) {
      const signal = this.signals[j];
      const piece = this.line.pieces[j][segment];
      const tau = Math.max(0, time - signal.starts[piece]);
      const out = this.#inputs[j];
      const { order, omega } = signal;
      shiftedPolynomial(signal.coefficients, piece * order, order, tau, out, 0);
      if (omega === 0) continue;
      const cos = Math.cos(omega * tau);
      const sin = Math.sin(omega * tau);
      out[order] = signal.sineRe[piece] * cos - signal.sineIm[piece] * sin;
      out[order + 1] = signal.sineRe[piece] * sin + signal.sineIm[piece] * cos;
    }
  }

  #readInputs(segment: number, time: number, out: Float64Array, row: number): void {
    const width = this.signals.length * DIRECT_ORDERS;
    for (let j = 0; j < this.signals.length; j++) {
      const signal = this.signals[j];
      const piece = this.line.pieces[j][segment];
      signalDerivatives(signal, piece, Math.max(0, time - signal.starts[piece]), this.#derivatives);
      out.set(this.#derivatives, row * width + j * DIRECT_ORDERS);
    }
  }

  #propagator(h: number, time: number): Outcome<Propagator> {
    const kept = this.#kept;
    for (let i = 0; i < kept.length; i++) {
      if (Math.abs(kept[i].h - h) <= SAME_STEP * time) {
        if (i > 0) {
          const found = kept[i];
          kept.copyWithin(1, 0, i);
          kept[0] = found;
        }
        return succeed(kept[0]);
      }
    }
    const made = makePropagator(this.modal, this.#shapes, h);
    if (!made.ok) return made;
    kept.unshift(made.value);
    if (kept.length > KEPT_PROPAGATORS) kept.pop();
    return made;
  }

  #beginChecks(steps: number): number {
    const least = Math.ceil((steps * this.width) / CHECKPOINT_ROOM);
    const stride = Math.max(STRIDE, least);
    const room = Math.ceil(steps / stride);
    this.#checks = 0;
    this.#checkTimes = new Float64Array(room);
    this.#checkSegments = new Int32Array(room);
    this.#checkRows = new Float64Array(room * this.width);
    return stride;
  }

  #addCheck(time: number, segment: number, rows: Float64Array, at: number): void {
    this.#checkTimes[this.#checks] = time;
    this.#checkSegments[this.#checks] = segment;
    this.#checkRows.set(rows.subarray(at, at + this.width), this.#checks * this.width);
    this.#checks++;
  }

  /** The last checkpoint that does not lie behind the instant or its segment. */
  #checkBefore(time: number, segment: number): number {
    let lo = 0;
    let hi = this.#checks;
    while (hi - lo > 1) {
      const middle = (lo + hi) >> 1;
      if (this.#checkTimes[middle] <= time && this.#checkSegments[middle] <= segment) lo = middle;
      else hi = middle;
    }
    return lo;
  }
}

/** y of a modal row and input derivatives. */
export function outputValue(output: ModalOutput, row: Float64Array, inputs: Float64Array): number {
  const { re, im, rest, direct } = output;
  const count = re.length;
  let sum = 0;
  for (let k = 0; k < count; k++) sum += re[k] * row[k] - im[k] * row[count + k];
  for (let k = 0; k < rest.length; k++) sum += rest[k] * row[2 * count + k];
  for (let k = 0; k < direct.length; k++) if (direct[k] !== 0) sum += direct[k] * inputs[k];
  return sum;
}

/** Index of the first visible row that is not calm, `count` where all are. */
function firstWild(rows: Float64Array, width: number, count: number): number {
  for (let r = 0; r < count; r++) if (!isCalm(rows, (r + 1) * width, width)) return r;
  return count;
}

function isCalm(rows: Float64Array, at: number, width: number): boolean {
  for (let k = 0; k < width; k++) if (!(Math.abs(rows[at + k]) < RUNAWAY)) return false;
  return true;
}
