/** Lowest and highest values of any stretch of a row, without looking at each of its samples. NaN is no value. */
export class Pyramid {
  readonly values: ArrayLike<number>;
  /** Level k holds extremes of BLOCK^(k+1) samples each. */
  readonly #lows: Float64Array[] = [];
  readonly #highs: Float64Array[] = [];

  constructor(values: ArrayLike<number>) {
    this.values = values;
    let [lows, highs]: [ArrayLike<number>, ArrayLike<number>] = [values, values];
    while (lows.length > BLOCK) {
      const next = folded(lows, highs);
      this.#lows.push(next[0]);
      this.#highs.push(next[1]);
      [lows, highs] = next;
    }
  }

  /**
   * Extremes of samples `from` up to but not including `to`, written to `out` as [lowest, highest];
   * Infinity and -Infinity where there is no value.
   */
  extremes(from: number, to: number, out: Float64Array): void {
    out[0] = Number.POSITIVE_INFINITY;
    out[1] = Number.NEGATIVE_INFINITY;
    let [lows, highs]: [ArrayLike<number>, ArrayLike<number>] = [this.values, this.values];
    let [start, end, level] = [from, to, 0];
    while (start < end) {
      const more = level < this.#lows.length && end - start > 2 * BLOCK;
      const inner = more ? Math.ceil(start / BLOCK) * BLOCK : end;
      const outer = more ? Math.floor(end / BLOCK) * BLOCK : end;
      take(lows, highs, start, inner, out);
      if (!more) return;
      take(lows, highs, outer, end, out);
      start = inner / BLOCK;
      end = outer / BLOCK;
      lows = this.#lows[level];
      highs = this.#highs[level];
      level++;
    }
  }
}

const BLOCK = 16;

function folded(lows: ArrayLike<number>, highs: ArrayLike<number>): [Float64Array, Float64Array] {
  const length = Math.ceil(lows.length / BLOCK);
  const [low, high] = [new Float64Array(length), new Float64Array(length)];
  const pair = new Float64Array(2);
  for (let i = 0; i < length; i++) {
    pair[0] = Number.POSITIVE_INFINITY;
    pair[1] = Number.NEGATIVE_INFINITY;
    take(lows, highs, i * BLOCK, Math.min(lows.length, (i + 1) * BLOCK), pair);
    low[i] = pair[0];
    high[i] = pair[1];
  }
  return [low, high];
}

function take(
  lows: ArrayLike<number>,
  highs: ArrayLike<number>,
  from: number,
  to: number,
  out: Float64Array,
): void {
  for (let i = from; i < to; i++) {
    if (lows[i] < out[0]) out[0] = lows[i];
    if (highs[i] > out[1]) out[1] = highs[i];
  }
}

/** First index whose value is at least `x`; the length when there is none. `values` ascend. */
export function firstFrom(values: ArrayLike<number>, x: number): number {
  let [low, high] = [0, values.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (values[middle] < x) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Index of the value nearest to `x`; -1 in an empty row. */
export function nearestTo(values: ArrayLike<number>, x: number): number {
  const right = firstFrom(values, x);
  if (right === values.length) return right - 1;
  return right > 0 && x - values[right - 1] <= values[right] - x ? right - 1 : right;
}
