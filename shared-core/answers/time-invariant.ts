/**
 * The invariant subspace of roots that lie together, without their vectors: subspace iteration with an inverse
 * shifted beside each cluster (Golub & Van Loan, Matrix Computations, 4th ed., section 7.6). Vectors of a defective
 * root are nearly parallel and span it badly; the iteration does not need them.
 */
import { factorLu, solveLu } from "../numerics/lu.ts";
import { multiply } from "../numerics/products.ts";

/** Roots of a matrix, 1/s. */
export interface RootValues {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * Orthonormal basis (N x count) of the invariant subspace of the marked roots: subspace iteration with the
 * inverse of the product of (A - sigma) over one shift sigma beside each cluster. Undefined where it does not
 * settle.
 */
export function invariantBasis(
  a: Float64Array,
  n: number,
  roots: RootValues,
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
function clustersOf(roots: RootValues, bad: Uint8Array, scale: number): Cluster[] {
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

/** Largest row sum of magnitudes. */
export function normOf(a: Float64Array, n: number): number {
  let most = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += Math.abs(a[i * n + j]);
    most = Math.max(most, sum);
  }
  return most;
}
