/**
 * First-order equations of a linear system, exact where places without inertia are in it.
 *
 * State y = (p, p', d): displacements and velocities of the inertial coordinates, displacements of the relaxing
 * ones (massless.ts). Inputs u are loads along forms and displacements of supports:
 *
 *   y' = A y + B0 u + B1 u' + B2 u'',   q = R y + D u
 *
 * with q the free coordinates of the assembly. Velocities and accelerations follow by differentiating q.
 * Supports enter with K_s, C_s and M_s; modal damping, loss factors included, comes as a matrix over the
 * inertial coordinates.
 */
import { factorCholesky, factorLu, solveCholesky, solveLu } from "../numerics/dense.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type SparseMatrix, sparseToDense } from "../numerics/sparse.ts";
import type { Assembly, LinearForm } from "./assembly.ts";
import { formValue } from "./forms.ts";
import { type Reduction, reduceSystem } from "./massless.ts";
import { sumSupportTerms, sumTerms, systemTerms, type Term } from "./matrices.ts";

/** A force (N, N*m) along a form over the free coordinates, or a support's displacement (m, rad). */
export type StateInput =
  | { readonly kind: "load"; readonly form: LinearForm }
  | { readonly kind: "support"; readonly support: number };

/** All matrices dense and row-major, SI. */
export interface StateSpace {
  readonly reduction: Reduction;
  /** N = 2 inertial + relaxing. */
  readonly size: number;
  readonly a: Float64Array;
  /** J. */
  readonly inputs: number;
  /** N x J, for the inputs and their first and second derivatives. */
  readonly b0: Float64Array;
  readonly b1: Float64Array;
  readonly b2: Float64Array;
  /** free x N. */
  readonly displacement: Float64Array;
  /** free x J. */
  readonly displacementDirect: Float64Array;
  /** The state at which the free coordinates stand at `q` and the inertial ones move with `v`, supports still. */
  stateOf(q: ArrayLike<number>, v: ArrayLike<number>): Float64Array;
}

/**
 * `modal` is an inertial x inertial damping matrix added to C (see modal-damping.ts). Fails as `reduceSystem`
 * does, or where dampers of both signs cancel on a place without inertia.
 */
export function stateSpace(
  assembly: Assembly,
  inputs: readonly StateInput[],
  modal?: Float64Array,
): Outcome<StateSpace> {
  const reduced = reduceSystem(assembly, { keepDamperOnly: true });
  if (!reduced.ok) return fail(reduced.reason);
  const blocks = new Blocks(assembly, reduced.value, inputs, modal);
  return blocks.assemble();
}

class Blocks {
  readonly #assembly: Assembly;
  readonly #reduction: Reduction;
  readonly #inputs: readonly StateInput[];
  readonly #m: number;
  readonly #d: number;
  readonly #mass: Float64Array;
  readonly #damping: Float64Array;
  readonly #stiffness: Float64Array;
  /** (m + d) x J loads of the inputs and of their derivatives. */
  readonly #load: readonly [Float64Array, Float64Array, Float64Array];

  constructor(
    assembly: Assembly,
    reduction: Reduction,
    inputs: readonly StateInput[],
    modal: Float64Array | undefined,
  ) {
    this.#assembly = assembly;
    this.#reduction = reduction;
    this.#inputs = inputs;
    this.#m = reduction.inertial;
    this.#d = reduction.relaxing;
    const all = this.#m + this.#d;
    const mass = reduction.mass.map(asTerm);
    const damping = [
      ...reduction.damping.map(asTerm),
      ...mass.map((term) => ({ ...term, value: assembly.massDamping * term.value })),
    ];
    const stiffness = reduction.stiffness.map(asTerm);
    this.#mass = sparseToDense(sumTerms(mass, all));
    this.#damping = sparseToDense(sumTerms(damping, all));
    this.#stiffness = sparseToDense(sumTerms(stiffness, all));
    for (let i = 0; modal !== undefined && i < this.#m; i++) {
      for (let j = 0; j < this.#m; j++) this.#damping[i * all + j] += modal[i * this.#m + j];
    }
    const supports = assembly.supports.length;
    this.#load = [
      this.#loads(sumSupportTerms(stiffness, all, supports), true),
      this.#loads(sumSupportTerms(damping, all, supports), false),
      this.#loads(sumSupportTerms(mass, all, supports), false),
    ];
  }

  /** Minus the support columns; loads stand beside the displacements. */
  #loads(coupling: SparseMatrix, withForces: boolean): Float64Array {
    const all = this.#m + this.#d;
    const dense = sparseToDense(coupling);
    const count = this.#inputs.length;
    const out = new Float64Array(all * count);
    this.#inputs.forEach((input, j) => {
      if (input.kind === "support") {
        for (let i = 0; i < all; i++) out[i * count + j] = -dense[i * coupling.columns + input.support];
      } else if (withForces) {
        const { coordinates, factors } = this.#reduction.load(input.form);
        coordinates.forEach((i, k) => {
          out[i * count + j] = factors[k];
        });
      }
    });
    return out;
  }

  assemble(): Outcome<StateSpace> {
    const m = this.#m;
    const d = this.#d;
    const count = this.#inputs.length;
    const size = 2 * m + d;
    const massFactor = factorCholesky(this.#block(this.#mass, 0, m, 0, m), m);
    if (!massFactor.ok) return fail("the mass matrix is not positive definite");
    const dampingFactor = factorLu(this.#block(this.#damping, m, d, m, d), d);
    if (!dampingFactor.ok) return fail("dampers cancel on a place without inertia");
    // Columns of the right-hand sides: state (p, v, d), then the inputs and their two derivatives.
    const width = size + 3 * count;
    const relaxed = new Float64Array(d * width);
    this.#put(relaxed, width, m, d, (i, j) => -this.#entry(this.#stiffness, i, j), 0, 0, m);
    this.#put(relaxed, width, m, d, (i, j) => -this.#entry(this.#damping, i, j), 0, m, m);
    this.#put(relaxed, width, m, d, (i, j) => -this.#entry(this.#stiffness, i, j), m, 2 * m, d);
    this.#putLoads(relaxed, width, m, d);
    const rates = d > 0 ? solveLu(dampingFactor.value, relaxed, width) : relaxed;
    const forces = new Float64Array(m * width);
    this.#put(forces, width, 0, m, (i, j) => -this.#entry(this.#stiffness, i, j), 0, 0, m);
    this.#put(forces, width, 0, m, (i, j) => -this.#entry(this.#damping, i, j), 0, m, m);
    this.#put(forces, width, 0, m, (i, j) => -this.#entry(this.#stiffness, i, j), m, 2 * m, d);
    this.#putLoads(forces, width, 0, m);
    for (let i = 0; i < m; i++) {
      for (let k = 0; k < d; k++) {
        const c = this.#entry(this.#damping, i, m + k);
        if (c === 0) continue;
        for (let j = 0; j < width; j++) forces[i * width + j] -= c * rates[k * width + j];
      }
    }
    const accelerations = solveCholesky(massFactor.value, forces, width);
    return succeed(this.#result(size, width, accelerations, rates));
  }

  #result(size: number, width: number, accelerations: Float64Array, rates: Float64Array): StateSpace {
    const m = this.#m;
    const count = this.#inputs.length;
    const a = new Float64Array(size * size);
    const b = [0, 1, 2].map(() => new Float64Array(size * count));
    for (let i = 0; i < m; i++) a[i * size + m + i] = 1;
    for (let i = m; i < size; i++) {
      const from = i < 2 * m ? accelerations : rates;
      const at = (i < 2 * m ? i - m : i - 2 * m) * width;
      for (let j = 0; j < size; j++) a[i * size + j] = from[at + j];
      for (let order = 0; order < 3; order++) {
        for (let j = 0; j < count; j++) b[order][i * count + j] = from[at + size + order * count + j];
      }
    }
    const [displacement, displacementDirect] = this.#outputs(size);
    return {
      reduction: this.#reduction,
      size,
      a,
      inputs: count,
      b0: b[0],
      b1: b[1],
      b2: b[2],
      displacement,
      displacementDirect,
      stateOf: (q, v) => this.#stateOf(q, v),
    };
  }

  #outputs(size: number): [Float64Array, Float64Array] {
    const m = this.#m;
    const { free } = this.#assembly;
    const count = this.#inputs.length;
    const displacement = new Float64Array(free * size);
    const direct = new Float64Array(free * count);
    const { recovery } = this.#reduction;
    const column = (i: number) => (i < m ? i : i + m);
    recovery.forEach((form, q) => {
      form.coordinates.forEach((i, k) => {
        displacement[q * size + column(i)] = form.factors[k];
      });
    });
    this.#inputs.forEach((input, j) => {
      if (input.kind === "load") {
        const local = this.#reduction.compliance(input.form);
        for (let q = 0; q < free; q++) direct[q * count + j] = local[q];
        return;
      }
      recovery.forEach((form, q) => {
        const at = form.supports.indexOf(input.support);
        if (at >= 0) direct[q * count + j] = form.supportFactors[at];
      });
    });
    return [displacement, direct];
  }

  /** Inertial coordinates by the momentum they carry, relaxing ones by the travel of their dampers. */
  #stateOf(q: ArrayLike<number>, v: ArrayLike<number>): Float64Array {
    const m = this.#m;
    const d = this.#d;
    const y = new Float64Array(2 * m + d);
    const before = systemTerms({ ...this.#assembly, massDamping: 0 });
    const factor = factorCholesky(this.#block(this.#mass, 0, m, 0, m), m);
    if (!factor.ok) return y;
    const momentum = (x: ArrayLike<number>) =>
      solveCholesky(factor.value, gather(before.mass, this.#reduction.mass, x, 0, m));
    y.set(momentum(q), 0);
    y.set(momentum(v), m);
    if (d === 0) return y;
    const damper = factorLu(this.#block(this.#damping, m, d, m, d), d);
    if (!damper.ok) return y;
    const load = gather(before.damping, this.#reduction.damping, q, m, d);
    for (let k = 0; k < d; k++) {
      for (let i = 0; i < m; i++) load[k] -= this.#entry(this.#damping, m + k, i) * y[i];
    }
    y.set(solveLu(damper.value, load), 2 * m);
    return y;
  }

  #entry(matrix: Float64Array, row: number, column: number): number {
    return matrix[row * (this.#m + this.#d) + column];
  }

  #block(matrix: Float64Array, row: number, rows: number, column: number, columns: number): Float64Array {
    const out = new Float64Array(rows * columns);
    for (let i = 0; i < rows; i++) {
      for (let j = 0; j < columns; j++) out[i * columns + j] = this.#entry(matrix, row + i, column + j);
    }
    return out;
  }

  /** Writes `entry(firstRow + i, firstColumn + j)` for `rows` x `columns` at column `at` of `out`. */
  #put(
    out: Float64Array,
    width: number,
    firstRow: number,
    rows: number,
    entry: (row: number, column: number) => number,
    firstColumn: number,
    at: number,
    columns: number,
  ): void {
    for (let i = 0; i < rows; i++) {
      for (let j = 0; j < columns; j++) out[i * width + at + j] = entry(firstRow + i, firstColumn + j);
    }
  }

  #putLoads(out: Float64Array, width: number, firstRow: number, rows: number): void {
    const count = this.#inputs.length;
    const start = width - 3 * count;
    this.#load.forEach((load, order) => {
      for (let i = 0; i < rows; i++) {
        for (let j = 0; j < count; j++) {
          out[i * width + start + order * count + j] = load[(firstRow + i) * count + j];
        }
      }
    });
  }
}

const asTerm = ({ form, value }: { form: LinearForm; value: number }): Term => ({
  row: form,
  column: form,
  value,
});

/** Sum of value times the form's travel at `q`, along each reduced coordinate from `first` on. */
function gather(
  before: readonly Term[],
  after: Reduction["mass"],
  q: ArrayLike<number>,
  first: number,
  count: number,
): Float64Array {
  const out = new Float64Array(count);
  after.forEach(({ form, value }, t) => {
    const travel = formValue(before[t].row, q);
    form.coordinates.forEach((i, k) => {
      if (first <= i && i < first + count) out[i - first] += value * form.factors[k] * travel;
    });
  });
  return out;
}
