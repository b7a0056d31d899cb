import type { LinearForm } from "../mechanics/assembly.ts";
import { formValue } from "../mechanics/forms.ts";
import type { ModalBasis } from "./modes-basis.ts";

/**
 * How far a load along `form` goes into undamped mode r: the cosine between the two in the metric of the
 * inverse mass matrix, 0 to 1. One that acts on no mass at all gives 0.
 */
export function excitationOf(basis: ModalBasis, form: LinearForm, r: number): number {
  let square = 0;
  for (let s = 0; s < basis.undamped.count; s++) square += formValue(form, basis.shape(s)) ** 2;
  return square > 0 ? Math.abs(formValue(form, basis.shape(r))) / Math.sqrt(square) : 0;
}
