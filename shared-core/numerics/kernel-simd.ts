/**
 * The dense inner loops on WebAssembly SIMD, about four times as fast as the plain ones from n ≈ 32 on.
 *
 * Arrays are copied into the module's memory and back, which costs n² against n³ of work. Results agree with
 * the plain kernel to rounding: sums run in another order.
 */
import type { Kernel, Window } from "./kernel.ts";
import { KERNEL_MODULE } from "./kernel-module.ts";
import { type Bulge, doubleShiftQr, type SchurValues } from "./real-schur.ts";

type Exports = {
  memory: WebAssembly.Memory;
  product(
    a: number,
    aStride: number,
    b: number,
    bStride: number,
    c: number,
    cStride: number,
    rows: number,
    inner: number,
    columns: number,
    mode: number,
    pack: number,
  ): void;
  tridiagonalise(a: number, stride: number, n: number, d: number, e: number, tau: number, work: number): void;
  backTransform(
    rows: number,
    rowStride: number,
    count: number,
    reflectors: number,
    stride: number,
    n: number,
    tau: number,
    work: number,
    pack: number,
  ): void;
  hessenberg(a: number, stride: number, n: number, vectors: number, tau: number, work: number): void;
  hessenbergQ(
    q: number,
    stride: number,
    n: number,
    vectors: number,
    tau: number,
    work: number,
    pack: number,
  ): void;
  chase(
    h: number,
    n: number,
    l: number,
    m: number,
    i: number,
    i1: number,
    i2: number,
    v1: number,
    v2: number,
    v3: number,
    z: number,
  ): void;
  factor(
    re: number,
    im: number,
    stride: number,
    n: number,
    permutation: number,
    floor: number,
    pack: number,
  ): number;
  merge(
    k: number,
    size: number,
    left: number,
    upper: number,
    skip: number,
    rho: number,
    poles: number,
    weights: number,
    column: number,
    values: number,
    packed: number,
    result: number,
    mix: number,
    gaps: number,
    work: number,
    pack: number,
  ): number;
};

/** Matrices below this order are quicker without the module; found by trial. */
const SHORT_SCHUR = 24;
const PAGE = 65536;
/** The module keeps small constants below this address. */
const BASE = 1024;
/** DEPTH in tools/kernel.as. */
const PACK_DEPTH = 256;
/** An instance whose memory has grown beyond this is given up after use, so that the host can reclaim it. */
const KEPT_BYTES = 16 * 2 ** 20;

/** The SIMD kernel, or undefined where the host lacks WebAssembly or its SIMD. */
export function simdKernel(): Kernel | undefined {
  if (typeof WebAssembly === "undefined") return undefined;
  const compiled = compile(decodeBase64(KERNEL_MODULE));
  return compiled && kernelOf(compiled);
}

function kernelOf(compiled: WebAssembly.Module): Kernel {
  let kept: Exports | undefined;
  /** Runs with an instance that has room for the given areas (in numbers) and the address of each. */
  function run<T>(
    sizes: readonly number[],
    body: (wasm: Exports, memory: Float64Array, at: number[]) => T,
  ): T {
    const wasm = kept ?? (new WebAssembly.Instance(compiled).exports as unknown as Exports);
    const at: number[] = [];
    let end = BASE;
    for (const size of sizes) {
      at.push(end);
      // Sixteen-byte boundaries, a line apart.
      end += 8 * (size + (size % 2)) + 64;
    }
    const missing = end - wasm.memory.buffer.byteLength;
    if (missing > 0) wasm.memory.grow(Math.ceil(missing / PAGE));
    const result = body(wasm, new Float64Array(wasm.memory.buffer), at);
    kept = wasm.memory.buffer.byteLength <= KEPT_BYTES ? wasm : undefined;
    return result;
  }
  return {
    name: "simd",
    product: (a, b, c, rows, inner, columns) => {
      if (rows === 0 || columns === 0) return;
      const sizes = [rows * inner, inner * columns, rows * columns, packRoom(columns)];
      run(sizes, (wasm, memory, [pa, pb, pc, pack]) => {
        copyIn(a, memory, pa, rows, inner);
        copyIn(b, memory, pb, inner, columns);
        wasm.product(pa, inner, pb, columns, pc, columns, rows, inner, columns, 0, pack);
        copyOut(c, memory, pc, rows, columns);
      });
    },
    tridiagonalise: (a, n) => {
      // Even row distance, so that every row starts on a sixteen-byte boundary.
      const stride = n + (n % 2);
      return run([n * stride, n, n, n, 4 * (n + 2)], (wasm, memory, [pa, pd, pe, pt, work]) => {
        spread(a, n, n, memory, pa, stride);
        memory.fill(0, pt / 8, pt / 8 + n);
        wasm.tridiagonalise(pa, stride, n, pd, pe, pt, work);
        gather(memory, pa, stride, a, n, n);
        const part = (p: number, count: number) => memory.slice(p / 8, p / 8 + count);
        const offDiagonal = part(pe, Math.max(0, n - 1));
        return { n, diagonal: part(pd, n), offDiagonal, reflectors: a, tau: part(pt, n) };
      });
    },
    backTransform: (rows, count, t) => {
      const { n } = t;
      const stride = n + (n % 2);
      const room = roomFor(count, n);
      run([count * n, n * stride, n, room, packRoom(n)], (wasm, memory, [pr, pv, pt, work, pack]) => {
        memory.set(rows.subarray(0, count * n), pr / 8);
        spread(t.reflectors, n, n, memory, pv, stride);
        memory.set(t.tau, pt / 8);
        wasm.backTransform(pr, n, count, pv, stride, n, pt, work, pack);
        rows.set(memory.subarray(pr / 8, pr / 8 + count * n));
      });
    },
    factor: (re, im, n, permutation, floor) => {
      const sizes = [n * n, im ? n * n : 0, n, packRoom(n)];
      return run(sizes, (wasm, memory, [pr, pi, pp, pack]) => {
        const rows = new Int32Array(memory.buffer, pp, n);
        memory.set(re, pr / 8);
        if (im) memory.set(im, pi / 8);
        rows.set(permutation);
        const singularAt = wasm.factor(pr, im ? pi : 0, n, n, pp, floor, pack);
        re.set(memory.subarray(pr / 8, pr / 8 + n * n));
        im?.set(memory.subarray(pi / 8, pi / 8 + n * n));
        permutation.set(rows);
        return singularAt;
      });
    },
    schur: (h, n, full, values, zt) => {
      if (n < SHORT_SCHUR) return doubleShiftQr(h, n, 0, n - 1, full, values, zt);
      return run([n * n, zt ? n * n : 0], (wasm, memory, [ph, pz]) =>
        schurOn(wasm, memory, [ph, pz], h, n, full, values, zt),
      );
    },
    merge: (step) => {
      const { k, size, poles, weights, column, packed, result, values } = step;
      const { left, upper, skip, rho } = step;
      const rows = k * size;
      const sizes = [k, k, k, k, rows, rows, k * k, k * k, 2 * (k + 2), packRoom(size)];
      return run(sizes, (wasm, memory, at) => {
        const [pp, pw, pc, pv, pa, pr, pm, pg, work, pack] = at;
        memory.set(poles, pp / 8);
        memory.set(weights, pw / 8);
        new Int32Array(memory.buffer, pc, k).set(column);
        memory.set(packed.subarray(0, rows), pa / 8);
        const done = wasm.merge(k, size, left, upper, skip, rho, pp, pw, pc, pv, pa, pr, pm, pg, work, pack);
        result.set(memory.subarray(pr / 8, pr / 8 + rows));
        values.set(memory.subarray(pv / 8, pv / 8 + k));
        return done === 1;
      });
    },
    hessenberg: (a, n, withQ) => {
      const stride = n + (n % 2);
      const room = withQ ? roomFor(n, n) : 0;
      const sizes = [
        n * stride,
        n * stride,
        n,
        6 * (n + 2),
        withQ ? n * stride : 0,
        room,
        withQ ? packRoom(n) : 0,
      ];
      return run(sizes, (wasm, memory, [pa, pv, pt, work, pq, scratch, pack]) => {
        spread(a, n, n, memory, pa, stride);
        memory.fill(0, pv / 8, pv / 8 + n * stride);
        memory.fill(0, pt / 8, pt / 8 + n);
        wasm.hessenberg(pa, stride, n, pv, pt, work);
        if (withQ) wasm.hessenbergQ(pq, stride, n, pv, pt, scratch, pack);
        const transposedQ = new Float64Array(withQ ? n * n : 0);
        gather(memory, pa, stride, a, n, n);
        if (withQ) gather(memory, pq, stride, transposedQ, n, n);
        return { n, h: a, transposedQ };
      });
    },
  };
}

/** The iteration itself runs here, on the module's memory; only the long loops are the module's. */
function schurOn(
  wasm: Exports,
  memory: Float64Array,
  [ph, pz]: readonly [number, number],
  h: Float64Array,
  n: number,
  full: boolean,
  values: SchurValues,
  zt: Float64Array | undefined,
): number {
  const own = memory.subarray(ph / 8, ph / 8 + n * n);
  const ownZ = zt && memory.subarray(pz / 8, pz / 8 + n * n);
  own.set(h);
  if (zt) ownZ?.set(zt);
  const chase = ({ l, m, i, i1, i2, v1, v2, v3 }: Bulge) =>
    wasm.chase(ph, n, l, m, i, i1, i2, v1, v2, v3, zt ? pz : 0);
  const found = doubleShiftQr(own, n, 0, n - 1, full, values, ownZ, n, chase);
  h.set(own);
  if (ownZ) zt?.set(ownZ);
  return found;
}

/** Compiling is the only test for SIMD that does not compile twice. */
function compile(bytes: Uint8Array<ArrayBuffer>): WebAssembly.Module | undefined {
  try {
    return new WebAssembly.Module(bytes);
  } catch {
    return undefined;
  }
}

/** Scratch of backTransform in numbers; the module's own formula with its block of 32. */
function roomFor(count: number, n: number): number {
  const block = 32;
  return 3 * block * n + 2 * block * block + count * block;
}

function packRoom(columns: number): number {
  return PACK_DEPTH * (columns + 4);
}

/** Rows of an array into the module, `stride` numbers apart; in one piece where they lie so already. */
function spread(
  from: Float64Array,
  rows: number,
  columns: number,
  memory: Float64Array,
  to: number,
  stride: number,
): void {
  copyRows(from, 0, columns, memory, to / 8, stride, rows, columns);
}

/** The way back. */
function gather(
  memory: Float64Array,
  from: number,
  stride: number,
  to: Float64Array,
  rows: number,
  columns: number,
): void {
  copyRows(memory, from / 8, stride, to, 0, columns, rows, columns);
}

/** Rows shorter than this are copied number by number: a view of each would cost more. */
const SHORT_ROW = 64;

function copyRows(
  from: Float64Array,
  fromAt: number,
  fromStride: number,
  to: Float64Array,
  toAt: number,
  toStride: number,
  rows: number,
  columns: number,
): void {
  if (fromStride === columns && toStride === columns) {
    to.set(from.subarray(fromAt, fromAt + rows * columns), toAt);
    return;
  }
  for (let i = 0; i < rows; i++) {
    const p = fromAt + i * fromStride;
    const q = toAt + i * toStride;
    if (columns < SHORT_ROW) for (let j = 0; j < columns; j++) to[q + j] = from[p + j];
    else to.set(from.subarray(p, p + columns), q);
  }
}

function copyIn(from: Window, memory: Float64Array, to: number, rows: number, columns: number): void {
  copyRows(from.data, from.at, from.stride, memory, to / 8, columns, rows, columns);
}

function copyOut(to: Window, memory: Float64Array, from: number, rows: number, columns: number): void {
  copyRows(memory, from / 8, columns, to.data, to.at, to.stride, rows, columns);
}

const ALPHABET = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";

function decodeBase64(text: string): Uint8Array<ArrayBuffer> {
  const digit = new Uint8Array(128);
  for (let i = 0; i < 64; i++) digit[ALPHABET.charCodeAt(i)] = i;
  const padding = text.endsWith("==") ? 2 : text.endsWith("=") ? 1 : 0;
  const out = new Uint8Array((text.length / 4) * 3 - padding);
  let at = 0;
  for (let i = 0; i < text.length; i += 4) {
    let word = 0;
    for (let k = 0; k < 4; k++) word = word * 64 + digit[text.charCodeAt(i + k)];
    for (let shift = 16; shift >= 0 && at < out.length; shift -= 8) out[at++] = (word >> shift) & 255;
  }
  return out;
}
