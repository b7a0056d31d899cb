/**
 * The undamped problem K phi = lambda M phi of a reduced system: free, damper-held and elastic modes.
 *
 * How many motions are free or held by dampers only is known from the forms (null-space.ts); their shapes are
 * those null vectors, so no tolerance decides. Elastic modes come from a dense or tridiagonal eigenvalue
 * routine, are cleared of the null vectors, and are then refined on the sum over springs itself: lambda =
 * sum k (f phi)^2 / sum m (f phi)^2, and within each group of modes far below the largest root by a
 * Rayleigh-Ritz step on the same sums. The routine's error, n eps times the *largest* root, becomes one
 * relative to the group's own: stiffnesses 1e12 apart keep about fifteen digits of the lowest frequency.
 * Source of both steps: Parlett, The Symmetric Eigenvalue Problem, 1998, sections 1.4 and 11.3.
 */
import type { LinearForm } from "../mechanics/assembly.ts";
import { type FlatForms, flatForms, formValues, quadratic } from "../mechanics/flat-forms.ts";
import { type Condensation, condense, type Reduction } from "../mechanics/massless.ts";
import { sumTerms } from "../mechanics/matrices.ts";
import { nullSpace, type SparseVector } from "../mechanics/null-space.ts";
import type { SquareTerm } from "../mechanics/star-mesh.ts";
import { generalisedEigen } from "../numerics/generalised-eigen.ts";
import { bandwidthOf, patternOf, reverseCuthillMcKee } from "../numerics/ordering.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type SparseMatrix, sparseTimesVector, sparseToDense } from "../numerics/sparse.ts";
import { symmetricEigen } from "../numerics/symmetric-eigen.ts";
import { tridiagonalEigen } from "../numerics/tridiagonal-eigen.ts";

/** Modes of the undamped problem over the inertial coordinates: free ones, damper-held ones, elastic ones. */
export interface UndampedModes {
  readonly reduction: Reduction;
  readonly condensed: Condensation;
  /** Number of inertial coordinates, and of modes. */
  readonly count: number;
  readonly free: number;
  /** Motions that no spring feels and a damper does. */
  readonly held: number;
  /** lambda = omega^2 (rad^2/s^2), 0 for free and held ones, then ascending; negative: it buckles. */
  readonly values: Float64Array;
  /** count x count, one mode a row, phi^T M phi = 1. */
  readonly vectors: Float64Array;
  readonly mass: SparseMatrix;
  /** An order of the inertial coordinates that makes K tridiagonal; only where M is diagonal. */
  readonly chain?: Int32Array;
}

/** Share of the largest root below which a root is taken from its sums: above, the routine's error is small. */
const REFINED = 1e-2;
/** Share of the largest root below which a group of modes is refined among itself. */
const GROUP = 1e-4;
/** Springs a coordinate above which a model is not looked at as a chain. */
const CHAIN_SPRINGS = 8;
/** Work above which a group keeps the routine's shapes (its roots are refined all the same). */
const GROUP_WORK = 3e9;
/** Spring energies of both signs that cancel to this share of their size leave a root of zero. */
const CANCELLED = 1e-13;
/** Share of its length that a null vector must keep beside those before it. */
const INDEPENDENT = 1e-6;

/** Solves the undamped problem. Fails where M is not positive definite or a routine does. */
export function undampedModes(reduction: Reduction): Outcome<UndampedModes> {
  const condensation = condense(reduction);
  if (!condensation.ok) return fail(condensation.reason);
  const condensed = condensation.value;
  const n = condensed.inertial;
  if (n === 0) return fail("nothing in it has an inertia");
  const mass = sumTerms(condensed.mass.map(asTerm), n);
  const nullVectors = rigidVectors(reduction, condensed, mass);
  const solved = solve(condensed.stiffness, mass);
  if (!solved.ok) return fail(solved.reason);
  const elastic = elasticRows(solved.value, nullVectors.rows, mass);
  refine(elastic.rows, elastic.values, condensed, n);
  const { values, rows: vectors } = ascending(nullVectors.rows, elastic, n);
  const { free, held } = nullVectors;
  const { chain } = solved.value;
  return succeed({ reduction, condensed, count: n, free, held, values, vectors, mass, chain });
}

/** Null vectors with roots of zero, then the elastic modes by their roots. */
function ascending(rigid: readonly Float64Array[], { values, rows }: Rows, n: number): Rows {
  if (rigid.length === 0 && isAscending(values)) return { values, rows };
  const sorted = new Float64Array(n);
  const vectors = new Float64Array(n * n);
  rigid.forEach((row, r) => {
    vectors.set(row, r * n);
  });
  const order = indices(values.length).sort((a, b) => values[a] - values[b] || a - b);
  order.forEach((from, r) => {
    sorted[rigid.length + r] = values[from];
    vectors.set(rows.subarray(from * n, (from + 1) * n), (rigid.length + r) * n);
  });
  return { values: sorted, rows: vectors };
}

function isAscending(values: Float64Array): boolean {
  for (let r = 1; r < values.length; r++) if (!(values[r - 1] <= values[r])) return false;
  return true;
}

const asTerm = ({ form, value }: SquareTerm) => ({ row: form, column: form, value });
function indices(n: number): number[] {
  const out = new Array<number>(n);
  for (let i = 0; i < n; i++) out[i] = i;
  return out;
}

const formsOf = (terms: readonly SquareTerm[]): LinearForm[] => terms.map(({ form }) => form);

/** Mass-orthonormal motions that no spring feels, those that no damper feels either first. */
function rigidVectors(
  reduction: Reduction,
  condensed: Condensation,
  mass: SparseMatrix,
): { rows: Float64Array[]; free: number; held: number } {
  const n = condensed.inertial;
  const all = reduction.inertial + reduction.relaxing;
  const unfelt = nullSpace(formsOf(condensed.stiffness), indices(n), n).vectors;
  if (unfelt.length === 0) return { rows: [], free: 0, held: 0 };
  const loose = nullSpace(
    [...formsOf(reduction.stiffness), ...formsOf(reduction.damping)],
    indices(all),
    all,
  );
  const rows: Float64Array[] = [];
  for (const vector of loose.vectors) addIndependent(rows, expand(vector, n), mass);
  const free = rows.length;
  for (const vector of unfelt) addIndependent(rows, expand(vector, n), mass);
  return { rows, free, held: rows.length - free };
}

function expand(vector: SparseVector, n: number): Float64Array {
  const out = new Float64Array(n);
  vector.at.forEach((i, k) => {
    if (i < n) out[i] = vector.by[k];
  });
  return out;
}

/** Gram-Schmidt in the mass metric, twice. */
function addIndependent(rows: Float64Array[], vector: Float64Array, mass: SparseMatrix): void {
  const before = massNorm(vector, mass);
  for (let pass = 0; pass < 2; pass++) for (const row of rows) project(vector, row, mass);
  const size = massNorm(vector, mass);
  if (!(size > INDEPENDENT * before)) return;
  rows.push(vector.map((x) => x / size));
}

function project(vector: Float64Array, along: Float64Array, mass: SparseMatrix): void {
  const share = dot(sparseTimesVector(mass, along), vector);
  for (let i = 0; i < vector.length; i++) vector[i] -= share * along[i];
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

const massNorm = (x: Float64Array, mass: SparseMatrix): number =>
  Math.sqrt(Math.max(0, dot(sparseTimesVector(mass, x), x)));

/** Roots and mass-normalised vectors, one a row. */
interface Rows {
  readonly values: Float64Array;
  readonly rows: Float64Array;
  readonly chain?: Int32Array;
}

/** All modes by the dense or tridiagonal routine. */
function solve(springs: readonly SquareTerm[], mass: SparseMatrix): Outcome<Rows> {
  const n = mass.rows;
  const diagonal = diagonalOf(mass);
  if (diagonal && springs.length <= CHAIN_SPRINGS * n && mayBeChain(springs, n)) {
    const stiffness = sumTerms(springs.map(asTerm), n);
    const chain = chainOrder(stiffness);
    if (chain) return solveChain(stiffness, diagonal, chain);
  }
  const solved = generalisedEigen(denseSum(springs, n), diagonal ?? sparseToDense(mass), n, {
    layout: "rows",
  });
  if (!solved.ok) return fail(solved.reason);
  return succeed({ values: solved.value.values, rows: solved.value.vectors });
}

/** Whether no coordinate is joined to more than two others: cheaper to see than to build the matrix. */
function mayBeChain(springs: readonly SquareTerm[], n: number): boolean {
  const neighbours = new Int32Array(2 * n).fill(-1);
  for (const { form } of springs) {
    const { coordinates } = form;
    for (let i = 0; i < coordinates.length; i++) {
      for (let j = 0; j < coordinates.length; j++) {
        if (i !== j && !addNeighbour(neighbours, coordinates[i], coordinates[j])) return false;
      }
    }
  }
  return true;
}

/** False where two others are neighbours already. */
function addNeighbour(neighbours: Int32Array, of: number, other: number): boolean {
  for (let p = 2 * of; p < 2 * of + 2; p++) {
    if (neighbours[p] === other) return true;
    if (neighbours[p] < 0) {
      neighbours[p] = other;
      return true;
    }
  }
  return false;
}

/** Sum of value form form^T, row-major: many springs on few coordinates need no sorting of entries. */
function denseSum(springs: readonly SquareTerm[], n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (const { form, value } of springs) {
    const { coordinates, factors } = form;
    for (let i = 0; i < coordinates.length; i++) {
      const at = coordinates[i] * n;
      const scaled = value * factors[i];
      for (let j = 0; j < coordinates.length; j++) out[at + coordinates[j]] += scaled * factors[j];
    }
  }
  return out;
}

/** The diagonal of a matrix that has nothing beside it. */
function diagonalOf(a: SparseMatrix): Float64Array | undefined {
  const out = new Float64Array(a.rows);
  for (let i = 0; i < a.rows; i++) {
    for (let p = a.rowStart[i]; p < a.rowStart[i + 1]; p++) {
      if (a.column[p] === i) out[i] = a.value[p];
      else if (a.value[p] !== 0) return undefined;
    }
  }
  return out;
}

/** An order of the coordinates in which the matrix is tridiagonal, where there is one. */
function chainOrder(a: SparseMatrix): Int32Array | undefined {
  const n = a.rows;
  if (n < 3 || a.value.length > 3 * n) return undefined;
  if (isTridiagonal(a)) return Int32Array.from(indices(n));
  const pattern = patternOf([a], n);
  const order = reverseCuthillMcKee(pattern);
  return bandwidthOf(pattern, order) <= 1 ? order : undefined;
}

function isTridiagonal({ rows, rowStart, column }: SparseMatrix): boolean {
  for (let i = 0; i < rows; i++) {
    for (let p = rowStart[i]; p < rowStart[i + 1]; p++) if (Math.abs(column[p] - i) > 1) return false;
  }
  return true;
}

function solveChain(stiffness: SparseMatrix, diagonal: Float64Array, order: Int32Array): Outcome<Rows> {
  const n = order.length;
  const place = new Int32Array(n);
  for (let t = 0; t < n; t++) place[order[t]] = t;
  const root = diagonal.map((m) => 1 / Math.sqrt(m));
  if (!root.every((r) => Number.isFinite(r) && r > 0)) return fail("an inertia is not positive");
  const d = new Float64Array(n);
  const e = new Float64Array(n - 1);
  for (let i = 0; i < n; i++) {
    for (let p = stiffness.rowStart[i]; p < stiffness.rowStart[i + 1]; p++) {
      const j = stiffness.column[p];
      const scaled = stiffness.value[p] * root[i] * root[j];
      if (j === i) d[place[i]] = scaled;
      else if (place[j] === place[i] + 1) e[place[i]] = scaled;
    }
  }
  const solved = tridiagonalEigen(d, e, { layout: "rows" });
  if (!solved.ok) return fail(solved.reason);
  const { values, vectors: rows } = solved.value;
  const row = new Float64Array(n);
  const inOrder = order.every((i, t) => i === t);
  for (let at = 0; at < n * n; at += n) {
    if (inOrder) for (let t = 0; t < n; t++) rows[at + t] *= root[t];
    else {
      for (let t = 0; t < n; t++) row[order[t]] = rows[at + t] * root[order[t]];
      rows.set(row, at);
    }
  }
  return succeed({ values, rows, chain: order });
}

/** The routine's modes without as many as there are null vectors (those nearest to them), cleared of these. */
function elasticRows(all: Rows, rigid: readonly Float64Array[], mass: SparseMatrix): Rows {
  if (rigid.length === 0) return all;
  const n = mass.rows;
  const weighted = rigid.map((row) => sparseTimesVector(mass, row));
  const share = new Float64Array(n);
  for (let r = 0; r < n; r++) {
    const row = all.rows.subarray(r * n, (r + 1) * n);
    for (const w of weighted) share[r] += dot(w, row) ** 2;
  }
  const nearest = Array.from(share.keys()).sort((a, b) => share[b] - share[a] || a - b);
  const dropped = new Set(nearest.slice(0, rigid.length));
  const rows = new Float64Array((n - rigid.length) * n);
  const values = new Float64Array(n - rigid.length);
  let count = 0;
  for (let r = 0; r < n; r++) {
    if (dropped.has(r)) continue;
    const row = all.rows.slice(r * n, (r + 1) * n);
    for (let k = 0; k < rigid.length; k++) {
      const along = dot(weighted[k], row);
      for (let i = 0; i < n; i++) row[i] -= along * rigid[k][i];
    }
    values[count] = all.values[r];
    rows.set(row, count++ * n);
  }
  return { values, rows };
}

/** Low roots from the sums over springs and inertias; rows are rotated within groups and normalised, in place. */
function refine(rows: Float64Array, values: Float64Array, condensed: Condensation, n: number): void {
  const below = (group: readonly number[], share: number): number[] => {
    const largest = group.reduce((most, r) => Math.max(most, Math.abs(values[r])), 0);
    return group.filter((r) => Math.abs(values[r]) <= share * largest);
  };
  const all = indices(values.length);
  const low = below(all, REFINED);
  if (low.length === 0) return;
  const springs = flatForms(condensed.stiffness);
  const inertias = flatForms(condensed.mass);
  for (const r of low) values[r] = quotient(rows, r, n, springs, inertias);
  let group = all;
  // Each round goes down at least a factor of GROUP; forty reach below the smallest number there is.
  for (let round = 0; round < 40; round++) {
    const lower = below(group, GROUP);
    if (lower.length === group.length || lower.length < 2) break;
    group = lower;
    if (springs.count * group.length * group.length > GROUP_WORK) continue;
    if (!rotate(rows, group, n, springs)) break;
    for (const r of group) values[r] = quotient(rows, r, n, springs, inertias);
  }
}

/** Normalises a row and gives its Rayleigh quotient. */
function quotient(rows: Float64Array, r: number, n: number, springs: FlatForms, inertias: FlatForms): number {
  const size = Math.sqrt(quadratic(inertias, rows, r * n).value);
  for (let i = r * n; i < (r + 1) * n; i++) rows[i] /= size;
  const energy = quadratic(springs, rows, r * n);
  return Math.abs(energy.value) <= CANCELLED * energy.size ? 0 : energy.value;
}

/** Rayleigh-Ritz within a group of rows; false when the small problem fails. */
function rotate(rows: Float64Array, group: readonly number[], n: number, springs: FlatForms): boolean {
  const g = group.length;
  const strains = group.map((r) => formValues(springs, rows, r * n, new Float64Array(springs.count)));
  const a = new Float64Array(g * g);
  for (let p = 0; p < g; p++) {
    const weighted = strains[p].map((s, e) => s * springs.value[e]);
    for (let q = 0; q <= p; q++) {
      a[p * g + q] = dot(weighted, strains[q]);
      a[q * g + p] = a[p * g + q];
    }
  }
  const solved = symmetricEigen(a, g);
  if (!solved.ok) return false;
  const { vectors } = solved.value;
  const before = group.map((r) => rows.slice(r * n, (r + 1) * n));
  group.forEach((r, q) => {
    const row = rows.subarray(r * n, (r + 1) * n).fill(0);
    for (let p = 0; p < g; p++) {
      const factor = vectors[p * g + q];
      for (let i = 0; i < n; i++) row[i] += factor * before[p][i];
    }
  });
  return true;
}
