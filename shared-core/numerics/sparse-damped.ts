/**
 * Damped modes of sparse models given as dense matrices with unit mass: brings the coordinates into the order of
 * the chain or the narrowest band, takes proportional damping of chains in closed form and hands the rest to
 * chain-quadratic.ts or band-quadratic.ts.
 */
import { bandModes } from "./band-quadratic.ts";
import { type ChainQuadratic, chainModes } from "./chain-quadratic.ts";
import type { Kernel } from "./kernel.ts";
import { closedForm, type Pairs } from "./modal-pairs.ts";
import { bandwidthOf, patternOf, reverseCuthillMcKee } from "./ordering.ts";
import { maxAbs } from "./products.ts";
import { type SparseMatrix, sparseFromDense, sparseToBand } from "./sparse.ts";
import { unitScale } from "./symmetric-eigen.ts";
import { tridiagonalEigen } from "./tridiagonal-eigen.ts";

/** Below this size a band is not looked for. */
const BAND_SIZE = 40;
/** Below this size the dense way is as quick. */
const CHAIN_SIZE = 8;
/** Departure from C = αI + βK, relative to the terms, that counts as rounding. */
const PROPORTIONAL_FLOOR = 16 * Number.EPSILON;

/** C and K n×n symmetric, tridiagonal in the order `path`. Undefined where the dense way is to be taken. */
export function chainPairs(
  c: Float64Array,
  k: Float64Array,
  path: Int32Array,
  kernel: Kernel,
): Pairs | undefined {
  const n = path.length;
  if (n < CHAIN_SIZE) return undefined;
  // Time in units of the highest frequency; powers of two, so nothing is rounded.
  const rate = unitScale(Math.sqrt(maxAbs(k)));
  const chain: ChainQuadratic = {
    c: new Float64Array(n),
    cOff: new Float64Array(n - 1),
    k: new Float64Array(n),
    kOff: new Float64Array(n - 1),
  };
  for (let t = 0; t < n; t++) {
    const i = path[t];
    chain.c[t] = c[i * n + i] * rate;
    chain.k[t] = k[i * n + i] * rate * rate;
    if (t + 1 === n) break;
    const j = path[t + 1];
    chain.cOff[t] = c[i * n + j] * rate;
    chain.kOff[t] = k[i * n + j] * rate * rate;
  }
  const modes = proportional(chain, kernel) ?? chainModes(chain);
  return modes && restored(modes, path, rate);
}

/**
 * The same for C and K that a reordering brings into a band narrow enough to be worth it: the work is about
 * 60 n² b² against 50 n³ of the dense way.
 */
export function bandPairs(c: Float64Array, k: Float64Array, n: number): Pairs | undefined {
  if (n < BAND_SIZE) return undefined;
  const [sparseC, sparseK] = [sparseFromDense(c, n, n), sparseFromDense(k, n, n)];
  // A band of half-width b holds at most (2b + 1) n entries; the bound below keeps b under √(n/2).
  if (sparseK.value.length > 2 * n * Math.sqrt(n)) return undefined;
  const pattern = patternOf([sparseC, sparseK], n);
  const order = reverseCuthillMcKee(pattern);
  const bandwidth = bandwidthOf(pattern, order);
  if (2 * bandwidth * bandwidth > n) return undefined;
  const rate = unitScale(Math.sqrt(maxAbs(k)));
  const scaled = (a: SparseMatrix, factor: number) =>
    sparseToBand({ ...a, value: a.value.map((v) => v * factor) }, bandwidth, order);
  const modes = bandModes(scaled(sparseC, rate), scaled(sparseK, rate * rate));
  return modes && restored(modes, order, rate);
}

/** Back to the caller's order and unit of time. */
function restored(modes: Pairs, order: Int32Array, rate: number): Pairs {
  const { re, im, rowsRe, rowsIm } = modes;
  return {
    re: re.map((v) => v / rate),
    im: im.map((v) => v / rate),
    rowsRe: unpath(rowsRe, order),
    rowsIm: unpath(rowsIm, order),
  };
}

function unpath(rows: Float64Array, path: Int32Array): Float64Array {
  const n = path.length;
  const out = new Float64Array(rows.length);
  for (let at = 0; at < rows.length; at += n) {
    for (let t = 0; t < n; t++) out[at + path[t]] = rows[at + t];
  }
  return out;
}

/** The closed form where C = αI + βK, no damping included. */
function proportional(q: ChainQuadratic, kernel: Kernel): Pairs | undefined {
  const n = q.k.length;
  let stiffest = 0;
  for (let i = 1; i < n - 1; i++) if (Math.abs(q.kOff[i]) > Math.abs(q.kOff[stiffest])) stiffest = i;
  const beta = q.kOff[stiffest] === 0 ? 0 : q.cOff[stiffest] / q.kOff[stiffest];
  const alpha = q.c[0] - beta * q.k[0];
  for (let i = 0; i < n; i++) {
    const scale = Math.abs(q.c[i]) + Math.abs(beta * q.k[i]);
    if (Math.abs(q.c[i] - alpha - beta * q.k[i]) > PROPORTIONAL_FLOOR * scale) return undefined;
    if (i + 1 === n) break;
    const off = Math.abs(q.cOff[i]) + Math.abs(beta * q.kOff[i]);
    if (Math.abs(q.cOff[i] - beta * q.kOff[i]) > PROPORTIONAL_FLOOR * off) return undefined;
  }
  const undamped = tridiagonalEigen(q.k, q.kOff, { kernel });
  if (!undamped.ok) return undefined;
  const { values, vectors } = undamped.value;
  const pairs = closedForm(values, (j) => alpha + beta * values[j]);
  for (let j = 0; j < n; j++) {
    for (let i = 0; i < n; i++) {
      pairs.rowsRe[2 * j * n + i] = pairs.rowsRe[(2 * j + 1) * n + i] = vectors[i * n + j];
    }
  }
  return pairs;
}
