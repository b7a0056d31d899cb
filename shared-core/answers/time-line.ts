/** The instants at which any drive changes its closed form, and which piece of each holds between them. */
import type { Signal } from "./drive-signal.ts";

export interface TimeLine {
  /** 0 = edges[0] < ... < edges[M] = duration, s. */
  readonly edges: Float64Array;
  /** For each signal, the piece that holds in each of the M segments. */
  readonly pieces: readonly Int32Array[];
  /** The lowest derivative of any input that jumps at each edge; 4: none that matters. Impulses count as 0. */
  readonly jumps: Uint8Array;
  /** Impulses by edge: [signal, size]. */
  readonly impulses: ReadonlyMap<number, readonly (readonly [number, number])[]>;
}

/** Instants closer than this share of the duration are one: sums of sample times round so. */
const SAME_INSTANT = 1e-13;

export function timeLine(signals: readonly Signal[], duration: number): TimeLine {
  const same = SAME_INSTANT * duration;
  const edges = mergedEdges(signals, duration, same);
  const segments = edges.length - 1;
  const jumps = new Uint8Array(edges.length).fill(4);
  const pieces = signals.map((signal) => {
    const of = new Int32Array(segments);
    let piece = 0;
    for (let i = 0; i < segments; i++) {
      const before = piece;
      while (piece + 1 < signal.starts.length && signal.starts[piece + 1] <= edges[i] + same) {
        piece++;
        jumps[i] = Math.min(jumps[i], signal.jumps[piece]);
      }
      if (i === 0 && before === piece) jumps[0] = Math.min(jumps[0], signal.jumps[0]);
      of[i] = piece;
    }
    return of;
  });
  const impulses = new Map<number, [number, number][]>();
  signals.forEach((signal, j) => {
    for (const { time, size } of signal.impulses) {
      const edge = nearestEdge(edges, time);
      if (edge === segments || Math.abs(edges[edge] - time) > same) continue;
      impulses.set(edge, [...(impulses.get(edge) ?? []), [j, size]]);
      jumps[edge] = 0;
    }
  });
  return { edges, pieces, jumps, impulses };
}

/** Index of the segment that holds `time`: edges[i] <= time < edges[i + 1], the last one for the end. */
export function segmentAt(edges: Float64Array, time: number): number {
  let lo = 0;
  let hi = edges.length - 1;
  while (hi - lo > 1) {
    const middle = (lo + hi) >> 1;
    if (edges[middle] <= time) lo = middle;
    else hi = middle;
  }
  return lo;
}

function mergedEdges(signals: readonly Signal[], duration: number, same: number): Float64Array {
  let total = 2;
  for (const signal of signals) total += signal.starts.length + signal.impulses.length;
  const all = new Float64Array(total);
  let used = 0;
  all[used++] = duration;
  for (const { starts, impulses } of signals) {
    for (let i = 0; i < starts.length; i++) if (starts[i] < duration - same) all[used++] = starts[i];
    for (const { time } of impulses) if (time < duration - same) all[used++] = time;
  }
  // One record alone is in order but for the end put in front; sorting that many takes longer than looking.
  all.copyWithin(0, 1, used);
  all[used - 1] = duration;
  const sorted = ascending(all.subarray(0, used));
  const edges = new Float64Array(used + 1);
  let count = 1;
  for (let i = 0; i < used; i++) if (sorted[i] - edges[count - 1] > same) edges[count++] = sorted[i];
  edges[count - 1] = duration;
  return edges.subarray(0, Math.max(2, count));
}

function ascending(values: Float64Array): Float64Array {
  for (let i = 1; i < values.length; i++) if (!(values[i - 1] <= values[i])) return values.sort();
  return values;
}

function nearestEdge(edges: Float64Array, time: number): number {
  const i = segmentAt(edges, time);
  return Math.abs(edges[i + 1] - time) < Math.abs(edges[i] - time) ? i + 1 : i;
}
