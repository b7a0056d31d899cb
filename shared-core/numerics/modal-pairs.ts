/** Damped values with their vectors while still in the coordinates of a solution method. */

/** Values and vectors in basis coordinates: `rows` holds one vector (n) a value, real and imaginary parts. */
export type Pairs = { re: Float64Array; im: Float64Array; rowsRe: Float64Array; rowsIm: Float64Array };

/** λ² + d λ + ω² = 0 mode by mode (`lambda` holds ω²), by the formula that loses no digits. */
export function closedForm(lambda: Float64Array, damping: (j: number) => number): Pairs {
  const n = lambda.length;
  const re = new Float64Array(2 * n);
  const im = new Float64Array(2 * n);
  const rowsRe = new Float64Array(2 * n * n);
  for (let j = 0; j < n; j++) {
    const d = damping(j);
    const half = 0.5 * d;
    const root = Math.sqrt(Math.abs(lambda[j]));
    const inner = lambda[j] > 0 ? (half - root) * (half + root) : half * half - lambda[j];
    if (inner < 0) {
      re[2 * j] = re[2 * j + 1] = -half;
      im[2 * j] = Math.sqrt(-inner);
      im[2 * j + 1] = -im[2 * j];
    } else {
      const large = -(half + (half >= 0 ? 1 : -1) * Math.sqrt(inner));
      re[2 * j] = large === 0 ? 0 : lambda[j] / large;
      re[2 * j + 1] = large;
    }
    rowsRe[2 * j * n + j] = rowsRe[(2 * j + 1) * n + j] = 1;
  }
  return { re, im, rowsRe, rowsIm: new Float64Array(2 * n * n) };
}
