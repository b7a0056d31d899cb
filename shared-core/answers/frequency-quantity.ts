/**
 * Quantities of a steady answer, from the phasors of coordinates and supports.
 *
 * A linear quantity has one phasor for all drives at one ratio to the axis. Where drives at different ratios act
 * together no common phasor exists: the value is the sum of the magnitudes of the components, the largest the
 * quantity can reach when they meet in phase, and its imaginary part is 0.
 * Power is the mean over a cycle, positive when it goes into the element; components at different rates add.
 * Energy is the largest that each element stores in the cycle: the larger of half k x^2 and half b v^2, which
 * stand a quarter of a cycle apart; those of several elements are added. Preloads and gravity are no part of a steady answer.
 */
import type { Assembly, QuantityRef } from "../mechanics/assembly.ts";
import type { StateBlock } from "./frequency-block.ts";
import { type MotionTerm, quantityParts } from "./time-quantity.ts";

/** Phasors of all coordinates and supports for one group of drives. */
export interface GroupState {
  /** rad/s, of the group's own frequency. */
  omega: number;
  readonly xRe: Float64Array;
  readonly xIm: Float64Array;
  readonly sRe: Float64Array;
  readonly sIm: Float64Array;
}

/** Sum over coordinates and supports: factor * (1 + i loss) * (i omega)^derivative * phasor. */
interface FlatTerms {
  readonly count: number;
  readonly support: Uint8Array;
  readonly index: Int32Array;
  readonly derivative: Uint8Array;
  readonly factor: Float64Array;
  readonly loss: Float64Array;
}

export interface SteadyQuantity {
  readonly linear: FlatTerms;
  readonly products: readonly {
    readonly kind: "power" | "energy";
    readonly owner: number;
    readonly factor: number;
    /** The travel (energies: travel or rate) whose square it goes with. */
    readonly motion: FlatTerms;
    /** Of a power: hysteretic stiffness and damping, so that what loses nothing has a power of exactly zero. */
    readonly hysteretic: number;
    readonly viscous: number;
  }[];
}

export function steadyQuantity(assembly: Assembly, ref: QuantityRef): SteadyQuantity {
  const parts = quantityParts(assembly, ref);
  return {
    linear: flatten(parts.linear),
    products: parts.products.map(({ kind, owner, factor, a, b }) => ({
      kind,
      owner,
      factor,
      motion: flatten(kind === "energy" ? a : [{ ...b[0], derivative: 0 }]),
      hysteretic: a.reduce((sum, t) => sum + (t.derivative === 0 ? t.factor * t.loss : 0), 0),
      viscous: a.reduce((sum, t) => sum + (t.derivative === 1 ? t.factor : 0), 0),
    })),
  };
}

/** [re, im] into `out`. */
export function steadyValue(
  quantity: SteadyQuantity,
  groups: readonly GroupState[],
  out: Float64Array,
): void {
  if (groups.length === 1 && quantity.products.length === 0) {
    phasor(quantity.linear, groups[0], out);
    return;
  }
  let re = 0;
  let im = 0;
  if (quantity.linear.count > 0) {
    if (groups.length === 1) {
      phasor(quantity.linear, groups[0], scratch);
      re = scratch[0];
      im = scratch[1];
    } else {
      for (const group of groups) {
        phasor(quantity.linear, group, scratch);
        re += Math.hypot(scratch[0], scratch[1]);
      }
    }
  }
  if (quantity.products.length > 0) re += productValue(quantity, groups);
  out[0] = re;
  out[1] = im;
}

/** Writes the values of quantities that are all single motions of coordinates, as most are. */
export interface PlainWriter {
  /** Of one state, into place `i` of each column. */
  point(state: GroupState, i: number, re: readonly Float64Array[], im: readonly Float64Array[]): void;
  /** Of the first `count` lanes, into the places from `i` on. */
  block(
    block: StateBlock,
    count: number,
    i: number,
    re: readonly Float64Array[],
    im: readonly Float64Array[],
  ): void;
}

/** The quick way for tables of many coordinates; undefined where any quantity is more than that. */
export function plainMotions(quantities: readonly SteadyQuantity[]): PlainWriter | undefined {
  const single = ({ linear, products }: SteadyQuantity) =>
    products.length === 0 && linear.count === 1 && linear.support[0] === 0 && linear.loss[0] === 0;
  if (!quantities.every(single)) return undefined;
  const index = Int32Array.from(quantities, (q) => q.linear.index[0]);
  const factor = Float64Array.from(quantities, (q) => q.linear.factor[0]);
  const derivative = Uint8Array.from(quantities, (q) => q.linear.derivative[0]);
  return {
    point({ omega, xRe, xIm }, i, re, im) {
      for (let q = 0; q < index.length; q++) {
        const a = xRe[index[q]] * factor[q];
        const b = xIm[index[q]] * factor[q];
        const d = derivative[q];
        re[q][i] = d === 0 ? a : d === 1 ? -omega * b : -omega * omega * a;
        im[q][i] = d === 0 ? b : d === 1 ? omega * a : -omega * omega * b;
      }
    },
    block(block, count, i, re, im) {
      for (let q = 0; q < index.length; q++) {
        writeLanes(block, index[q], factor[q], derivative[q], count, re[q], im[q], i);
      }
    },
  };
}

function writeLanes(
  { stride, omega, row, re: xRe, im: xIm }: StateBlock,
  coordinate: number,
  factor: number,
  derivative: number,
  count: number,
  re: Float64Array,
  im: Float64Array,
  to: number,
): void {
  const at = row[coordinate] * stride;
  for (let lane = 0; lane < count; lane++) {
    const a = xRe[at + lane] * factor;
    const b = xIm[at + lane] * factor;
    const w = omega[lane];
    re[to + lane] = derivative === 0 ? a : derivative === 1 ? -w * b : -w * w * a;
    im[to + lane] = derivative === 0 ? b : derivative === 1 ? w * a : -w * w * b;
  }
}

/**
 * What the quantity would be if every coordinate moved as far as the one that moves furthest, all in step: the
 * size against which a value near a pole is only rounding.
 */
export function steadyScale({ linear, products }: SteadyQuantity, groups: readonly GroupState[]): number {
  let sum = 0;
  for (const group of groups) {
    const most = furthest(group);
    sum += termScale(linear, group, most);
    for (const { kind, factor, motion, hysteretic, viscous } of products) {
      const lost = kind === "power" ? 0.5 * group.omega * (hysteretic + group.omega * viscous) : 1;
      sum += Math.abs(factor * lost) * termScale(motion, group, most) ** 2;
    }
  }
  return sum;
}

function furthest({ xRe, xIm }: GroupState): number {
  let most = 0;
  for (let i = 0; i < xRe.length; i++) most = Math.max(most, Math.abs(xRe[i]), Math.abs(xIm[i]));
  return most;
}

function termScale(terms: FlatTerms, { omega }: GroupState, most: number): number {
  let sum = 0;
  for (let t = 0; t < terms.count; t++)
    sum += Math.abs(terms.factor[t]) * omega ** terms.derivative[t] * most;
  return sum;
}

function productValue({ products }: SteadyQuantity, groups: readonly GroupState[]): number {
  let sum = 0;
  for (let p = 0; p < products.length; p++) {
    if (products[p].kind === "power") {
      sum += meanPower(products[p], groups);
      continue;
    }
    let largest = largestEnergy(products[p], groups);
    while (p + 1 < products.length && products[p + 1].owner === products[p].owner) {
      const other = largestEnergy(products[++p], groups);
      if (Math.abs(other) > Math.abs(largest)) largest = other;
    }
    sum += largest;
  }
  return sum;
}

type Product = SteadyQuantity["products"][number];

/** Half Re(F V*) = half omega |x|^2 (k eta + omega c): springs and inerters give back what they take. */
function meanPower({ factor, motion, hysteretic, viscous }: Product, groups: readonly GroupState[]): number {
  let sum = 0;
  for (const group of groups) {
    phasor(motion, group, scratch);
    const square = scratch[0] * scratch[0] + scratch[1] * scratch[1];
    sum += 0.5 * factor * group.omega * square * (hysteretic + group.omega * viscous);
  }
  return sum;
}

function largestEnergy({ factor, motion }: Product, groups: readonly GroupState[]): number {
  let size = 0;
  for (const group of groups) {
    phasor(motion, group, scratch);
    size += Math.hypot(scratch[0], scratch[1]);
  }
  return factor * size * size;
}

const scratch = new Float64Array(2);

function phasor(terms: FlatTerms, group: GroupState, out: Float64Array): void {
  let re = 0;
  let im = 0;
  const { omega } = group;
  for (let t = 0; t < terms.count; t++) {
    const at = terms.index[t];
    let pr = terms.support[t] ? group.sRe[at] : group.xRe[at];
    let pi = terms.support[t] ? group.sIm[at] : group.xIm[at];
    const derivative = terms.derivative[t];
    if (derivative === 1) {
      const kept = pr;
      pr = -omega * pi;
      pi = omega * kept;
    } else if (derivative === 2) {
      pr *= -omega * omega;
      pi *= -omega * omega;
    }
    const factor = terms.factor[t];
    const lossy = factor * terms.loss[t];
    re += factor * pr - lossy * pi;
    im += factor * pi + lossy * pr;
  }
  out[0] = re;
  out[1] = im;
}

function flatten(terms: readonly MotionTerm[]): FlatTerms {
  const support: number[] = [];
  const index: number[] = [];
  const derivative: number[] = [];
  const factor: number[] = [];
  const loss: number[] = [];
  for (const term of terms) {
    const add = (isSupport: number, at: number, share: number) => {
      support.push(isSupport);
      index.push(at);
      derivative.push(term.derivative);
      factor.push(term.factor * share);
      loss.push(term.loss);
    };
    term.form.coordinates.forEach((at, k) => {
      add(0, at, term.form.factors[k]);
    });
    term.form.supports.forEach((at, k) => {
      add(1, at, term.form.supportFactors[k]);
    });
  }
  return {
    count: index.length,
    support: Uint8Array.from(support),
    index: Int32Array.from(index),
    derivative: Uint8Array.from(derivative),
    factor: Float64Array.from(factor),
    loss: Float64Array.from(loss),
  };
}
