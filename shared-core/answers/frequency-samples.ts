/** The states of a steady solution along a search axis, solved once for all quantities that are asked about. */
import type { GroupState } from "./frequency-quantity.ts";
import type { SteadySolution } from "./frequency-solution.ts";

export interface SampledStates {
  /** Hz, ascending. */
  readonly axis: Float64Array;
  /** States at axis[i]; undefined where there is no steady response. Overwritten by the next call. */
  at(i: number): readonly GroupState[] | undefined;
}

/** Numbers kept; longer tables are solved anew for every quantity. */
const ROOM = 6_000_000;

export function sampledStates(solution: SteadySolution, axis: Float64Array): SampledStates {
  const first = solution.quick(axis[0]);
  const groups = first.ok ? first.value : undefined;
  const width = (groups ?? []).reduce((sum, g) => sum + 2 * (g.xRe.length + g.sRe.length) + 1, 0);
  const solve = (i: number) => {
    const got = solution.quick(axis[i]);
    return got.ok ? got.value : undefined;
  };
  if (groups === undefined || width * axis.length > ROOM) return { axis, at: solve };
  const kept = new Float64Array(width * axis.length);
  const known = new Int8Array(axis.length);
  return {
    axis,
    at(i) {
      if (known[i] === 1) {
        readStates(kept, i * width, groups);
        return groups;
      }
      const states = known[i] === 0 ? solve(i) : undefined;
      known[i] = states === undefined ? -1 : 1;
      if (states !== undefined) writeStates(kept, i * width, states);
      return states;
    },
  };
}

function writeStates(kept: Float64Array, at: number, states: readonly GroupState[]): void {
  let next = at;
  for (const { omega, xRe, xIm, sRe, sIm } of states) {
    kept[next++] = omega;
    for (const part of [xRe, xIm, sRe, sIm]) {
      kept.set(part, next);
      next += part.length;
    }
  }
}

function readStates(kept: Float64Array, at: number, states: readonly GroupState[]): void {
  let next = at;
  for (const state of states) {
    state.omega = kept[next++];
    for (const part of [state.xRe, state.xIm, state.sRe, state.sIm]) {
      part.set(kept.subarray(next, next + part.length));
      next += part.length;
    }
  }
}
