/**
 * Modal damping as terms in the equations of motion, M Phi diag(2 zeta omega) Phi^T M.
 *
 * It damps the motion relative to where a support's displacement alone would carry the system, as dampers and
 * springs with loss between the system and the support would: for mode r that place is -phi^T K_s s / omega^2.
 */
import type { Assembly } from "../mechanics/assembly.ts";
import { formValue } from "../mechanics/forms.ts";
import { sparseTimesVector } from "../numerics/sparse.ts";
import type { ModalBasis } from "./modes-basis.ts";

export interface AddedDamping {
  /** inertial x inertial, row-major: N*s/m. */
  readonly matrix: Float64Array;
  /** inertial x supports: acceleration (not force) a unit of the support's velocity gives. */
  readonly support: Float64Array;
}

/** Undefined where nothing is added. Loss factors are in it when asked for: a history has no other place for them. */
export function addedDamping(basis: ModalBasis, withLoss: boolean): AddedDamping | undefined {
  const rates = basis.modalRates(withLoss);
  if (rates.every((rate) => rate === 0)) return undefined;
  const { undamped, assembly } = basis;
  const { count: n, vectors, mass } = undamped;
  const supports = assembly.supports.length;
  const matrix = new Float64Array(n * n);
  const support = new Float64Array(n * supports);
  for (let r = 0; r < n; r++) {
    if (rates[r] === 0) continue;
    const phi = vectors.subarray(r * n, (r + 1) * n);
    const momentum = sparseTimesVector(mass, phi);
    for (let i = 0; i < n; i++) {
      const factor = rates[r] * momentum[i];
      if (factor !== 0) for (let j = 0; j < n; j++) matrix[i * n + j] += factor * momentum[j];
    }
    const places = supportPlaces(basis, r, supports);
    for (let s = 0; s < supports; s++) {
      for (let i = 0; i < n; i++) support[i * supports + s] += rates[r] * phi[i] * places[s];
    }
  }
  return { matrix, support };
}

/** Where a unit displacement of each support carries mode r when it moves slowly: -phi^T K_s / omega^2. */
export function supportPlaces({ undamped }: ModalBasis, r: number, supports: number): Float64Array {
  const { condensed, vectors, count: n, values } = undamped;
  const phi = vectors.subarray(r * n, (r + 1) * n);
  const out = new Float64Array(supports);
  for (const { form, value } of condensed.stiffness) {
    if (form.supports.length === 0) continue;
    const pull = (value * formValue(form, phi)) / values[r];
    form.supports.forEach((s, k) => {
      out[s] -= pull * form.supportFactors[k];
    });
  }
  return out;
}

/** True where modal damping or a loss factor is in the model at all. */
export function hasAddedDamping(assembly: Assembly, withLoss: boolean): boolean {
  if (assembly.modalDamping !== 0) return true;
  return withLoss && assembly.elements.some(({ lossFactor, stiffness }) => lossFactor * stiffness !== 0);
}
