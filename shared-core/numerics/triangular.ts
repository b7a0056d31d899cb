/**
 * Substitution for many right-hand sides in blocks, so that most of the work is a product for the kernel.
 *
 * Error as for plain substitution, n·ε|L⁻¹||L||x|.
 */
import { kernelFor, type Window } from "./kernel.ts";

/** Rows solved by the plain loop before the rest is brought up to date. */
const BLOCK = 32;
/** Below this many right-hand sides, or rows, the plain loop over everything is as quick. */
const WORTHWHILE = 16;

export type Substitution = {
  n: number;
  columns: number;
  /** From the first row down (lower triangle) or from the last row up (upper triangle). */
  downwards: boolean;
  /** Solves rows from … to − 1 in place, all other rows of the block being done or out of it. */
  within: (from: number, to: number) => void;
  /** The coefficients of columns from … to − 1 in rows start … end − 1. */
  coefficients: (start: number, end: number, from: number, to: number) => Window;
};

/** X (n×columns, row-major) in place. */
export function substitute(x: Float64Array, s: Substitution): void {
  const { n, columns, downwards, within, coefficients } = s;
  if (columns < WORTHWHILE || n <= BLOCK) {
    within(0, n);
    return;
  }
  const kernel = kernelFor(n);
  const room = new Float64Array(n * columns);
  const blocks = Math.ceil(n / BLOCK);
  for (let b = 0; b < blocks; b++) {
    const from = (downwards ? b : blocks - 1 - b) * BLOCK;
    const to = Math.min(n, from + BLOCK);
    within(from, to);
    const [start, end] = downwards ? [to, n] : [0, from];
    if (start === end) break;
    const solved = { data: x, at: from * columns, stride: columns };
    const change = { data: room, at: 0, stride: columns };
    kernel.product(coefficients(start, end, from, to), solved, change, end - start, to - from, columns);
    const at = start * columns;
    for (let p = 0; p < (end - start) * columns; p++) x[at + p] -= room[p];
  }
}
