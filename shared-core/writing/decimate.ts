/**
 * Indices of the samples worth drawing when `columns` columns of a picture share them: of each column the first,
 * lowest, highest and last. No peak is lost, however narrow. Of a run of samples without a finite value one is kept,
 * where the curve has its gap.
 *
 * @param column ascending place of sample i in columns from 0, not whole; outside [0, columns] it is not drawn
 * @param values sample values in the picture's own scale (a log scale: logarithms)
 */
export function keepExtremes(
  column: (index: number) => number,
  values: ArrayLike<number>,
  columns: number,
): number[] {
  const kept: number[] = [];
  let current = -1;
  let run: Run | undefined;
  for (let i = 0; i < values.length; i++) {
    const place = column(i);
    if (!(0 <= place && place <= columns)) continue;
    if (!Number.isFinite(values[i])) {
      if (run) keep(run, kept);
      if (run) kept.push(i);
      run = undefined;
      continue;
    }
    const cell = Math.min(columns - 1, Math.floor(place));
    if (run === undefined || cell !== current) {
      if (run) keep(run, kept);
      run = { first: i, last: i, lowest: i, highest: i };
      current = cell;
    }
    run.last = i;
    if (values[i] < values[run.lowest]) run.lowest = i;
    if (values[i] > values[run.highest]) run.highest = i;
  }
  if (run) keep(run, kept);
  return kept;
}

interface Run {
  readonly first: number;
  last: number;
  lowest: number;
  highest: number;
}

function keep(run: Run, kept: number[]): void {
  const ordered = [run.first, run.lowest, run.highest, run.last].sort((a, b) => a - b);
  for (const index of new Set(ordered)) kept.push(index);
}
