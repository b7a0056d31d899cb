/**
 * Which complex roots belong to which undamped mode.
 *
 * The measure is |phi^T M psi|^2 over both norms, largest first, each root and mode once; an overdamped mode takes
 * two real roots. Where measures agree (one mass with a branch beside it: every shape is the same), a pair
 * that oscillates goes before real ones, then the roots whose size is nearest to the undamped frequency.
 */
import type { Root } from "./modes-roots.ts";

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

/** Matches roots to the modes `first` to `count - 1`; `values` are their omega^2. */
export function matchRoots(
  roots: readonly Root[],
  values: Float64Array,
  first: number,
  count: number,
): Matching {
  const measures = new Measures(roots, count);
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
  // A share above one half is the largest of its root's, so these agree with the full order and are cheap.
  accept(clearPairs(roots, measures, open, values));
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

class Measures {
  readonly #roots: readonly Root[];
  readonly #norm: Float64Array;

  constructor(roots: readonly Root[], count: number) {
    this.#roots = roots;
    this.#norm = Float64Array.from(roots, ({ shapeRe, shapeIm }) => {
      let sum = 0;
      for (let r = 0; r < count; r++) sum += shapeRe[r] * shapeRe[r] + shapeIm[r] * shapeIm[r];
      return sum;
    });
  }

  /** Share of the mode in the root's shape, 0 to 1. */
  of(mode: number, root: number): number {
    const { shapeRe, shapeIm } = this.#roots[root];
    const norm = this.#norm[root];
    return norm > 0 ? (shapeRe[mode] * shapeRe[mode] + shapeIm[mode] * shapeIm[mode]) / norm : 0;
  }
}

function candidate(mode: number, some: readonly number[], measure: number, size: number, value: number) {
  const distance = Math.abs(Math.log((size || Number.MIN_VALUE) / (Math.abs(value) || Number.MIN_VALUE)));
  return { mode, roots: some, measure: Math.round(measure / STEP), distance };
}

function clearPairs(
  roots: readonly Root[],
  measures: Measures,
  open: ReadonlySet<number>,
  values: Float64Array,
): Candidate[] {
  const out: Candidate[] = [];
  roots.forEach(({ re, im }, s) => {
    if (im === 0) return;
    for (const r of open) {
      const measure = measures.of(r, s);
      if (measure > 0.5) out.push(candidate(r, [s], measure, re * re + im * im, values[r]));
    }
  });
  // Roots whose measures nearly agree on one mode are left to the full comparison.
  const perMode = new Map<number, number>();
  for (const { mode } of out) perMode.set(mode, (perMode.get(mode) ?? 0) + 1);
  const reals = roots.some(({ im }) => im === 0);
  return reals ? [] : out.filter(({ mode }) => perMode.get(mode) === 1);
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
