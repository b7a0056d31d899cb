/**
 * Counter-based random numbers: a number is a pure function of (seed, draw, sample), so a study split over
 * workers, or run in another order, gives the same numbers.
 *
 * Method: Philox-4×32-10 (Salmon, Moraes, Dror & Shaw, Parallel random numbers: as easy as 1, 2, 3, SC11).
 */

const MULTIPLIER_0 = 0xd2511f53;
const MULTIPLIER_1 = 0xcd9e8d57;
/** Weyl increments of the key: golden ratio and √3 − 1, as published. */
const WEYL_0 = 0x9e3779b9;
const WEYL_1 = 0xbb67ae85;
const ROUNDS = 10;

/** The four 32-bit words of the Philox block of a 128-bit counter and a 64-bit key, into `out` (length 4). */
export function philox(
  counter0: number,
  counter1: number,
  counter2: number,
  counter3: number,
  key0: number,
  key1: number,
  out: Uint32Array,
): void {
  let c0 = counter0;
  let c1 = counter1;
  let c2 = counter2;
  let c3 = counter3;
  let k0 = key0;
  let k1 = key1;
  for (let round = 0; round < ROUNDS; round++) {
    const high0 = highWord(MULTIPLIER_0, c0);
    const high1 = highWord(MULTIPLIER_1, c2);
    const low0 = Math.imul(MULTIPLIER_0, c0) >>> 0;
    const low1 = Math.imul(MULTIPLIER_1, c2) >>> 0;
    c0 = (high1 ^ c1 ^ k0) >>> 0;
    c1 = low1;
    c2 = (high0 ^ c3 ^ k1) >>> 0;
    c3 = low0;
    k0 = (k0 + WEYL_0) >>> 0;
    k1 = (k1 + WEYL_1) >>> 0;
  }
  out[0] = c0;
  out[1] = c1;
  out[2] = c2;
  out[3] = c3;
}

/** Upper 32 bits of the 64-bit product, from 16-bit halves so that every step is exact in a double. */
function highWord(a: number, b: number): number {
  const al = a & 0xffff;
  const ah = a >>> 16;
  const bl = b & 0xffff;
  const bh = b >>> 16;
  const cross = ah * bl + Math.floor((al * bl) / 65536);
  const middle = al * bh + (cross % 65536);
  return (ah * bh + Math.floor(cross / 65536) + Math.floor(middle / 65536)) >>> 0;
}

/**
 * A uniform number strictly between 0 and 1, 52 bits fine. `seed` is any safe integer; `draw` names the
 * quantity drawn, `sample` the repetition, both from 0 to 2⁵³ − 1.
 */
export function uniform(seed: number, draw: number, sample: number): number {
  philox(low(sample), high(sample), low(draw), high(draw), low(seed), high(seed), words);
  // 52 bits and a half step: neither 0 nor 1 can come out.
  return ((words[0] >>> 6) * 2 ** 26 + (words[1] >>> 6) + 0.5) / 2 ** 52;
}

/** Room for one block, kept so that a draw allocates nothing; never read before it is written. */
const words = new Uint32Array(4);

/** A standard normal number (mean 0, deviation 1) by inversion of the distribution. */
export function normal(seed: number, draw: number, sample: number): number {
  return normalQuantile(uniform(seed, draw, sample));
}

function low(x: number): number {
  return x >>> 0;
}

function high(x: number): number {
  return Math.floor(x / 2 ** 32) >>> 0;
}

/**
 * Inverse of the standard normal distribution function; ∓∞ at 0 and 1, NaN outside.
 * Method: Wichura, Algorithm AS 241 (PPND16), Applied Statistics 37, 1988; relative error about 1e−16.
 */
export function normalQuantile(p: number): number {
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * horner(CENTRAL_ABOVE, r)) / horner(CENTRAL_BELOW, r);
  }
  const tail = q < 0 ? p : 1 - p;
  if (!(tail >= 0)) return Number.NaN;
  if (tail === 0) return q < 0 ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
  const r = Math.sqrt(-Math.log(tail));
  const size =
    r <= 5
      ? horner(MIDDLE_ABOVE, r - 1.6) / horner(MIDDLE_BELOW, r - 1.6)
      : horner(FAR_ABOVE, r - 5) / horner(FAR_BELOW, r - 5);
  return q < 0 ? -size : size;
}

/** Coefficients from the constant upwards. */
function horner(coefficients: readonly number[], x: number): number {
  let sum = 0;
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * x + coefficients[i];
  return sum;
}

// Tables of AS 241, constant term first.
const CENTRAL_ABOVE = [
  3.3871328727963665, 133.14166789178438, 1971.5909503065513, 13731.69376550946, 45921.95393154987,
  67265.7709270087, 33430.57558358813, 2509.0809287301227,
];
const CENTRAL_BELOW = [
  1, 42.31333070160091, 687.1870074920579, 5394.196021424751, 21213.794301586597, 39307.89580009271,
  28729.085735721943, 5226.495278852546,
];
const MIDDLE_ABOVE = [
  1.4234371107496835, 4.630337846156546, 5.769497221460691, 3.6478483247632045, 1.2704582524523684,
  0.2417807251774506, 0.022723844989269184, 0.0007745450142783414,
];
const MIDDLE_BELOW = [
  1, 2.053191626637759, 1.6763848301838038, 0.6897673349851, 0.14810397642748008, 0.015198666563616457,
  0.0005475938084995345, 1.0507500716444169e-9,
];
const FAR_ABOVE = [
  6.657904643501103, 5.463784911164114, 1.7848265399172913, 0.29656057182850487, 0.026532189526576124,
  0.0012426609473880784, 2.7115555687434876e-5, 2.0103343992922881e-7,
];
const FAR_BELOW = [
  1, 0.599832206555888, 0.1369298809227358, 0.014875361290850615, 0.0007868691311456133,
  1.8463183175100548e-5, 1.421511758316446e-7, 2.0442631033899397e-15,
];
