/**
 * The steady response by superposition of roots, X(s) = sum v_k w_k (B0 + s B1 + s^2 B2) U / (s - lambda_k): roots
 * once, then O(n^2) for all coordinates instead of the O(n^3) of a factorisation.
 *
 * For models with viscous and modal damping; loss factors are no first-order terms. Checked against the
 * factorisation at some frequencies before it is used; searches run on it, single values do not.
 */
import type { Assembly } from "../mechanics/assembly.ts";
import { formValue } from "../mechanics/forms.ts";
import { type StateInput, stateSpace } from "../mechanics/state-space.ts";
import { complexLuWorkspace, factorComplexLu, solveComplexLu } from "../numerics/complex-lu.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { multiply, transpose } from "../numerics/products.ts";
import type { StateBlock } from "./frequency-block.ts";
import type { ModalBasis } from "./modes-basis.ts";
import type { Root } from "./modes-roots.ts";
import { modalStates } from "./time-basis.ts";
import { type ModalSystem, modalSystem } from "./time-modal.ts";

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

/** Inputs are the drives `by` in their order: forces, or displacements of supports. */
export function modalTransfer(
  assembly: Assembly,
  basis: ModalBasis,
  by: readonly number[],
): Outcome<Transfer> {
  const inputs = by.map((index): StateInput => {
    const { on } = assembly.drives[index];
    return on.kind === "form" ? { kind: "load", form: on.form } : { kind: "support", support: on.support };
  });
  const space = stateSpace(assembly, inputs);
  if (!space.ok) return fail(space.reason);
  const chosen = modalStates(basis, space.value, inputs, basis.modalRates(false));
  if (!chosen.ok) return fail(chosen.reason);
  const { raw, columns, components } = chosen.value;
  const { size, free } = { size: raw.size, free: assembly.free };
  const modal = modalSystem({ size, a: raw.a, inputs: raw.inputs, b: raw.b0 }, components);
  const displacement = multiply(space.value.displacement, columns, free, size, size);
  const parts = {
    modal,
    free,
    shapeRe: multiply(displacement, modal.vectorRe, free, size, modal.count),
    shapeIm: multiply(displacement, modal.vectorIm, free, size, modal.count),
    shapeRest: multiply(displacement, modal.basis, free, size, modal.rest),
    direct: space.value.displacementDirect,
    feeds: [raw.b0, raw.b1, raw.b2].map((b) => ({
      re: multiply(modal.leftRe, b, modal.count, size, raw.inputs),
      im: multiply(modal.leftIm, b, modal.count, size, raw.inputs),
      rest: multiply(modal.left, b, modal.rest, size, raw.inputs),
    })),
  };
  return succeed({ at: transferOf(parts), many: modal.rest === 0 ? blockOf(parts) : undefined });
}

/**
 * The same from the roots and shapes that the mode table stands on. M, C and K are symmetric, so that a shape is
 * its own left shape: X(s) = sum psi (psi^T F) / (norm (s - root)). For forces on models in which every coordinate
 * has an inertia and nothing floats; undefined for others.
 */
export function symmetricTransfer(
  assembly: Assembly,
  basis: ModalBasis,
  by: readonly number[],
): Transfer | undefined {
  const { undamped } = basis;
  const { count: n, free: floating, reduction } = undamped;
  if (n !== assembly.free || floating > 0 || reduction.relaxing > 0) return undefined;
  const found = basis.complexRoots();
  if (!found.ok) return undefined;
  const { roots } = found.value;
  const forms = by.flatMap((index) => {
    const { on } = assembly.drives[index];
    return on.kind === "form" ? [on.form] : [];
  });
  if (forms.length < by.length || roots.some(({ norm }) => norm === undefined)) return undefined;
  const { re, im } = shapeRows(basis, roots);
  const feed = {
    re: new Float64Array(roots.length * by.length),
    im: new Float64Array(roots.length * by.length),
  };
  roots.forEach(({ norm = [0, 0] }, k) => {
    const square = norm[0] * norm[0] + norm[1] * norm[1];
    forms.forEach((form, j) => {
      const a = formValue(form, re.subarray(k * n, (k + 1) * n));
      const b = formValue(form, im.subarray(k * n, (k + 1) * n));
      feed.re[k * by.length + j] = (a * norm[0] + b * norm[1]) / square;
      feed.im[k * by.length + j] = (b * norm[0] - a * norm[1]) / square;
    });
  });
  const nothing = { re: new Float64Array(feed.re.length), im: new Float64Array(feed.re.length) };
  const rest = new Float64Array(0);
  const parts: Parts = {
    modal: {
      count: roots.length,
      rest: 0,
      inputs: by.length,
      block: rest,
      lambdaRe: Float64Array.from(roots, (root) => root.re),
      lambdaIm: Float64Array.from(roots, (root) => root.im),
      weight: Float64Array.from(roots, (root) => (root.im === 0 ? 1 : 2)),
    },
    free: n,
    shapeRe: transpose(re, roots.length, n),
    shapeIm: transpose(im, roots.length, n),
    shapeRest: rest,
    direct: new Float64Array(n * by.length),
    feeds: [feed, nothing, nothing].map((f) => ({ ...f, rest })),
  };
  return { at: transferOf(parts), many: blockOf(parts) };
}

/** Shapes of roots over the coordinates, one a row. */
function shapeRows({ undamped }: ModalBasis, roots: readonly Root[]): { re: Float64Array; im: Float64Array } {
  const { count: n, vectors } = undamped;
  const rows = (part: "re" | "im"): Float64Array => {
    const given = new Float64Array(roots.length * n);
    roots.forEach(({ shape }, k) => {
      given.set(shape[part], k * n);
    });
    return roots[0]?.shape.basis === "inertial" ? given : multiply(given, vectors, roots.length, n, n);
  };
  return { re: rows("re"), im: rows("im") };
}

interface Parts {
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
function blockOf(parts: Parts): TransferBlock {
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

/** The shares of root k (see `rootShare`) in all lanes: rows k and count + k of `shares`, real parts first. */
function shareLanes(
  { modal, feeds }: Parts,
  k: number,
  { lanes, omega, good }: StateBlock,
  uRe: Float64Array,
  uIm: Float64Array,
  shares: Float64Array,
): void {
  const { inputs, count } = modal;
  const [f0, f1, f2] = feeds;
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
      const evenRe = f0.re[at] - w * w * f2.re[at];
      const evenIm = f0.im[at] - w * w * f2.im[at];
      const oddRe = w * f1.re[at];
      const oddIm = w * f1.im[at];
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

function transferOf(parts: Parts): Transfer["at"] {
  const { modal, free, shapeRe, shapeIm, direct } = parts;
  const { count, rest, inputs } = modal;
  const aRe = new Float64Array(count);
  const aIm = new Float64Array(count);
  const bRe = new Float64Array(count);
  const bIm = new Float64Array(count);
  const restRe = new Float64Array(rest);
  const restIm = new Float64Array(rest);
  const solveRest = blockSolver(modal);
  return (omega, uRe, uIm, xRe, xIm) => {
    for (let k = 0; k < count; k++) {
      if (!rootShare(parts, k, omega, uRe, uIm)) return false;
      aRe[k] = share[0];
      aIm[k] = share[1];
      bRe[k] = share[2];
      bIm[k] = share[3];
    }
    restRe.fill(0);
    restIm.fill(0);
    for (let j = 0; j < inputs && rest > 0; j++) {
      for (let k = 0; k < rest; k++) {
        const [f0, f1, f2] = parts.feeds;
        const re = f0.rest[k * inputs + j] - omega * omega * f2.rest[k * inputs + j];
        const im = omega * f1.rest[k * inputs + j];
        restRe[k] += re * uRe[j] - im * uIm[j];
        restIm[k] += re * uIm[j] + im * uRe[j];
      }
    }
    if (rest > 0 && !solveRest(omega, restRe, restIm)) return false;
    for (let i = 0; i < free; i++) {
      let re = 0;
      let im = 0;
      const at = i * count;
      for (let k = 0; k < count; k++) {
        const p = shapeRe[at + k];
        const q = shapeIm[at + k];
        re += p * aRe[k] + q * bRe[k];
        im += p * aIm[k] + q * bIm[k];
      }
      for (let k = 0; k < rest; k++) {
        re += parts.shapeRest[i * rest + k] * restRe[k];
        im += parts.shapeRest[i * rest + k] * restIm[k];
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

/** eta + eta' and i (eta - eta') of a root and its conjugate (or eta and i eta of a real one), into `share`. */
function rootShare(
  { modal, feeds }: Parts,
  k: number,
  omega: number,
  uRe: Float64Array,
  uIm: Float64Array,
): boolean {
  const { inputs } = modal;
  let re = 0;
  let im = 0;
  let otherRe = 0;
  let otherIm = 0;
  const [f0, f1, f2] = feeds;
  for (let j = 0; j < inputs; j++) {
    const at = k * inputs + j;
    // w b with b = b0 + i omega b1 - omega^2 b2, and conj(w) b for the conjugate root.
    const evenRe = f0.re[at] - omega * omega * f2.re[at];
    const evenIm = f0.im[at] - omega * omega * f2.im[at];
    const oddRe = omega * f1.re[at];
    const oddIm = omega * f1.im[at];
    const gRe = evenRe - oddIm;
    const gIm = evenIm + oddRe;
    const hRe = evenRe + oddIm;
    const hIm = oddRe - evenIm;
    re += gRe * uRe[j] - gIm * uIm[j];
    im += gRe * uIm[j] + gIm * uRe[j];
    otherRe += hRe * uRe[j] - hIm * uIm[j];
    otherIm += hRe * uIm[j] + hIm * uRe[j];
  }
  const dr = -modal.lambdaRe[k];
  const di = omega - modal.lambdaIm[k];
  const square = dr * dr + di * di;
  if (square === 0) return false;
  const etaRe = (re * dr + im * di) / square;
  const etaIm = (im * dr - re * di) / square;
  if (modal.weight[k] === 1) {
    share[0] = etaRe;
    share[1] = etaIm;
    share[2] = 0;
    share[3] = 0;
    return true;
  }
  const oi = omega + modal.lambdaIm[k];
  const otherSquare = dr * dr + oi * oi;
  const nextRe = (otherRe * dr + otherIm * oi) / otherSquare;
  const nextIm = (otherIm * dr - otherRe * oi) / otherSquare;
  share[0] = etaRe + nextRe;
  share[1] = etaIm + nextIm;
  share[2] = nextIm - etaIm;
  share[3] = etaRe - nextRe;
  return true;
}

const share = new Float64Array(4);

/** x <- (i omega - A_c)^-1 x for the block. */
function blockSolver(modal: Parts["modal"]): (omega: number, re: Float64Array, im: Float64Array) => boolean {
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
