/**
 * Chirps and laws as pieces: interpolation of degree 7 at Chebyshev points, halved until it agrees with the
 * function between them.
 *
 * Error of a piece of length h: about 2 (h/4)^8 max|u^(8)| / 8! (Trefethen, Approximation Theory and
 * Approximation Practice, chapter 6, error of Chebyshev interpolation). Degree 7 is the largest whose powers on
 * [0, 1] still keep 1e-11 of the largest value.
 */
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { packedSignal, type Signal } from "./drive-signal.ts";

export interface SmoothOptions {
  /** s; the function is followed from 0 to here. */
  readonly lasting: number;
  /** Where it is not smooth, s. */
  readonly kinks: readonly number[];
  /** Fastest rate in it, Hz; 0 when unknown. */
  readonly fastestHz: number;
  /** Wanted error as a share of its largest value. */
  readonly tolerance: number;
  /** Pieces looked at first are this many times finer. */
  readonly finer: number;
}

export interface SmoothSignal {
  readonly signal: Signal;
  /** Largest error seen between the points, as a share of the largest value. */
  readonly error: number;
}

const POINTS = 8;
/** More pieces than this are not made: 200,000 pieces of 8 coefficients are 13 MB. */
const MOST_PIECES = 200_000;
/** Pieces are not halved below this share of the whole; what jumps inside one has no weight in any integral. */
const LEAST_SHARE = 2 ** -44;
const FIRST_PIECES = 256;

/** Chebyshev points of the first kind on [0, 1]. */
const NODES = Float64Array.from(
  { length: POINTS },
  (_, j) => 0.5 - 0.5 * Math.cos((Math.PI * (2 * j + 1)) / (2 * POINTS)),
);
/** Between the nodes and at the ends, where the error is largest; away from any even division. */
const CHECKS = [0, 0.0741, 0.2113, 0.3779, 0.5447, 0.7309, 0.9127, 1];
/** Row p, column j: share of the value at node j in the coefficient of s^p. */
const TO_POWERS = powersFromNodes();

/**
 * Follows `at` from 0 to `lasting`. Fails where the function has no finite value, or where the pieces run out
 * before the tolerance is met; `upTo` then holds what was reached.
 */
export function smoothSignal(at: (time: number) => number, options: SmoothOptions): Outcome<SmoothSignal> {
  const { lasting } = options;
  const edges = firstEdges(options);
  let scale = 0;
  for (const edge of edges) scale = Math.max(scale, Math.abs(at(edge)) || 0);
  const starts: number[] = [];
  const coefficients: number[] = [];
  const values = new Float64Array(POINTS);
  const powers = new Float64Array(POINTS);
  let worst = 0;
  const stack: [number, number][] = [];
  for (let i = edges.length - 1; i > 0; i--) stack.push([edges[i - 1], edges[i]]);
  let exhausted = false;
  for (let piece = stack.pop(); piece !== undefined; piece = stack.pop()) {
    const [from, to] = piece;
    const h = to - from;
    for (let j = 0; j < POINTS; j++) {
      const value = at(from + h * NODES[j]);
      if (!Number.isFinite(value)) return fail(`it has no finite value at t = ${from + h * NODES[j]} s`);
      values[j] = value;
      scale = Math.max(scale, Math.abs(value));
    }
    toPowers(values, powers);
    const error = largestError(at, from, h, powers);
    const small = error <= options.tolerance * scale || h <= LEAST_SHARE * lasting;
    exhausted ||= starts.length + stack.length >= MOST_PIECES;
    if (!small && !exhausted) {
      stack.push([from + h / 2, to], [from, from + h / 2]);
      continue;
    }
    if (h > LEAST_SHARE * lasting) worst = Math.max(worst, error);
    starts.push(from);
    for (let p = 0; p < POINTS; p++) coefficients.push(powers[p] / h ** p);
  }
  const signal = packedSignal({
    starts: Float64Array.from(starts),
    order: POINTS,
    coefficients: Float64Array.from(coefficients),
    omega: 0,
    sineRe: new Float64Array(starts.length),
    sineIm: new Float64Array(starts.length),
  });
  const reached = { signal, error: scale > 0 ? worst / scale : 0 };
  if (exhausted) return fail(`it changes too fast to be followed over ${lasting} s`, reached);
  return succeed(reached);
}

function firstEdges({ lasting, kinks, fastestHz, finer }: SmoothOptions): number[] {
  // Two pieces a cycle to begin with, so that no oscillation hides between the points.
  const byRate = Math.ceil(2 * Math.abs(fastestHz) * lasting);
  const count = Math.min(MOST_PIECES / 4, Math.max(FIRST_PIECES, byRate) * finer);
  const edges = Array.from({ length: count + 1 }, (_, i) => (lasting * i) / count);
  for (const kink of kinks) if (kink > 0 && kink < lasting) edges.push(kink);
  return edges.sort((a, b) => a - b).filter((edge, i, all) => i === 0 || edge - all[i - 1] > 1e-14 * lasting);
}

function toPowers(values: Float64Array, powers: Float64Array): void {
  for (let p = 0; p < POINTS; p++) {
    let sum = 0;
    for (let j = 0; j < POINTS; j++) sum += TO_POWERS[p * POINTS + j] * values[j];
    powers[p] = sum;
  }
}

/** Values at the very ends belong to the neighbours where the function jumps, so the ends are judged just inside. */
function largestError(at: (time: number) => number, from: number, h: number, powers: Float64Array): number {
  let most = 0;
  for (const check of CHECKS) {
    const s = Math.min(1 - 1e-9, Math.max(1e-9, check));
    let sum = 0;
    for (let p = POINTS - 1; p >= 0; p--) sum = sum * s + powers[p];
    const value = at(from + h * s);
    most = Math.max(most, Number.isFinite(value) ? Math.abs(value - sum) : Number.POSITIVE_INFINITY);
  }
  return most;
}

function powersFromNodes(): Float64Array {
  const table = new Float64Array(POINTS * POINTS);
  for (let j = 0; j < POINTS; j++) {
    let basis = [1];
    for (let k = 0; k < POINTS; k++) {
      if (k === j) continue;
      const width = NODES[j] - NODES[k];
      const next = new Array<number>(basis.length + 1).fill(0);
      basis.forEach((c, p) => {
        next[p] -= (c * NODES[k]) / width;
        next[p + 1] += c / width;
      });
      basis = next;
    }
    for (let p = 0; p < POINTS; p++) table[p * POINTS + j] = basis[p];
  }
  return table;
}
