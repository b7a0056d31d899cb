/** Many linear forms packed into flat arrays, for the loops that evaluate them on every mode. */
import type { LinearForm } from "./assembly.ts";

export interface FlatForms {
  readonly count: number;
  /** Entries of form e stand at starts[e] to starts[e + 1] - 1. */
  readonly starts: Int32Array;
  readonly coordinate: Int32Array;
  readonly factor: Float64Array;
  /** Value with which each form enters its sum of squares. */
  readonly value: Float64Array;
}

/** Packs `value * form form^T` terms; supports are left out. */
export function flatForms(
  terms: readonly { readonly form: LinearForm; readonly value: number }[],
): FlatForms {
  const starts = new Int32Array(terms.length + 1);
  for (let e = 0; e < terms.length; e++) starts[e + 1] = starts[e] + terms[e].form.coordinates.length;
  const coordinate = new Int32Array(starts[terms.length]);
  const factor = new Float64Array(starts[terms.length]);
  const value = new Float64Array(terms.length);
  for (let e = 0, p = 0; e < terms.length; e++) {
    const { coordinates, factors } = terms[e].form;
    for (let k = 0; k < coordinates.length; k++, p++) {
      coordinate[p] = coordinates[k];
      factor[p] = factors[k];
    }
    value[e] = terms[e].value;
  }
  return { count: terms.length, starts, coordinate, factor, value };
}

/** Value of every form at the vector that starts at `offset` in `q`; written to `out` (count entries). */
export function formValues(
  forms: FlatForms,
  q: Float64Array,
  offset: number,
  out: Float64Array,
): Float64Array {
  const { count, starts, coordinate, factor } = forms;
  for (let e = 0; e < count; e++) {
    let sum = 0;
    for (let p = starts[e]; p < starts[e + 1]; p++) sum += factor[p] * q[offset + coordinate[p]];
    out[e] = sum;
  }
  return out;
}

/** `sum of value * form(q)^2`, and the same with magnitudes of the values: the scale of its rounding. */
export function quadratic(
  forms: FlatForms,
  q: Float64Array,
  offset: number,
): { readonly value: number; readonly size: number } {
  const { count, starts, coordinate, factor, value } = forms;
  let total = 0;
  let size = 0;
  for (let e = 0; e < count; e++) {
    let sum = 0;
    for (let p = starts[e]; p < starts[e + 1]; p++) sum += factor[p] * q[offset + coordinate[p]];
    const term = value[e] * sum * sum;
    total += term;
    size += Math.abs(term);
  }
  return { value: total, size };
}
