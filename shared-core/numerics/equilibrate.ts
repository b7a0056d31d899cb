/**
 * Row and column scales that bring every row and column of a matrix to a largest entry of about one.
 *
 * Mixed units (translations beside rotations) spread the entries of a sound matrix over many decades; pivots
 * and "zero" are therefore judged on R A C. Scales are powers of two, so scaling is exact.
 * Source: Golub & Van Loan, Matrix Computations, 4th ed., §3.5.2; power-of-two scales as common practice.
 */

/** The power of two nearest below `size`, inverted; 1 for zero. */
function inversePowerOfTwo(size: number): number {
  if (size === 0) return 1;
  // The exponent is clamped so that neither the scale nor its inverse leaves the normal range.
  const exponent = Math.max(-1000, Math.min(1000, Math.floor(Math.log2(size))));
  return 2 ** -exponent;
}

/**
 * Fills `rowScale` and `columnScale` (n each) for a real matrix `re`, or a complex one when `im` is given.
 * Magnitudes are |re| + |im|. A zero row or column keeps the scale 1.
 */
export function equilibrationScales(
  re: Float64Array,
  im: Float64Array | undefined,
  n: number,
  rowScale: Float64Array,
  columnScale: Float64Array,
): void {
  columnScale.fill(0);
  for (let i = 0; i < n; i++) {
    const at = i * n;
    let most = 0;
    for (let j = 0; j < n; j++) {
      const size = Math.abs(re[at + j]) + (im ? Math.abs(im[at + j]) : 0);
      if (most < size) most = size;
    }
    rowScale[i] = inversePowerOfTwo(most);
    for (let j = 0; j < n; j++) {
      const size = (Math.abs(re[at + j]) + (im ? Math.abs(im[at + j]) : 0)) * rowScale[i];
      if (columnScale[j] < size) columnScale[j] = size;
    }
  }
  for (let j = 0; j < n; j++) columnScale[j] = inversePowerOfTwo(columnScale[j]);
}
