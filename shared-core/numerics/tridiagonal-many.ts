/**
 * Complex symmetric tridiagonal systems (K + i H + i ω C − ω² M) x = b for many ω at once.
 *
 * L D Lᵀ without exchange and with the same watch on its pivots as band-solve.ts, where the matrix that fails it
 * is at home. The frequencies of a block are lanes: the elimination of one is a chain of divisions of which each
 * waits for the one before, those of many run side by side.
 */
import { GROWTH_LIMIT } from "./band-solve.ts";

/** Frequencies taken together; chosen by trial. */
export const LANES = 16;

/** Bands of width one (see `SymmetricBand`): entry (i, i − 1) at 2i, entry (i, i) at 2i + 1. */
export type TridiagonalBands = {
  n: number;
  m: Float64Array;
  c: Float64Array;
  k: Float64Array;
  h: Float64Array;
};

/**
 * Makes a solver: `re` and `im` (n×LANES row-major, lane l in column l) hold right-hand sides and become the
 * solutions at `omega[l]`; `good[l]` is 0 where a pivot was too small or not finite, and that column means nothing.
 */
export function tridiagonalLanes(bands: TridiagonalBands): LaneSolver {
  const { n } = bands;
  const room = () => new Float64Array(n * LANES);
  const work: Work = { lr: room(), li: room(), qr: room(), qi: room() };
  return (omega, re, im, good) => {
    good.fill(1);
    for (let i = 0; i < n; i++) eliminateRow(bands, work, i, omega, re, im, good);
    for (let i = n - 1; i >= 0; i--) substituteRow(n, work, i, re, im);
    for (let l = 0; l < LANES; l++) {
      // x − x is zero for numbers and nothing else; the first row has seen all the others.
      if (re[l] - re[l] + (im[l] - im[l]) !== 0) good[l] = 0;
    }
  };
}

export type LaneSolver = (omega: Float64Array, re: Float64Array, im: Float64Array, good: Uint8Array) => void;

/** L below the diagonal and the inverse pivots, a row of lanes each. */
type Work = { lr: Float64Array; li: Float64Array; qr: Float64Array; qi: Float64Array };

/** Row i of the factors, and the forward substitution of the right-hand sides. */
function eliminateRow(
  { m, c, k, h }: TridiagonalBands,
  { lr, li, qr, qi }: Work,
  i: number,
  omega: Float64Array,
  re: Float64Array,
  im: Float64Array,
  good: Uint8Array,
): void {
  const [mo, co, ko, ho] = [m[2 * i], c[2 * i], k[2 * i], h[2 * i]];
  const [md, cd, kd, hd] = [m[2 * i + 1], c[2 * i + 1], k[2 * i + 1], h[2 * i + 1]];
  const at = i * LANES;
  const before = at - LANES;
  for (let l = 0; l < LANES; l++) {
    const w = omega[l];
    const w2 = w * w;
    let dr = kd - w2 * md;
    let di = hd + w * cd;
    const own = Math.abs(dr) + Math.abs(di);
    let taken = 0;
    if (i > 0) {
      const sr = ko - w2 * mo;
      const si = ho + w * co;
      const pr = qr[before + l];
      const pi = qi[before + l];
      const fr = sr * pr - si * pi;
      const fi = sr * pi + si * pr;
      lr[at + l] = fr;
      li[at + l] = fi;
      const tr = sr * fr - si * fi;
      const ti = sr * fi + si * fr;
      taken = Math.abs(tr) + Math.abs(ti);
      dr -= tr;
      di -= ti;
      const xr = re[before + l];
      const xi = im[before + l];
      re[at + l] -= fr * xr - fi * xi;
      im[at + l] -= fr * xi + fi * xr;
    }
    const left = Math.abs(dr) + Math.abs(di);
    // A NaN fails both comparisons' negations as well.
    if (!(taken <= GROWTH_LIMIT * own) || !(left * GROWTH_LIMIT > own + taken)) good[l] = 0;
    const inverse = 1 / (dr * dr + di * di);
    qr[at + l] = dr * inverse;
    qi[at + l] = -di * inverse;
  }
}

/** Row i of the back substitution. */
function substituteRow(
  n: number,
  { lr, li, qr, qi }: Work,
  i: number,
  re: Float64Array,
  im: Float64Array,
): void {
  const at = i * LANES;
  const below = at + LANES;
  const last = i === n - 1;
  for (let l = 0; l < LANES; l++) {
    const yr = re[at + l];
    const yi = im[at + l];
    let xr = yr * qr[at + l] - yi * qi[at + l];
    let xi = yr * qi[at + l] + yi * qr[at + l];
    if (!last) {
      const fr = lr[below + l];
      const fi = li[below + l];
      const br = re[below + l];
      const bi = im[below + l];
      xr -= fr * br - fi * bi;
      xi -= fr * bi + fi * br;
    }
    re[at + l] = xr;
    im[at + l] = xi;
  }
}
