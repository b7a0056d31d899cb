/**
 * Sparse real matrices in compressed rows (CSR): made from triplets, multiplied, and turned into other shapes.
 *
 * Duplicates are summed in the order given and columns ascend within a row, so the same triplets give the same
 * bits whatever else happens.
 */

export type SparseMatrix = {
  rows: number;
  columns: number;
  /** Entries of row i stand at rowStart[i] … rowStart[i + 1] − 1; length rows + 1. */
  rowStart: Int32Array;
  /** Column of each entry, ascending within a row. */
  column: Int32Array;
  value: Float64Array;
};

/** Symmetric band, lower part: entry (i, j), i − bandwidth ≤ j ≤ i, at i·(bandwidth + 1) + j − i + bandwidth. */
export type SymmetricBand = { n: number; bandwidth: number; values: Float64Array };

/** One entry; several for one place add up. */
export type Triplets = { row: ArrayLike<number>; column: ArrayLike<number>; value: ArrayLike<number> };

/** Gathers triplets; places that sum to exactly zero stay in the pattern. */
export function sparseFromTriplets(rows: number, columns: number, triplets: Triplets): SparseMatrix {
  const { row, column, value } = triplets;
  // Two stable counting sorts, by column then by row: linear work and a fixed order of sums.
  const byColumn = countingSort(columns, row.length, (t) => column[t], undefined);
  const order = countingSort(rows, row.length, (t) => row[t], byColumn);
  const rowStart = new Int32Array(rows + 1);
  const outColumn = new Int32Array(row.length);
  const outValue = new Float64Array(row.length);
  let count = 0;
  let lastRow = -1;
  let lastColumn = -1;
  for (const t of order) {
    if (row[t] === lastRow && column[t] === lastColumn) {
      outValue[count - 1] += value[t];
      continue;
    }
    lastRow = row[t];
    lastColumn = column[t];
    outColumn[count] = lastColumn;
    outValue[count] = value[t];
    count++;
    rowStart[lastRow + 1]++;
  }
  for (let i = 0; i < rows; i++) rowStart[i + 1] += rowStart[i];
  return { rows, columns, rowStart, column: outColumn.slice(0, count), value: outValue.slice(0, count) };
}

function countingSort(
  buckets: number,
  count: number,
  key: (t: number) => number,
  order: Int32Array | undefined,
): Int32Array {
  const start = new Int32Array(buckets + 1);
  for (let t = 0; t < count; t++) start[key(t) + 1]++;
  for (let b = 0; b < buckets; b++) start[b + 1] += start[b];
  const out = new Int32Array(count);
  for (let s = 0; s < count; s++) {
    const t = order ? order[s] : s;
    out[start[key(t)]++] = t;
  }
  return out;
}

/** The non-zero entries of a dense row-major matrix. */
export function sparseFromDense(a: Float64Array, rows: number, columns: number): SparseMatrix {
  const rowStart = new Int32Array(rows + 1);
  let count = 0;
  for (let p = 0; p < rows * columns; p++) if (a[p] !== 0) count++;
  const column = new Int32Array(count);
  const value = new Float64Array(count);
  let at = 0;
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) {
      if (a[i * columns + j] === 0) continue;
      column[at] = j;
      value[at++] = a[i * columns + j];
    }
    rowStart[i + 1] = at;
  }
  return { rows, columns, rowStart, column, value };
}

/** Row-major rows×columns. */
export function sparseToDense(a: SparseMatrix): Float64Array {
  const out = new Float64Array(a.rows * a.columns);
  for (let i = 0; i < a.rows; i++) {
    for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) out[i * a.columns + a.column[p]] = a.value[p];
  }
  return out;
}

/** y = A x; `out` (rows) may not be x. */
export function sparseTimesVector(
  a: SparseMatrix,
  x: Float64Array,
  out: Float64Array = new Float64Array(a.rows),
): Float64Array {
  for (let i = 0; i < a.rows; i++) {
    let sum = 0;
    for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) sum += a.value[p] * x[a.column[p]];
    out[i] = sum;
  }
  return out;
}

/**
 * The lower part of a symmetric matrix as a band, coordinates taken in `order` (place t holds coordinate
 * order[t]). Entries outside `bandwidth` are an error of the caller and left out.
 */
export function sparseToBand(a: SparseMatrix, bandwidth: number, order?: Int32Array): SymmetricBand {
  const n = a.rows;
  const place = new Int32Array(n);
  for (let t = 0; t < n; t++) place[order ? order[t] : t] = t;
  const width = bandwidth + 1;
  const values = new Float64Array(n * width);
  for (let i = 0; i < n; i++) {
    for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) {
      const down = place[i] - place[a.column[p]];
      if (0 <= down && down <= bandwidth) values[place[i] * width + bandwidth - down] = a.value[p];
    }
  }
  return { n, bandwidth, values };
}
