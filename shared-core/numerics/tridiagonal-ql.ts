/**
 * Eigenvalues and, if wanted, eigenvectors of a symmetric tridiagonal matrix by implicit QL.
 *
 * Method: implicit QL with Wilkinson's shift (Bowdler, Martin, Reinsch & Wilkinson, Numerische Mathematik 11,
 * 1968), deflation where |e|² ≤ ε²|dᵢ||dᵢ₊₁| and each unreduced block turned so that its smaller end comes
 * first, as LAPACK's dsteqr does: a graded matrix then usually keeps the relative accuracy of its small values.
 */

/** Sweeps allowed for each eigenvalue, on average; LAPACK's figure. */
const SWEEPS_PER_VALUE = 30;
/** Sums of squares below this lose digits to gradual underflow and go the slow, scaled way. */
const TINY_SQUARE = 1e-280;

/** √(a² + b²) without overflow worries for the scaled matrices used here. */
function length2(a: number, b: number): number {
  const square = a * a + b * b;
  return square > TINY_SQUARE ? Math.sqrt(square) : Math.hypot(a, b);
}

/**
 * Diagonalises in place. `d` (n) ends as the eigenvalues, in no order; `e` (n−1 used, eᵢ couples i and i+1) is
 * destroyed. `rows`, when given, holds n rows of `width` numbers from `at` on, `stride` apart; on entry Qᵀ, on
 * exit row j is the eigenvector of d[j]. Entries should be of size about one. Returns false at the cap.
 */
export function implicitQl(
  d: Float64Array,
  e: Float64Array,
  n: number,
  rows?: Float64Array,
  at = 0,
  stride = n,
  width = n,
): boolean {
  let budget = SWEEPS_PER_VALUE * n;
  let start = 0;
  while (start < n) {
    let end = start;
    while (end < n - 1 && !negligible(d, e, end)) end++;
    if (end < n - 1) e[end] = 0;
    if (Math.abs(d[end]) < Math.abs(d[start])) turnBlock(d, e, start, end, rows, at, stride, width);
    let first = start;
    while (first < end) {
      let m = first;
      while (m < end && !negligible(d, e, m)) m++;
      if (m < end) e[m] = 0;
      if (m === first) {
        first++;
      } else if (m === first + 1) {
        solveTwo(d, e, first, rows, at, stride, width);
        first += 2;
      } else {
        if (budget-- === 0) return false;
        sweep(d, e, first, m, rows, at, stride, width);
      }
    }
    start = end + 1;
  }
  return true;
}

function negligible(d: Float64Array, e: Float64Array, i: number): boolean {
  const size = Math.abs(e[i]);
  // Written as a product of roots of magnitudes so that tiny squares cannot underflow to a false "yes".
  return size === 0 || size <= Number.EPSILON * Math.sqrt(Math.abs(d[i])) * Math.sqrt(Math.abs(d[i + 1]));
}

/** One implicit QL sweep over the block l…m. */
function sweep(
  d: Float64Array,
  e: Float64Array,
  l: number,
  m: number,
  rows: Float64Array | undefined,
  at: number,
  stride: number,
  width: number,
): void {
  let g = (d[l + 1] - d[l]) / (2 * e[l]);
  let r = length2(g, 1);
  g = d[m] - d[l] + e[l] / (g + (g >= 0 ? r : -r));
  let s = 1;
  let c = 1;
  let p = 0;
  for (let i = m - 1; i >= l; i--) {
    const f = s * e[i];
    const b = c * e[i];
    r = length2(g, f);
    if (r === 0) {
      c = 1;
      s = 0;
    } else {
      c = g / r;
      s = f / r;
    }
    if (i !== m - 1) e[i + 1] = r;
    g = d[i + 1] - p;
    r = (d[i] - g) * s + 2 * c * b;
    p = s * r;
    d[i + 1] = g + p;
    g = c * r - b;
    if (rows) rotateRows(rows, at + i * stride, at + (i + 1) * stride, width, c, s);
  }
  d[l] -= p;
  e[l] = g;
}

/** lower ← c·lower − s·upper, upper ← s·lower + c·upper. */
export function rotateRows(
  rows: Float64Array,
  lower: number,
  upper: number,
  width: number,
  c: number,
  s: number,
): void {
  for (let k = 0; k < width; k++) {
    const u = rows[upper + k];
    const v = rows[lower + k];
    rows[upper + k] = s * v + c * u;
    rows[lower + k] = c * v - s * u;
  }
}

/** Reverses the order of one block, and of its rows. */
function turnBlock(
  d: Float64Array,
  e: Float64Array,
  start: number,
  end: number,
  rows: Float64Array | undefined,
  at: number,
  stride: number,
  width: number,
): void {
  d.subarray(start, end + 1).reverse();
  e.subarray(start, end).reverse();
  if (!rows) return;
  for (let i = start, j = end; i < j; i++, j--) {
    const p = at + i * stride;
    const q = at + j * stride;
    for (let k = 0; k < width; k++) {
      const kept = rows[p + k];
      rows[p + k] = rows[q + k];
      rows[q + k] = kept;
    }
  }
}

/** Closed form of the 2×2 block at l, l+1; formulas of LAPACK's dlaev2, which lose no digits. */
function solveTwo(
  d: Float64Array,
  e: Float64Array,
  l: number,
  rows: Float64Array | undefined,
  at: number,
  stride: number,
  width: number,
): void {
  const a = d[l];
  const b = e[l];
  const c = d[l + 1];
  const sum = a + c;
  const diff = a - c;
  const root = length2(diff, 2 * b);
  const [large, small] = Math.abs(a) > Math.abs(c) ? [a, c] : [c, a];
  let first = 0.5 * root;
  let second = -0.5 * root;
  if (sum !== 0) {
    first = 0.5 * (sum + (sum > 0 ? root : -root));
    second = (large / first) * small - (b / first) * b;
  }
  let cosine: number;
  let sine: number;
  const lead = diff >= 0 ? diff + root : diff - root;
  if (Math.abs(lead) > Math.abs(2 * b)) {
    const cotangent = (-2 * b) / lead;
    sine = 1 / Math.sqrt(1 + cotangent * cotangent);
    cosine = cotangent * sine;
  } else {
    const tangent = -lead / (2 * b);
    cosine = 1 / Math.sqrt(1 + tangent * tangent);
    sine = tangent * cosine;
  }
  if (sum >= 0 === diff >= 0) [cosine, sine] = [-sine, cosine];
  d[l] = first;
  d[l + 1] = second;
  e[l] = 0;
  if (rows) rotateRows(rows, at + l * stride, at + (l + 1) * stride, width, cosine, -sine);
}

/** Sorts the values ascending and brings the rows (n of `width`, `stride` apart) into the same order. */
export function sortAscending(
  d: Float64Array,
  n: number,
  rows?: Float64Array,
  at = 0,
  stride = n,
  width = n,
): void {
  for (let i = 0; i < n - 1; i++) {
    let least = i;
    for (let j = i + 1; j < n; j++) if (d[j] < d[least]) least = j;
    if (least === i) continue;
    const kept = d[i];
    d[i] = d[least];
    d[least] = kept;
    if (!rows) continue;
    const p = at + i * stride;
    const q = at + least * stride;
    for (let k = 0; k < width; k++) {
      const held = rows[p + k];
      rows[p + k] = rows[q + k];
      rows[q + k] = held;
    }
  }
}
