/**
 * Where a steady load leaves the system: K q = F.
 *
 * Motions that no spring feels are found on the forms (null-space.ts). One that the load does no work on is
 * pinned, which changes no travel; one that it works on has no equilibrium, and neither has anything joined to
 * it by springs: those coordinates are `loose`.
 */

import { solveRealBand } from "../numerics/band-solve.ts";
import { bandwidthOf, patternOf, reverseCuthillMcKee } from "../numerics/ordering.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type SparseMatrix, sparseToBand } from "../numerics/sparse.ts";
import type { Assembly, LinearForm } from "./assembly.ts";
import { combineForms, formValue } from "./forms.ts";
import { sumTerms, systemTerms } from "./matrices.ts";
import { type NullSpace, nullSpace } from "./null-space.ts";

export interface Equilibrium {
  /** Free coordinates (m, rad); 0 where loose. */
  readonly q: Float64Array;
  /** 1 for coordinates that the load moves away without end. */
  readonly loose: Uint8Array;
  /** Name of a coordinate in the form that nothing holds against the load; undefined when all are held. */
  looseIn(form: LinearForm): string | undefined;
}

/** Share of the work of a load's parts below which the load does no work on a motion. */
const NO_WORK = 1e-9;

/** Gravity on every mass in the positive direction of its coordinate, as one load. */
export function positiveGravity(assembly: Assembly): LinearForm {
  const heavy = assembly.coordinates.filter(({ gravityMass }) => gravityMass !== 0);
  return combineForms(
    heavy.map(({ form }) => form),
    heavy.map(({ gravityMass }) => gravityMass * assembly.gravity),
  );
}

/** Solves K q = load, supports at zero. Fails where springs of both signs cancel. */
export function equilibrium(assembly: Assembly, load: LinearForm): Outcome<Equilibrium> {
  const n = assembly.free;
  const terms = systemTerms(assembly).stiffness;
  const stiffness = sumTerms(terms, n);
  const unfelt = nullSpace(
    terms.map(({ column }) => column),
    Array.from({ length: n }, (_, i) => i),
    n,
  );
  const loose = looseCoordinates(unfelt, load, stiffness);
  const force = new Float64Array(n);
  load.coordinates.forEach((i, k) => {
    if (loose[i] === 0) force[i] += load.factors[k];
  });
  const solved = solvePinned(stiffness, force, unfelt.free);
  if (!solved.ok) return fail("springs of both signs cancel: there is no equilibrium");
  const nameOf = (i: number) =>
    assembly.coordinates.find(({ form }) => form.coordinates.includes(i))?.name ?? "a place";
  return succeed({
    q: solved.value,
    loose,
    looseIn: (form) => {
      const at = form.coordinates.find((i) => loose[i] === 1);
      return at === undefined ? undefined : nameOf(at);
    },
  });
}

/** Everything that springs join to a motion that the load works on. */
function looseCoordinates({ vectors }: NullSpace, load: LinearForm, stiffness: SparseMatrix): Uint8Array {
  const n = stiffness.rows;
  const loose = new Uint8Array(n);
  const waiting: number[] = [];
  for (const { at, by } of vectors) {
    const x = new Float64Array(n);
    at.forEach((i, k) => {
      x[i] = by[k];
    });
    const parts = load.coordinates.reduce((sum, i, k) => sum + Math.abs(load.factors[k] * x[i]), 0);
    if (Math.abs(formValue(load, x)) > NO_WORK * parts) waiting.push(...at);
  }
  while (waiting.length > 0) {
    const i = waiting.pop() ?? 0;
    if (loose[i] === 1) continue;
    loose[i] = 1;
    for (let p = stiffness.rowStart[i]; p < stiffness.rowStart[i + 1]; p++) waiting.push(stiffness.column[p]);
  }
  return loose;
}

/** Solves with some coordinates held at zero, banded after reordering. */
function solvePinned(
  stiffness: SparseMatrix,
  force: Float64Array,
  pinned: readonly number[],
): Outcome<Float64Array> {
  const n = stiffness.rows;
  const fixed = new Uint8Array(n);
  for (const i of pinned) fixed[i] = 1;
  const value = Float64Array.from(stiffness.value);
  const rows = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    for (let p = stiffness.rowStart[i]; p < stiffness.rowStart[i + 1]; p++) {
      const j = stiffness.column[p];
      if (fixed[i] === 1 || fixed[j] === 1) value[p] = i === j ? 1 : 0;
      if (i === j) rows[i] = 1;
    }
  }
  const pattern = patternOf([stiffness], n);
  const order = reverseCuthillMcKee(pattern);
  const band = sparseToBand({ ...stiffness, value }, bandwidthOf(pattern, order), order);
  const right = new Float64Array(n);
  order.forEach((i, t) => {
    // A pinned coordinate without any spring has no entry to hold the one.
    if (fixed[i] === 1 && rows[i] === 0) band.values[t * (band.bandwidth + 1) + band.bandwidth] = 1;
    right[t] = fixed[i] === 1 ? 0 : force[i];
  });
  const solved = solveRealBand(band, right);
  if (!solved.ok) return fail(solved.reason);
  const q = new Float64Array(n);
  order.forEach((i, t) => {
    q[i] = solved.value[t];
  });
  return succeed(q);
}
