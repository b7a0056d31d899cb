/**
 * One exact step of a modal system over a time h, for inputs that are polynomials plus a sinusoid on the step.
 *
 * A single root: eta(h) = e^(lambda h) eta + b (sum of c_p p! h^(p+1) phi_(p+1)(lambda h) + the sinusoid's part);
 * the block: the exponential of its matrix augmented by the input's own generator (Van Loan, Computing integrals
 * involving the matrix exponential, IEEE Trans. Automatic Control 23, 1978). Both are exact for any h.
 */
import { matrixExponential } from "../numerics/matrix-exponential.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { ModalSystem } from "./time-modal.ts";
import { phiFunctions, sineResponse } from "./time-phi.ts";

/** What a step has to know of an input: how many powers and which rate (rad/s, 0: none). */
export interface InputShape {
  readonly order: number;
  readonly omega: number;
}

export interface Propagator {
  readonly h: number;
  readonly expRe: Float64Array;
  readonly expIm: Float64Array;
  /** Per input: response to tau^p, order x count. */
  readonly powerRe: readonly Float64Array[];
  readonly powerIm: readonly Float64Array[];
  /** Per input: response to Re(S e^(i omega tau)) is S * plus + conj(S) * minus; count each, re then im. */
  readonly plus: readonly Float64Array[];
  readonly minus: readonly Float64Array[];
  /** rest x rest. */
  readonly block: Float64Array;
  /** Per input: (order + 2) x rest: powers, then the responses to cos and -sin. */
  readonly blockInput: readonly Float64Array[];
}

export function makePropagator(
  modal: ModalSystem,
  shapes: readonly InputShape[],
  h: number,
): Outcome<Propagator> {
  const { count } = modal;
  const orders = Math.max(1, ...shapes.map((s) => s.order));
  const phiRe = new Float64Array(orders + 1);
  const phiIm = new Float64Array(orders + 1);
  const expRe = new Float64Array(count);
  const expIm = new Float64Array(count);
  const powerRe = shapes.map((s) => new Float64Array(s.order * count));
  const powerIm = shapes.map((s) => new Float64Array(s.order * count));
  const plus = shapes.map((s) => new Float64Array(s.omega === 0 ? 0 : 2 * count));
  const minus = shapes.map((s) => new Float64Array(s.omega === 0 ? 0 : 2 * count));
  const response = new Float64Array(2);
  for (let k = 0; k < count; k++) {
    const lr = modal.lambdaRe[k];
    const li = modal.lambdaIm[k];
    phiFunctions(lr * h, li * h, orders, phiRe, phiIm);
    expRe[k] = phiRe[0];
    expIm[k] = phiIm[0];
    for (let j = 0; j < shapes.length; j++) {
      const br = modal.inputRe[j * count + k];
      const bi = modal.inputIm[j * count + k];
      if (br === 0 && bi === 0) continue;
      let factor = h;
      for (let p = 0; p < shapes[j].order; p++) {
        if (p > 0) factor *= p * h;
        powerRe[j][p * count + k] = factor * (br * phiRe[p + 1] - bi * phiIm[p + 1]);
        powerIm[j][p * count + k] = factor * (br * phiIm[p + 1] + bi * phiRe[p + 1]);
      }
      const { omega } = shapes[j];
      if (omega === 0) continue;
      sineResponse(lr, li, omega, h, response);
      plus[j][k] = 0.5 * (br * response[0] - bi * response[1]);
      plus[j][count + k] = 0.5 * (br * response[1] + bi * response[0]);
      sineResponse(lr, li, -omega, h, response);
      minus[j][k] = 0.5 * (br * response[0] - bi * response[1]);
      minus[j][count + k] = 0.5 * (br * response[1] + bi * response[0]);
    }
  }
  const blockParts = makeBlock(modal, shapes, h);
  if (!blockParts.ok) return fail(blockParts.reason);
  return succeed({ h, expRe, expIm, powerRe, powerIm, plus, minus, ...blockParts.value });
}

/** Inputs as they stand at the start of a step: powers of tau, then Re S, Im S; one array an input. */
export type StepInputs = readonly Float64Array[];

/**
 * Writes the modal row `to` from the row `from` (both 2 count + rest long, in `rows`); they may not overlap.
 */
export function advance(
  modal: ModalSystem,
  shapes: readonly InputShape[],
  step: Propagator,
  inputs: StepInputs,
  rows: Float64Array,
  from: number,
  to: number,
): void {
  const { count, rest } = modal;
  let fused = 0;
  if (shapes.length > 0 && shapes[0].order >= 2) {
    advanceLine(count, step, inputs[0][0], inputs[0][1], rows, from, to);
    fused = 2;
  } else advanceFree(count, step, rows, from, to);
  for (let j = 0; j < shapes.length; j++) {
    const { order, omega } = shapes[j];
    const input = inputs[j];
    const powerRe = step.powerRe[j];
    const powerIm = step.powerIm[j];
    for (let p = j === 0 ? fused : 0; p < order; p++) {
      const c = input[p];
      if (c === 0) continue;
      const at = p * count;
      for (let k = 0; k < count; k++) {
        rows[to + k] += c * powerRe[at + k];
        rows[to + count + k] += c * powerIm[at + k];
      }
    }
    if (omega !== 0) addSine(step, j, input[order], input[order + 1], count, rows, to);
  }
  if (rest > 0) advanceBlock(modal, shapes, step, inputs, rows, from + 2 * count, to + 2 * count);
}

function advanceFree(count: number, step: Propagator, rows: Float64Array, from: number, to: number): void {
  const { expRe, expIm } = step;
  for (let k = 0; k < count; k++) {
    const re = rows[from + k];
    const im = rows[from + count + k];
    rows[to + k] = expRe[k] * re - expIm[k] * im;
    rows[to + count + k] = expRe[k] * im + expIm[k] * re;
  }
}

/** The same with the first input's straight line in one pass: the inner loop of every record. */
function advanceLine(
  count: number,
  step: Propagator,
  c0: number,
  c1: number,
  rows: Float64Array,
  from: number,
  to: number,
): void {
  const { expRe, expIm } = step;
  const powerRe = step.powerRe[0];
  const powerIm = step.powerIm[0];
  for (let k = 0; k < count; k++) {
    const re = rows[from + k];
    const im = rows[from + count + k];
    rows[to + k] = expRe[k] * re - expIm[k] * im + c0 * powerRe[k] + c1 * powerRe[count + k];
    rows[to + count + k] = expRe[k] * im + expIm[k] * re + c0 * powerIm[k] + c1 * powerIm[count + k];
  }
}

function addSine(
  step: Propagator,
  j: number,
  re: number,
  im: number,
  count: number,
  rows: Float64Array,
  to: number,
): void {
  if (re === 0 && im === 0) return;
  const plus = step.plus[j];
  const minus = step.minus[j];
  for (let k = 0; k < count; k++) {
    const pr = plus[k];
    const pi = plus[count + k];
    const mr = minus[k];
    const mi = minus[count + k];
    rows[to + k] += re * (pr + mr) - im * (pi - mi);
    rows[to + count + k] += re * (pi + mi) + im * (pr - mr);
  }
}

function advanceBlock(
  modal: ModalSystem,
  shapes: readonly InputShape[],
  step: Propagator,
  inputs: StepInputs,
  rows: Float64Array,
  from: number,
  to: number,
): void {
  const { rest } = modal;
  for (let i = 0; i < rest; i++) {
    let sum = 0;
    for (let k = 0; k < rest; k++) sum += step.block[i * rest + k] * rows[from + k];
    rows[to + i] = sum;
  }
  for (let j = 0; j < shapes.length; j++) {
    const table = step.blockInput[j];
    const terms = shapes[j].order + (shapes[j].omega === 0 ? 0 : 2);
    for (let p = 0; p < terms; p++) {
      const c = inputs[j][p];
      if (c === 0) continue;
      for (let i = 0; i < rest; i++) rows[to + i] += c * table[p * rest + i];
    }
  }
}

function makeBlock(
  modal: ModalSystem,
  shapes: readonly InputShape[],
  h: number,
): Outcome<{ block: Float64Array; blockInput: Float64Array[] }> {
  const { rest } = modal;
  if (rest === 0) return succeed({ block: new Float64Array(0), blockInput: [] });
  const plain = new Float64Array(rest * rest);
  for (let p = 0; p < plain.length; p++) plain[p] = modal.block[p] * h;
  const block = matrixExponential(plain, rest);
  if (!block.ok) return fail(`one step of ${h} s cannot be taken: ${block.reason}`);
  const blockInput: Float64Array[] = [];
  for (let j = 0; j < shapes.length; j++) {
    const table = blockResponses(modal, shapes[j], j, h);
    if (!table.ok) return fail(table.reason);
    blockInput.push(table.value);
  }
  return succeed({ block: block.value, blockInput });
}

/** Powers by a chain of integrators in front of the block, the sinusoid by a rotation. */
function blockResponses(modal: ModalSystem, shape: InputShape, j: number, h: number): Outcome<Float64Array> {
  const { rest, inputs } = modal;
  const { order, omega } = shape;
  const table = new Float64Array((order + 2) * rest);
  const column = Float64Array.from({ length: rest }, (_, i) => modal.blockInput[i * inputs + j]);
  if (column.every((v) => v === 0)) return succeed(table);
  const chain = augmentedExponential(modal, column, order, h, (m, width) => {
    // Chain state q feeds q + 1 at the rate 1/h, so that state q starts tau^(order - 1 - q) in units of h.
    for (let q = 0; q + 1 < order; q++) m[(rest + q + 1) * width + rest + q] = 1;
  });
  if (!chain.ok) return chain;
  for (let q = 0; q < order; q++) {
    const p = order - 1 - q;
    let factor = 1;
    for (let k = 1; k <= p; k++) factor *= k * h;
    for (let i = 0; i < rest; i++) table[p * rest + i] = factor * chain.value[i * (rest + order) + rest + q];
  }
  if (omega === 0) return succeed(table);
  const turn = augmentedExponential(modal, column, 2, h, (m, width) => {
    // The input reads the second state, which starts as cos (or as -sin when the first starts).
    m[(rest + 1) * width + rest] = omega * h;
    m[rest * width + rest + 1] = -omega * h;
  });
  if (!turn.ok) return turn;
  for (let i = 0; i < rest; i++) {
    table[order * rest + i] = turn.value[i * (rest + 2) + rest + 1];
    table[(order + 1) * rest + i] = -turn.value[i * (rest + 2) + rest];
  }
  return succeed(table);
}

/** exp of [A h, b h on the last of `extra` states; 0, generator]. */
function augmentedExponential(
  modal: ModalSystem,
  column: Float64Array,
  extra: number,
  h: number,
  generator: (m: Float64Array, width: number) => void,
): Outcome<Float64Array> {
  const { rest, block } = modal;
  const width = rest + extra;
  const m = new Float64Array(width * width);
  for (let i = 0; i < rest; i++) {
    for (let k = 0; k < rest; k++) m[i * width + k] = block[i * rest + k] * h;
    m[i * width + width - 1] = column[i] * h;
  }
  generator(m, width);
  const made = matrixExponential(m, width);
  return made.ok ? made : fail(`one step of ${h} s cannot be taken: ${made.reason}`);
}
