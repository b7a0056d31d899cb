/**
 * The matrices of M q'' + C q' + K q = F - M_s u'' - C_s u' - K_s u, as sums over the terms of an assembly.
 *
 * C holds dampers, `mass_damping` and `stiffness_damping`; modal damping and loss factors are not in it (the
 * former needs the modes, the latter is `hysteretic`: K + i H in a steady response). Terms are added in the
 * order of the assembly, so the same model gives the same bits.
 */
import { type SparseMatrix, sparseFromTriplets } from "../numerics/sparse.ts";
import type { Assembly, LinearForm } from "./assembly.ts";

export { type SparseMatrix, sparseToDense as toDense } from "../numerics/sparse.ts";

/** `value * row column^T`. */
export interface Term {
  readonly row: LinearForm;
  readonly column: LinearForm;
  readonly value: number;
}

/** Square ones are free x free, the others free x supports. SI. */
export interface SystemMatrices {
  readonly free: number;
  readonly mass: SparseMatrix;
  readonly damping: SparseMatrix;
  readonly stiffness: SparseMatrix;
  /** Sum of loss factor times stiffness. */
  readonly hysteretic: SparseMatrix;
  readonly massSupport: SparseMatrix;
  readonly dampingSupport: SparseMatrix;
  readonly stiffnessSupport: SparseMatrix;
  readonly hystereticSupport: SparseMatrix;
}

/** Terms of the four matrices, supports included in their forms. */
export interface SystemTerms {
  readonly mass: readonly Term[];
  readonly damping: readonly Term[];
  readonly stiffness: readonly Term[];
  readonly hysteretic: readonly Term[];
}

/** All terms of an assembly that are not zero, in its order. */
export function systemTerms(assembly: Assembly): SystemTerms {
  const { massDamping, stiffnessDamping } = assembly;
  const mass: Term[] = [];
  const damping: Term[] = [];
  const stiffness: Term[] = [];
  const hysteretic: Term[] = [];
  const add = (to: Term[], form: LinearForm, value: number) => {
    if (value !== 0) to.push({ row: form, column: form, value });
  };
  for (const { form, value } of assembly.inertias) {
    add(mass, form, value);
    add(damping, form, massDamping * value);
  }
  for (const element of assembly.elements) {
    add(stiffness, element.form, element.stiffness);
    add(damping, element.form, element.damping);
    add(damping, element.form, stiffnessDamping * element.stiffness);
    add(hysteretic, element.form, element.lossFactor * element.stiffness);
  }
  const lists = { mass, damping, stiffness };
  for (const { matrix, row, column, value } of assembly.extras ?? []) {
    if (value !== 0) lists[matrix].push({ row, column, value });
  }
  return { mass, damping, stiffness, hysteretic };
}

/** Sums the terms of an assembly into its matrices. */
export function systemMatrices(assembly: Assembly): SystemMatrices {
  const { free } = assembly;
  const supports = assembly.supports.length;
  const { mass, damping, stiffness, hysteretic } = systemTerms(assembly);
  return {
    free,
    mass: sumTerms(mass, free),
    damping: sumTerms(damping, free),
    stiffness: sumTerms(stiffness, free),
    hysteretic: sumTerms(hysteretic, free),
    massSupport: sumSupportTerms(mass, free, supports),
    dampingSupport: sumSupportTerms(damping, free, supports),
    stiffnessSupport: sumSupportTerms(stiffness, free, supports),
    hystereticSupport: sumSupportTerms(hysteretic, free, supports),
  };
}

/** free x free part of a sum of terms. */
export function sumTerms(terms: readonly Term[], free: number): SparseMatrix {
  const alone = sumSingles(terms, free);
  if (alone !== undefined) return alone;
  const entries = new Entries();
  for (const { row, column, value } of terms) {
    for (let i = 0; i < row.coordinates.length; i++) {
      const scaled = value * row.factors[i];
      for (let j = 0; j < column.coordinates.length; j++) {
        entries.add(row.coordinates[i], column.coordinates[j], scaled * column.factors[j]);
      }
    }
  }
  return sparseFromTriplets(free, free, entries);
}

/** The same where every term touches one coordinate and every coordinate is touched, as masses usually do. */
function sumSingles(terms: readonly Term[], free: number): SparseMatrix | undefined {
  if (terms.length < free) return undefined;
  const value = new Float64Array(free);
  const touched = new Uint8Array(free);
  let count = 0;
  for (const { row, column, value: factor } of terms) {
    if (row.coordinates.length !== 1 || column.coordinates.length !== 1) return undefined;
    const i = row.coordinates[0];
    if (column.coordinates[0] !== i) return undefined;
    value[i] += factor * row.factors[0] * column.factors[0];
    if (touched[i] === 0) count++;
    touched[i] = 1;
  }
  if (count < free) return undefined;
  const rowStart = new Int32Array(free + 1);
  const at = new Int32Array(free);
  for (let i = 0; i < free; i++) {
    at[i] = i;
    rowStart[i + 1] = i + 1;
  }
  return { rows: free, columns: free, rowStart, column: at, value };
}

/** free x supports part of a sum of terms. */
export function sumSupportTerms(terms: readonly Term[], free: number, supports: number): SparseMatrix {
  const entries = new Entries();
  for (const { row, column, value } of terms) {
    for (let i = 0; i < row.coordinates.length; i++) {
      const scaled = value * row.factors[i];
      for (let j = 0; j < column.supports.length; j++) {
        entries.add(row.coordinates[i], column.supports[j], scaled * column.supportFactors[j]);
      }
    }
  }
  return sparseFromTriplets(free, supports, entries);
}

/** Entries in the order in which they came. */
class Entries {
  readonly row: number[] = [];
  readonly column: number[] = [];
  readonly value: number[] = [];

  add(row: number, column: number, value: number): void {
    this.row.push(row);
    this.column.push(column);
    this.value.push(value);
  }
}
