/**
 * Least and greatest values of a row over runs of 4, 16, 64 ... samples, so that a picture of any part of it costs
 * as much as its own width and loses no peak. What is not finite is passed over.
 */
export interface Pyramid {
  readonly values: Float64Array;
  /** Level k holds runs of 4^(k+1) samples. */
  readonly levels: readonly { readonly least: Float64Array; readonly greatest: Float64Array }[];
}

const RUN = 4;

export function pyramidOf(values: Float64Array): Pyramid {
  const levels: { least: Float64Array; greatest: Float64Array }[] = [];
  let below = { least: values, greatest: values };
  while (below.least.length > RUN) {
    const count = Math.ceil(below.least.length / RUN);
    const level = {
      least: new Float64Array(count).fill(Number.POSITIVE_INFINITY),
      greatest: new Float64Array(count).fill(Number.NEGATIVE_INFINITY),
    };
    for (let i = 0; i < below.least.length; i++) {
      const run = Math.floor(i / RUN);
      if (below.least[i] < level.least[run]) level.least[run] = below.least[i];
      if (below.greatest[i] > level.greatest[run]) level.greatest[run] = below.greatest[i];
    }
    levels.push(level);
    below = level;
  }
  return { values, levels };
}

/** Least and greatest of samples `from` to `to` (exclusive); undefined where none is finite. */
export function extremesOf(
  { values, levels }: Pyramid,
  from: number,
  to: number,
): { readonly least: number; readonly greatest: number } | undefined {
  let [least, greatest] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  let [low, high] = [Math.max(0, from), Math.min(values.length, to)];
  for (let k = -1; low < high; k++) {
    const row = k < 0 ? { least: values, greatest: values } : levels[k];
    const isTop = k === levels.length - 1;
    const take = (i: number): void => {
      if (row.least[i] < least) least = row.least[i];
      if (row.greatest[i] > greatest) greatest = row.greatest[i];
    };
    while (low < high && (isTop || low % RUN !== 0)) take(low++);
    while (low < high && high % RUN !== 0) take(--high);
    [low, high] = [low / RUN, high / RUN];
  }
  return least <= greatest ? { least, greatest } : undefined;
}
