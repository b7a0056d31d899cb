/** Where a quantity comes to rest once every drive has ended or stands still. */
import { matrixExponential } from "../numerics/matrix-exponential.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { SIGNAL_DERIVATIVES, signalDerivatives } from "./drive-signal.ts";
import { type ModalOutput, type ModalSystem, modalDerivative } from "./time-modal.ts";
import { type Motion, outputValue } from "./time-motion.ts";
import type { ModalQuantity } from "./time-trace.ts";

/** A root with less damping than this (share of its own size) never comes to rest. */
const UNDAMPED = 1e-11;
/** Double roots are known to half the digits: a root of the block that decays by less may be one of zero. */
const DECAYS = 1e-6;
/** What makes up less than this of the motion at hand does not keep it from resting. */
const UNSEEN = 1e-9;

/**
 * The value of the quantity in the final equilibrium. Fails where a drive goes on, or where the quantity sees a
 * motion that never dies: an undamped mode that is in swing, a body that drifts.
 */
export function settledValue(motion: Motion, quantity: ModalQuantity): Outcome<number> {
  const standing = standingInputs(motion);
  if (!standing.ok) return fail(standing.reason);
  const row = new Float64Array(motion.width);
  const inputs = new Float64Array(motion.signals.length * SIGNAL_DERIVATIVES);
  const end = motion.rowAt(motion.duration, "before", row, inputs);
  if (!end.ok) return fail(end.reason);
  const outputs = [quantity.linear, ...quantity.products.flatMap((p) => [p.a, p.b])];
  const rest = equilibriumRow(motion.modal, standing.value, row, outputs);
  if (!rest.ok) return fail(rest.reason);
  const block = laterBlock(motion.modal, standing.value, row);
  if (!block.ok) return fail(block.reason);
  row.set(block.value, 2 * motion.modal.count);
  rest.value.set(block.value, 2 * motion.modal.count);
  for (const output of outputs) {
    const trouble = unrest(motion, output, row, rest.value, standing.value);
    if (trouble !== undefined) return fail(trouble);
  }
  let sum = outputValue(quantity.linear, rest.value, standing.value) + quantity.constant;
  for (const { factor, a, aConstant, b } of quantity.products) {
    sum +=
      factor *
      (outputValue(a, rest.value, standing.value) + aConstant) *
      outputValue(b, rest.value, standing.value);
  }
  return succeed(sum);
}

/** Input derivatives once all signals stand; fails where one goes on for ever. */
function standingInputs(motion: Motion): Outcome<Float64Array> {
  const out = new Float64Array(motion.signals.length * SIGNAL_DERIVATIVES);
  const values = new Float64Array(SIGNAL_DERIVATIVES);
  for (let j = 0; j < motion.signals.length; j++) {
    const signal = motion.signals[j];
    const last = signal.starts.length - 1;
    signalDerivatives(signal, last, Math.max(0, motion.duration - signal.starts[last]), values);
    const moving =
      (signal.omega !== 0 && (signal.sineRe[last] !== 0 || signal.sineIm[last] !== 0)) ||
      signal.coefficients.subarray(last * signal.order + 1, (last + 1) * signal.order).some((c) => c !== 0);
    if (moving) return fail("a drive goes on to the end, so nothing comes to rest");
    if (signal.starts[last] > motion.duration) return fail("a drive has not ended when the history ends");
    out[j * SIGNAL_DERIVATIVES] = values[0];
  }
  return succeed(out);
}

/**
 * The single roots' places under standing inputs; where a root of zero leaves one open it is that of `open`. One
 * that a load moves on for ever, as an angle at a running speed, may be open where no output sees it.
 */
function equilibriumRow(
  modal: ModalSystem,
  standing: Float64Array,
  open: Float64Array,
  outputs: readonly ModalOutput[],
): Outcome<Float64Array> {
  const { count, inputs } = modal;
  const out = new Float64Array(2 * count + modal.rest);
  for (let k = 0; k < count; k++) {
    let br = 0;
    let bi = 0;
    let size = 0;
    for (let j = 0; j < inputs; j++) {
      const load = standing[j * SIGNAL_DERIVATIVES];
      br += modal.inputRe[j * count + k] * load;
      bi += modal.inputIm[j * count + k] * load;
      size += Math.hypot(modal.inputRe[j * count + k], modal.inputIm[j * count + k]) * Math.abs(load);
    }
    const lr = modal.lambdaRe[k];
    const li = modal.lambdaIm[k];
    const square = lr * lr + li * li;
    if (square === 0) {
      if (Math.abs(br) > UNSEEN * size && outputs.some((output) => sees(output, k)))
        return fail("a standing load moves something that nothing holds");
      out[k] = open[k];
      continue;
    }
    out[k] = -(br * lr + bi * li) / square;
    out[count + k] = -(bi * lr - br * li) / square;
  }
  return succeed(out);
}

/** Whether a root makes up more of an output than rounding. */
function sees({ re, im }: ModalOutput, k: number): boolean {
  let most = 0;
  for (let i = 0; i < re.length; i++) most = Math.max(most, Math.hypot(re[i], im[i]));
  return Math.hypot(re[k], im[k]) > UNDAMPED * most;
}

/** The block so much later that whatever decays in it has died away: forty times its slowest decay. */
function laterBlock(modal: ModalSystem, standing: Float64Array, end: Float64Array): Outcome<Float64Array> {
  const { count, rest, inputs } = modal;
  const row = end.slice(2 * count);
  const decays = modal.blockRoots.map(([re, im]) => (re < -DECAYS * Math.hypot(re, im) ? -re : 0));
  const slowest = Math.min(...decays.filter((d) => d > 0));
  if (rest === 0 || !Number.isFinite(slowest)) return succeed(row);
  // The equations of the block with one state more, which holds the standing load.
  const width = rest + 1;
  const m = new Float64Array(width * width);
  const later = 40 / slowest;
  for (let i = 0; i < rest; i++) {
    for (let k = 0; k < rest; k++) m[i * width + k] = later * modal.block[i * rest + k];
    for (let j = 0; j < inputs; j++) {
      m[i * width + rest] += later * modal.blockInput[i * inputs + j] * standing[j * SIGNAL_DERIVATIVES];
    }
  }
  const step = matrixExponential(m, width);
  if (!step.ok) return fail("where it comes to rest cannot be told");
  const out = new Float64Array(rest);
  for (let i = 0; i < rest; i++) {
    out[i] = step.value[i * width + rest];
    for (let k = 0; k < rest; k++) out[i] += step.value[i * width + k] * row[k];
  }
  return succeed(out);
}

/** Why the output does not come to the resting row, if so. */
function unrest(
  motion: Motion,
  output: ModalOutput,
  end: Float64Array,
  rest: Float64Array,
  standing: Float64Array,
): string | undefined {
  const { modal } = motion;
  const { count } = modal;
  let scale = Math.abs(outputValue(output, rest, standing));
  for (let k = 0; k < count; k++) {
    scale = Math.max(scale, Math.hypot(output.re[k], output.im[k]) * Math.hypot(end[k], end[count + k]));
  }
  for (let k = 0; k < count; k++) {
    const lr = modal.lambdaRe[k];
    const size = Math.hypot(lr, modal.lambdaIm[k]);
    if (size === 0 || lr < -UNDAMPED * size) continue;
    const away = Math.hypot(end[k] - rest[k], end[count + k] - rest[count + k]);
    if (Math.hypot(output.re[k], output.im[k]) * away > UNSEEN * scale) {
      return lr > UNDAMPED * size
        ? "it grows for ever and never comes to rest"
        : "it swings for ever: nothing damps it";
    }
  }
  if (modal.rest === 0 || output.rest.every((v) => v === 0)) return undefined;
  return blockUnrest(motion, output, end, standing, scale);
}

/** Within the block the output rests when no derivative of it is left, or when all roots of the block decay. */
function blockUnrest(
  motion: Motion,
  output: ModalOutput,
  end: Float64Array,
  standing: Float64Array,
  modes: number,
): string | undefined {
  const { modal } = motion;
  const rate = Math.max(modal.blockRate, Number.MIN_VALUE);
  if (modal.blockRoots.every(([re, im]) => re < -DECAYS * Math.hypot(re, im))) return undefined;
  const { count, rest } = modal;
  const alone: ModalOutput = { ...output, re: new Float64Array(count), im: new Float64Array(count) };
  let derivative = alone;
  let scale = modes;
  for (let i = 0; i < rest; i++) scale += Math.abs(output.rest[i] * end[2 * count + i]);
  const reach = 1 / Math.max(rate, 1 / motion.duration);
  let left = 0;
  let factor = 1;
  for (let d = 0; d < rest; d++) {
    derivative = modalDerivative(modal, derivative);
    // Direct parts do not move any more: what is left is the block's own drift and its constant feed.
    factor *= reach;
    left = Math.max(left, factor * Math.abs(blockValue(derivative, end, count, standing)));
  }
  return left > UNSEEN * scale ? "it drifts on: nothing holds it" : undefined;
}

function blockValue(output: ModalOutput, row: Float64Array, count: number, standing: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < output.rest.length; i++) sum += output.rest[i] * row[2 * count + i];
  for (let k = 0; k < output.direct.length; k++) sum += output.direct[k] * standing[k];
  return sum;
}
