/**
 * The complex roots of a chain: masses in a row with springs and dampers between neighbours.
 *
 * All roots together on the tridiagonal quadratic (chain-quadratic.ts), O(n) for each step of each, then one
 * Newton step on the sums over the elements themselves, which a difference of large matrix entries does not
 * blur. Not taken, so that the dense way answers: other shapes than chains, modal damping, small models, and
 * whatever the routine's own checks do not confirm.
 */
import { type FlatForms, flatForms } from "../mechanics/flat-forms.ts";
import { sumTerms } from "../mechanics/matrices.ts";
import type { SquareTerm } from "../mechanics/star-mesh.ts";
import { type ChainModes, type ChainQuadratic, chainModes } from "../numerics/chain-quadratic.ts";
import type { SparseMatrix } from "../numerics/sparse.ts";
import { addSquare, newtonStep, type Pair } from "./modes-newton.ts";
import type { Root } from "./modes-roots.ts";
import type { UndampedModes } from "./modes-undamped.ts";

/** Size below which the dense way is as quick; found by trial. */
const CHAIN_SIZE = 24;

/** Undefined where the model is no chain or the roots could not be confirmed. */
export function chainRoots(
  undamped: UndampedModes,
  massDamping: number,
  added: Float64Array,
): Root[] | undefined {
  const { chain, reduction, count, mass } = undamped;
  if (chain === undefined || count < CHAIN_SIZE || reduction.relaxing > 0) return undefined;
  if (massDamping !== 0 || added.some((rate) => rate !== 0)) return undefined;
  const root = Float64Array.from(mass.value, (m) => 1 / Math.sqrt(m));
  const stiffness = tridiagonal(sumTerms(reduction.stiffness.map(asTerm), count), chain, root);
  const damping = tridiagonal(sumTerms(reduction.damping.map(asTerm), count), chain, root);
  if (stiffness === undefined || damping === undefined) return undefined;
  const largest = stiffness.diagonal.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
  // Powers of two keep every digit.
  const rate = 2 ** Math.round(Math.log2(largest) / 2);
  const quadratic: ChainQuadratic = {
    c: damping.diagonal.map((x) => x / rate),
    cOff: damping.off.map((x) => x / rate),
    k: stiffness.diagonal.map((x) => x / (rate * rate)),
    kOff: stiffness.off.map((x) => x / (rate * rate)),
  };
  const solved = chainModes(quadratic, {
    values: undamped.values.map((value) => value / (rate * rate)),
    vector: (j, out) => {
      chain.forEach((i, t) => {
        out[t] = undamped.vectors[j * count + i] / root[i];
      });
    },
  });
  return solved === undefined ? undefined : collect(solved, undamped, chain, root, rate);
}

/** One root of each pair over the inertial coordinates; undefined where there are not as many zeros as known. */
function collect(
  solved: ChainModes,
  undamped: UndampedModes,
  chain: Int32Array,
  root: Float64Array,
  rate: number,
): Root[] | undefined {
  const { count } = undamped;
  const sums = new Sums(undamped);
  const roots: Root[] = [];
  let zeros = 0;
  for (let s = 0; s < 2 * count; s++) {
    if (solved.im[s] < 0) continue;
    if (solved.re[s] === 0 && solved.im[s] === 0) {
      zeros++;
      continue;
    }
    const shape = { basis: "inertial" as const, re: new Float64Array(count), im: new Float64Array(count) };
    chain.forEach((i, t) => {
      shape.re[i] = solved.rowsRe[s * count + t] * root[i];
      shape.im[i] = solved.rowsIm[s * count + t] * root[i];
    });
    roots.push(sums.improve({ re: solved.re[s] * rate, im: solved.im[s] * rate, shape }));
  }
  if (zeros !== 2 * undamped.free + undamped.held) return undefined;
  return [...roots, ...heldRoots(undamped)];
}

const asTerm = ({ form, value }: SquareTerm) => ({ row: form, column: form, value });

/** Positions of motions that dampers alone hold. */
function heldRoots({ free, held, count, vectors }: UndampedModes): Root[] {
  return Array.from({ length: held }, (_, h) => ({
    re: 0,
    im: 0,
    shape: {
      basis: "inertial" as const,
      re: vectors.slice((free + h) * count, (free + h + 1) * count),
      im: new Float64Array(count),
    },
  }));
}

/** Diagonals of a matrix scaled by `root` on both sides; undefined where it has more than three in the order. */
function tridiagonal(
  a: SparseMatrix,
  order: Int32Array,
  root: Float64Array,
): { diagonal: Float64Array; off: Float64Array } | undefined {
  const n = a.rows;
  const place = new Int32Array(n);
  order.forEach((i, t) => {
    place[i] = t;
  });
  const diagonal = new Float64Array(n);
  const off = new Float64Array(Math.max(0, n - 1));
  for (let i = 0; i < n; i++) {
    for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) {
      const j = a.column[p];
      const scaled = a.value[p] * root[i] * root[j];
      const step = place[j] - place[i];
      if (step === 0) diagonal[place[i]] = scaled;
      else if (step === 1) off[place[i]] = scaled;
      else if (step !== -1 && scaled !== 0) return undefined;
    }
  }
  return { diagonal, off };
}

/** psi^T (M, C, K) psi over the terms. */
class Sums {
  readonly #mass: FlatForms;
  readonly #damping: FlatForms;
  readonly #stiffness: FlatForms;

  constructor({ reduction }: UndampedModes) {
    this.#mass = flatForms(reduction.mass);
    this.#damping = flatForms(reduction.damping);
    this.#stiffness = flatForms(reduction.stiffness);
  }

  improve(root: Root): Root {
    const { re, im } = root.shape;
    const [a, b, c] = [this.#mass, this.#damping, this.#stiffness].map((forms) => square(forms, re, im));
    return newtonStep(root, a, b, c);
  }
}

function square(forms: FlatForms, x: Float64Array, y: Float64Array): Pair {
  const { count, starts, coordinate, factor, value } = forms;
  const sum: Pair = [0, 0];
  for (let e = 0; e < count; e++) {
    let re = 0;
    let im = 0;
    for (let p = starts[e]; p < starts[e + 1]; p++) {
      re += factor[p] * x[coordinate[p]];
      im += factor[p] * y[coordinate[p]];
    }
    addSquare(sum, value[e], re, im);
  }
  return sum;
}
