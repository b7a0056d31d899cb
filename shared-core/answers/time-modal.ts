/**
 * z' = A z + B u split into parts that do not feel each other: single complex roots, and one real block of what
 * cannot be split safely (double roots without two vectors: rigid bodies that move on, critical damping).
 *
 * Single oscillators are split in closed form, sets of coupled states by time-parting.ts.
 */
import { assemble, balancedParting, type ModalSystem } from "./time-parting.ts";
import { DIRECT_ORDERS, type OutputForm, type StateForm } from "./time-state.ts";

export type { ModalSystem } from "./time-parting.ts";

/** An oscillator whose roots are closer than this share of their size stays together. */
const NEARLY_DOUBLE = 1e-4;

/** The factors of an output in modal coordinates: y = sum(re * eta_re - im * eta_im) + sum(rest * x) + direct. */
export interface ModalOutput {
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly rest: Float64Array;
  readonly direct: Float64Array;
}

/**
 * Splits a system whose `components` (sets of states) do not feel each other, each by its own roots. A component
 * whose roots cannot be had stays in the block.
 */
export function modalSystem(system: StateForm, components: readonly (readonly number[])[]): ModalSystem {
  const parts = components.map((states) => {
    const part = subsystem(system, states);
    return { states, modal: oscillator(part) ?? balancedParting(part) };
  });
  return joined(system, parts);
}

/** Projects an output on the modal coordinates. */
export function modalOutput(modal: ModalSystem, form: OutputForm): ModalOutput {
  const { size: n, count, rest, weight } = modal;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const restFactors = new Float64Array(rest);
  for (let i = 0; i < n; i++) {
    const factor = form.state[i];
    if (factor === 0) continue;
    for (let k = 0; k < count; k++) {
      re[k] += weight[k] * factor * modal.vectorRe[i * count + k];
      im[k] += weight[k] * factor * modal.vectorIm[i * count + k];
    }
    for (let k = 0; k < rest; k++) restFactors[k] += factor * modal.basis[i * rest + k];
  }
  return { re, im, rest: restFactors, direct: form.direct };
}

/** The time derivative of an output, in the same coordinates. */
export function modalDerivative(modal: ModalSystem, output: ModalOutput): ModalOutput {
  const { count, rest, inputs } = modal;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const restFactors = new Float64Array(rest);
  const direct = new Float64Array(output.direct.length);
  for (let j = 0; j < inputs; j++) {
    let feed = 0;
    for (let k = 0; k < count; k++) {
      feed += output.re[k] * modal.inputRe[j * count + k] - output.im[k] * modal.inputIm[j * count + k];
    }
    for (let k = 0; k < rest; k++) feed += output.rest[k] * modal.blockInput[k * inputs + j];
    const at = j * DIRECT_ORDERS;
    direct[at] = feed;
    for (let d = 0; d + 1 < DIRECT_ORDERS; d++) direct[at + d + 1] = output.direct[at + d];
  }
  for (let k = 0; k < count; k++) {
    re[k] = output.re[k] * modal.lambdaRe[k] - output.im[k] * modal.lambdaIm[k];
    im[k] = output.re[k] * modal.lambdaIm[k] + output.im[k] * modal.lambdaRe[k];
  }
  for (let i = 0; i < rest; i++) {
    for (let k = 0; k < rest; k++) restFactors[k] += output.rest[i] * modal.block[i * rest + k];
  }
  return { re, im, rest: restFactors, direct };
}

/** The modal coordinates of a state: count real parts, count imaginary parts, then the block's. */
export function modalState(modal: ModalSystem, z: Float64Array): Float64Array {
  const { size: n, count, rest } = modal;
  const out = new Float64Array(2 * count + rest);
  for (let k = 0; k < count; k++) {
    for (let i = 0; i < n; i++) {
      out[k] += modal.leftRe[k * n + i] * z[i];
      out[count + k] += modal.leftIm[k * n + i] * z[i];
    }
  }
  for (let k = 0; k < rest; k++) {
    for (let i = 0; i < n; i++) out[2 * count + k] += modal.left[k * n + i] * z[i];
  }
  return out;
}

interface Part {
  readonly states: readonly number[];
  readonly modal: ModalSystem;
}

function subsystem({ a, b, size, inputs }: StateForm, states: readonly number[]): StateForm {
  const n = states.length;
  const own = new Float64Array(n * n);
  const feed = new Float64Array(n * inputs);
  states.forEach((i, p) => {
    states.forEach((j, q) => {
      own[p * n + q] = a[i * size + j];
    });
    for (let j = 0; j < inputs; j++) feed[p * inputs + j] = b[i * inputs + j];
  });
  return { size: n, a: own, inputs, b: feed };
}

/** x'' + c x' + k x as two states (x, x'), in closed form; undefined for anything else or a nearly double root. */
function oscillator(system: StateForm): ModalSystem | undefined {
  if (system.size !== 2 || system.a[0] !== 0 || system.a[1] !== 1) return undefined;
  const k = -system.a[2];
  const half = -system.a[3] / 2;
  const square = half * half - k;
  if (!(Math.abs(square) > NEARLY_DOUBLE * NEARLY_DOUBLE * (half * half + Math.abs(k)))) return undefined;
  const root = Math.sqrt(Math.abs(square));
  if (square < 0) {
    // v = (1, s), w = (-s*, 1) / (s - s*), with s = -half + i root.
    return assemble(system, {
      singles: [{ re: 0 - half, im: root, column: 0 }],
      columns: Float64Array.of(1, 0, -half, root),
      rest: 0,
      inverse: Float64Array.of(1, 0, half / root, 1 / root),
      roots: [],
    });
  }
  // The root of larger size first; the other from the product, so that it keeps its digits.
  const large = half < 0 ? root - half : -half - root;
  const small = k / large;
  const apart = small - large;
  return assemble(system, {
    singles: [
      { re: large, im: 0, column: 0 },
      { re: small, im: 0, column: 1 },
    ],
    columns: Float64Array.of(1, 1, large, small),
    rest: 0,
    inverse: Float64Array.of(small / apart, -1 / apart, -large / apart, 1 / apart),
    roots: [],
  });
}

/** Puts the parts back into one system over all states. */
function joined({ size: n, inputs }: StateForm, parts: readonly Part[]): ModalSystem {
  const count = parts.reduce((sum, { modal }) => sum + modal.count, 0);
  const rest = parts.reduce((sum, { modal }) => sum + modal.rest, 0);
  const out: ModalSystem = {
    size: n,
    inputs,
    count,
    rest,
    lambdaRe: new Float64Array(count),
    lambdaIm: new Float64Array(count),
    weight: new Float64Array(count),
    inputRe: new Float64Array(inputs * count),
    inputIm: new Float64Array(inputs * count),
    block: new Float64Array(rest * rest),
    blockInput: new Float64Array(rest * inputs),
    blockRate: parts.reduce((most, { modal }) => Math.max(most, modal.blockRate), 0),
    blockRoots: parts.flatMap(({ modal }) => modal.blockRoots),
    vectorRe: new Float64Array(n * count),
    vectorIm: new Float64Array(n * count),
    basis: new Float64Array(n * rest),
    leftRe: new Float64Array(count * n),
    leftIm: new Float64Array(count * n),
    left: new Float64Array(rest * n),
  };
  let single = 0;
  let open = 0;
  for (const part of parts) {
    putSingles(out, part, single);
    putBlock(out, part, open);
    single += part.modal.count;
    open += part.modal.rest;
  }
  return out;
}

function putSingles(out: ModalSystem, { states, modal }: Part, at: number): void {
  const { count, inputs, size: n } = out;
  out.lambdaRe.set(modal.lambdaRe, at);
  out.lambdaIm.set(modal.lambdaIm, at);
  out.weight.set(modal.weight, at);
  for (let k = 0; k < modal.count; k++) {
    for (let j = 0; j < inputs; j++) {
      out.inputRe[j * count + at + k] = modal.inputRe[j * modal.count + k];
      out.inputIm[j * count + at + k] = modal.inputIm[j * modal.count + k];
    }
    states.forEach((state, i) => {
      out.vectorRe[state * count + at + k] = modal.vectorRe[i * modal.count + k];
      out.vectorIm[state * count + at + k] = modal.vectorIm[i * modal.count + k];
      out.leftRe[(at + k) * n + state] = modal.leftRe[k * states.length + i];
      out.leftIm[(at + k) * n + state] = modal.leftIm[k * states.length + i];
    });
  }
}

function putBlock(out: ModalSystem, { states, modal }: Part, at: number): void {
  const { rest, inputs, size: n } = out;
  for (let k = 0; k < modal.rest; k++) {
    for (let l = 0; l < modal.rest; l++) {
      out.block[(at + k) * rest + at + l] = modal.block[k * modal.rest + l];
    }
    for (let j = 0; j < inputs; j++) {
      out.blockInput[(at + k) * inputs + j] = modal.blockInput[k * inputs + j];
    }
    states.forEach((state, i) => {
      out.basis[state * rest + at + k] = modal.basis[i * modal.rest + k];
      out.left[(at + k) * n + state] = modal.left[k * states.length + i];
    });
  }
}
