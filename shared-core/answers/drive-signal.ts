/**
 * Drives as functions of time in closed form: pieces, each a polynomial plus at most one sinusoid.
 *
 * On piece i, with tau = t - starts[i]:
 *   u(t) = sum over p of coefficients[i * order + p] * tau^p + Re((sineRe[i] + i sineIm[i]) * exp(i * omega * tau)).
 * The family is closed under integration, which is what supports driven by accelerations need. A signal is zero
 * before t = 0; its last piece runs on for ever. A jump between pieces is a real jump.
 */

export interface Impulse {
  /** s */
  readonly time: number;
  /** Integral over the impulse: N*s for a force. */
  readonly size: number;
}

export interface Signal {
  /** Where the pieces begin, s, ascending; the first is 0. */
  readonly starts: Float64Array;
  /** Coefficients kept a piece, one more than the degree. */
  readonly order: number;
  readonly coefficients: Float64Array;
  /** rad/s, the same in all pieces; 0 where no piece has a sinusoid. */
  readonly omega: number;
  readonly sineRe: Float64Array;
  readonly sineIm: Float64Array;
  readonly impulses: readonly Impulse[];
  /**
   * The lowest derivative (0: the value itself) that is not continuous at the start of each piece, up to 3;
   * 4 where nothing that matters jumps.
   */
  readonly jumps: Uint8Array;
}

/** One piece before it is packed. */
export interface Piece {
  readonly start: number;
  readonly polynomial: readonly number[];
  readonly sine?: readonly [number, number];
}

/** Derivatives kept by `signalDerivatives`: the value and four more. */
export const SIGNAL_DERIVATIVES = 5;

/** Jumps below this share of a derivative's own size are rounding: sums of records carry errors of 1e-13 or so. */
const JUMP_FLOOR = 1e-9;

/** Packs pieces in ascending order into a signal that begins at t = 0; what lies before is cut off. */
export function signalFrom(pieces: readonly Piece[], omega = 0, impulses: readonly Impulse[] = []): Signal {
  const kept: Piece[] = [];
  pieces.forEach((piece, i) => {
    const next = pieces[i + 1]?.start ?? Number.POSITIVE_INFINITY;
    if (next <= 0 || piece.start === next) return;
    kept.push(piece.start < 0 ? movedPiece(piece, -piece.start, omega) : piece);
  });
  if (kept.length === 0 || kept[0].start > 0) kept.unshift({ start: 0, polynomial: [0] });
  const order = Math.max(1, ...kept.map((p) => p.polynomial.length));
  const coefficients = new Float64Array(kept.length * order);
  const sineRe = new Float64Array(kept.length);
  const sineIm = new Float64Array(kept.length);
  kept.forEach((piece, i) => {
    coefficients.set(piece.polynomial, i * order);
    sineRe[i] = piece.sine?.[0] ?? 0;
    sineIm[i] = piece.sine?.[1] ?? 0;
  });
  const starts = Float64Array.from(kept, (p) => p.start);
  const plain = { starts, order, coefficients, omega, sineRe, sineIm };
  return { ...plain, impulses: impulses.filter((i) => i.time >= 0), jumps: jumpOrders(plain) };
}

/** A signal of one constant value from t = 0 on. */
export function constantSignal(value: number): Signal {
  return signalFrom([{ start: 0, polynomial: [value] }]);
}

type Plain = Omit<Signal, "impulses" | "jumps">;

/** Packs ready arrays (see `Signal`) and finds where they jump, unless that is known. */
export function packedSignal(plain: Plain, jumps: Uint8Array = jumpOrders(plain)): Signal {
  return { ...plain, impulses: [], jumps };
}

/**
 * The same signal with its clock set back: what was at `time` is at 0. Impulses up to then are left out, and so are
 * pieces that begin after `until`. Instants closer than `same` are one.
 */
export function laterSignal(signal: Signal, time: number, until: number, same: number): Signal {
  const { starts, order, coefficients, omega, sineRe, sineIm, impulses, jumps } = signal;
  const first = Math.max(0, startsUpTo(starts, time + same) - 1);
  const end = Math.max(first + 1, startsUpTo(starts, until));
  const by = Math.max(0, time - starts[first]);
  const moved = coefficients.slice(first * order, end * order);
  shiftedPolynomial(coefficients, first * order, order, by, moved, 0);
  const [re, im] = [sineRe.slice(first, end), sineIm.slice(first, end)];
  const [cos, sin] = [Math.cos(omega * by), Math.sin(omega * by)];
  [re[0], im[0]] = [re[0] * cos - im[0] * sin, re[0] * sin + im[0] * cos];
  return {
    starts: starts.slice(first, end).map((start, i) => (i === 0 ? 0 : start - time)),
    order,
    coefficients: moved,
    omega,
    sineRe: re,
    sineIm: im,
    impulses: impulses.flatMap((each) =>
      each.time > time + same ? [{ ...each, time: each.time - time }] : [],
    ),
    jumps: jumps.slice(first, end),
  };
}

/** How many pieces begin at or before an instant. */
function startsUpTo(starts: Float64Array, time: number): number {
  let [low, high] = [0, starts.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (starts[middle] <= time) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** u, u', u'' ... at `tau` after the start of piece `i`, into `out` (length SIGNAL_DERIVATIVES). */
export function signalDerivatives(signal: Plain, i: number, tau: number, out: Float64Array): void {
  const { order, coefficients, omega } = signal;
  const at = i * order;
  for (let d = 0; d < SIGNAL_DERIVATIVES; d++) {
    let sum = 0;
    for (let p = order - 1; p >= d; p--) sum = sum * tau + coefficients[at + p] * fallingFactorial(p, d);
    out[d] = sum;
  }
  if (omega === 0) return;
  let re = signal.sineRe[i];
  let im = signal.sineIm[i];
  if (re === 0 && im === 0) return;
  const cos = Math.cos(omega * tau);
  const sin = Math.sin(omega * tau);
  const turned = re * cos - im * sin;
  im = re * sin + im * cos;
  re = turned;
  for (let d = 0; d < SIGNAL_DERIVATIVES; d++) {
    out[d] += re;
    // The next derivative multiplies the phasor by i omega.
    const kept = re;
    re = -omega * im;
    im = omega * kept;
  }
}

/** The integral of a signal from rest: zero at t = 0; impulses become steps. */
export function integrated(signal: Signal): Signal {
  const { starts, order, omega } = signal;
  const pieces: Piece[] = [];
  const steps = [...signal.impulses].sort((a, b) => a.time - b.time);
  let value = 0;
  for (let i = 0; i < starts.length; i++) {
    const from = starts[i];
    const to = i + 1 < starts.length ? starts[i + 1] : Number.POSITIVE_INFINITY;
    // The integral of Re(S e^(i w tau)) is Re(S / (i w) * e^(i w tau)) up to a constant.
    const re = omega === 0 ? 0 : signal.sineIm[i] / omega;
    const im = omega === 0 ? 0 : -signal.sineRe[i] / omega;
    const polynomial = [value - re];
    for (let p = 0; p < order; p++) polynomial.push(signal.coefficients[i * order + p] / (p + 1));
    let piece: Piece = { start: from, polynomial, sine: [re, im] };
    pieces.push(piece);
    while (steps.length > 0 && steps[0].time < to) {
      const step = steps.shift() as Impulse;
      piece = raised(movedPiece(piece, step.time - piece.start, omega), step.size);
      if (pieces[pieces.length - 1].start === piece.start) pieces.pop();
      pieces.push(piece);
    }
    if (to < Number.POSITIVE_INFINITY) value = pieceValue(piece, to - piece.start, omega);
  }
  return signalFrom(pieces, omega);
}

/** The coefficients of a polynomial about a place `by` further on; `count` of them from `at`. */
export function shiftedPolynomial(
  source: ArrayLike<number>,
  at: number,
  count: number,
  by: number,
  out: Float64Array | number[],
  to: number,
): void {
  for (let p = 0; p < count; p++) out[to + p] = source[at + p];
  if (by === 0) return;
  // Repeated synthetic division by (tau - by).
  for (let k = 0; k < count - 1; k++) {
    for (let p = count - 2; p >= k; p--) out[to + p] += by * out[to + p + 1];
  }
}

function movedPiece(piece: Piece, by: number, omega: number): Piece {
  const polynomial = [...piece.polynomial];
  shiftedPolynomial(piece.polynomial, 0, polynomial.length, by, polynomial, 0);
  if (!piece.sine) return { start: piece.start + by, polynomial };
  const cos = Math.cos(omega * by);
  const sin = Math.sin(omega * by);
  const [re, im] = piece.sine;
  return { start: piece.start + by, polynomial, sine: [re * cos - im * sin, re * sin + im * cos] };
}

function raised(piece: Piece, by: number): Piece {
  const [first, ...rest] = piece.polynomial;
  return { ...piece, polynomial: [first + by, ...rest] };
}

function pieceValue(piece: Piece, tau: number, omega: number): number {
  let sum = 0;
  for (let p = piece.polynomial.length - 1; p >= 0; p--) sum = sum * tau + piece.polynomial[p];
  if (piece.sine) sum += piece.sine[0] * Math.cos(omega * tau) - piece.sine[1] * Math.sin(omega * tau);
  return sum;
}

function jumpOrders(plain: Plain): Uint8Array {
  const { starts } = plain;
  const before = new Float64Array(SIGNAL_DERIVATIVES);
  const after = new Float64Array(SIGNAL_DERIVATIVES);
  const sizes = new Float64Array(4);
  const steps = new Float64Array(4 * starts.length);
  for (let i = 0; i < starts.length; i++) {
    if (i > 0) signalDerivatives(plain, i - 1, starts[i] - starts[i - 1], before);
    signalDerivatives(plain, i, 0, after);
    for (let d = 0; d < 4; d++) {
      sizes[d] = Math.max(sizes[d], Math.abs(before[d]), Math.abs(after[d]));
      steps[4 * i + d] = Math.abs(after[d] - before[d]);
    }
  }
  return Uint8Array.from(starts, (_, i) => {
    for (let d = 0; d < 4; d++) if (steps[4 * i + d] > JUMP_FLOOR * sizes[d]) return d;
    return 4;
  });
}

function fallingFactorial(p: number, d: number): number {
  let product = 1;
  for (let k = 0; k < d; k++) product *= p - k;
  return product;
}
