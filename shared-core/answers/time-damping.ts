/**
 * What modal damping, M Phi diag(2 zeta omega) Phi^T M, acts on where supports move.
 *
 * It damps the motion relative to where a support's displacement alone would carry the system, as dampers and
 * springs with loss between the system and the support would: for mode r that place is -phi^T K_s s / omega^2.
 */
import type { Assembly } from "../mechanics/assembly.ts";
import { formValue } from "../mechanics/forms.ts";
import type { ModalBasis } from "./modes-basis.ts";

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
