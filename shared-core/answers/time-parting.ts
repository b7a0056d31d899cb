/**
 * One set of coupled states split by its roots.
 *
 * A root is split off when its condition |w| |v| with w v = 1 (w the row of the inverse of the vectors, v the
 * vector, states balanced) stays below `MOST_CONDITION`. The rest keeps an orthonormal basis of its invariant
 * subspace and is propagated by matrix exponentials, so a defective system is answered as exactly as a plain
 * one, only more slowly.
 */
import { balance } from "../numerics/balance.ts";
import { generalEigen } from "../numerics/general-eigen.ts";
import { factorLu, solveLu } from "../numerics/lu.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { identity, multiply } from "../numerics/products.ts";
import { invariantBasis, normOf, type RootValues } from "./time-invariant.ts";
import type { StateForm } from "./time-state.ts";

export interface ModalSystem {
  readonly size: number;
  readonly inputs: number;
  /** Single roots: real ones, and one of each conjugate pair. */
  readonly count: number;
  readonly lambdaRe: Float64Array;
  readonly lambdaIm: Float64Array;
  /** 2 for a pair, 1 for a real root. */
  readonly weight: Float64Array;
  /** Modal input factors, J x count. */
  readonly inputRe: Float64Array;
  readonly inputIm: Float64Array;
  /** States left in the block. */
  readonly rest: number;
  /** rest x rest. */
  readonly block: Float64Array;
  /** rest x J. */
  readonly blockInput: Float64Array;
  /** Largest |root| within the block, 1/s. */
  readonly blockRate: number;
  /** Roots within the block. */
  readonly blockRoots: readonly (readonly [number, number])[];
  /** z = sum over pairs of 2 Re(v eta) + sum over real roots of v eta + Q x. */
  readonly vectorRe: Float64Array;
  readonly vectorIm: Float64Array;
  readonly basis: Float64Array;
  /** eta = w z, x = L z; count x N and rest x N. */
  readonly leftRe: Float64Array;
  readonly leftIm: Float64Array;
  readonly left: Float64Array;
}

export interface Parting {
  readonly singles: readonly Single[];
  /** N x N: the columns of the singles, then the `rest` columns of the block's basis. */
  readonly columns: Float64Array;
  readonly rest: number;
  readonly inverse: Float64Array;
  /** Roots in the block. */
  readonly roots: readonly (readonly [number, number])[];
}

export interface Single {
  readonly re: number;
  readonly im: number;
  /** Column of Re v (and of Im v behind it for a pair). */
  readonly column: number;
}

/** Splits after balancing, so that conditions do not depend on the units of the states. */
export function balancedParting(system: StateForm): ModalSystem {
  const { size: n, inputs } = system;
  const a = Float64Array.from(system.a);
  const scale = balance(a, n);
  const b = Float64Array.from(system.b);
  for (let i = 0; i < n; i++) for (let j = 0; j < inputs; j++) b[i * inputs + j] /= scale[i];
  const modal = partedSystem({ size: n, a, inputs, b });
  const { count, rest } = modal;
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < count; k++) {
      modal.vectorRe[i * count + k] *= scale[i];
      modal.vectorIm[i * count + k] *= scale[i];
      modal.leftRe[k * n + i] /= scale[i];
      modal.leftIm[k * n + i] /= scale[i];
    }
    for (let k = 0; k < rest; k++) {
      modal.basis[i * rest + k] *= scale[i];
      modal.left[k * n + i] /= scale[i];
    }
  }
  return modal;
}

export function assemble(system: StateForm, parting: Parting): ModalSystem {
  const { size: n, inputs, a, b } = system;
  const { singles, columns, rest, inverse } = parting;
  const count = singles.length;
  const vectorRe = new Float64Array(n * count);
  const vectorIm = new Float64Array(n * count);
  const leftRe = new Float64Array(count * n);
  const leftIm = new Float64Array(count * n);
  singles.forEach(({ im, column }, k) => {
    for (let i = 0; i < n; i++) {
      vectorRe[i * count + k] = columns[i * n + column];
      leftRe[k * n + i] = im === 0 ? inverse[column * n + i] : 0.5 * inverse[column * n + i];
      if (im === 0) continue;
      vectorIm[i * count + k] = columns[i * n + column + 1];
      leftIm[k * n + i] = -0.5 * inverse[(column + 1) * n + i];
    }
  });
  const basis = new Float64Array(n * rest);
  const left = inverse.slice((n - rest) * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < rest; k++) basis[i * rest + k] = columns[i * n + n - rest + k];
  }
  return {
    size: n,
    inputs,
    count,
    lambdaRe: Float64Array.from(singles, (s) => s.re),
    lambdaIm: Float64Array.from(singles, (s) => s.im),
    weight: Float64Array.from(singles, (s) => (s.im === 0 ? 1 : 2)),
    inputRe: transposedProduct(leftRe, b, count, n, inputs),
    inputIm: transposedProduct(leftIm, b, count, n, inputs),
    rest,
    block: multiply(left, multiply(a, basis, n, n, rest), rest, n, rest),
    blockInput: multiply(left, b, rest, n, inputs),
    blockRate: rest === 0 ? 0 : Math.max(...parting.roots.map(([re, im]) => Math.hypot(re, im))),
    blockRoots: rest === 0 ? [] : parting.roots,
    vectorRe,
    vectorIm,
    basis,
    leftRe,
    leftIm,
    left,
  };
}

/** Chosen by trial: keeps ten digits of every split root. */
const MOST_CONDITION = 1e5;

/** Roots and vectors of A; conjugate pairs stand side by side, the one with positive imaginary part first. */
interface StateRoots extends RootValues {
  /** N x N row-major, the vector of root k in column k; of a pair the first column is Re v, the second Im v. */
  readonly vectors: Float64Array;
}

function partedSystem(system: StateForm): ModalSystem {
  const n = system.size;
  const roots = stateRoots(system);
  if (roots.ok) {
    const parted = partRoots(system, roots.value);
    if (parted !== undefined) return parted;
  }
  const all = roots.ok ? Array.from(roots.value.re, (re, k) => [re, roots.value.im[k]] as const) : undefined;
  return assemble(system, {
    singles: [],
    columns: identity(n),
    rest: n,
    inverse: identity(n),
    roots: all ?? [[normOf(system.a, n), 0]],
  });
}

function stateRoots(system: StateForm): Outcome<StateRoots> {
  const n = system.size;
  const found = generalEigen(system.a, n);
  if (!found.ok) return fail(found.reason);
  const { re, im, right } = found.value;
  if (right === undefined) return fail("the roots have no vectors");
  const vectors = Float64Array.from(right.re);
  for (let k = 0; k < n; k++) {
    if (im[k] === 0) continue;
    for (let i = 0; i < n; i++) vectors[i * n + k + 1] = right.im[i * n + k];
    k++;
  }
  return succeed({ re, im, vectors });
}

function partRoots(system: StateForm, roots: StateRoots): ModalSystem | undefined {
  const n = system.size;
  const columns = normalised(roots, n);
  const inverse = invert(columns, n);
  const bad = new Uint8Array(n);
  if (inverse === undefined) markParallel(roots, columns, n, bad);
  else markIllConditioned(roots, columns, inverse, n, bad);
  const badCount = bad.reduce((sum, b) => sum + b, 0);
  if (badCount === 0) {
    return (
      inverse && assemble(system, { singles: singlesOf(roots, bad), columns, rest: 0, inverse, roots: [] })
    );
  }
  if (badCount === n) return undefined;
  return partRest(system, roots, columns, bad, badCount);
}

/** Fills the places of the bad columns with a basis of their invariant subspace. */
function partRest(
  system: StateForm,
  roots: StateRoots,
  columns: Float64Array,
  bad: Uint8Array,
  badCount: number,
): ModalSystem | undefined {
  const n = system.size;
  const basis = invariantBasis(system.a, n, roots, bad, badCount);
  if (basis === undefined) return undefined;
  const full = new Float64Array(n * n);
  let at = 0;
  for (let k = 0; k < n; k++) {
    if (bad[k]) continue;
    for (let i = 0; i < n; i++) full[i * n + at] = columns[i * n + k];
    at++;
  }
  for (let k = 0; k < badCount; k++) {
    for (let i = 0; i < n; i++) full[i * n + at + k] = basis[i * badCount + k];
  }
  const inverse = invert(full, n);
  if (inverse === undefined) return undefined;
  const singles = singlesOf(roots, bad);
  for (let k = 0; k < n; k++) {
    if (!(conditionOf(full, inverse, n, k, 1) <= MOST_CONDITION)) return undefined;
  }
  const within = Array.from({ length: n }, (_, k) => k)
    .filter((k) => bad[k])
    .map((k) => [roots.re[k], roots.im[k]] as const);
  return assemble(system, { singles, columns: full, rest: badCount, inverse, roots: within });
}

/** Columns scaled to a largest entry of one; those of a pair turned so that Re v and Im v are orthogonal. */
function normalised({ im, vectors }: StateRoots, n: number): Float64Array {
  const out = Float64Array.from(vectors);
  for (let k = 0; k < n; k++) {
    const pair = im[k] !== 0;
    if (pair) turnPair(out, n, k);
    let most = 0;
    for (let i = 0; i < n; i++) {
      most = Math.max(most, Math.abs(out[i * n + k]), pair ? Math.abs(out[i * n + k + 1]) : 0);
    }
    const scale = most > 0 ? 1 / most : 1;
    for (let i = 0; i < n; i++) {
      out[i * n + k] *= scale;
      if (pair) out[i * n + k + 1] *= scale;
    }
    if (pair) k++;
  }
  return out;
}

function turnPair(v: Float64Array, n: number, k: number): void {
  let squares = 0;
  let cross = 0;
  for (let i = 0; i < n; i++) {
    const p = v[i * n + k];
    const q = v[i * n + k + 1];
    squares += p * p - q * q;
    cross += 2 * p * q;
  }
  const angle = -0.5 * Math.atan2(cross, squares);
  const cos = Math.cos(angle);
  const sin = Math.sin(angle);
  for (let i = 0; i < n; i++) {
    const p = v[i * n + k];
    const q = v[i * n + k + 1];
    v[i * n + k] = p * cos - q * sin;
    v[i * n + k + 1] = p * sin + q * cos;
  }
}

function markIllConditioned(
  roots: StateRoots,
  columns: Float64Array,
  inverse: Float64Array,
  n: number,
  bad: Uint8Array,
): void {
  for (let k = 0; k < n; k++) {
    const pair = roots.im[k] !== 0;
    if (!(conditionOf(columns, inverse, n, k, pair ? 2 : 1) <= MOST_CONDITION)) {
      bad[k] = 1;
      if (pair) bad[k + 1] = 1;
    }
    if (pair) k++;
  }
}

/** |w| |v| of the columns k to k + width - 1 and the rows of the inverse that belong to them. */
function conditionOf(
  columns: Float64Array,
  inverse: Float64Array,
  n: number,
  k: number,
  width: number,
): number {
  let v = 0;
  let w = 0;
  for (let i = 0; i < n; i++) {
    for (let l = k; l < k + width; l++) {
      v += columns[i * n + l] ** 2;
      w += inverse[l * n + i] ** 2;
    }
  }
  return Math.sqrt(v * w);
}

/** Where the vectors cannot be inverted: marks roots whose vectors are parallel to another's. */
function markParallel(roots: StateRoots, columns: Float64Array, n: number, bad: Uint8Array): void {
  const rowScale = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) rowScale[i] = Math.max(rowScale[i], Math.abs(columns[i * n + k]));
    rowScale[i] = rowScale[i] > 0 ? 1 / rowScale[i] : 1;
  }
  for (let k = 0; k < n; k++) {
    for (let l = 0; l < k; l++) {
      if (isSecond(roots, k) || isSecond(roots, l)) continue;
      if (cosineSquare(roots, columns, rowScale, n, k, l) < 1 - 1e-8) continue;
      for (const m of [k, l]) {
        bad[m] = 1;
        if (roots.im[m] !== 0) bad[m + 1] = 1;
      }
    }
    // A pair next to the real axis is nearly a double real root: its vector is parallel to its conjugate.
    if (roots.im[k] > 0 && selfParallel(columns, rowScale, n, k)) bad[k] = bad[k + 1] = 1;
  }
  if (bad.every((b) => b === 0)) bad.fill(1);
}

const isSecond = (roots: StateRoots, k: number): boolean => roots.im[k] < 0;

function cosineSquare(
  roots: StateRoots,
  columns: Float64Array,
  rowScale: Float64Array,
  n: number,
  k: number,
  l: number,
): number {
  let re = 0;
  let im = 0;
  let kk = 0;
  let ll = 0;
  const pairK = roots.im[k] !== 0;
  const pairL = roots.im[l] !== 0;
  for (let i = 0; i < n; i++) {
    const scale = rowScale[i];
    const a = columns[i * n + k] * scale;
    const b = pairK ? columns[i * n + k + 1] * scale : 0;
    const c = columns[i * n + l] * scale;
    const d = pairL ? columns[i * n + l + 1] * scale : 0;
    re += a * c + b * d;
    im += a * d - b * c;
    kk += a * a + b * b;
    ll += c * c + d * d;
  }
  return (re * re + im * im) / (kk * ll);
}

function selfParallel(columns: Float64Array, rowScale: Float64Array, n: number, k: number): boolean {
  let p = 0;
  let q = 0;
  for (let i = 0; i < n; i++) {
    p += (columns[i * n + k] * rowScale[i]) ** 2;
    q += (columns[i * n + k + 1] * rowScale[i]) ** 2;
  }
  return Math.min(p, q) < 1e-8 * Math.max(p, q);
}

function singlesOf(roots: StateRoots, bad: Uint8Array): Single[] {
  const singles: Single[] = [];
  let column = 0;
  for (let k = 0; k < bad.length; k++) {
    const pair = roots.im[k] !== 0;
    if (!bad[k]) {
      singles.push({ re: roots.re[k], im: Math.abs(roots.im[k]), column });
      column += pair ? 2 : 1;
    }
    if (pair) k++;
  }
  return singles;
}

/** (left B) as J x count. */
function transposedProduct(
  left: Float64Array,
  b: Float64Array,
  count: number,
  n: number,
  inputs: number,
): Float64Array {
  const product = multiply(left, b, count, n, inputs);
  const out = new Float64Array(inputs * count);
  for (let k = 0; k < count; k++)
    for (let j = 0; j < inputs; j++) out[j * count + k] = product[k * inputs + j];
  return out;
}

function invert(a: Float64Array, n: number): Float64Array | undefined {
  const lu = factorLu(a, n);
  return lu.ok ? solveLu(lu.value, identity(n), n) : undefined;
}
