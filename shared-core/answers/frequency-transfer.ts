/**
 * Sums over roots, X(s) = sum v_k w_k (B0 + s B1 + s^2 B2) U / (s - lambda_k), at one frequency or at many.
 *
 * Roots that cannot be split safely stand together in a block of their own, solved frequency by frequency.
 */
import { complexLuWorkspace, factorComplexLu, solveComplexLu } from "../numerics/complex-lu.ts";
import { multiply } from "../numerics/products.ts";
import type { StateBlock } from "./frequency-block.ts";
import type { ModalSystem } from "./time-modal.ts";

export interface Transfer {
  /** All free coordinates at s = i omega for input phasors `uRe`, `uIm`; false where a root stands at s itself. */
  at(omega: number, uRe: Float64Array, uIm: Float64Array, xRe: Float64Array, xIm: Float64Array): boolean;
  /** The same for many frequencies as one product, where every root stands singly. */
  readonly many?: TransferBlock;
}

export interface TransferBlock {
  /** Frequencies are put into it, motions taken from it; `good` is 0 where a root stands at s itself. */
  readonly block: StateBlock;
  /** Solves for input j of a lane at lane * inputs + j. */
  solve(uRe: Float64Array, uIm: Float64Array): void;
}

/** A modal system as the sum over its roots needs it. */
export interface TransferParts {
  /** What of a modal system the sum needs. */
  readonly modal: Pick<
    ModalSystem,
    "count" | "rest" | "inputs" | "block" | "lambdaRe" | "lambdaIm" | "weight"
  >;
  readonly free: number;
  readonly shapeRe: Float64Array;
  readonly shapeIm: Float64Array;
  readonly shapeRest: Float64Array;
  readonly direct: Float64Array;
  /** For the inputs, their first and their second derivatives. */
  readonly feeds: readonly {
    readonly re: Float64Array;
    readonly im: Float64Array;
    readonly rest: Float64Array;
  }[];
}

/** Frequencies in one product; chosen by trial. */
const BLOCK_LANES = 128;

/** x = [Re V, Im V] [a; b] with the shares of all roots at all lanes: one real product. */
export function blockOf(parts: TransferParts): TransferBlock {
  const { modal, free, shapeRe, shapeIm, direct } = parts;
  const { count, inputs } = modal;
  const [lanes, width] = [BLOCK_LANES, 2 * BLOCK_LANES];
  const shapes = new Float64Array(free * 2 * count);
  for (let i = 0; i < free; i++) {
    shapes.set(shapeRe.subarray(i * count, (i + 1) * count), 2 * i * count);
    shapes.set(shapeIm.subarray(i * count, (i + 1) * count), (2 * i + 1) * count);
  }
  const shares = new Float64Array(2 * count * width);
  const both = new Float64Array(free * width);
  const block: StateBlock = {
    lanes,
    stride: width,
    omega: new Float64Array(lanes),
    row: Int32Array.from({ length: free }, (_, i) => i),
    re: both,
    im: both.subarray(lanes),
    good: new Uint8Array(lanes),
  };
  return {
    block,
    solve(uRe, uIm) {
      block.good.fill(1);
      for (let k = 0; k < count; k++) shareLanes(parts, k, block, uRe, uIm, shares);
      multiply(shapes, shares, free, 2 * count, width, both);
      addDirect(direct, inputs, block, uRe, uIm);
    },
  };
}

/**
 * What root k makes up in all lanes: eta + eta' of the root and its conjugate in row k of `shares`, i (eta - eta')
 * in row count + k (of a real root eta and nothing), real parts first. With w b, b = b0 + i omega b1 - omega^2 b2,
 * and conj(w) b for the conjugate root.
 */
function shareLanes(
  { modal, feeds }: TransferParts,
  k: number,
  { lanes, omega, good }: Pick<StateBlock, "lanes" | "omega" | "good">,
  uRe: Float64Array,
  uIm: Float64Array,
  shares: Float64Array,
): void {
  const { inputs, count } = modal;
  const [{ re: f0Re, im: f0Im }, { re: f1Re, im: f1Im }, { re: f2Re, im: f2Im }] = feeds;
  const single = modal.weight[k] === 1;
  const [rootRe, rootIm] = [modal.lambdaRe[k], modal.lambdaIm[k]];
  const first = 2 * lanes * k;
  const second = first + 2 * lanes * count;
  for (let lane = 0; lane < lanes; lane++) {
    const w = omega[lane];
    let re = 0;
    let im = 0;
    let otherRe = 0;
    let otherIm = 0;
    for (let j = 0; j < inputs; j++) {
      const at = k * inputs + j;
      const a = uRe[lane * inputs + j];
      const b = uIm[lane * inputs + j];
      const evenRe = f0Re[at] - w * w * f2Re[at];
      const evenIm = f0Im[at] - w * w * f2Im[at];
      const oddRe = w * f1Re[at];
      const oddIm = w * f1Im[at];
      re += (evenRe - oddIm) * a - (evenIm + oddRe) * b;
      im += (evenRe - oddIm) * b + (evenIm + oddRe) * a;
      otherRe += (evenRe + oddIm) * a - (oddRe - evenIm) * b;
      otherIm += (evenRe + oddIm) * b + (oddRe - evenIm) * a;
    }
    const di = w - rootIm;
    const square = rootRe * rootRe + di * di;
    if (square === 0) good[lane] = 0;
    const inverse = 1 / square;
    const etaRe = (im * di - re * rootRe) * inverse;
    const etaIm = (-im * rootRe - re * di) * inverse;
    const oi = w + rootIm;
    const otherInverse = single ? 0 : 1 / (rootRe * rootRe + oi * oi);
    const nextRe = (otherIm * oi - otherRe * rootRe) * otherInverse;
    const nextIm = (-otherIm * rootRe - otherRe * oi) * otherInverse;
    shares[first + lane] = etaRe + nextRe;
    shares[first + lanes + lane] = etaIm + nextIm;
    shares[second + lane] = single ? 0 : nextIm - etaIm;
    shares[second + lanes + lane] = single ? 0 : etaRe - nextRe;
  }
}

/** What inputs move at once: places without inertia, and supports. */
function addDirect(
  direct: Float64Array,
  inputs: number,
  { lanes, stride, row, re, im }: StateBlock,
  uRe: Float64Array,
  uIm: Float64Array,
): void {
  for (let i = 0; i < row.length; i++) {
    for (let j = 0; j < inputs; j++) {
      const factor = direct[i * inputs + j];
      if (factor === 0) continue;
      for (let lane = 0; lane < lanes; lane++) {
        re[i * stride + lane] += factor * uRe[lane * inputs + j];
        im[i * stride + lane] += factor * uIm[lane * inputs + j];
      }
    }
  }
}

/** One frequency at a time; what the block of roots that cannot be split takes part in as well. */
export function transferOf(parts: TransferParts): Transfer["at"] {
  const { modal, free, shapeRe, shapeIm, shapeRest, direct } = parts;
  const { count, rest, inputs } = modal;
  const shares = new Float64Array(4 * count);
  const lane = { lanes: 1, omega: new Float64Array(1), good: new Uint8Array(1) };
  const restRe = new Float64Array(rest);
  const restIm = new Float64Array(rest);
  const solveRest = blockSolver(modal);
  return (omega, uRe, uIm, xRe, xIm) => {
    lane.omega[0] = omega;
    lane.good[0] = 1;
    for (let k = 0; k < count; k++) shareLanes(parts, k, lane, uRe, uIm, shares);
    if (lane.good[0] === 0) return false;
    loadRest(parts, omega, uRe, uIm, restRe, restIm);
    if (rest > 0 && !solveRest(omega, restRe, restIm)) return false;
    for (let i = 0; i < free; i++) {
      let re = 0;
      let im = 0;
      for (let k = 0; k < count; k++) {
        const p = shapeRe[i * count + k];
        const q = shapeIm[i * count + k];
        re += p * shares[2 * k] + q * shares[2 * (count + k)];
        im += p * shares[2 * k + 1] + q * shares[2 * (count + k) + 1];
      }
      for (let k = 0; k < rest; k++) {
        re += shapeRest[i * rest + k] * restRe[k];
        im += shapeRest[i * rest + k] * restIm[k];
      }
      for (let j = 0; j < inputs; j++) {
        re += direct[i * inputs + j] * uRe[j];
        im += direct[i * inputs + j] * uIm[j];
      }
      xRe[i] = re;
      xIm[i] = im;
    }
    return true;
  };
}

/** What the inputs load the block of roots that cannot be split with. */
function loadRest(
  { modal, feeds }: TransferParts,
  omega: number,
  uRe: Float64Array,
  uIm: Float64Array,
  restRe: Float64Array,
  restIm: Float64Array,
): void {
  const { rest, inputs } = modal;
  const [f0, f1, f2] = feeds;
  restRe.fill(0);
  restIm.fill(0);
  for (let j = 0; j < inputs && rest > 0; j++) {
    for (let k = 0; k < rest; k++) {
      const re = f0.rest[k * inputs + j] - omega * omega * f2.rest[k * inputs + j];
      const im = omega * f1.rest[k * inputs + j];
      restRe[k] += re * uRe[j] - im * uIm[j];
      restIm[k] += re * uIm[j] + im * uRe[j];
    }
  }
}

/** x <- (i omega - A_c)^-1 x for the block. */
function blockSolver(
  modal: TransferParts["modal"],
): (omega: number, re: Float64Array, im: Float64Array) => boolean {
  const { rest, block } = modal;
  const minus = block.map((v) => -v);
  const turn = new Float64Array(rest * rest);
  const workspace = complexLuWorkspace(rest);
  const bRe = new Float64Array(rest);
  const bIm = new Float64Array(rest);
  return (omega, re, im) => {
    for (let i = 0; i < rest; i++) turn[i * rest + i] = omega;
    const lu = factorComplexLu(minus, turn, rest, workspace);
    if (!lu.ok) return false;
    bRe.set(re);
    bIm.set(im);
    solveComplexLu(lu.value, bRe, bIm, 1, re, im);
    return true;
  };
}
