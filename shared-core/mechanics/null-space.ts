/**
 * The motions that a set of linear forms does not feel.
 *
 * What floats, what is massless and how many rigid-body modes there are is decided here, on the forms alone
 * (ones, minus ones, bind factors), never on the size of masses or stiffnesses: sums of v f f^T with v > 0 have
 * exactly this null space. Forms of one or two coordinates are followed as ratios along a forest; what is left
 * is eliminated densely with complete pivoting. A combination counts as zero below `RELATIVE_ZERO` of the
 * terms it is made of.
 */
import type { LinearForm } from "./assembly.ts";

/** Entries of a sparse vector, indices ascending. */
export interface SparseVector {
  readonly at: readonly number[];
  readonly by: readonly number[];
}

export interface NullSpace {
  /** One coordinate a basis vector, in which that vector is 1 and the others are 0; ascending. */
  readonly free: readonly number[];
  readonly vectors: readonly SparseVector[];
}

/** Far above the rounding of a chain of bind factors, far below any slip in one: chosen by trial. */
const RELATIVE_ZERO = 1e-10;

/**
 * Null space of `forms` within the coordinates of `subset` (ascending); all other coordinates, and supports,
 * stand still. `size` is above every coordinate's index.
 */
export function nullSpace(forms: readonly LinearForm[], subset: readonly number[], size: number): NullSpace {
  if (subset.length === 0) return { free: [], vectors: [] };
  const forest = new Forest(subset, size);
  const wide: LinearForm[] = [];
  for (const form of forms) {
    if (forest.open === 0) return { free: [], vectors: [] };
    if (!forest.absorb(form)) wide.push(form);
  }
  const rows = wide.map((form) => forest.reduce(form)).filter((row) => row.size > 0);
  return basisOf(subset, forest, solveRows(rows));
}

/** Coordinates tied in fixed ratios: x = ratio * x of the root; a root may be held at zero. */
class Forest {
  readonly #parent: Int32Array;
  readonly #ratio: Float64Array;
  readonly #weight: Int32Array;
  readonly #held: Uint8Array;
  readonly #path: number[] = [];
  /** Roots that are not held. */
  open: number;

  constructor(subset: readonly number[], size: number) {
    this.#parent = Int32Array.from({ length: size }, (_, i) => i);
    this.#ratio = new Float64Array(size).fill(1);
    this.#weight = new Int32Array(size).fill(1);
    this.#held = new Uint8Array(size).fill(1);
    for (const i of subset) this.#held[i] = 0;
    this.open = subset.length;
  }

  /** Root and ratio of a coordinate; the path to it is shortened. */
  find(i: number): { root: number; ratio: number } {
    const path = this.#path;
    path.length = 0;
    let root = i;
    while (this.#parent[root] !== root) {
      path.push(root);
      root = this.#parent[root];
    }
    let ratio = 1;
    for (let p = path.length - 1; p >= 0; p--) {
      ratio *= this.#ratio[path[p]];
      this.#parent[path[p]] = root;
      this.#ratio[path[p]] = ratio;
    }
    return { root, ratio };
  }

  held(root: number): boolean {
    return this.#held[root] === 1;
  }

  /** The form over roots that are not held, without what cancels. */
  reduce(form: LinearForm): Map<number, number> {
    const sums = new Map<number, { value: number; size: number }>();
    for (let k = 0; k < form.coordinates.length; k++) {
      const { root, ratio } = this.find(form.coordinates[k]);
      if (this.held(root)) continue;
      const term = form.factors[k] * ratio;
      const sum = sums.get(root);
      if (sum === undefined) sums.set(root, { value: term, size: Math.abs(term) });
      else {
        sum.value += term;
        sum.size += Math.abs(term);
      }
    }
    const row = new Map<number, number>();
    for (const [root, { value, size }] of sums) {
      if (RELATIVE_ZERO * size < Math.abs(value)) row.set(root, value);
    }
    return row;
  }

  /** Follows a form of at most two roots; false for a wider one. */
  absorb(form: LinearForm): boolean {
    if (form.coordinates.length === 1) {
      const { root } = this.find(form.coordinates[0]);
      if (!this.held(root)) this.#hold(root);
      return true;
    }
    if (form.coordinates.length === 2 && this.#absorbPair(form)) return true;
    const row = this.reduce(form);
    if (row.size > 2) return false;
    const [first, second] = row;
    if (first === undefined) return true;
    if (second === undefined) this.#hold(first[0]);
    else if (this.#weight[first[0]] < this.#weight[second[0]]) this.#tie(first, second);
    else this.#tie(second, first);
    return true;
  }

  /** The usual spring, between two trees: nothing can cancel. False where that is not so. */
  #absorbPair({ coordinates, factors }: LinearForm): boolean {
    const a = this.find(coordinates[0]);
    const b = this.find(coordinates[1]);
    if (a.root === b.root || factors[0] * a.ratio === 0 || factors[1] * b.ratio === 0) return false;
    const first = [a.root, factors[0] * a.ratio] as const;
    const second = [b.root, factors[1] * b.ratio] as const;
    if (this.held(a.root) || this.held(b.root)) {
      if (!this.held(a.root)) this.#hold(a.root);
      else if (!this.held(b.root)) this.#hold(b.root);
      return true;
    }
    if (this.#weight[a.root] < this.#weight[b.root]) this.#tie(first, second);
    else this.#tie(second, first);
    return true;
  }

  #hold(root: number): void {
    this.#held[root] = 1;
    this.open--;
  }

  #tie([child, a]: readonly [number, number], [root, b]: readonly [number, number]): void {
    this.open--;
    this.#parent[child] = root;
    this.#ratio[child] = -b / a;
    this.#weight[root] += this.#weight[child];
  }
}

/** Roots that depend on others, as sums over those that stay free. */
function solveRows(rows: readonly Map<number, number>[]): Map<number, Map<number, number>> {
  const solved = new Map<number, Map<number, number>>();
  if (rows.length === 0) return solved;
  const columns = [...new Set(rows.flatMap((row) => [...row.keys()]))].sort((a, b) => a - b);
  const width = columns.length;
  const scale = columns.map((c) => Math.max(...rows.map((row) => Math.abs(row.get(c) ?? 0))));
  const a = rows.map((row) => {
    const dense = Float64Array.from(columns, (c, j) => (row.get(c) ?? 0) / scale[j]);
    const most = dense.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
    return dense.map((x) => x / most);
  });
  const pivots: number[] = [];
  for (let k = 0; k < Math.min(rows.length, width); k++) {
    const [row, column] = largestBelow(a, k, pivots);
    if (row < 0) break;
    [a[k], a[row]] = [a[row], a[k]];
    eliminateColumn(a, k, column);
    pivots.push(column);
  }
  pivots.forEach((column, k) => {
    const sum = new Map<number, number>();
    for (let j = 0; j < width; j++) {
      if (pivots.includes(j) || Math.abs(a[k][j]) <= RELATIVE_ZERO) continue;
      sum.set(columns[j], (-a[k][j] * scale[j]) / scale[column]);
    }
    solved.set(columns[column], sum);
  });
  return solved;
}

function largestBelow(a: readonly Float64Array[], from: number, taken: readonly number[]): [number, number] {
  let size = RELATIVE_ZERO;
  let best: [number, number] = [-1, -1];
  for (let i = from; i < a.length; i++) {
    for (let j = 0; j < a[i].length; j++) {
      if (Math.abs(a[i][j]) > size && !taken.includes(j)) {
        size = Math.abs(a[i][j]);
        best = [i, j];
      }
    }
  }
  return best;
}

/** Gauss-Jordan step: the pivot row gets a 1 in `column`, all others a 0. */
function eliminateColumn(a: Float64Array[], pivotRow: number, column: number): void {
  const pivot = a[pivotRow][column];
  for (let j = 0; j < a[pivotRow].length; j++) a[pivotRow][j] /= pivot;
  for (let i = 0; i < a.length; i++) {
    const factor = a[i][column];
    if (i === pivotRow || factor === 0) continue;
    for (let j = 0; j < a[i].length; j++) a[i][j] -= factor * a[pivotRow][j];
    a[i][column] = 0;
  }
}

function basisOf(
  subset: readonly number[],
  forest: Forest,
  solved: Map<number, Map<number, number>>,
): NullSpace {
  const entries = new Map<number, { at: number[]; by: number[] }>();
  for (const i of subset) {
    const { root } = forest.find(i);
    if (root === i && !forest.held(root) && !solved.has(root)) entries.set(root, { at: [], by: [] });
  }
  for (const i of subset) {
    const { root, ratio } = forest.find(i);
    if (forest.held(root)) continue;
    const sum = solved.get(root) ?? new Map([[root, 1]]);
    for (const [free, factor] of sum) {
      const vector = entries.get(free);
      if (vector === undefined) continue;
      vector.at.push(i);
      vector.by.push(ratio * factor);
    }
  }
  return { free: [...entries.keys()], vectors: [...entries.values()] };
}
