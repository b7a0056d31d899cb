/**
 * The exponential of a real square matrix.
 *
 * Method: scaling and squaring with diagonal Padé approximants of degree 3 to 13 (Higham, SIAM J. Matrix Anal.
 * Appl. 26, 2005, algorithm 2.3); symbols as there. Backward error of order ε in exact squaring; squaring may
 * lose digits for strongly non-normal A, as with every method of this kind.
 */
import { type Kernel, kernelFor } from "./kernel.ts";
import { factorLu, solveLu } from "./lu.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite, identity, norm1 } from "./products.ts";

/** Largest ‖A‖₁ for which each degree is accurate to ε: table 2.3 of the source. */
const THETA: readonly (readonly [degree: number, theta: number])[] = [
  [3, 1.495585217958292e-2],
  [5, 2.53939833006323e-1],
  [7, 9.504178996162932e-1],
  [9, 2.097847961257068],
];
const THETA_13 = 5.371920351148152;
/** e^709.8 overflows; ‖A‖₁ may be far larger with a finite exponential, but then squarings are endless. */
const SQUARING_CAP = 60;

const COEFFICIENTS: Readonly<Record<number, readonly number[]>> = {
  3: [120, 60, 12, 1],
  5: [30240, 15120, 3360, 420, 30, 1],
  7: [17297280, 8648640, 1995840, 277200, 25200, 1512, 56, 1],
  9: [17643225600, 8821612800, 2075673600, 302702400, 30270240, 2162160, 110880, 3960, 90, 1],
  13: [
    64764752532480000, 32382376266240000, 7771770303897600, 1187353796428800, 129060195264000, 10559470521600,
    670442572800, 33522128640, 1323241920, 40840800, 960960, 16380, 182, 1,
  ],
};

/** e^A for A n×n row-major (kept). Fails on input or a result that is not finite. */
export function matrixExponential(
  a: Float64Array,
  n: number,
  kernel: Kernel = kernelFor(n),
): Outcome<Float64Array> {
  if (!allFinite(a)) return fail("the matrix holds a value that is not finite");
  const norm = norm1(a, n, n);
  const times = (x: Float64Array, y: Float64Array) => {
    const out = new Float64Array(n * n);
    kernel.product(whole(x, n), whole(y, n), whole(out, n), n, n, n);
    return out;
  };
  const small = THETA.find(([, theta]) => norm <= theta);
  if (small) return pade(a, n, small[0], times);
  const squarings = Math.max(0, Math.ceil(Math.log2(norm / THETA_13)));
  if (squarings > SQUARING_CAP) return fail("the norm of the matrix is too large for its exponential");
  const scaled = a.map((v) => v * 2 ** -squarings);
  const start = pade(scaled, n, 13, times);
  if (!start.ok) return start;
  let x = start.value;
  for (let s = 0; s < squarings; s++) x = times(x, x);
  return allFinite(x) ? succeed(x) : fail("the exponential of the matrix overflows");
}

function whole(data: Float64Array, n: number) {
  return { data, at: 0, stride: n };
}

/** r_m(A) = (V − U)⁻¹ (V + U), U the odd and V the even part of the numerator. */
function pade(
  a: Float64Array,
  n: number,
  degree: number,
  times: (x: Float64Array, y: Float64Array) => Float64Array,
): Outcome<Float64Array> {
  const b = COEFFICIENTS[degree];
  const a2 = times(a, a);
  const powers = [identity(n), a2];
  while (2 * powers.length <= Math.min(degree, 7)) powers.push(times(powers[powers.length - 1], a2));
  let odd: Float64Array;
  let even: Float64Array;
  if (degree === 13) {
    const a6 = powers[3];
    odd = sum([b[1], b[3], b[5], b[7]], powers);
    even = sum([b[0], b[2], b[4], b[6]], powers);
    add(odd, times(a6, sum([0, b[9], b[11], b[13]], powers)));
    add(even, times(a6, sum([0, b[8], b[10], b[12]], powers)));
  } else {
    if (degree === 9) powers.push(times(powers[2], powers[2]));
    odd = sum(
      powers.map((_, i) => b[2 * i + 1]),
      powers,
    );
    even = sum(
      powers.map((_, i) => b[2 * i]),
      powers,
    );
  }
  const u = times(a, odd);
  const above = even.map((v, p) => v + u[p]);
  const below = even.map((v, p) => v - u[p]);
  const lu = factorLu(below, n);
  return lu.ok ? succeed(solveLu(lu.value, above, n)) : fail(lu.reason);
}

function sum(weights: readonly number[], matrices: readonly Float64Array[]): Float64Array {
  const out = new Float64Array(matrices[0].length);
  for (let m = 0; m < weights.length; m++) {
    const weight = weights[m];
    const matrix = matrices[m];
    for (let p = 0; p < out.length; p++) out[p] += weight * matrix[p];
  }
  return out;
}

function add(to: Float64Array, more: Float64Array): void {
  for (let p = 0; p < to.length; p++) to[p] += more[p];
}
