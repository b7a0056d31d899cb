/** Steady states at many frequencies at once, where a model has a quick way to them. */
import type { GroupState } from "./frequency-quantity.ts";

/** One group's phasors of all coordinates at neighbouring points of an axis. */
export interface StateBlock {
  /** Points there is room for, and the distance of the rows. */
  readonly lanes: number;
  readonly stride: number;
  /** rad/s, of the group's own frequency, one a lane. */
  readonly omega: Float64Array;
  /** Coordinate i stands in row `row[i]`. */
  readonly row: Int32Array;
  /** Lane l of a row at row * stride + l. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** 0 where this way gave nothing and the point has to be solved by itself. */
  readonly good: Uint8Array;
}

/**
 * Solves axis[from] and those after it, as many as there are lanes; lanes beyond the end of the axis hold the last
 * point. The block is overwritten by the next call.
 */
export type BlockSolver = (axisHz: Float64Array, from: number) => StateBlock;

/** Puts the motions of one lane into a state whose frequency and supports are already those of the lane. */
export function takeLane({ stride, row, re, im }: StateBlock, lane: number, { xRe, xIm }: GroupState): void {
  for (let i = 0; i < row.length; i++) {
    const at = row[i] * stride + lane;
    xRe[i] = re[at];
    xIm[i] = im[at];
  }
}
