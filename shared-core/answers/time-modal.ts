/**
 * z' = A z + B u split into parts that do not feel each other: single complex roots, and one real block of what
 * cannot be split safely (double roots without two vectors: rigid bodies that move on, critical damping).
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
import { multiply } from "../numerics/products.ts";
import { DIRECT_ORDERS, type OutputForm, type StateForm } from "./time-state.ts";

/** Roots and vectors of A; conjugate pairs stand side by side, the one with positive imaginary part first. */
export interface StateRoots {
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** N x N row-major, the vector of root k in column k; of a pair the first column is Re v, the second Im v. */
  readonly vectors: Float64Array;
}

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

/** Chosen by trial: keeps ten digits of every split root. */
const MOST_CONDITION = 1e5;
/** An oscillator whose roots are closer than this share of their size stays together. */
const NEARLY_DOUBLE = 1e-4;

/** The factors of an output in modal coordinates: y = sum(re * eta_re - im * eta_im) + sum(rest * x) + direct. */
export interface ModalOutput {
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly rest: Float64Array;
  readonly direct: Float64Array;
}

/**
 * Splits a system whose `components` (sets of states) do not feel each other, each by its own roots. A component
 * whose roots cannot be had stays in the block.
 */
export function modalSystem(system: StateForm, components: readonly (readonly number[])[]): ModalSystem {
  const parts = components.map((states) => {
    const part = subsystem(system, states);
    return { states, modal: oscillator(part) ?? balancedParting(part) };
  });
  return joined(system, parts);
}

interface Part {
  readonly states: readonly number[];
  readonly modal: ModalSystem;
}

function subsystem({ a, b, size, inputs }: StateForm, states: readonly number[]): StateForm {
  const n = states.length;
  const own = new Float64Array(n * n);
  const feed = new Float64Array(n * inputs);
  states.forEach((i, p) => {
    states.forEach((j, q) => {
      own[p * n + q] = a[i * size + j];
    });
    for (let j = 0; j < inputs; j++) feed[p * inputs + j] = b[i * inputs + j];
  });
  return { size: n, a: own, inputs, b: feed };
}

/** x'' + c x' + k x as two states (x, x'), in closed form; undefined for anything else or a nearly double root. */
function oscillator(system: StateForm): ModalSystem | undefined {
  if (system.size !== 2 || system.a[0] !== 0 || system.a[1] !== 1) return undefined;
  const k = -system.a[2];
  const half = -system.a[3] / 2;
  const square = half * half - k;
  if (!(Math.abs(square) > NEARLY_DOUBLE * NEARLY_DOUBLE * (half * half + Math.abs(k)))) return undefined;
  const root = Math.sqrt(Math.abs(square));
  if (square < 0) {
    // v = (1, s), w = (-s*, 1) / (s - s*), with s = -half + i root.
    return assemble(system, {
      singles: [{ re: 0 - half, im: root, column: 0 }],
      columns: Float64Array.of(1, 0, -half, root),
      rest: 0,
      inverse: Float64Array.of(1, 0, half / root, 1 / root),
      roots: [],
    });
  }
  // The root of larger size first; the other from the product, so that it keeps its digits.
  const large = half < 0 ? root - half : -half - root;
  const small = k / large;
  const apart = small - large;
  return assemble(system, {
    singles: [
      { re: large, im: 0, column: 0 },
      { re: small, im: 0, column: 1 },
    ],
    columns: Float64Array.of(1, 1, large, small),
    rest: 0,
    inverse: Float64Array.of(small / apart, -1 / apart, -large / apart, 1 / apart),
    roots: [],
  });
}

/** Splits after balancing, so that conditions do not depend on the units of the states. */
function balancedParting(system: StateForm): ModalSystem {
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

/** Puts the parts back into one system over all states. */
function joined({ size: n, inputs }: StateForm, parts: readonly Part[]): ModalSystem {
  const count = parts.reduce((sum, { modal }) => sum + modal.count, 0);
  const rest = parts.reduce((sum, { modal }) => sum + modal.rest, 0);
  const out: ModalSystem = {
    size: n,
    inputs,
    count,
    rest,
    lambdaRe: new Float64Array(count),
    lambdaIm: new Float64Array(count),
    weight: new Float64Array(count),
    inputRe: new Float64Array(inputs * count),
    inputIm: new Float64Array(inputs * count),
    block: new Float64Array(rest * rest),
    blockInput: new Float64Array(rest * inputs),
    blockRate: parts.reduce((most, { modal }) => Math.max(most, modal.blockRate), 0),
    blockRoots: parts.flatMap(({ modal }) => modal.blockRoots),
    vectorRe: new Float64Array(n * count),
    vectorIm: new Float64Array(n * count),
    basis: new Float64Array(n * rest),
    leftRe: new Float64Array(count * n),
    leftIm: new Float64Array(count * n),
    left: new Float64Array(rest * n),
  };
  let single = 0;
  let open = 0;
  for (const part of parts) {
    putSingles(out, part, single);
    putBlock(out, part, open);
    single += part.modal.count;
    open += part.modal.rest;
  }
  return out;
}

function putSingles(out: ModalSystem, { states, modal }: Part, at: number): void {
  const { count, inputs, size: n } = out;
  out.lambdaRe.set(modal.lambdaRe, at);
  out.lambdaIm.set(modal.lambdaIm, at);
  out.weight.set(modal.weight, at);
  for (let k = 0; k < modal.count; k++) {
    for (let j = 0; j < inputs; j++) {
      out.inputRe[j * count + at + k] = modal.inputRe[j * modal.count + k];
      out.inputIm[j * count + at + k] = modal.inputIm[j * modal.count + k];
    }
    states.forEach((state, i) => {
      out.vectorRe[state * count + at + k] = modal.vectorRe[i * modal.count + k];
      out.vectorIm[state * count + at + k] = modal.vectorIm[i * modal.count + k];
      out.leftRe[(at + k) * n + state] = modal.leftRe[k * states.length + i];
      out.leftIm[(at + k) * n + state] = modal.leftIm[k * states.length + i];
    });
  }
}

function putBlock(out: ModalSystem, { states, modal }: Part, at: number): void {
  const { rest, inputs, size: n } = out;
  for (let k = 0; k < modal.rest; k++) {
    for (let l = 0; l < modal.rest; l++) {
      out.block[(at + k) * rest + at + l] = modal.block[k * modal.rest + l];
    }
    for (let j = 0; j < inputs; j++) {
      out.blockInput[(at + k) * inputs + j] = modal.blockInput[k * inputs + j];
    }
    states.forEach((state, i) => {
      out.basis[state * rest + at + k] = modal.basis[i * modal.rest + k];
      out.left[(at + k) * n + state] = modal.left[k * states.length + i];
    });
  }
}

/** Projects an output on the modal coordinates. */
export function modalOutput(modal: ModalSystem, form: OutputForm): ModalOutput {
  const { size: n, count, rest, weight } = modal;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const restFactors = new Float64Array(rest);
  for (let i = 0; i < n; i++) {
    const factor = form.state[i];
    if (factor === 0) continue;
    for (let k = 0; k < count; k++) {
      re[k] += weight[k] * factor * modal.vectorRe[i * count + k];
      im[k] += weight[k] * factor * modal.vectorIm[i * count + k];
    }
    for (let k = 0; k < rest; k++) restFactors[k] += factor * modal.basis[i * rest + k];
  }
  return { re, im, rest: restFactors, direct: form.direct };
}

/** The time derivative of an output, in the same coordinates. */
export function modalDerivative(modal: ModalSystem, output: ModalOutput): ModalOutput {
  const { count, rest, inputs } = modal;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const restFactors = new Float64Array(rest);
  const direct = new Float64Array(output.direct.length);
  for (let j = 0; j < inputs; j++) {
    let feed = 0;
    for (let k = 0; k < count; k++) {
      feed += output.re[k] * modal.inputRe[j * count + k] - output.im[k] * modal.inputIm[j * count + k];
    }
    for (let k = 0; k < rest; k++) feed += output.rest[k] * modal.blockInput[k * inputs + j];
    const at = j * DIRECT_ORDERS;
    direct[at] = feed;
    for (let d = 0; d + 1 < DIRECT_ORDERS; d++) direct[at + d + 1] = output.direct[at + d];
  }
  for (let k = 0; k < count; k++) {
    re[k] = output.re[k] * modal.lambdaRe[k] - output.im[k] * modal.lambdaIm[k];
    im[k] = output.re[k] * modal.lambdaIm[k] + output.im[k] * modal.lambdaRe[k];
  }
  for (let i = 0; i < rest; i++) {
    for (let k = 0; k < rest; k++) restFactors[k] += output.rest[i] * modal.block[i * rest + k];
  }
  return { re, im, rest: restFactors, direct };
}

/** The modal coordinates of a state: count real parts, count imaginary parts, then the block's. */
export function modalState(modal: ModalSystem, z: Float64Array): Float64Array {
  const { size: n, count, rest } = modal;
  const out = new Float64Array(2 * count + rest);
  for (let k = 0; k < count; k++) {
    for (let i = 0; i < n; i++) {
      out[k] += modal.leftRe[k * n + i] * z[i];
      out[count + k] += modal.leftIm[k * n + i] * z[i];
    }
  }
  for (let k = 0; k < rest; k++) {
    for (let i = 0; i < n; i++) out[2 * count + k] += modal.left[k * n + i] * z[i];
  }
  return out;
}

interface Single {
  readonly re: number;
  readonly im: number;
  /** Column of Re v (and of Im v behind it for a pair). */
  readonly column: number;
}

interface Parting {
  readonly singles: readonly Single[];
  /** N x N: the columns of the singles, then the `rest` columns of the block's basis. */
  readonly columns: Float64Array;
  readonly rest: number;
  readonly inverse: Float64Array;
  /** Roots in the block. */
  readonly roots: readonly (readonly [number, number])[];
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

/**
 * Orthonormal basis (N x count) of the invariant subspace of the marked roots: subspace iteration with the
 * inverse of the product of (A - sigma) over one shift sigma beside each cluster. Undefined where it does not
 * settle.
 */
function invariantBasis(
  a: Float64Array,
  n: number,
  roots: StateRoots,
  bad: Uint8Array,
  count: number,
): Float64Array | undefined {
  const scale = normOf(a, n);
  let at = 0;
  const out = new Float64Array(n * count);
  for (const cluster of clustersOf(roots, bad, scale)) {
    const width = cluster.members;
    const x = clusterBasis(a, n, cluster, scale);
    if (x === undefined) return undefined;
    for (let k = 0; k < width; k++) for (let i = 0; i < n; i++) out[i * count + at + k] = x[i * width + k];
    at += width;
  }
  return out;
}

/** Near shifts part a cluster from its neighbours quickly but magnify rounding within it; far ones first. */
const SHIFTS = [1e-2, 1e-3, 1e-4, 1e-6];

function clusterBasis(a: Float64Array, n: number, cluster: Cluster, scale: number): Float64Array | undefined {
  for (const share of SHIFTS) {
    const offset = share * (Math.hypot(cluster.re, cluster.im) + 1e-3 * scale);
    const solver = shiftedInverse(a, n, cluster, offset);
    if (solver === undefined) continue;
    let x = startVectors(n, cluster.members);
    for (let sweep = 0; sweep < 30; sweep++) {
      x = solver(x);
      if (!orthonormalise(x, n, cluster.members)) break;
      if (invariance(a, x, n, cluster.members) <= 1e-13 * scale) return x;
    }
  }
  return undefined;
}

interface Cluster {
  readonly re: number;
  readonly im: number;
  /** Roots in it, conjugates included. */
  readonly members: number;
}

/** Marked roots that lie together, one entry for a cluster and its conjugate. */
function clustersOf(roots: StateRoots, bad: Uint8Array, scale: number): Cluster[] {
  const groups: { re: number; im: number; size: number }[] = [];
  for (let k = 0; k < bad.length; k++) {
    if (!bad[k]) continue;
    const re = roots.re[k];
    // Pairs next to the real axis belong to a real cluster.
    const reach = 1e-3 * Math.hypot(re, roots.im[k]) + 1e-6 * scale;
    const im = Math.abs(roots.im[k]) <= reach ? 0 : Math.abs(roots.im[k]);
    const near = groups.find(
      (g) => Math.hypot(g.re - re, g.im - im) <= 2 * reach && (g.im === 0) === (im === 0),
    );
    if (near === undefined) groups.push({ re, im, size: 1 });
    else {
      near.re += (re - near.re) / (near.size + 1);
      near.im += (im - near.im) / (near.size + 1);
      near.size++;
    }
  }
  return groups.map(({ re, im, size }) => ({ re, im, members: size }));
}

/** x -> (A - s)^-1 x for a real shift, ((A - s)(A - s*))^-1 x for a complex one, beside the cluster. */
function shiftedInverse(
  a: Float64Array,
  n: number,
  cluster: Cluster,
  offset: number,
): ((x: Float64Array) => Float64Array) | undefined {
  const re = cluster.re + offset;
  let matrix: Float64Array;
  if (cluster.im === 0) {
    matrix = Float64Array.from(a);
    for (let i = 0; i < n; i++) matrix[i * n + i] -= re;
  } else {
    matrix = multiply(a, a, n, n, n);
    for (let p = 0; p < n * n; p++) matrix[p] -= 2 * re * a[p];
    const square = re * re + cluster.im * cluster.im;
    for (let i = 0; i < n; i++) matrix[i * n + i] += square;
  }
  const lu = factorLu(matrix, n);
  if (!lu.ok) return undefined;
  return (x) => solveLu(lu.value, x, x.length / n);
}

/** Fixed directions without any symmetry of their own. */
function startVectors(n: number, width: number): Float64Array {
  return Float64Array.from({ length: n * width }, (_, p) => Math.sin(1 + 2.399963 * p) + 0.1);
}

/** Modified Gram-Schmidt, twice; false where the columns depend on each other. */
function orthonormalise(x: Float64Array, n: number, width: number): boolean {
  for (let k = 0; k < width; k++) {
    for (let pass = 0; pass < 2; pass++) {
      for (let l = 0; l < k; l++) {
        let dot = 0;
        for (let i = 0; i < n; i++) dot += x[i * width + l] * x[i * width + k];
        for (let i = 0; i < n; i++) x[i * width + k] -= dot * x[i * width + l];
      }
      let square = 0;
      for (let i = 0; i < n; i++) square += x[i * width + k] ** 2;
      if (!(square > 0) || !Number.isFinite(square)) return false;
      const inverse = 1 / Math.sqrt(square);
      for (let i = 0; i < n; i++) x[i * width + k] *= inverse;
    }
  }
  return true;
}

/** Largest entry of A Q - Q (Q^T A Q). */
function invariance(a: Float64Array, q: Float64Array, n: number, width: number): number {
  const aq = multiply(a, q, n, n, width);
  const inner = new Float64Array(width * width);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < width; k++) {
      for (let l = 0; l < width; l++) inner[k * width + l] += q[i * width + k] * aq[i * width + l];
    }
  }
  const back = multiply(q, inner, n, width, width);
  let most = 0;
  for (let p = 0; p < aq.length; p++) most = Math.max(most, Math.abs(aq[p] - back[p]));
  return most;
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

function assemble(system: StateForm, parting: Parting): ModalSystem {
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

function identity(n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) out[i * n + i] = 1;
  return out;
}

/** Largest row sum of magnitudes. */
function normOf(a: Float64Array, n: number): number {
  let most = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += Math.abs(a[i * n + j]);
    most = Math.max(most, sum);
  }
  return most;
}
