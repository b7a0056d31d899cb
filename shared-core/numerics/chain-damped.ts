/**
 * Damped modes of a chain given as dense matrices with unit mass: brings the coordinates into the order of the
 * chain, takes proportional damping in closed form and hands the rest to chain-quadratic.ts.
 */
import { type ChainQuadratic, chainModes } from "./chain-quadratic.ts";
import type { Kernel } from "./kernel.ts";
import { closedForm, type Pairs } from "./modal-pairs.ts";
import { maxAbs } from "./products.ts";
import { unitScale } from "./symmetric-eigen.ts";
import { tridiagonalEigen } from "./tridiagonal-eigen.ts";

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
  if (!modes) return undefined;
  const { re, im, rowsRe, rowsIm } = modes;
  return {
    re: re.map((v) => v / rate),
    im: im.map((v) => v / rate),
    rowsRe: unpath(rowsRe, path),
    rowsIm: unpath(rowsIm, path),
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
