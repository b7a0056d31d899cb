// Dense inner loops in AssemblyScript with 128-bit SIMD, compiled by tools/build-kernel.mjs into
// shared-core/numerics/kernel-module.ts. Pointers are byte addresses, sizes and strides count 64-bit numbers.
// The host lays out memory; nothing is allocated here. The plain versions with their comments and sources are
// products in kernel.ts, tridiagonalise.ts and back-transform.ts.

/** Depth of a packed panel: 4 columns × 256 rows stay in the first-level cache. */
const DEPTH: i32 = 256;
/** Rows of A that stay in the second-level cache beside a panel. */
const HEIGHT: i32 = 64;
/** Reflections taken together by backTransform. */
const BLOCK: i32 = 32;

// @ts-ignore: decorator
@inline
function at(base: usize, index: i32): usize {
  return base + ((<usize>index) << 3);
}

// @ts-ignore: decorator
@inline
function lanes(v: v128): f64 {
  return f64x2.extract_lane(v, 0) + f64x2.extract_lane(v, 1);
}

/**
 * C = A B (mode 0), C −= A B (mode 1) or C += A B (mode 2). `pack` has room for DEPTH × (columns rounded up to 4) numbers.
 */
export function product(
  a: usize, aStride: i32, b: usize, bStride: i32, c: usize, cStride: i32,
  rows: i32, inner: i32, columns: i32, mode: i32, pack: usize,
): void {
  if (inner == 0 && mode == 0) {
    for (let i = 0; i < rows; i++) memory.fill(at(c, i * cStride), 0, columns << 3);
    return;
  }
  for (let k = 0; k < inner; k += DEPTH) {
    const depth = min(DEPTH, inner - k);
    packPanels(at(b, k * bStride), bStride, depth, columns, pack);
    const how = mode == 1 ? 2 : mode == 2 || k > 0 ? 1 : 0;
    for (let i0 = 0; i0 < rows; i0 += HEIGHT) {
      const end = min(i0 + HEIGHT, rows);
      for (let j = 0; j < columns; j += 4) {
        const panel = at(pack, j * depth);
        const width = min(4, columns - j);
        for (let i = i0; i < end; i += 4) {
          tile(at(a, i * aStride + k), aStride, panel, at(c, i * cStride + j), cStride, min(4, end - i), width, depth, how);
        }
      }
    }
  }
}

/** Copies B into panels of four columns, zeros behind the last one. */
function packPanels(b: usize, stride: i32, depth: i32, columns: i32, pack: usize): void {
  let to = pack;
  for (let j = 0; j < columns; j += 4) {
    let from = at(b, j);
    if (j + 4 <= columns) {
      for (let k = 0; k < depth; k++) {
        v128.store(to, v128.load(from));
        v128.store(to, v128.load(from, 16), 16);
        from = at(from, stride);
        to += 32;
      }
    } else {
      for (let k = 0; k < depth; k++) {
        for (let c = 0; c < 4; c++) store<f64>(at(to, c), j + c < columns ? load<f64>(at(from, c)) : 0);
        from = at(from, stride);
        to += 32;
      }
    }
  }
}

/** A tile of up to 4×4 of C. `how`: 0 sets, 1 adds, 2 subtracts. Missing rows repeat the last one. */
function tile(
  a: usize, aStride: i32, panel: usize, c: usize, cStride: i32, rows: i32, width: i32, depth: i32, how: i32,
): void {
  let a0 = a;
  let a1 = at(a, min(1, rows - 1) * aStride);
  let a2 = at(a, min(2, rows - 1) * aStride);
  let a3 = at(a, min(3, rows - 1) * aStride);
  let s00 = f64x2.splat(0), s01 = s00, s10 = s00, s11 = s00, s20 = s00, s21 = s00, s30 = s00, s31 = s00;
  const end = panel + ((<usize>depth) << 5);
  for (let p = panel; p < end; p += 32) {
    const b0 = v128.load(p);
    const b1 = v128.load(p, 16);
    let x = v128.load64_splat(a0);
    s00 = f64x2.add(s00, f64x2.mul(x, b0));
    s01 = f64x2.add(s01, f64x2.mul(x, b1));
    x = v128.load64_splat(a1);
    s10 = f64x2.add(s10, f64x2.mul(x, b0));
    s11 = f64x2.add(s11, f64x2.mul(x, b1));
    x = v128.load64_splat(a2);
    s20 = f64x2.add(s20, f64x2.mul(x, b0));
    s21 = f64x2.add(s21, f64x2.mul(x, b1));
    x = v128.load64_splat(a3);
    s30 = f64x2.add(s30, f64x2.mul(x, b0));
    s31 = f64x2.add(s31, f64x2.mul(x, b1));
    a0 += 8;
    a1 += 8;
    a2 += 8;
    a3 += 8;
  }
  write(c, s00, s01, width, how);
  if (rows > 1) write(at(c, cStride), s10, s11, width, how);
  if (rows > 2) write(at(c, 2 * cStride), s20, s21, width, how);
  if (rows > 3) write(at(c, 3 * cStride), s30, s31, width, how);
}

function write(c: usize, left: v128, right: v128, width: i32, how: i32): void {
  if (width == 4) {
    if (how == 1) {
      left = f64x2.add(v128.load(c), left);
      right = f64x2.add(v128.load(c, 16), right);
    } else if (how == 2) {
      left = f64x2.sub(v128.load(c), left);
      right = f64x2.sub(v128.load(c, 16), right);
    }
    v128.store(c, left);
    v128.store(c, right, 16);
    return;
  }
  for (let k = 0; k < width; k++) {
    const value = k == 0 ? f64x2.extract_lane(left, 0) : k == 1 ? f64x2.extract_lane(left, 1) : f64x2.extract_lane(right, 0);
    const p = at(c, k);
    store<f64>(p, how == 0 ? value : how == 1 ? load<f64>(p) + value : load<f64>(p) - value);
  }
}

/**
 * Tridiagonal form of the lower triangle of `a` (n×n, row distance `stride`), which becomes the reflections.
 * `work` has room for 4 (n + 2) numbers. See tridiagonalise.ts.
 */
export function tridiagonalise(a: usize, stride: i32, n: i32, d: usize, e: usize, tau: usize, work: usize): void {
  const v = work;
  const w = at(v, n + 2 & ~1);
  const u = at(w, n + 2 & ~1);
  const p = at(u, n + 2 & ~1);
  memory.fill(work, 0, (4 * (n + 2)) << 3);
  for (let i = n - 1; i >= 0; i--) {
    const row = at(a, i * stride);
    const vi = load<f64>(at(v, i));
    const wi = load<f64>(at(w, i));
    for (let j = 0; j <= i; j++) {
      store<f64>(at(row, j), load<f64>(at(row, j)) - (vi * load<f64>(at(w, j)) + wi * load<f64>(at(v, j))));
    }
    store<f64>(at(d, i), load<f64>(at(row, i)));
    if (i == 0) break;
    const t = reflect(row, i, at(e, i - 1));
    store<f64>(at(tau, i), t);
    memory.copy(u, row, i << 3);
    memory.fill(p, 0, (i + 1) << 3);
    pass(a, stride, i, v, w, u, p);
    let dot: f64 = 0;
    for (let j = 0; j < i; j++) dot += load<f64>(at(p, j)) * load<f64>(at(u, j));
    const half = 0.5 * t * t * dot;
    for (let j = 0; j < i; j++) {
      const x = load<f64>(at(u, j));
      store<f64>(at(w, j), t * load<f64>(at(p, j)) - half * x);
      store<f64>(at(v, j), x);
    }
    if (t == 0) memory.fill(v, 0, i << 3);
  }
}

function reflect(row: usize, i: i32, e: usize): f64 {
  const last = load<f64>(at(row, i - 1));
  let square: f64 = 0;
  for (let j = 0; j < i - 1; j++) {
    const x = load<f64>(at(row, j));
    square += x * x;
  }
  if (square == 0) {
    store<f64>(e, last);
    memory.fill(row, 0, i << 3);
    return 0;
  }
  const length = sqrt<f64>(square + last * last);
  const beta = last >= 0 ? -length : length;
  const scale = 1 / (last - beta);
  for (let j = 0; j < i - 1; j++) store<f64>(at(row, j), load<f64>(at(row, j)) * scale);
  store<f64>(at(row, i - 1), 1);
  store<f64>(e, beta);
  return (beta - last) / beta;
}

/** A −= v wᵀ + w vᵀ and p += A u over the leading i×i lower triangle, two rows at a time. */
function pass(a: usize, stride: i32, i: i32, v: usize, w: usize, u: usize, p: usize): void {
  let r = 0;
  for (; r + 1 < i; r += 2) {
    const row0 = at(a, r * stride);
    const row1 = at(row0, stride);
    const v0 = load<f64>(at(v, r)), v1 = load<f64>(at(v, r + 1));
    const w0 = load<f64>(at(w, r)), w1 = load<f64>(at(w, r + 1));
    const u0 = load<f64>(at(u, r)), u1 = load<f64>(at(u, r + 1));
    const vv0 = f64x2.splat(v0), vv1 = f64x2.splat(v1), ww0 = f64x2.splat(w0), ww1 = f64x2.splat(w1);
    const uu0 = f64x2.splat(u0), uu1 = f64x2.splat(u1);
    let sum0 = f64x2.splat(0), sum1 = sum0;
    const end = (<usize>r) << 3;
    for (let c: usize = 0; c < end; c += 16) {
      const wc = v128.load(w + c);
      const vc = v128.load(v + c);
      const uc = v128.load(u + c);
      const x0 = f64x2.sub(f64x2.sub(v128.load(row0 + c), f64x2.mul(vv0, wc)), f64x2.mul(ww0, vc));
      const x1 = f64x2.sub(f64x2.sub(v128.load(row1 + c), f64x2.mul(vv1, wc)), f64x2.mul(ww1, vc));
      v128.store(row0 + c, x0);
      v128.store(row1 + c, x1);
      sum0 = f64x2.add(sum0, f64x2.mul(x0, uc));
      sum1 = f64x2.add(sum1, f64x2.mul(x1, uc));
      v128.store(p + c, f64x2.add(f64x2.add(v128.load(p + c), f64x2.mul(x0, uu0)), f64x2.mul(x1, uu1)));
    }
    // The 2×2 corner on the diagonal.
    const x00 = load<f64>(at(row0, r)) - 2 * v0 * w0;
    const x10 = load<f64>(at(row1, r)) - v1 * w0 - w1 * v0;
    const x11 = load<f64>(at(row1, r + 1)) - 2 * v1 * w1;
    store<f64>(at(row0, r), x00);
    store<f64>(at(row1, r), x10);
    store<f64>(at(row1, r + 1), x11);
    store<f64>(at(p, r), load<f64>(at(p, r)) + lanes(sum0) + x00 * u0 + x10 * u1);
    store<f64>(at(p, r + 1), load<f64>(at(p, r + 1)) + lanes(sum1) + x10 * u0 + x11 * u1);
  }
  if (r < i) {
    const row = at(a, r * stride);
    const vr = load<f64>(at(v, r)), wr = load<f64>(at(w, r)), ur = load<f64>(at(u, r));
    let sum: f64 = 0;
    for (let c = 0; c < r; c++) {
      const x = load<f64>(at(row, c)) - vr * load<f64>(at(w, c)) - wr * load<f64>(at(v, c));
      store<f64>(at(row, c), x);
      sum += x * load<f64>(at(u, c));
      store<f64>(at(p, c), load<f64>(at(p, c)) + x * ur);
    }
    const x = load<f64>(at(row, r)) - 2 * vr * wr;
    store<f64>(at(row, r), x);
    store<f64>(at(p, r), load<f64>(at(p, r)) + sum + x * ur);
  }
}

/**
 * rows (count×n, row distance `rowStride`) ← rows Qᵀ for the reflections left by tridiagonalise.
 * `work` has room for 3 BLOCK n + 2 BLOCK² + count BLOCK numbers.
 */
export function backTransform(
  rows: usize, rowStride: i32, count: i32, reflectors: usize, stride: i32, n: i32, tau: usize, work: usize, pack: usize,
): void {
  const v = work;
  const vt = at(v, BLOCK * n);
  const tv = at(vt, BLOCK * n);
  const gram = at(tv, BLOCK * n);
  const factor = at(gram, BLOCK * BLOCK);
  const dots = at(factor, BLOCK * BLOCK);
  for (let first = 1; first < n; first += BLOCK) {
    const many = min(BLOCK, n - first);
    const width = first + many - 1;
    for (let b = 0; b < many; b++) {
      const i = first + b;
      memory.copy(at(v, b * width), at(reflectors, i * stride), i << 3);
      memory.fill(at(v, b * width + i), 0, (width - i) << 3);
      for (let j = 0; j < width; j++) store<f64>(at(vt, j * many + b), load<f64>(at(v, b * width + j)));
    }
    product(v, width, vt, many, gram, many, many, width, many, 0, pack);
    for (let b = 0; b < many; b++) {
      const t = load<f64>(at(tau, first + b));
      for (let r = 0; r < b; r++) {
        let sum: f64 = 0;
        for (let c = r; c < b; c++) sum += load<f64>(at(factor, r * many + c)) * load<f64>(at(gram, c * many + b));
        store<f64>(at(factor, r * many + b), -t * sum);
      }
      store<f64>(at(factor, b * many + b), t);
      for (let r = b + 1; r < many; r++) store<f64>(at(factor, r * many + b), 0);
    }
    product(factor, many, v, width, tv, width, many, many, width, 0, pack);
    product(rows, rowStride, vt, many, dots, many, count, width, many, 0, pack);
    product(dots, many, tv, width, rows, rowStride, count, many, width, 1, pack);
  }
}

/**
 * Hessenberg form of `a` (n×n, row distance `stride`) in place; row k of `vectors` (n×n, same distance, zero on
 * entry) becomes the vector of reflection k. `work` has room for 6 (n + 2) numbers. See hessenberg.ts.
 */
export function hessenberg(a: usize, stride: i32, n: i32, vectors: usize, tau: usize, work: usize): void {
  const step = n + 2 & ~1;
  const y = work;
  const w = at(y, step);
  const sum = at(w, step);
  const pack = at(sum, step);
  memory.fill(work, 0, (6 * (n + 2)) << 3);
  // Pending update of the step before: A −= y vᵀ + v wᵀ with v in row k − 1 of `vectors`.
  let v = pack;
  for (let k = 0; k + 2 < n; k++) {
    for (let i = 0; i < n; i++) {
      const p = at(a, i * stride + k);
      store<f64>(p, load<f64>(p) - (load<f64>(at(y, i)) * load<f64>(at(v, k)) + load<f64>(at(v, i)) * load<f64>(at(w, k))));
    }
    const u = at(vectors, k * stride);
    const t = reflectColumn(a, stride, n, k, u);
    store<f64>(at(tau, k), t);
    memory.fill(sum, 0, n << 3);
    for (let i = 0; i < n; i += 2) hessenbergRows(a, stride, n, k, i, y, v, w, u, sum);
    // y of the rows stands in `y` now, Aᵀ u in `sum`.
    let dot: f64 = 0;
    for (let i = k + 1; i < n; i++) dot += load<f64>(at(u, i)) * load<f64>(at(y, i));
    for (let i = 0; i < n; i++) store<f64>(at(y, i), t * load<f64>(at(y, i)));
    for (let j = k + 1; j < n; j++) {
      store<f64>(at(w, j), t * load<f64>(at(sum, j)) - t * t * dot * load<f64>(at(u, j)));
    }
    v = u;
  }
  for (let i = 0; i < n && n > 2; i++) {
    for (let j = n - 2; j < n; j++) {
      const p = at(a, i * stride + j);
      store<f64>(p, load<f64>(p) - (load<f64>(at(y, i)) * load<f64>(at(v, j)) + load<f64>(at(v, i)) * load<f64>(at(w, j))));
    }
  }
}

function reflectColumn(a: usize, stride: i32, n: i32, k: i32, v: usize): f64 {
  const first = load<f64>(at(a, (k + 1) * stride + k));
  let square: f64 = 0;
  for (let i = k + 2; i < n; i++) {
    const x = load<f64>(at(a, i * stride + k));
    square += x * x;
  }
  if (square == 0) {
    for (let i = k + 2; i < n; i++) store<f64>(at(a, i * stride + k), 0);
    return 0;
  }
  const length = sqrt<f64>(first * first + square);
  const beta = first >= 0 ? -length : length;
  const scale = 1 / (first - beta);
  store<f64>(at(v, k + 1), 1);
  for (let i = k + 2; i < n; i++) {
    const p = at(a, i * stride + k);
    store<f64>(at(v, i), load<f64>(p) * scale);
    store<f64>(p, 0);
  }
  store<f64>(at(a, (k + 1) * stride + k), beta);
  return (beta - first) / beta;
}

/** Rows i and i + 1, columns from k + 1: the pending update, then y = A u into `y` and sum += uᵢ A. */
function hessenbergRows(
  a: usize, stride: i32, n: i32, k: i32, i: i32, y: usize, v: usize, w: usize, u: usize, sum: usize,
): void {
  const two = i + 1 < n;
  const row0 = at(a, i * stride);
  const row1 = two ? at(row0, stride) : row0;
  const y0 = load<f64>(at(y, i)), v0 = load<f64>(at(v, i)), u0 = load<f64>(at(u, i));
  const y1 = two ? load<f64>(at(y, i + 1)) : 0, v1 = two ? load<f64>(at(v, i + 1)) : 0, u1 = two ? load<f64>(at(u, i + 1)) : 0;
  let s0: f64 = 0;
  let s1: f64 = 0;
  let j = k + 1;
  if (two) {
    const yy0 = f64x2.splat(y0), yy1 = f64x2.splat(y1), vv0 = f64x2.splat(v0), vv1 = f64x2.splat(v1);
    const uu0 = f64x2.splat(u0), uu1 = f64x2.splat(u1);
    let t0 = f64x2.splat(0), t1 = t0;
    const from = (<usize>j) << 3;
    const end = from + ((<usize>((n - j) & ~1)) << 3);
    if (i + 1 < k) {
      // Above the reflections: v and u are zero in these rows.
      for (let c = from; c < end; c += 16) {
        const vc = v128.load(v + c);
        const uc = v128.load(u + c);
        const x0 = f64x2.sub(v128.load(row0 + c), f64x2.mul(yy0, vc));
        const x1 = f64x2.sub(v128.load(row1 + c), f64x2.mul(yy1, vc));
        v128.store(row0 + c, x0);
        v128.store(row1 + c, x1);
        t0 = f64x2.add(t0, f64x2.mul(x0, uc));
        t1 = f64x2.add(t1, f64x2.mul(x1, uc));
      }
    } else {
      for (let c = from; c < end; c += 16) {
        const vc = v128.load(v + c);
        const wc = v128.load(w + c);
        const uc = v128.load(u + c);
        const x0 = f64x2.sub(f64x2.sub(v128.load(row0 + c), f64x2.mul(yy0, vc)), f64x2.mul(vv0, wc));
        const x1 = f64x2.sub(f64x2.sub(v128.load(row1 + c), f64x2.mul(yy1, vc)), f64x2.mul(vv1, wc));
        v128.store(row0 + c, x0);
        v128.store(row1 + c, x1);
        t0 = f64x2.add(t0, f64x2.mul(x0, uc));
        t1 = f64x2.add(t1, f64x2.mul(x1, uc));
        v128.store(sum + c, f64x2.add(f64x2.add(v128.load(sum + c), f64x2.mul(x0, uu0)), f64x2.mul(x1, uu1)));
      }
    }
    s0 = lanes(t0);
    s1 = lanes(t1);
    j += (n - j) & ~1;
  }
  for (; j < n; j++) {
    const p0 = at(row0, j);
    const vj = load<f64>(at(v, j)), wj = load<f64>(at(w, j)), uj = load<f64>(at(u, j));
    const x0 = load<f64>(p0) - y0 * vj - v0 * wj;
    store<f64>(p0, x0);
    s0 += x0 * uj;
    let add = x0 * u0;
    if (two) {
      const p1 = at(row1, j);
      const x1 = load<f64>(p1) - y1 * vj - v1 * wj;
      store<f64>(p1, x1);
      s1 += x1 * uj;
      add += x1 * u1;
    }
    store<f64>(at(sum, j), load<f64>(at(sum, j)) + add);
  }
  store<f64>(at(y, i), s0);
  if (two) store<f64>(at(y, i + 1), s1);
}

/**
 * q (n×n, row distance `stride`) becomes Qᵀ for the reflections left by hessenberg. `work` as for backTransform
 * with count = n.
 */
export function hessenbergQ(q: usize, stride: i32, n: i32, vectors: usize, tau: usize, work: usize, pack: usize): void {
  const v = work;
  const vt = at(v, BLOCK * n);
  const tv = at(vt, BLOCK * n);
  const gram = at(tv, BLOCK * n);
  const factor = at(gram, BLOCK * BLOCK);
  const dots = at(factor, BLOCK * BLOCK);
  for (let i = 0; i < n; i++) {
    memory.fill(at(q, i * stride), 0, stride << 3);
    store<f64>(at(q, i * stride + i), 1);
  }
  const last = n - 2;
  let first = last <= 0 ? 0 : (last - 1) / BLOCK * BLOCK;
  for (; last > 0 && first >= 0; first -= BLOCK) {
    const many = min(BLOCK, last - first);
    const skip = first + 1;
    const width = n - skip;
    for (let b = 0; b < many; b++) {
      memory.copy(at(v, b * width), at(vectors, (first + b) * stride + skip), width << 3);
      for (let j = 0; j < width; j++) store<f64>(at(vt, j * many + b), load<f64>(at(v, b * width + j)));
    }
    product(v, width, vt, many, gram, many, many, width, many, 0, pack);
    // T of H(first) … H(last), stored transposed because the rows take the reflections in reverse.
    for (let b = 0; b < many; b++) {
      const t = load<f64>(at(tau, first + b));
      for (let r = 0; r < b; r++) {
        let sum: f64 = 0;
        for (let c = r; c < b; c++) sum += load<f64>(at(factor, c * many + r)) * load<f64>(at(gram, c * many + b));
        store<f64>(at(factor, b * many + r), -t * sum);
      }
      store<f64>(at(factor, b * many + b), t);
      for (let r = b + 1; r < many; r++) store<f64>(at(factor, b * many + r), 0);
    }
    const block = at(q, skip * stride + skip);
    product(factor, many, v, width, tv, width, many, many, width, 0, pack);
    product(block, stride, vt, many, dots, many, width, width, many, 0, pack);
    product(dots, many, tv, width, block, stride, width, many, width, 1, pack);
  }
}

/**
 * One merge of divide and conquer: roots and vectors of diag(poles) + ρ z zᵀ (k of them), vectors times the rows in
 * `packed` (k×size) into `result`. Rows up to `upper` reach into the first `left` columns, those from `skip` on into
 * the others. `column` (32-bit) says where component j of a vector stands. Returns 1, or 0 at the cap of an
 * iteration. See divide-and-conquer.ts and secular.ts.
 */
export function merge(
  k: i32, size: i32, left: i32, upper: i32, skip: i32, rho: f64, poles: usize, weights: usize, column: usize,
  values: usize, packed: usize, result: usize, mix: usize, gaps: usize, work: usize, pack: usize,
): i32 {
  const squares = work;
  const exact = at(work, k + 2 & ~1);
  for (let j = 0; j < k; j++) {
    const w = load<f64>(at(weights, j));
    store<f64>(at(squares, j), w * w);
    store<f64>(at(exact, j), 1);
  }
  for (let i = 0; i < k; i++) {
    const value = secularRoot(i, k, poles, squares, rho, at(gaps, i * k));
    if (isNaN<f64>(value)) return 0;
    store<f64>(at(values, i), value);
  }
  for (let i = 0; i < k; i++) {
    const row = at(gaps, i * k);
    const pole = load<f64>(at(poles, i));
    quotients(exact, row, poles, pole, 0, i);
    store<f64>(at(exact, i), load<f64>(at(exact, i)) * load<f64>(at(row, i)));
    quotients(exact, row, poles, pole, i + 1, k);
  }
  for (let j = 0; j < k; j++) {
    const root = sqrt<f64>(abs<f64>(load<f64>(at(exact, j))));
    store<f64>(at(exact, j), load<f64>(at(weights, j)) < 0 ? -root : root);
  }
  for (let i = 0; i < k; i++) {
    const row = at(gaps, i * k);
    let sum = f64x2.splat(0);
    let j = 0;
    for (; j + 1 < k; j += 2) {
      const x = f64x2.div(v128.load(at(exact, j)), v128.load(at(row, j)));
      v128.store(at(row, j), x);
      sum = f64x2.add(sum, f64x2.mul(x, x));
    }
    let square = lanes(sum);
    if (j < k) {
      const x = load<f64>(at(exact, j)) / load<f64>(at(row, j));
      store<f64>(at(row, j), x);
      square += x * x;
    }
    const scale = 1 / sqrt<f64>(square);
    const to = at(mix, i * k);
    for (let c = 0; c < k; c++) {
      store<f64>(at(to, load<i32>(column + ((<usize>c) << 2))), load<f64>(at(row, c)) * scale);
    }
  }
  product(mix, k, packed, size, result, size, k, upper, left, 0, pack);
  product(at(mix, skip), k, at(packed, skip * size + left), size, at(result, left), size, k, k - skip, size - left, 0, pack);
  return 1;
}

/** exactⱼ ← exactⱼ · gapⱼ / (poleⱼ − pole) for j from … to − 1. */
function quotients(exact: usize, row: usize, poles: usize, pole: f64, from: i32, to: i32): void {
  const pp = f64x2.splat(pole);
  let j = from;
  for (; j + 1 < to; j += 2) {
    const p = at(exact, j);
    const q = f64x2.div(v128.load(at(row, j)), f64x2.sub(v128.load(at(poles, j)), pp));
    v128.store(p, f64x2.mul(v128.load(p), q));
  }
  if (j < to) {
    const p = at(exact, j);
    store<f64>(p, load<f64>(p) * (load<f64>(at(row, j)) / (load<f64>(at(poles, j)) - pole)));
  }
}

/** Sums over poles from … to − 1 at one point, left behind by `sums`. */
let total: f64 = 0;
let slope: f64 = 0;
let partials: f64 = 0;

/** Gaps dⱼ − origin − τ into `row`; Σ sⱼ/gap, Σ sⱼ/gap² and the sum of the partial sums in the order from first to last. */
function sums(d: usize, squares: usize, row: usize, origin: f64, tau: f64, from: i32, to: i32, forwards: bool): void {
  const oo = f64x2.splat(origin), tt = f64x2.splat(tau), one = f64x2.splat(1);
  let value = f64x2.splat(0), derivative = value, error = value;
  // Term j counts in as many partial sums as follow it.
  const first: f64 = forwards ? <f64>(to - from) : 1;
  const step: f64 = forwards ? -1 : 1;
  let count = f64x2.splat(first);
  count = f64x2.replace_lane(count, 1, first + step);
  const two = f64x2.splat(2 * step);
  let j = from;
  for (; j + 1 < to; j += 2) {
    const gap = f64x2.sub(f64x2.sub(v128.load(at(d, j)), oo), tt);
    v128.store(at(row, j), gap);
    const inverse = f64x2.div(one, gap);
    const t = f64x2.mul(v128.load(at(squares, j)), inverse);
    value = f64x2.add(value, t);
    derivative = f64x2.add(derivative, f64x2.mul(t, inverse));
    error = f64x2.add(error, f64x2.mul(t, count));
    count = f64x2.add(count, two);
  }
  total = lanes(value);
  slope = lanes(derivative);
  partials = lanes(error);
  if (j < to) {
    const gap = load<f64>(at(d, j)) - origin - tau;
    store<f64>(at(row, j), gap);
    const inverse = 1 / gap;
    const t = load<f64>(at(squares, j)) * inverse;
    total += t;
    slope += t * inverse;
    partials += t * f64x2.extract_lane(count, 0);
  }
}

/** Root i of the secular equation; gaps into `row`. NaN at the cap. */
function secularRoot(i: i32, k: i32, d: usize, squares: usize, rho: f64, row: usize): f64 {
  const last = i == k - 1;
  const own = load<f64>(at(d, i));
  if (k == 1) {
    const shift = rho * load<f64>(squares);
    store<f64>(row, -shift);
    return own + shift;
  }
  let width: f64 = 0;
  if (last) for (let j = 0; j < k; j++) width += rho * load<f64>(at(squares, j));
  else width = load<f64>(at(d, i + 1)) - own;
  const middle = width / 2;
  sums(d, squares, row, own, middle, 0, k, true);
  const atMiddle = 1 / rho + total;
  const right = !last && atMiddle < 0;
  const origin = right ? load<f64>(at(d, i + 1)) : own;
  let lo = right ? -middle : atMiddle < 0 ? middle : 0;
  let hi = right ? 0 : atMiddle < 0 ? width : middle;
  const p = last ? k - 2 : i;
  let tau = firstGuess(p, last, right, d, squares, rho, middle, atMiddle, own);
  if (!(lo < tau && tau < hi)) tau = (lo + hi) / 2;
  for (let step = 0; step < 120; step++) {
    sums(d, squares, row, origin, tau, 0, p + 1, true);
    const psi = total, dpsi = slope;
    let error = abs<f64>(partials);
    sums(d, squares, row, origin, tau, p + 1, k, false);
    const phi = total, dphi = slope;
    error += abs<f64>(partials);
    const f = 1 / rho + psi + phi;
    error += 8 * (abs<f64>(psi) + abs<f64>(phi)) + 3 / rho + abs<f64>(tau) * (dpsi + dphi);
    if (abs<f64>(f) <= f64.EPSILON * error) return origin + tau;
    if (f < 0) lo = tau;
    else hi = tau;
    const next = tau + rationalStep(f, dpsi, dphi, load<f64>(at(row, p)), load<f64>(at(row, p + 1)), last);
    const before = tau;
    tau = lo < next && next < hi ? next : (lo + hi) / 2;
    if (tau == before || tau == lo || tau == hi) return origin + before;
  }
  return NaN;
}

function rationalStep(f: f64, dpsi: f64, dphi: f64, gapP: f64, gapQ: f64, last: bool): f64 {
  const c = f - gapP * dpsi - gapQ * dphi;
  const a = (gapP + gapQ) * f - gapP * gapQ * (dpsi + dphi);
  const b = gapP * gapQ * f;
  const root = sqrt<f64>(abs<f64>(a * a - 4 * b * c));
  let step: f64;
  if (last) step = a >= 0 ? (a + root) / (2 * c) : (2 * b) / (a - root);
  else step = a <= 0 ? (a - root) / (2 * c) : (2 * b) / (a + root);
  return f * step < 0 ? step : -f / (dpsi + dphi);
}

function firstGuess(
  p: i32, last: bool, right: bool, d: usize, squares: usize, rho: f64, middle: f64, atMiddle: f64, own: f64,
): f64 {
  const dp = load<f64>(at(d, p)), dq = load<f64>(at(d, p + 1));
  const sp = load<f64>(at(squares, p)), sq = load<f64>(at(squares, p + 1));
  const span = dq - dp;
  const c = atMiddle - sp / (dp - own - middle) - sq / (dq - own - middle);
  if (last) {
    const a = -c * span + sp + sq;
    const b = sq * span;
    const root = sqrt<f64>(max<f64>(0, a * a + 4 * b * c));
    if (atMiddle <= 0 && c <= sp / (span + rho) + sq / rho) return rho;
    return a < 0 ? (2 * b) / (root - a) : (a + root) / (2 * c);
  }
  if (right) {
    const a = c * span - sp - sq;
    const b = sq * span;
    const root = sqrt<f64>(abs<f64>(a * a + 4 * b * c));
    return a < 0 ? (2 * b) / (a - root) : -(a + root) / (2 * c);
  }
  const a = c * span + sp + sq;
  const b = sp * span;
  const root = sqrt<f64>(abs<f64>(a * a - 4 * b * c));
  return a > 0 ? (2 * b) / (a + root) : (a - root) / (2 * c);
}

/** Columns factored before everything to their right is brought up to date by products. */
const PANEL: i32 = 24;

/**
 * Chases the bulge of one double-shift step, see chaseBulge in real-schur.ts. H and Z' (0: none) are n x n, rows
 * and columns as there.
 */
export function chase(
  h: usize, n: i32, l: i32, m: i32, i: i32, i1: i32, i2: i32, v1: f64, v2: f64, v3: f64, z: usize,
): void {
  for (let k = m; k < i; k++) {
    const three = k + 2 <= i;
    const before = at(h, k * n + k - 1);
    if (k > m) {
      v1 = load<f64>(before);
      v2 = load<f64>(at(before, n));
      v3 = three ? load<f64>(at(before, 2 * n)) : 0;
    }
    if (!three) v3 = 0;
    const tail = v2 * v2 + v3 * v3;
    let t1: f64 = 0;
    let beta = v1;
    if (tail > 0) {
      const length = sqrt<f64>(v1 * v1 + tail);
      beta = v1 >= 0 ? -length : length;
      t1 = (beta - v1) / beta;
      const scale = 1 / (v1 - beta);
      v2 *= scale;
      v3 *= scale;
    } else {
      v2 = 0;
      v3 = 0;
    }
    if (k > m) {
      store<f64>(before, beta);
      store<f64>(at(before, n), 0);
      if (three) store<f64>(at(before, 2 * n), 0);
    } else if (m > l) {
      store<f64>(before, load<f64>(before) * (1 - t1));
    }
    if (t1 == 0) continue;
    const last = three ? min(k + 3, i) : i;
    if (three) {
      reflectRows3(at(h, k * n + k), n, i2 - k + 1, v2, v3, t1);
      reflectColumns3(at(h, i1 * n + k), n, last - i1 + 1, v2, v3, t1);
      if (z != 0) reflectRows3(at(z, k * n), n, n, v2, v3, t1);
    } else {
      reflectRows2(at(h, k * n + k), n, i2 - k + 1, v2, t1);
      reflectColumns2(at(h, i1 * n + k), n, last - i1 + 1, v2, t1);
      if (z != 0) reflectRows2(at(z, k * n), n, n, v2, t1);
    }
  }
}

function reflectRows3(p: usize, stride: i32, count: i32, v2: f64, v3: f64, t1: f64): void {
  const w2 = f64x2.splat(v2);
  const w3 = f64x2.splat(v3);
  const s1 = f64x2.splat(t1);
  const s2 = f64x2.splat(t1 * v2);
  const s3 = f64x2.splat(t1 * v3);
  let q = at(p, stride);
  let r = at(q, stride);
  let j = 0;
  for (; j + 1 < count; j += 2) {
    const a = v128.load(p);
    const b = v128.load(q);
    const c = v128.load(r);
    const sum = f64x2.add(f64x2.add(a, f64x2.mul(w2, b)), f64x2.mul(w3, c));
    v128.store(p, f64x2.sub(a, f64x2.mul(sum, s1)));
    v128.store(q, f64x2.sub(b, f64x2.mul(sum, s2)));
    v128.store(r, f64x2.sub(c, f64x2.mul(sum, s3)));
    p += 16;
    q += 16;
    r += 16;
  }
  if (j == count) return;
  const a = load<f64>(p);
  const b = load<f64>(q);
  const c = load<f64>(r);
  const sum = a + v2 * b + v3 * c;
  store<f64>(p, a - sum * t1);
  store<f64>(q, b - sum * (t1 * v2));
  store<f64>(r, c - sum * (t1 * v3));
}

function reflectRows2(p: usize, stride: i32, count: i32, v2: f64, t1: f64): void {
  const t2 = t1 * v2;
  for (let j = 0; j < count; j++) {
    const a = load<f64>(at(p, j));
    const b = load<f64>(at(p, j + stride));
    const sum = a + v2 * b;
    store<f64>(at(p, j), a - sum * t1);
    store<f64>(at(p, j + stride), b - sum * t2);
  }
}

function reflectColumns3(p: usize, stride: i32, count: i32, v2: f64, v3: f64, t1: f64): void {
  const t2 = t1 * v2;
  const t3 = t1 * v3;
  const step = (<usize>stride) << 3;
  for (let j = 0; j < count; j++) {
    const a = load<f64>(p);
    const b = load<f64>(p, 8);
    const c = load<f64>(p, 16);
    const sum = a + v2 * b + v3 * c;
    store<f64>(p, a - sum * t1);
    store<f64>(p, b - sum * t2, 8);
    store<f64>(p, c - sum * t3, 16);
    p += step;
  }
}

function reflectColumns2(p: usize, stride: i32, count: i32, v2: f64, t1: f64): void {
  const t2 = t1 * v2;
  const step = (<usize>stride) << 3;
  for (let j = 0; j < count; j++) {
    const a = load<f64>(p);
    const b = load<f64>(p, 8);
    const sum = a + v2 * b;
    store<f64>(p, a - sum * t1);
    store<f64>(p, b - sum * t2, 8);
    p += step;
  }
}

/**
 * LU with partial pivoting of re (and im, unless 0), n×n with row distance `stride`, in place: multipliers below the
 * diagonal, U above and, inverted where complex, on it. `permutation` (32-bit) takes the row exchanges. Returns the
 * first column without a pivot above `floor`, or −1. See lu.ts and complex-lu.ts.
 */
export function factor(
  re: usize, im: usize, stride: i32, n: i32, permutation: usize, floor: f64, pack: usize,
): i32 {
  for (let k = 0; k < n; k += PANEL) {
    const end = min(k + PANEL, n);
    for (let p = k; p < end; p++) {
      if (!panelColumn(re, im, stride, n, p, end, permutation, floor)) return p;
    }
    if (end == n) break;
    const right = n - end;
    for (let p = k + 1; p < end; p++) {
      for (let q = k; q < p; q++) {
        const l = p * stride + q;
        const to = p * stride + end;
        const from = q * stride + end;
        const lr = load<f64>(at(re, l));
        axpy(at(re, to), at(re, from), -lr, right);
        if (im == 0) continue;
        const li = load<f64>(at(im, l));
        axpy(at(re, to), at(im, from), li, right);
        axpy(at(im, to), at(im, from), -lr, right);
        axpy(at(im, to), at(re, from), -li, right);
      }
    }
    const below = n - end;
    const l = end * stride + k;
    const u = k * stride + end;
    const c = end * stride + end;
    product(at(re, l), stride, at(re, u), stride, at(re, c), stride, below, end - k, right, 1, pack);
    if (im == 0) continue;
    product(at(im, l), stride, at(im, u), stride, at(re, c), stride, below, end - k, right, 2, pack);
    product(at(re, l), stride, at(im, u), stride, at(im, c), stride, below, end - k, right, 1, pack);
    product(at(im, l), stride, at(re, u), stride, at(im, c), stride, below, end - k, right, 1, pack);
  }
  return -1;
}

/** y += f x */
function axpy(y: usize, x: usize, f: f64, count: i32): void {
  const ff = f64x2.splat(f);
  let j = 0;
  for (; j + 1 < count; j += 2) {
    const p = at(y, j);
    v128.store(p, f64x2.add(v128.load(p), f64x2.mul(ff, v128.load(at(x, j)))));
  }
  if (j < count) store<f64>(at(y, j), load<f64>(at(y, j)) + f * load<f64>(at(x, j)));
}

function exchange(a: usize, b: usize, count: i32): void {
  for (let j = 0; j < count; j++) {
    const kept = load<f64>(at(a, j));
    store<f64>(at(a, j), load<f64>(at(b, j)));
    store<f64>(at(b, j), kept);
  }
}

/** Pivot, exchange and elimination of column p within its panel; false without a pivot. */
function panelColumn(
  re: usize, im: usize, stride: i32, n: i32, p: i32, end: i32, permutation: usize, floor: f64,
): bool {
  let best = p;
  let size: f64 = -1;
  for (let i = p; i < n; i++) {
    let s = abs<f64>(load<f64>(at(re, i * stride + p)));
    if (im != 0) s += abs<f64>(load<f64>(at(im, i * stride + p)));
    if (size < s) {
      size = s;
      best = i;
    }
  }
  if (!(size > floor)) return false;
  if (best != p) {
    exchange(at(re, p * stride), at(re, best * stride), n);
    if (im != 0) exchange(at(im, p * stride), at(im, best * stride), n);
    const a = permutation + ((<usize>p) << 2), b = permutation + ((<usize>best) << 2);
    const kept = load<i32>(a);
    store<i32>(a, load<i32>(b));
    store<i32>(b, kept);
  }
  const row = p * stride;
  const pr = load<f64>(at(re, row + p));
  if (im == 0) {
    const inverse = 1 / pr;
    for (let i = p + 1; i < n; i++) {
      const l = load<f64>(at(re, i * stride + p)) * inverse;
      store<f64>(at(re, i * stride + p), l);
      axpy(at(re, i * stride + p + 1), at(re, row + p + 1), -l, end - p - 1);
    }
    return true;
  }
  const pi = load<f64>(at(im, row + p));
  const square = pr * pr + pi * pi;
  const ir = pr / square, ii = -pi / square;
  store<f64>(at(re, row + p), ir);
  store<f64>(at(im, row + p), ii);
  for (let i = p + 1; i < n; i++) {
    const q = i * stride + p;
    const ar = load<f64>(at(re, q)), ai = load<f64>(at(im, q));
    const lr = ar * ir - ai * ii, li = ar * ii + ai * ir;
    store<f64>(at(re, q), lr);
    store<f64>(at(im, q), li);
    for (let j = p + 1; j < end; j++) {
      const ur = load<f64>(at(re, row + j)), ui = load<f64>(at(im, row + j));
      const to = i * stride + j;
      store<f64>(at(re, to), load<f64>(at(re, to)) - (lr * ur - li * ui));
      store<f64>(at(im, to), load<f64>(at(im, to)) - (lr * ui + li * ur));
    }
  }
  return true;
}
