/**
 * The functions phi_k of exponential integrators: phi_0(z) = e^z, phi_k(z) = integral from 0 to 1 of
 * e^((1 - s) z) s^(k-1) / (k-1)! ds, so that phi_(k+1)(z) = (phi_k(z) - 1/k!) / z.
 * Source: Hochbruck & Ostermann, Exponential integrators, Acta Numerica 19 (2010), section 2.1.
 */

/** Below this |z| the series is summed; above, the recurrence loses no more than |z|^-k k! roundings. */
const SERIES_RADIUS = 2;
/** Terms of the series: 2^32 / 32! is below 1e-25. */
const SERIES_TERMS = 32;

/**
 * phi_0 .. phi_last of z = zr + i zi into `re` and `im` (each at least last + 1 long). Error: a few roundings
 * below |z| = 2, then k! / 2^k roundings at worst, so 1e-12 up to k = 10.
 */
export function phiFunctions(zr: number, zi: number, last: number, re: Float64Array, im: Float64Array): void {
  const size = Math.exp(zr);
  re[0] = size * Math.cos(zi);
  im[0] = size * Math.sin(zi);
  const square = zr * zr + zi * zi;
  if (square < SERIES_RADIUS * SERIES_RADIUS) {
    fromSeries(zr, zi, last, re, im);
    return;
  }
  let inverseFactorial = 1;
  for (let k = 0; k < last; k++) {
    if (k > 0) inverseFactorial /= k;
    const ar = re[k] - inverseFactorial;
    const ai = im[k];
    re[k + 1] = (ar * zr + ai * zi) / square;
    im[k + 1] = (ai * zr - ar * zi) / square;
  }
}

/** The highest one by its series sum z^j / (j + k)!, the lower ones by the stable backward recurrence. */
function fromSeries(zr: number, zi: number, last: number, re: Float64Array, im: Float64Array): void {
  if (last === 0) return;
  let factorial = 1;
  for (let k = 2; k <= last; k++) factorial *= k;
  let sumRe = 0;
  let sumIm = 0;
  for (let j = SERIES_TERMS; j > 0; j--) {
    // Horner in z / (j + last): 1 + z/(last+1) (1 + z/(last+2) ( ... )).
    const tr = 1 + sumRe;
    const ti = sumIm;
    sumRe = (tr * zr - ti * zi) / (last + j);
    sumIm = (tr * zi + ti * zr) / (last + j);
  }
  re[last] = (1 + sumRe) / factorial;
  im[last] = sumIm / factorial;
  for (let k = last - 1; k >= 1; k--) {
    factorial /= k + 1;
    re[k] = re[k + 1] * zr - im[k + 1] * zi + 1 / factorial;
    im[k] = re[k + 1] * zi + im[k + 1] * zr;
  }
}

/**
 * Response at tau of x' = lambda x + e^(i omega s), x(0) = 0: (e^(i omega tau) - e^(lambda tau)) / (i omega - lambda),
 * and tau e^(lambda tau) where both rates agree. Into out[0], out[1].
 */
export function sineResponse(
  lambdaRe: number,
  lambdaIm: number,
  omega: number,
  tau: number,
  out: Float64Array,
): void {
  const dr = -lambdaRe;
  const di = omega - lambdaIm;
  const zr = dr * tau;
  const zi = di * tau;
  const growth = Math.exp(lambdaRe * tau);
  const er = growth * Math.cos(lambdaIm * tau);
  const ei = growth * Math.sin(lambdaIm * tau);
  if (zr * zr + zi * zi < 1) {
    phiFunctions(zr, zi, 1, scratchRe, scratchIm);
    const pr = scratchRe[1] * tau;
    const pi = scratchIm[1] * tau;
    out[0] = er * pr - ei * pi;
    out[1] = er * pi + ei * pr;
    return;
  }
  const nr = Math.cos(omega * tau) - er;
  const ni = Math.sin(omega * tau) - ei;
  const square = dr * dr + di * di;
  out[0] = (nr * dr + ni * di) / square;
  out[1] = (ni * dr - nr * di) / square;
}

const scratchRe = new Float64Array(2);
const scratchIm = new Float64Array(2);
