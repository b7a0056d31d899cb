/**
 * Which instants of a motion must be looked at to see all that a quantity does.
 *
 * The grid is fine enough that every root that matters turns by no more than `TURN` a step while it matters:
 * a root's free part decays, so fast damped roots are followed only behind the instants that excite them.
 */
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { ModalSystem } from "./time-modal.ts";
import type { Chunk, Grid, Motion } from "./time-motion.ts";
import { type ModalQuantity, OutputTable } from "./time-trace.ts";

/** Largest turn of a mattering root in one step, rad: 18 points a cycle. */
const TURN = 0.35;

/** Rows followed at most: ten quantities at this length take half a gigabyte. */
const MOST_ROWS = 4_000_000;

/** Steps in any segment of a motion of few segments. */
const LEAST_STEPS = 8;

const SURVEY_STEPS = 256;

/** What must be looked at behind the start of each segment. */
export interface Demand {
  /** rad/s */
  readonly rate: number;
  /** s behind the start of a segment; later it has died away. */
  readonly until: number;
  /** Largest share of any quantity that it makes up, 1 for what always counts. */
  readonly share: number;
}

export interface Demands {
  readonly rates: readonly Demand[];
}

/**
 * Finds the roots whose free part reaches `tolerance` of a quantity's size anywhere. Products turn twice as fast.
 */
export function surveyDemands(
  motion: Motion,
  quantities: readonly ModalQuantity[],
  tolerance: number,
): Outcome<Demands> {
  const { modal } = motion;
  const twice = quantities.some((q) => q.products.length > 0) ? 2 : 1;
  if (edgesSuffice(motion, twice)) return succeed({ rates: [] });
  const segments = motion.line.edges.length - 1;
  const grid = motion.edgeGrid(Math.ceil(SURVEY_STEPS / segments));
  const free = new FreeParts(motion);
  const table = new OutputTable(quantities, modal);
  const scales = new Float64Array(quantities.length);
  let buffer = new Float64Array(0);
  const options = { withInputs: table.withInputs, doubleUpTo: table.withInputs ? 2 : -1 };
  const marched = motion.march(grid, options, (chunk) => {
    if (buffer.length < chunk.count * quantities.length)
      buffer = new Float64Array(chunk.count * quantities.length);
    table.values(chunk, buffer);
    for (let q = 0; q < scales.length; q++) {
      for (let p = q; p < chunk.count * scales.length; p += scales.length) {
        const size = Math.abs(buffer[p]);
        if (scales[q] < size) scales[q] = size;
      }
    }
    free.look(chunk, grid);
  });
  const shares = mattering(modal, quantities, scales, free.sizes, tolerance);
  const rates: Demand[] = [];
  for (let k = 0; k < modal.count; k++) {
    if (!(shares[k] > 1)) continue;
    const rate = twice * Math.hypot(modal.lambdaRe[k], modal.lambdaIm[k]);
    const decay = -modal.lambdaRe[k];
    const until = decay > 0 ? Math.log(shares[k]) / decay : Number.POSITIVE_INFINITY;
    rates.push({ rate, until, share: Math.min(1, shares[k] * tolerance) });
  }
  if (modal.rest > 0 && quantities.some((q) => touchesBlock(q))) {
    rates.push({ rate: twice * modal.blockRate, until: Number.POSITIVE_INFINITY, share: 1 });
  }
  for (const { omega } of motion.signals) {
    if (omega === 0) continue;
    rates.push({ rate: twice * omega, until: Number.POSITIVE_INFINITY, share: 1 });
  }
  const demands = { rates };
  return marched.ok ? succeed(demands) : fail(marched.reason, demands);
}

/** A grid of all edges and `stored` instants (ascending), cut as the demands ask. */
export function demandedGrid(motion: Motion, demands: Demands, stored: Float64Array): Outcome<Grid> {
  const { edges } = motion.line;
  const segments = edges.length - 1;
  const degree = motion.signals.reduce((most, s) => Math.max(most, s.order), 0);
  const least = segments <= 500 ? LEAST_STEPS : degree > 4 ? 3 : 1;
  const same = 1e-12 * motion.duration;
  const grid = new GridRows(edges.length + stored.length);
  let next = 0;
  for (let i = 0; i < segments; i++) {
    const start = edges[i];
    const end = edges[i + 1];
    const rates =
      demands.rates.length === 0 ? NONE : demands.rates.filter(({ rate }) => rate * (end - start) > TURN);
    let from = start;
    while (from < end) {
      while (next < stored.length && stored[next] <= from + same) next++;
      const stop = next < stored.length && stored[next] < end - same ? stored[next] : end;
      let rate = (TURN * least) / (end - start);
      for (const r of rates) if (from < start + r.until - same && rate < r.rate) rate = r.rate;
      // A stage ends where the fastest root of it has died away.
      let to = stop;
      for (const r of rates) {
        const dead = start + r.until;
        if (r.rate === rate && from < dead - same && dead < to) to = dead;
      }
      const steps = Math.max(1, Math.ceil(((to - from) * rate) / TURN - 1e-9));
      if (grid.steps + 1 + steps > MOST_ROWS) {
        return fail(
          `it would have to be followed at more than ${MOST_ROWS} instants between 0 and ${motion.duration} s; ask for a shorter time`,
        );
      }
      for (let k = 1; k < steps; k++) grid.push(from + ((to - from) * k) / steps, i);
      grid.push(to, i);
      from = to;
    }
  }
  return succeed(grid.done());
}

const NONE: readonly Demand[] = [];

/** A grid while it grows, from t = 0. */
class GridRows {
  steps = 0;
  #times: Float64Array;
  #segments: Int32Array;

  constructor(room: number) {
    this.#times = new Float64Array(room + 1);
    this.#segments = new Int32Array(room);
  }

  push(time: number, segment: number): void {
    if (this.steps === this.#segments.length) this.#grow();
    this.#segments[this.steps] = segment;
    this.#times[++this.steps] = time;
  }

  done(): Grid {
    return {
      times: this.#times.subarray(0, this.steps + 1),
      segments: this.#segments.subarray(0, this.steps),
    };
  }

  #grow(): void {
    const [times, segments] = [this.#times, this.#segments];
    this.#times = new Float64Array(2 * segments.length + 1);
    this.#segments = new Int32Array(2 * segments.length);
    this.#times.set(times);
    this.#segments.set(segments);
  }
}

/** True where every root turns little within every segment, so that the edges alone show all there is to see. */
function edgesSuffice(motion: Motion, twice: number): boolean {
  const { edges } = motion.line;
  const { modal, signals } = motion;
  let longest = 0;
  for (let i = 0; i + 1 < edges.length; i++) longest = Math.max(longest, edges[i + 1] - edges[i]);
  let fastest = modal.rest > 0 ? modal.blockRate : 0;
  for (let k = 0; k < modal.count; k++) {
    fastest = Math.max(fastest, Math.hypot(modal.lambdaRe[k], modal.lambdaIm[k]));
  }
  for (const { omega } of signals) fastest = Math.max(fastest, omega);
  return twice * fastest * longest <= TURN;
}

/** Largest free part |eta - particular| of each root at the start of any segment long enough to show it. */
class FreeParts {
  readonly sizes: Float64Array;
  readonly #motion: Motion;
  #last = -1;

  constructor(motion: Motion) {
    this.#motion = motion;
    this.sizes = new Float64Array(motion.modal.count);
  }

  look(chunk: Chunk, grid: Grid): void {
    const motion = this.#motion;
    const { edges } = motion.line;
    for (let r = 0; r < chunk.count; r++) {
      const step = chunk.after[r] ? chunk.steps[r] : chunk.steps[r] + 1;
      if (step >= grid.segments.length) continue;
      const segment = grid.segments[step];
      if (grid.times[step] !== edges[segment] || (segment === this.#last && !chunk.after[r])) continue;
      this.#last = segment;
      this.#lookAt(segment, edges[segment + 1] - edges[segment], chunk.rows, r * motion.width);
    }
  }

  #lookAt(segment: number, length: number, rows: Float64Array, at: number): void {
    const { modal, signals } = this.#motion;
    const { count } = modal;
    let inputs: readonly Float64Array[] | undefined;
    for (let k = 0; k < count; k++) {
      const lr = modal.lambdaRe[k];
      const li = modal.lambdaIm[k];
      const square = lr * lr + li * li;
      if (!(square * length * length > TURN * TURN)) continue;
      inputs ??= this.#motion.inputsAt(segment, this.#motion.line.edges[segment]);
      let re = rows[at + k];
      let im = rows[at + count + k];
      for (let j = 0; j < signals.length; j++) {
        const br = modal.inputRe[j * count + k];
        const bi = modal.inputIm[j * count + k];
        if (br === 0 && bi === 0) continue;
        const [pr, pi] = particular(inputs[j], signals[j].order, signals[j].omega, lr, li);
        re -= br * pr - bi * pi;
        im -= br * pi + bi * pr;
      }
      // The exact length only where it may be the largest yet.
      if (Math.SQRT2 * Math.max(Math.abs(re), Math.abs(im)) < this.sizes[k]) continue;
      this.sizes[k] = Math.max(this.sizes[k], Math.hypot(re, im));
    }
  }
}

/** Particular solution at the start of x' = lambda x + u: -sum c_p p! / lambda^(p+1), plus the sinusoid's. */
function particular(
  input: Float64Array,
  order: number,
  omega: number,
  lr: number,
  li: number,
): readonly [number, number] {
  const square = lr * lr + li * li;
  const ir = lr / square;
  const ii = -li / square;
  let re = 0;
  let im = 0;
  // Horner in 1/lambda from the highest power: (c_0 + 1/lambda (c_1 + 2/lambda (c_2 + ...))) / lambda.
  for (let p = order - 1; p >= 0; p--) {
    const sr = input[p] + (p + 1) * re;
    const si = (p + 1) * im;
    re = sr * ir - si * ii;
    im = sr * ii + si * ir;
  }
  re = -re;
  im = -im;
  if (omega === 0) return [re, im];
  for (const sign of [1, -1]) {
    const dr = -lr;
    const di = sign * omega - li;
    const size = dr * dr + di * di;
    if (size === 0) continue;
    const sr = 0.5 * input[order];
    const si = 0.5 * sign * input[order + 1];
    re += (sr * dr + si * di) / size;
    im += (si * dr - sr * di) / size;
  }
  return [re, im];
}

/** For each root the largest share of a quantity it makes up, in units of the tolerance. */
function mattering(
  modal: ModalSystem,
  quantities: readonly ModalQuantity[],
  scales: Float64Array,
  sizes: Float64Array,
  tolerance: number,
): Float64Array {
  const shares = new Float64Array(modal.count);
  quantities.forEach(({ linear, products }, q) => {
    if (!(scales[q] > 0)) return;
    const outputs = [linear, ...products.flatMap((p) => [p.a, p.b])];
    for (const output of outputs) {
      // A product's parts are judged among themselves.
      let scale = output === linear ? scales[q] : 0;
      if (output !== linear) {
        for (let k = 0; k < modal.count; k++) {
          scale = Math.max(scale, Math.hypot(output.re[k], output.im[k]) * sizes[k]);
        }
      }
      if (!(scale > 0)) continue;
      for (let k = 0; k < modal.count; k++) {
        const size = Math.hypot(output.re[k], output.im[k]) * sizes[k];
        shares[k] = Math.max(shares[k], size / (tolerance * scale));
      }
    }
  });
  return shares;
}

function touchesBlock({ linear, products }: ModalQuantity): boolean {
  return [linear, ...products.flatMap((p) => [p.a, p.b])].some((o) => o.rest.some((v) => v !== 0));
}
