/**
 * The dynamic stiffness Z(s) = K + i H + s C + s^2 M of an assembly, factored frequency by frequency.
 *
 * Coordinates without inertia stand in it as they are: Z is regular wherever the model has a steady response.
 * Models that are narrow after reverse Cuthill-McKee ordering take the banded symmetric route, O(n) a frequency;
 * the others complex LU. H is that of the loss factors (s on the upper imaginary axis).
 */
import type { Assembly } from "../mechanics/assembly.ts";
import { type SystemMatrices, systemMatrices } from "../mechanics/matrices.ts";
import { type BandWorkspace, bandWorkspace, factorBand, solveBand } from "../numerics/band-solve.ts";
import {
  type ComplexLu,
  complexLuWorkspace,
  factorComplexLu,
  solveComplexLu,
} from "../numerics/complex-lu.ts";
import { bandwidthOf, patternOf, reverseCuthillMcKee } from "../numerics/ordering.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type SparseMatrix, sparseToBand, sparseToDense } from "../numerics/sparse.ts";
import { type LaneSolver, tridiagonalLanes } from "../numerics/tridiagonal-many.ts";

/** Modal damping over the free coordinates: free x free, and what a support's velocity adds, free x supports. */
export interface FreeDamping {
  readonly matrix: Float64Array;
  readonly support: Float64Array;
}

export interface SteadySystem {
  readonly free: number;
  readonly supports: number;
  /** "band" or "dense". */
  readonly route: "band" | "dense";
  /** Prepares Z(s), s = sRe + i sIm. Fails where Z is singular. */
  factor(sRe: number, sIm: number): Outcome<true>;
  /** Z(i omega)^-1 at many omega at once, for chains; coordinate i stands in row `row[i]`. */
  readonly lanes?: { readonly row: Int32Array; readonly solve: LaneSolver };
  /** x <- Z^-1 x for the last factorisation, one right-hand side over the free coordinates. */
  solve(xRe: Float64Array, xIm: Float64Array): void;
  /** x += -(K_s + i H_s + s C_s + s^2 M_s) times a support's displacement. */
  addSupportLoad(
    sRe: number,
    sIm: number,
    support: number,
    re: number,
    im: number,
    xRe: Float64Array,
    xIm: Float64Array,
  ): void;
  /** y = (C + 2 s M) x, the derivative of Z along s. */
  derivative(sRe: number, sIm: number, xRe: Float64Array, xIm: Float64Array): [Float64Array, Float64Array];
}

/** Bands wider than this share of n are no quicker than a dense factorisation. */
const WIDEST = 0.4;

/** `route` forces one; by default the quicker one is taken. */
export function steadySystem(
  assembly: Assembly,
  added?: FreeDamping,
  route?: "band" | "dense",
): SteadySystem {
  const matrices = systemMatrices(assembly);
  const { mass, damping, stiffness, hysteretic } = matrices;
  const n = matrices.free;
  const pattern = patternOf([mass, damping, stiffness, hysteretic], n);
  const order = reverseCuthillMcKee(pattern);
  const bandwidth = bandwidthOf(pattern, order);
  const symmetric = (assembly.extras ?? []).length === 0;
  const narrow = symmetric && added === undefined && bandwidth <= Math.max(2, WIDEST * n);
  if (symmetric && added === undefined && (route ?? (narrow ? "band" : "dense")) === "band") {
    return new BandSystem(matrices, assembly.supports.length, order, bandwidth);
  }
  return new DenseSystem(matrices, assembly.supports.length, added);
}

abstract class Base {
  readonly free: number;
  readonly supports: number;
  protected readonly matrices: SystemMatrices;
  protected readonly added: FreeDamping | undefined;

  constructor(matrices: SystemMatrices, supports: number, added: FreeDamping | undefined) {
    this.matrices = matrices;
    this.free = matrices.free;
    this.supports = supports;
    this.added = added;
  }

  addSupportLoad(
    sRe: number,
    sIm: number,
    support: number,
    re: number,
    im: number,
    xRe: Float64Array,
    xIm: Float64Array,
  ): void {
    const m = this.matrices;
    addColumn(m.stiffnessSupport, support, -re, -im, xRe, xIm);
    addColumn(m.hystereticSupport, support, im, -re, xRe, xIm);
    // The support's velocity and acceleration.
    const vRe = sRe * re - sIm * im;
    const vIm = sRe * im + sIm * re;
    addColumn(m.dampingSupport, support, -vRe, -vIm, xRe, xIm);
    addColumn(m.massSupport, support, sIm * vIm - sRe * vRe, -(sRe * vIm + sIm * vRe), xRe, xIm);
    const { added } = this;
    if (added === undefined) return;
    for (let i = 0; i < this.free; i++) {
      const factor = added.support[i * this.supports + support];
      xRe[i] += factor * vRe;
      xIm[i] += factor * vIm;
    }
  }

  derivative(sRe: number, sIm: number, xRe: Float64Array, xIm: Float64Array): [Float64Array, Float64Array] {
    const re = new Float64Array(this.free);
    const im = new Float64Array(this.free);
    addProduct(this.matrices.damping, 1, 0, xRe, xIm, re, im);
    addProduct(this.matrices.mass, 2 * sRe, 2 * sIm, xRe, xIm, re, im);
    const { added, free: n } = this;
    for (let i = 0; added !== undefined && i < n; i++) {
      for (let j = 0; j < n; j++) {
        re[i] += added.matrix[i * n + j] * xRe[j];
        im[i] += added.matrix[i * n + j] * xIm[j];
      }
    }
    return [re, im];
  }
}

class BandSystem extends Base implements SteadySystem {
  readonly route = "band";
  readonly #order: Int32Array;
  readonly #bands: readonly Float64Array[];
  readonly #workspace: BandWorkspace;
  readonly #xRe: Float64Array;
  readonly #xIm: Float64Array;
  readonly #lossy: boolean;
  #lanes: { row: Int32Array; solve: LaneSolver } | undefined;

  constructor(matrices: SystemMatrices, supports: number, order: Int32Array, bandwidth: number) {
    super(matrices, supports, undefined);
    const { mass, damping, stiffness, hysteretic } = matrices;
    this.#order = order;
    this.#bands = [mass, damping, stiffness, hysteretic].map((m) => sparseToBand(m, bandwidth, order).values);
    this.#workspace = bandWorkspace(this.free, bandwidth);
    this.#xRe = new Float64Array(this.free);
    this.#xIm = new Float64Array(this.free);
    this.#lossy = hysteretic.value.some((v) => v !== 0);
  }

  get lanes(): { row: Int32Array; solve: LaneSolver } | undefined {
    if (this.#workspace.bandwidth !== 1) return undefined;
    if (this.#lanes === undefined) {
      const [m, c, k, h] = this.#bands;
      const row = new Int32Array(this.free);
      this.#order.forEach((i, t) => {
        row[i] = t;
      });
      this.#lanes = { row, solve: tridiagonalLanes({ n: this.free, m, c, k, h }) };
    }
    return this.#lanes;
  }

  factor(sRe: number, sIm: number): Outcome<true> {
    const [m, c, k, h] = this.#bands;
    const { re, im } = this.#workspace;
    const qRe = sRe * sRe - sIm * sIm;
    const qIm = 2 * sRe * sIm;
    if (sRe === 0) {
      for (let p = 0; p < re.length; p++) {
        re[p] = k[p] + qRe * m[p];
        im[p] = sIm * c[p];
      }
    } else {
      for (let p = 0; p < re.length; p++) {
        re[p] = k[p] + sRe * c[p] + qRe * m[p];
        im[p] = sIm * c[p] + qIm * m[p];
      }
    }
    if (this.#lossy) for (let p = 0; p < im.length; p++) im[p] += h[p];
    return factorBand(this.#workspace);
  }

  solve(xRe: Float64Array, xIm: Float64Array): void {
    const order = this.#order;
    for (let t = 0; t < order.length; t++) {
      this.#xRe[t] = xRe[order[t]];
      this.#xIm[t] = xIm[order[t]];
    }
    solveBand(this.#workspace, this.#xRe, this.#xIm);
    for (let t = 0; t < order.length; t++) {
      xRe[order[t]] = this.#xRe[t];
      xIm[order[t]] = this.#xIm[t];
    }
  }
}

class DenseSystem extends Base implements SteadySystem {
  readonly route = "dense";
  readonly #parts: readonly Float64Array[];
  readonly #re: Float64Array;
  readonly #im: Float64Array;
  readonly #workspace: ComplexLu;
  readonly #bRe: Float64Array;
  readonly #bIm: Float64Array;

  constructor(matrices: SystemMatrices, supports: number, added: FreeDamping | undefined) {
    super(matrices, supports, added);
    const { mass, damping, stiffness, hysteretic } = matrices;
    this.#parts = [mass, damping, stiffness, hysteretic].map((m: SparseMatrix) => sparseToDense(m));
    if (added !== undefined)
      for (let p = 0; p < added.matrix.length; p++) this.#parts[1][p] += added.matrix[p];
    const n = this.free;
    this.#re = new Float64Array(n * n);
    this.#im = new Float64Array(n * n);
    this.#workspace = complexLuWorkspace(n);
    this.#bRe = new Float64Array(n);
    this.#bIm = new Float64Array(n);
  }

  factor(sRe: number, sIm: number): Outcome<true> {
    const [m, c, k, h] = this.#parts;
    const qRe = sRe * sRe - sIm * sIm;
    const qIm = 2 * sRe * sIm;
    for (let p = 0; p < m.length; p++) {
      this.#re[p] = k[p] + sRe * c[p] + qRe * m[p];
      this.#im[p] = h[p] + sIm * c[p] + qIm * m[p];
    }
    const factored = factorComplexLu(this.#re, this.#im, this.free, this.#workspace);
    return factored.ok ? DONE : fail(factored.reason);
  }

  solve(xRe: Float64Array, xIm: Float64Array): void {
    this.#bRe.set(xRe);
    this.#bIm.set(xIm);
    solveComplexLu(this.#workspace, this.#bRe, this.#bIm, 1, xRe, xIm);
  }
}

const DONE = succeed(true as const);

/** x += (re + i im) * column of A. */
function addColumn(
  a: SparseMatrix,
  column: number,
  re: number,
  im: number,
  xRe: Float64Array,
  xIm: Float64Array,
): void {
  for (let i = 0; i < a.rows; i++) {
    for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) {
      if (a.column[p] !== column) continue;
      xRe[i] += re * a.value[p];
      xIm[i] += im * a.value[p];
    }
  }
}

/** y += (re + i im) A x. */
function addProduct(
  a: SparseMatrix,
  re: number,
  im: number,
  xRe: Float64Array,
  xIm: Float64Array,
  yRe: Float64Array,
  yIm: Float64Array,
): void {
  for (let i = 0; i < a.rows; i++) {
    for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) {
      const vRe = a.value[p] * xRe[a.column[p]];
      const vIm = a.value[p] * xIm[a.column[p]];
      yRe[i] += re * vRe - im * vIm;
      yIm[i] += re * vIm + im * vRe;
    }
  }
}
