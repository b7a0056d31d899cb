/**
 * The steady response by superposition of roots, X(s) = sum v_k w_k (B0 + s B1 + s^2 B2) U / (s - lambda_k): roots
 * once, then O(n^2) for all coordinates instead of the O(n^3) of a factorisation.
 *
 * For models with viscous and modal damping; loss factors are no first-order terms. Checked against the
 * factorisation at some frequencies before it is used; searches run on it, single values do not.
 */
import type { Assembly } from "../mechanics/assembly.ts";
import { type StateInput, stateSpace } from "../mechanics/state-space.ts";
import { complexLuWorkspace, factorComplexLu, solveComplexLu } from "../numerics/complex-lu.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { multiply } from "../numerics/products.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { modalStates } from "./time-basis.ts";
import { type ModalSystem, modalSystem } from "./time-modal.ts";

/** All free coordinates at s = i omega for input phasors `uRe`, `uIm`; false where a root stands at s itself. */
export type Transfer = (
  omega: number,
  uRe: Float64Array,
  uIm: Float64Array,
  xRe: Float64Array,
  xIm: Float64Array,
) => boolean;

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
  return succeed(transferOf(parts));
}

interface Parts {
  readonly modal: ModalSystem;
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

function transferOf(parts: Parts): Transfer {
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
function blockSolver(modal: ModalSystem): (omega: number, re: Float64Array, im: Float64Array) => boolean {
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
