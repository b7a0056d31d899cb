/** Seeded matrices and measures shared by the numerical tests. */

export const EPS = Number.EPSILON;

/** Uniform numbers in [−1, 1) from a 32-bit mixing generator (mulberry32), independent of the code under test. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 31 - 1;
  };
}

export function randomMatrix(rows: number, columns: number, seed: number): Float64Array {
  const next = seeded(seed);
  return Float64Array.from({ length: rows * columns }, next);
}

export function randomSymmetric(n: number, seed: number): Float64Array {
  const a = randomMatrix(n, n, seed);
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) a[i * n + j] = a[j * n + i];
  return a;
}

/** Plain triple loop, kept apart from the kernels under test. */
export function product(
  a: ArrayLike<number>,
  b: ArrayLike<number>,
  rows: number,
  inner: number,
  columns: number,
) {
  const out = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i++) {
    for (let k = 0; k < inner; k++) {
      const factor = a[i * inner + k];
      for (let j = 0; j < columns; j++) out[i * columns + j] += factor * b[k * columns + j];
    }
  }
  return out;
}

export function transposed(a: ArrayLike<number>, rows: number, columns: number): Float64Array {
  const out = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) out[j * rows + i] = a[i * columns + j];
  return out;
}

export function largest(a: ArrayLike<number>): number {
  let most = 0;
  for (let i = 0; i < a.length; i++) {
    const size = Math.abs(a[i]);
    // NaN must not hide: Math.max keeps it.
    most = Math.max(most, size);
  }
  return most;
}

export function difference(a: ArrayLike<number>, b: ArrayLike<number>): number {
  if (a.length !== b.length) throw new Error(`lengths differ: ${a.length} and ${b.length}`);
  let most = 0;
  for (let i = 0; i < a.length; i++) most = Math.max(most, Math.abs(a[i] - b[i]));
  return most;
}

/** max |VᵀV − I| of an n×columns matrix. */
export function orthogonalityError(v: Float64Array, n: number, columns = n): number {
  const gram = product(transposed(v, n, columns), v, columns, n, columns);
  for (let i = 0; i < columns; i++) gram[i * columns + i] -= 1;
  return largest(gram);
}

/** max |A V − V diag(λ)|. */
export function eigenResidual(
  a: ArrayLike<number>,
  v: Float64Array,
  values: ArrayLike<number>,
  n: number,
): number {
  const av = product(a, v, n, n, values.length);
  const m = values.length;
  for (let i = 0; i < n; i++) for (let j = 0; j < m; j++) av[i * m + j] -= v[i * m + j] * values[j];
  return largest(av);
}

/** Unwraps a success; a failure fails the test with its reason. */
export function unwrap<T>(outcome: { ok: true; value: T } | { ok: false; reason: string }): T {
  if (!outcome.ok) throw new Error(outcome.reason);
  return outcome.value;
}

export function identityOf(n: number): Float64Array {
  return Float64Array.from({ length: n * n }, (_, p) => (p % (n + 1) === 0 ? 1 : 0));
}
