/**
 * Where a steady response may rise steeply: the roots of the model on the axis of a sweep, and the samples that
 * cannot miss them.
 */
import type { Mode, ModeTable } from "./answer.ts";
import type { SteadySystem } from "./frequency-system.ts";

/** A root as seen on the axis. */
export interface Pole {
  /** Hz on the axis. */
  readonly atHz: number;
  /** Half the width of its peak at half power, Hz on the axis; 0 where nothing damps it. */
  readonly halfWidthHz: number;
  /** "mode 2", or "a root" without a number. */
  readonly name: string;
}

/** Damping ratios below this count as none: what rounding leaves of an undamped root. */
export const UNDAMPED_RATIO = 1e-11;
/** Smallest distance from an undamped pole at which a search samples it, as a share of its frequency. */
const CLOSEST = 1e-7;

/** The oscillating roots of the mode table, for drives that act at `ratio` times the axis; ascending. */
export function polesOf(table: ModeTable, ratios: readonly number[], system?: SteadySystem): Pole[] {
  const poles: Pole[] = [];
  for (const mode of table.modes) {
    let [re, im] = mode.eigenvalue;
    if (!(im > 0)) continue;
    if (system !== undefined) [re, im] = refinedRoot(system, re, im);
    const undamped = Math.abs(re) <= UNDAMPED_RATIO * im;
    for (const ratio of ratios) {
      const scale = 1 / (2 * Math.PI * ratio);
      poles.push({ atHz: im * scale, halfWidthHz: undamped ? 0 : Math.abs(re) * scale, name: nameOf(mode) });
    }
  }
  return poles.sort((a, b) => a.atHz - b.atHz);
}

/** The first mode that grows, in words; undefined where none does. */
export function growingMode(table: ModeTable): string | undefined {
  for (const mode of table.modes) {
    const real = Math.max(mode.eigenvalue[0], ...(mode.realRoots ?? []));
    const size = Math.hypot(mode.eigenvalue[0], mode.eigenvalue[1], ...(mode.realRoots ?? []));
    if (real > UNDAMPED_RATIO * size && mode.number !== 0) {
      return `${nameOf(mode)} grows at ${Number(real.toPrecision(4))} 1/s, so there is no steady response`;
    }
  }
  return undefined;
}

/**
 * Frequencies (Hz, ascending, ends included) dense enough for every peak between `from` and `to`: `perDecade`
 * points everywhere, and around each pole points a quarter of a half-width apart that spread by `growth` until
 * they are no closer than what is there anyway.
 */
export function sampleFrequencies(
  poles: readonly Pole[],
  from: number,
  to: number,
  perDecade: number,
): Float64Array {
  const even = evenSamples(from, to, perDecade);
  return withPoles(even, poles, { first: 0.25, growth: 1.5, closest: CLOSEST });
}

export interface PoleSpacing {
  /** Distance of the first point from the pole, in half-widths. */
  readonly first: number;
  /** Ratio of each step to the one before. */
  readonly growth: number;
  /** Distance of the first point from an undamped pole, as a share of its frequency. */
  readonly closest: number;
}

/** Base points kept exactly, with points around the poles between the first and the last, no two the same. */
export function withPoles(
  base: Float64Array,
  poles: readonly Pole[],
  { first, growth, closest }: PoleSpacing,
): Float64Array {
  const out: number[] = [];
  const from = base[0];
  const to = base[base.length - 1];
  poles.forEach(({ atHz, halfWidthHz }, i) => {
    if (halfWidthHz > 0 && from < atHz && atHz < to) out.push(atHz);
    for (const side of [-1, 1]) {
      // Half way to the next pole that one's own points take over.
      const other = poles[i + side];
      const end = other === undefined ? (side < 0 ? from : to) : 0.5 * (atHz + other.atHz);
      const reach = Math.min(Math.abs(end - atHz), atHz);
      const spacing = spacingAt(base, atHz);
      let step = halfWidthHz > 0 ? first * halfWidthHz : closest * atHz;
      for (let x = step; x < reach && step < spacing; x += step, step *= growth) {
        const f = atHz + side * x;
        if (from < f && f < to) out.push(f);
      }
    }
  });
  return merged(base, Float64Array.from(out).sort());
}

/** Two ascending lists as one, each value once. */
function merged(a: Float64Array, b: Float64Array): Float64Array {
  const out = new Float64Array(a.length + b.length);
  let [i, j, count] = [0, 0, 0];
  while (i < a.length || j < b.length) {
    const next = j >= b.length || (i < a.length && a[i] <= b[j]) ? a[i++] : b[j++];
    if (count === 0 || next !== out[count - 1]) out[count++] = next;
  }
  return out.slice(0, count);
}

function evenSamples(from: number, to: number, perDecade: number): Float64Array {
  if (!(to > from)) return Float64Array.of(from);
  if (from > 0) {
    const count = Math.max(16, Math.ceil(perDecade * Math.log10(to / from)));
    const ratio = Math.log(to / from) / count;
    return Float64Array.from({ length: count + 1 }, (_, i) =>
      i === 0 ? from : i === count ? to : from * Math.exp(i * ratio),
    );
  }
  const count = 4 * perDecade;
  return Float64Array.from({ length: count + 1 }, (_, i) => from + ((to - from) * i) / count);
}

/** Distance of the base points around `f`. */
function spacingAt(base: Float64Array, f: number): number {
  const last = base.length - 1;
  if (last === 0) return 0;
  let lo = 0;
  let hi = last;
  while (hi - lo > 1) {
    const middle = (lo + hi) >> 1;
    if (base[middle] <= f) lo = middle;
    else hi = middle;
  }
  return base[hi] - base[lo];
}

/**
 * A root of Z(s) x = 0 near a start, by Newton's method on the inverse iterate: with x = Z^-1 Z' x_before, the
 * step is -x^T Z x / x^T Z' x (Ruhe, Algorithms for the nonlinear eigenvalue problem, SIAM J. Numer. Anal. 10,
 * 1973). Loss factors enter the mode table as modal damping, which moves narrow peaks by more than their width.
 */
function refinedRoot(system: SteadySystem, re: number, im: number): [number, number] {
  const n = system.free;
  let sRe = re;
  let sIm = im;
  let xRe = Float64Array.from({ length: n }, (_, i) => Math.sin(1 + 2.399963 * i) + 0.1);
  let xIm = new Float64Array(n);
  for (let round = 0; round < 12; round++) {
    // Beside the root itself, where Z would be singular.
    const factored = system.factor(sRe + (round === 0 ? 1e-6 * im : 0), sIm);
    if (!factored.ok) return [sRe, sIm];
    const [yRe, yIm] = system.derivative(sRe, sIm, xRe, xIm);
    const wRe = Float64Array.from(yRe);
    const wIm = Float64Array.from(yIm);
    system.solve(wRe, wIm);
    // x^T Z x with Z x = y, over x^T Z' x.
    const [dRe, dIm] = system.derivative(sRe, sIm, wRe, wIm);
    const top = product(wRe, wIm, yRe, yIm);
    const bottom = product(wRe, wIm, dRe, dIm);
    const square = bottom[0] ** 2 + bottom[1] ** 2;
    if (!(square > 0) || !Number.isFinite(square)) return [sRe, sIm];
    const stepRe = (top[0] * bottom[0] + top[1] * bottom[1]) / square;
    const stepIm = (top[1] * bottom[0] - top[0] * bottom[1]) / square;
    if (round > 0) {
      sRe -= stepRe;
      sIm -= stepIm;
    }
    let most = 0;
    for (let i = 0; i < n; i++) most = Math.max(most, Math.abs(wRe[i]), Math.abs(wIm[i]));
    if (!(most > 0) || !Number.isFinite(most)) return [sRe, sIm];
    xRe = wRe.map((v) => v / most);
    xIm = wIm.map((v) => v / most);
    if (round > 0 && Math.hypot(stepRe, stepIm) <= 1e-14 * im) break;
  }
  // Further than its own damping and a little would be another root.
  return Math.hypot(sRe - re, sIm - im) < 0.1 * im ? [sRe, sIm] : [re, im];
}

/** x^T y without conjugation. */
function product(
  xRe: Float64Array,
  xIm: Float64Array,
  yRe: Float64Array,
  yIm: Float64Array,
): [number, number] {
  let re = 0;
  let im = 0;
  for (let i = 0; i < xRe.length; i++) {
    re += xRe[i] * yRe[i] - xIm[i] * yIm[i];
    im += xRe[i] * yIm[i] + xIm[i] * yRe[i];
  }
  return [re, im];
}

function nameOf(mode: Mode): string {
  return mode.number === null || mode.number === 0 ? "a root without a mode" : `mode ${mode.number}`;
}
