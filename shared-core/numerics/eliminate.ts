/**
 * Gaussian elimination with partial pivoting in place: the plain version of the kernel's `factor`.
 *
 * Pivots are compared by |re| + |im| (as LAPACK's izamax does).
 */

/**
 * n×n `re` (and `im`) become U on and above the diagonal and the multipliers of L below; where complex the diagonal
 * holds 1/uᵢᵢ. `permutation` takes the row exchanges. Returns the first column without a pivot above `floor`, or −1.
 */
export function eliminate(
  re: Float64Array,
  im: Float64Array | undefined,
  n: number,
  permutation: Int32Array,
  floor: number,
): number {
  return im ? eliminateComplex(re, im, permutation, n, floor) : eliminateReal(re, permutation, n, floor);
}

/** Four pivots at a time, so that each entry is loaded and stored a quarter as often. */
function eliminateReal(f: Float64Array, permutation: Int32Array, n: number, floor: number): number {
  const width = 4;
  for (let k = 0; k < n; k += width) {
    const end = Math.min(k + width, n);
    // The panel of up to four columns first, ...
    for (let p = k; p < end; p++) {
      let best = p;
      for (let i = p + 1; i < n; i++) if (Math.abs(f[i * n + p]) > Math.abs(f[best * n + p])) best = i;
      if (Math.abs(f[best * n + p]) <= floor) return p;
      if (best !== p) swapRows(f, permutation, n, best, p);
      const inverse = 1 / f[p * n + p];
      for (let i = p + 1; i < n; i++) {
        const factor = f[i * n + p] * inverse;
        f[i * n + p] = factor;
        for (let j = p + 1; j < end; j++) f[i * n + j] -= factor * f[p * n + j];
      }
    }
    // ... then its rows of U, then everything below and to the right in one pass.
    for (let p = k + 1; p < end; p++) {
      for (let q = k; q < p; q++) {
        const factor = f[p * n + q];
        for (let j = end; j < n; j++) f[p * n + j] -= factor * f[q * n + j];
      }
    }
    for (let i = end; i < n; i++) subtractPanel(f, n, i, k, end);
  }
  return -1;
}

function subtractPanel(f: Float64Array, n: number, i: number, k: number, end: number): void {
  const at = i * n;
  if (end - k === 4) {
    const l0 = f[at + k];
    const l1 = f[at + k + 1];
    const l2 = f[at + k + 2];
    const l3 = f[at + k + 3];
    const u0 = k * n;
    const u1 = u0 + n;
    const u2 = u1 + n;
    const u3 = u2 + n;
    for (let j = end; j < n; j++) {
      f[at + j] -= l0 * f[u0 + j] + l1 * f[u1 + j] + l2 * f[u2 + j] + l3 * f[u3 + j];
    }
    return;
  }
  for (let q = k; q < end; q++) {
    const factor = f[at + q];
    for (let j = end; j < n; j++) f[at + j] -= factor * f[q * n + j];
  }
}

function swapRows(f: Float64Array, permutation: Int32Array, n: number, a: number, b: number): void {
  for (let j = 0; j < n; j++) {
    const kept = f[a * n + j];
    f[a * n + j] = f[b * n + j];
    f[b * n + j] = kept;
  }
  const kept = permutation[a];
  permutation[a] = permutation[b];
  permutation[b] = kept;
}

function eliminateComplex(
  fr: Float64Array,
  fi: Float64Array,
  permutation: Int32Array,
  n: number,
  floor: number,
): number {
  for (let k = 0; k < n; k++) {
    let best = k;
    let size = -1;
    for (let i = k; i < n; i++) {
      const s = Math.abs(fr[i * n + k]) + Math.abs(fi[i * n + k]);
      if (size < s) {
        size = s;
        best = i;
      }
    }
    if (size <= floor) return k;
    if (best !== k) swapBoth(fr, fi, permutation, n, best, k);
    const at = k * n;
    const pr = fr[at + k];
    const pi = fi[at + k];
    const square = pr * pr + pi * pi;
    const ir = pr / square;
    const ii = -pi / square;
    fr[at + k] = ir;
    fi[at + k] = ii;
    for (let i = k + 1; i < n; i++) {
      const row = i * n;
      const ar = fr[row + k];
      const ai = fi[row + k];
      if (ar === 0 && ai === 0) continue;
      const lr = ar * ir - ai * ii;
      const li = ar * ii + ai * ir;
      fr[row + k] = lr;
      fi[row + k] = li;
      for (let j = k + 1; j < n; j++) {
        const ur = fr[at + j];
        const ui = fi[at + j];
        fr[row + j] -= lr * ur - li * ui;
        fi[row + j] -= lr * ui + li * ur;
      }
    }
  }
  return -1;
}

function swapBoth(fr: Float64Array, fi: Float64Array, p: Int32Array, n: number, a: number, b: number): void {
  for (let j = 0; j < n; j++) {
    const re = fr[a * n + j];
    const im = fi[a * n + j];
    fr[a * n + j] = fr[b * n + j];
    fi[a * n + j] = fi[b * n + j];
    fr[b * n + j] = re;
    fi[b * n + j] = im;
  }
  const kept = p[a];
  p[a] = p[b];
  p[b] = kept;
}
