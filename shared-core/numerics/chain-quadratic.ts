/**
 * Damped modes of a chain: (λ² I + λ C + K) ψ = 0 with C and K symmetric tridiagonal.
 *
 * Method: undamped frequencies by QL, first guesses from each mode's own damping, all values together on the
 * determinant (modes-together.ts, O(n) a step), Rayleigh corrections with vectors from the twisted factorisation
 * (Dhillon & Parlett, Linear Algebra Appl. 387, 2004, here complex symmetric).
 */
import { Twist } from "./chain-twist.ts";
import type { Pairs } from "./modal-pairs.ts";
import { guessMode, rigidStarts, type Starts, solveTogether } from "./modes-together.ts";
import { maxAbs } from "./products.ts";
import { implicitQl, sortAscending } from "./tridiagonal-ql.ts";

/** Diagonals (n) and off-diagonals (n − 1) of C and K, scaled so that ‖K‖ is about one. */
export type ChainQuadratic = {
  c: Float64Array;
  cOff: Float64Array;
  k: Float64Array;
  kOff: Float64Array;
};

/** The 2n values, pairs adjacent with the positive imaginary part first, and their vectors as rows. */
export type ChainModes = Pairs;

/** Values of K, ascending, with a way to their vectors (unit 2-norm), where the caller has them already. */
export type UndampedChain = {
  values: Float64Array;
  vector(j: number, out: Float64Array): void;
};

/** Undefined where the checks do not hold: repeated or defective values, or no convergence. */
export function chainModes(q: ChainQuadratic, undamped?: UndampedChain): ChainModes | undefined {
  const n = q.k.length;
  const parts = connectedParts(q);
  const out: Pairs = {
    re: new Float64Array(2 * n),
    im: new Float64Array(2 * n),
    rowsRe: new Float64Array(2 * n * n),
    rowsIm: new Float64Array(2 * n * n),
  };
  let at = 0;
  for (const [first, end] of parts) {
    const part: ChainQuadratic = {
      c: q.c.subarray(first, end),
      cOff: q.cOff.subarray(first, Math.max(first, end - 1)),
      k: q.k.subarray(first, end),
      kOff: q.kOff.subarray(first, Math.max(first, end - 1)),
    };
    const twist = new Twist(part);
    const starts = firstGuesses(part, (parts.length === 1 && undamped) || undampedChain(part, twist));
    if (!starts || !solveTogether(twist, starts, out, n, first, at)) return undefined;
    at += 2 * (end - first);
  }
  return out;
}

/** Ranges [first, end) without coupling between them. */
function connectedParts(q: ChainQuadratic): [number, number][] {
  const parts: [number, number][] = [];
  let first = 0;
  for (let i = 0; i < q.k.length; i++) {
    if (i + 1 < q.k.length && (q.kOff[i] !== 0 || q.cOff[i] !== 0)) continue;
    parts.push([first, i + 1]);
    first = i + 1;
  }
  return parts;
}

/** Values by QL, vectors one by one by the twisted factorisation. */
function undampedChain(q: ChainQuadratic, twist: Twist): UndampedChain | undefined {
  const n = q.k.length;
  const values = Float64Array.from(q.k);
  if (!implicitQl(values, Float64Array.from(q.kOff), n)) return undefined;
  sortAscending(values, n);
  const vector = (j: number, out: Float64Array) => {
    twist.undampedVector(values[j]);
    out.set(twist.vectorRe);
  };
  return { values, vector };
}

/** First guesses of one part; a rigid-body motion is set aside exactly. */
function firstGuesses(q: ChainQuadratic, undamped: UndampedChain | undefined): Starts | undefined {
  if (undamped === undefined) return undefined;
  const n = q.k.length;
  const { values } = undamped;
  const items = { re: [], im: [] };
  let zeroVectors: readonly Float64Array[] | undefined = [];
  const v = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    undamped.vector(j, v);
    // A connected chain has at most one rigid-body motion, and rounding hides anything softer.
    if (j === 0 && Math.abs(values[0]) <= 8 * n * Number.EPSILON) {
      zeroVectors = rigidStarts([Float64Array.from(v)], (a) => bandForm(q.c, q.cOff, a), maxAbs(q.c), items);
      if (!zeroVectors) return undefined;
    } else guessMode(items, values[j], bandForm(q.c, q.cOff, v));
  }
  return { items, zeroVectors };
}

/** vᵀ A v for a tridiagonal A. */
function bandForm(diagonal: Float64Array, off: Float64Array, v: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < diagonal.length; i++) {
    sum += diagonal[i] * v[i] * v[i];
    if (i + 1 < diagonal.length) sum += 2 * off[i] * v[i] * v[i + 1];
  }
  return sum;
}
