/**
 * Linear motion as first-order equations, the door between mechanics and histories.
 *
 *   z' = A z + B u(t),      y = c z + d0 u + d1 u' + d2 u'' + ...
 *
 * Inputs u are forces and support displacements. Derivatives of inputs stand only in the outputs, so that z stays
 * continuous where an input jumps (see `withoutInputDerivatives`).
 */

export interface StateForm {
  /** Number of states N. */
  readonly size: number;
  /** N x N, row-major. */
  readonly a: Float64Array;
  /** Number of inputs J. */
  readonly inputs: number;
  /** N x J, row-major. */
  readonly b: Float64Array;
}

/** Derivatives of an input that an output may hold: u to u''''. */
export const DIRECT_ORDERS = 5;

export interface OutputForm {
  /** N factors of the states. */
  readonly state: Float64Array;
  /** J x DIRECT_ORDERS: factor of derivative d of input j at j * DIRECT_ORDERS + d. */
  readonly direct: Float64Array;
}

/** The form of an output's time derivative: c A, and c B beside the direct factors moved one order up. */
export function derivativeForm(form: OutputForm, system: StateForm): OutputForm {
  const { size: n, a, inputs, b } = system;
  const state = new Float64Array(n);
  const direct = new Float64Array(inputs * DIRECT_ORDERS);
  for (let i = 0; i < n; i++) {
    const factor = form.state[i];
    if (factor === 0) continue;
    for (let j = 0; j < n; j++) state[j] += factor * a[i * n + j];
    for (let j = 0; j < inputs; j++) direct[j * DIRECT_ORDERS] += factor * b[i * inputs + j];
  }
  for (let j = 0; j < inputs; j++) {
    for (let d = 0; d + 1 < DIRECT_ORDERS; d++) {
      direct[j * DIRECT_ORDERS + d + 1] = form.direct[j * DIRECT_ORDERS + d];
    }
  }
  return { state, direct };
}

/** Equations in which the first two derivatives of the inputs still stand: y' = A y + B0 u + B1 u' + B2 u''. */
export interface RawStateForm {
  readonly size: number;
  readonly a: Float64Array;
  readonly inputs: number;
  /** N x J each. */
  readonly b0: Float64Array;
  readonly b1: Float64Array;
  readonly b2: Float64Array;
}

export interface CleanState {
  readonly system: StateForm;
  /** y = z + p0 u + p1 u'; N x J each. */
  readonly p0: Float64Array;
  readonly p1: Float64Array;
}

/**
 * Puts z = y - P0 u - P1 u' with P1 = B2, P0 = B1 + A B2, so that z' = A z + (B0 + A P0) u. With u = 0 before
 * t = 0 the start z(0) is y(0-), and jumps of u act as they should: finite jumps of y, no delta functions in z.
 */
export function withoutInputDerivatives(raw: RawStateForm): CleanState {
  const { size: n, a, inputs } = raw;
  const p1 = Float64Array.from(raw.b2);
  const p0 = Float64Array.from(raw.b1);
  addProduct(a, raw.b2, n, inputs, p0);
  const b = Float64Array.from(raw.b0);
  addProduct(a, p0, n, inputs, b);
  return { system: { size: n, a, inputs, b }, p0, p1 };
}

/** out += A X with A n x n and X n x columns. */
function addProduct(a: Float64Array, x: Float64Array, n: number, columns: number, out: Float64Array): void {
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const factor = a[i * n + k];
      if (factor === 0) continue;
      for (let j = 0; j < columns; j++) out[i * columns + j] += factor * x[k * columns + j];
    }
  }
}
