/**
 * Reverse Cuthill-McKee ordering of a symmetric pattern, to bring its entries near the diagonal.
 *
 * Source: George & Liu, Computer Solution of Large Sparse Positive Definite Systems, 1981, ch. 4; start nodes
 * by the pseudo-peripheral search given there. Unconnected parts follow one another. Ties go to the lower
 * number, so the order is reproducible.
 */
import type { SparseMatrix } from "./sparse.ts";

/** Neighbours of node i stand at start[i] … start[i + 1] − 1; the diagonal may be present and is ignored. */
export type Adjacency = { start: Int32Array; neighbour: Int32Array };

/** Rounds of the search for a far-off start node; it ends by itself, this is the cap. */
const SEARCH_CAP = 20;

/** The pattern that all given square matrices share, made symmetric. */
export function patternOf(matrices: readonly SparseMatrix[], n: number): Adjacency {
  const sets: Set<number>[] = Array.from({ length: n }, () => new Set());
  for (const a of matrices) {
    for (let i = 0; i < n; i++) {
      for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) {
        const j = a.column[p];
        if (j === i) continue;
        sets[i].add(j);
        sets[j].add(i);
      }
    }
  }
  const start = new Int32Array(n + 1);
  for (let i = 0; i < n; i++) start[i + 1] = start[i] + sets[i].size;
  const neighbour = new Int32Array(start[n]);
  for (let i = 0; i < n; i++)
    neighbour.set(
      [...sets[i]].sort((p, q) => p - q),
      start[i],
    );
  return { start, neighbour };
}

/** Place t of the new numbering holds old node `order[t]`. */
export function reverseCuthillMcKee(adjacency: Adjacency): Int32Array {
  const { start, neighbour } = adjacency;
  const n = start.length - 1;
  const degree = new Int32Array(n).map((_, i) => start[i + 1] - start[i]);
  const order = new Int32Array(n);
  const placed = new Uint8Array(n);
  const mark = new Int32Array(n);
  let count = 0;
  let stamp = 0;
  for (let seed = 0; seed < n; seed++) {
    if (placed[seed]) continue;
    let root = seed;
    let level = levels(adjacency, root, mark, ++stamp);
    for (let round = 0; round < SEARCH_CAP; round++) {
      let far = level.last[0];
      for (const node of level.last) if (degree[node] < degree[far]) far = node;
      const next = levels(adjacency, far, mark, ++stamp);
      if (next.depth <= level.depth) break;
      root = far;
      level = next;
    }
    placed[root] = 1;
    order[count++] = root;
    for (let head = count - 1; head < count; head++) {
      const node = order[head];
      const fresh: number[] = [];
      for (let p = start[node]; p < start[node + 1]; p++) {
        const other = neighbour[p];
        if (placed[other]) continue;
        placed[other] = 1;
        fresh.push(other);
      }
      fresh.sort((a, b) => degree[a] - degree[b] || a - b);
      for (const other of fresh) order[count++] = other;
    }
  }
  return order.reverse();
}

/** Breadth-first levels from `root`: how many, and the nodes of the last. */
function levels(
  adjacency: Adjacency,
  root: number,
  mark: Int32Array,
  stamp: number,
): { depth: number; last: number[] } {
  let last = [root];
  mark[root] = stamp;
  for (let depth = 1; ; depth++) {
    const next: number[] = [];
    for (const node of last) {
      for (let p = adjacency.start[node]; p < adjacency.start[node + 1]; p++) {
        const other = adjacency.neighbour[p];
        if (mark[other] === stamp) continue;
        mark[other] = stamp;
        next.push(other);
      }
    }
    if (next.length === 0) return { depth, last };
    last = next;
  }
}

/** Largest |place of i − place of j| over the pattern, with the coordinates in `order` or as they are. */
export function bandwidthOf(adjacency: Adjacency, order?: Int32Array): number {
  const n = adjacency.start.length - 1;
  const place = new Int32Array(n);
  for (let t = 0; t < n; t++) place[order ? order[t] : t] = t;
  let most = 0;
  for (let i = 0; i < n; i++) {
    for (let p = adjacency.start[i]; p < adjacency.start[i + 1]; p++) {
      most = Math.max(most, Math.abs(place[i] - place[adjacency.neighbour[p]]));
    }
  }
  return most;
}

/**
 * An order that makes all the given dense symmetric matrices (n×n) tridiagonal at once, if there is one: no
 * coordinate has more than two neighbours and nothing closes to a ring. Parts follow one another.
 */
export function pathThrough(matrices: readonly Float64Array[], n: number): Int32Array | undefined {
  const neighbours = new Int32Array(2 * n).fill(-1);
  const degree = new Int32Array(n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      if (!touches(matrices, i * n + j)) continue;
      if (degree[i] === 2 || degree[j] === 2) return undefined;
      neighbours[2 * i + degree[i]++] = j;
      neighbours[2 * j + degree[j]++] = i;
    }
  }
  const order = new Int32Array(n);
  const placed = new Uint8Array(n);
  let count = 0;
  for (let end = 0; end < n; end++) {
    if (placed[end] || degree[end] === 2) continue;
    for (let at = end; at >= 0; ) {
      placed[at] = 1;
      order[count++] = at;
      const [a, b] = [neighbours[2 * at], neighbours[2 * at + 1]];
      at = a >= 0 && !placed[a] ? a : b >= 0 && !placed[b] ? b : -1;
    }
  }
  return count === n ? order : undefined;
}

function touches(matrices: readonly Float64Array[], at: number): boolean {
  for (let m = 0; m < matrices.length; m++) if (matrices[m][at] !== 0) return true;
  return false;
}
