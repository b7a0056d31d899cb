/**
 * Which complex roots belong to which undamped mode.
 *
 * The measure is |phi^T M psi|^2 over both norms, largest first, each root and mode once; an overdamped mode takes
 * two real roots. Where measures agree (one mass with a branch beside it: every shape is the same), a pair
 * that oscillates goes before real ones, then the roots whose size is nearest to the undamped frequency.
 */
import { multiply } from "../numerics/products.ts";
import { sparseTimesVector } from "../numerics/sparse.ts";
import type { Root } from "./modes-roots.ts";
import type { UndampedModes } from "./modes-undamped.ts";

/** Root or two real roots of each undamped mode, by index; empty when nothing was left. */
export interface Matching {
  readonly ofMode: readonly (readonly number[])[];
  /** Roots without an undamped mode. */
  readonly left: readonly number[];
}

/** Measures that differ by less count as equal. */
const STEP = 1e-6;
/** Real roots tried as second partner of each real root of a mode. */
const REAL_CHOICES = 6;

interface Candidate {
  readonly mode: number;
  readonly roots: readonly number[];
  /** Measure in steps, larger is better. */
  readonly measure: number;
  /** How far the roots' mean size is from the undamped frequency, in logarithms. */
  readonly distance: number;
}

/** Matches roots to the undamped modes from `first` on. */
export function matchRoots(roots: readonly Root[], undamped: UndampedModes, first: number): Matching {
  const { count, values } = undamped;
  const measures = new Measures(roots, undamped);
  const taken = new Set<number>();
  const ofMode: (readonly number[])[] = Array.from({ length: count }, () => []);
  const open = new Set<number>();
  for (let r = first; r < count; r++) open.add(r);
  const accept = (candidates: Candidate[]) => {
    for (const { mode, roots: some } of candidates.sort(better)) {
      if (!open.has(mode) || some.some((s) => taken.has(s))) continue;
      ofMode[mode] = some;
      open.delete(mode);
      for (const s of some) taken.add(s);
    }
  };
  accept(clearPairs(roots, measures, [...open], values));
  // Once over what is left, and again while leftovers of the short lists of real roots can be placed.
  for (let round = 0; open.size > 0 && round <= count; round++) {
    const before = open.size;
    accept(allCandidates(roots, measures, open, taken, values));
    if (open.size === before) break;
  }
  return { ofMode, left: roots.map((_, s) => s).filter((s) => !taken.has(s)) };
}

function better(a: Candidate, b: Candidate): number {
  return (
    b.measure - a.measure ||
    a.roots.length - b.roots.length ||
    a.distance - b.distance ||
    a.mode - b.mode ||
    a.roots[0] - b.roots[0]
  );
}

/** Share of a mode in a root's shape, 0 to 1; for shapes over the inertial coordinates worked out when asked. */
class Measures {
  readonly #roots: readonly Root[];
  readonly #undamped: UndampedModes;
  readonly #weighted: ({ re: Float64Array; im: Float64Array; norm: number } | undefined)[];

  constructor(roots: readonly Root[], undamped: UndampedModes) {
    this.#roots = roots;
    this.#undamped = undamped;
    this.#weighted = new Array(roots.length);
  }

  of(mode: number, root: number): number {
    const { re, im, norm } = this.#weights(root);
    if (!(norm > 0)) return 0;
    if (this.#roots[root].shape.basis === "modal") return (re[mode] * re[mode] + im[mode] * im[mode]) / norm;
    const { vectors, count } = this.#undamped;
    let x = 0;
    let y = 0;
    for (let i = 0, p = mode * count; i < count; i++, p++) {
      x += vectors[p] * re[i];
      y += vectors[p] * im[i];
    }
    return (x * x + y * y) / norm;
  }

  /** Of every mode (rows) in some roots (columns). */
  table(some: readonly number[]): Float64Array {
    const { vectors, count } = this.#undamped;
    const width = some.length;
    const out = new Float64Array(count * width);
    if (!some.every((s) => this.#roots[s].shape.basis === "inertial")) {
      for (let p = 0; p < out.length; p++) out[p] = this.of(Math.floor(p / width), some[p % width]);
      return out;
    }
    const columns = new Float64Array(count * 2 * width);
    some.forEach((s, k) => {
      const { re, im } = this.#weights(s);
      for (let i = 0; i < count; i++) {
        columns[i * 2 * width + 2 * k] = re[i];
        columns[i * 2 * width + 2 * k + 1] = im[i];
      }
    });
    const parts = multiply(vectors, columns, count, count, 2 * width);
    for (let p = 0; p < out.length; p++) {
      const { norm } = this.#weights(some[p % width]);
      const square = parts[2 * p] * parts[2 * p] + parts[2 * p + 1] * parts[2 * p + 1];
      out[p] = norm > 0 ? square / norm : 0;
    }
    return out;
  }

  /** The modal shape, or M times the shape, with psi^H M psi. */
  #weights(root: number): { re: Float64Array; im: Float64Array; norm: number } {
    const known = this.#weighted[root];
    if (known !== undefined) return known;
    const { basis, re, im } = this.#roots[root].shape;
    const { mass, count } = this.#undamped;
    const weighted = basis === "modal" ? [re, im] : [re, im].map((x) => sparseTimesVector(mass, x));
    let norm = 0;
    for (let r = 0; r < count; r++) norm += re[r] * weighted[0][r] + im[r] * weighted[1][r];
    const made = { re: weighted[0], im: weighted[1], norm };
    this.#weighted[root] = made;
    return made;
  }
}

function candidate(mode: number, some: readonly number[], measure: number, size: number, value: number) {
  const distance = Math.abs(Math.log((size || Number.MIN_VALUE) / (Math.abs(value) || Number.MIN_VALUE)));
  return { mode, roots: some, measure: Math.round(measure / STEP), distance };
}

/**
 * Pairs and modes of the same rank that share more than one half, as the full order would match them: shares of
 * one root add up to one at most, so each such root has less than one half of every other mode; the roots that
 * are not such are compared one by one.
 */
function clearPairs(
  roots: readonly Root[],
  measures: Measures,
  modes: readonly number[],
  values: Float64Array,
): Candidate[] {
  const squares = roots.map(({ re, im }) => re * re + im * im);
  const pairs = roots.map((_, s) => s).filter((s) => roots[s].im > 0);
  pairs.sort((a, b) => squares[a] - squares[b]);
  const clear: { r: number; s: number; measure: number }[] = [];
  const others = roots.map((_, s) => s).filter((s) => roots[s].im === 0);
  pairs.forEach((s, rank) => {
    const r = modes[rank];
    const measure = r === undefined ? 0 : measures.of(r, s);
    if (measure > 0.5) clear.push({ r, s, measure });
    else others.push(s);
  });
  const shares = measures.table(others);
  return clear
    .filter(({ r, measure }) => others.every((_, k) => shares[r * others.length + k] < measure))
    .map(({ r, s, measure }) => candidate(r, [s], measure, squares[s], values[r]));
}

function allCandidates(
  roots: readonly Root[],
  measures: Measures,
  open: ReadonlySet<number>,
  taken: ReadonlySet<number>,
  values: Float64Array,
): Candidate[] {
  const free = roots.map((_, s) => s).filter((s) => !taken.has(s));
  const pairs = free.filter((s) => roots[s].im > 0);
  const reals = free.filter((s) => roots[s].im === 0);
  const out: Candidate[] = [];
  for (const r of open) {
    for (const s of pairs) {
      const { re, im } = roots[s];
      out.push(candidate(r, [s], measures.of(r, s), re * re + im * im, values[r]));
    }
    const likely = reals
      .map((s) => ({ s, measure: measures.of(r, s) }))
      .sort((a, b) => b.measure - a.measure || a.s - b.s)
      .slice(0, REAL_CHOICES);
    for (let p = 0; p < likely.length; p++) {
      for (let q = p + 1; q < likely.length; q++) {
        const [a, b] = [likely[p], likely[q]];
        const product = Math.abs(roots[a.s].re * roots[b.s].re);
        out.push(candidate(r, [a.s, b.s], Math.min(a.measure, b.measure), product, values[r]));
      }
    }
  }
  return out;
}
