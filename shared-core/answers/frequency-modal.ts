/**
 * The steady response by superposition of roots, X(s) = sum v_k w_k (B0 + s B1 + s^2 B2) U / (s - lambda_k): roots
 * once, then O(n^2) for all coordinates instead of the O(n^3) of a factorisation.
 *
 * For models with viscous and modal damping; loss factors are no first-order terms. Checked against the
 * factorisation at some frequencies before it is used; searches run on it, single values do not.
 */
import type { Assembly, LinearForm } from "../mechanics/assembly.ts";
import { formValue } from "../mechanics/forms.ts";
import { type StateInput, stateSpace } from "../mechanics/state-space.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { multiply, transpose } from "../numerics/products.ts";
import { blockOf, type Transfer, type TransferParts, transferOf } from "./frequency-transfer.ts";
import type { ModalBasis } from "./modes-basis.ts";
import type { Root } from "./modes-roots.ts";
import { modalStates } from "./time-basis.ts";
import { modalSystem } from "./time-modal.ts";

/** Inputs are the drives `by` in their order: forces, or displacements of supports. */
export function modalTransfer(
  assembly: Assembly,
  basis: ModalBasis,
  by: readonly number[],
): Outcome<Transfer> {
  const inputs = by.map((index): StateInput => {
    const { on } = assembly.drives[index];
    return on.kind === "form" ? { kind: "load", form: on.form } : { kind: "support", support: on.support };
  });
  const space = stateSpace(assembly, inputs);
  if (!space.ok) return fail(space.reason);
  const chosen = modalStates(basis, space.value, inputs, basis.modalRates(false));
  if (!chosen.ok) return fail(chosen.reason);
  const { raw, columns, components } = chosen.value;
  const { size, free } = { size: raw.size, free: assembly.free };
  const modal = modalSystem({ size, a: raw.a, inputs: raw.inputs, b: raw.b0 }, components);
  const displacement = multiply(space.value.displacement, columns, free, size, size);
  const parts = {
    modal,
    free,
    shapeRe: multiply(displacement, modal.vectorRe, free, size, modal.count),
    shapeIm: multiply(displacement, modal.vectorIm, free, size, modal.count),
    shapeRest: multiply(displacement, modal.basis, free, size, modal.rest),
    direct: space.value.displacementDirect,
    feeds: [raw.b0, raw.b1, raw.b2].map((b) => ({
      re: multiply(modal.leftRe, b, modal.count, size, raw.inputs),
      im: multiply(modal.leftIm, b, modal.count, size, raw.inputs),
      rest: multiply(modal.left, b, modal.rest, size, raw.inputs),
    })),
  };
  return succeed({ at: transferOf(parts), many: modal.rest === 0 ? blockOf(parts) : undefined });
}

/**
 * The same from the roots and shapes that the mode table stands on. M, C and K are symmetric, so that a shape is
 * its own left shape: X(s) = sum psi (psi^T F) / (norm (s - root)). For forces on models in which every coordinate
 * has an inertia and nothing floats; undefined for others.
 */
export function symmetricTransfer(
  assembly: Assembly,
  basis: ModalBasis,
  by: readonly number[],
): Transfer | undefined {
  const { undamped } = basis;
  const { count: n, free: floating, reduction } = undamped;
  if (n !== assembly.free || floating > 0 || reduction.relaxing > 0) return undefined;
  const found = basis.complexRoots();
  if (!found.ok) return undefined;
  const { roots } = found.value;
  const forms = by.flatMap((index) => {
    const { on } = assembly.drives[index];
    return on.kind === "form" ? [on.form] : [];
  });
  if (forms.length < by.length || roots.some(({ norm }) => norm === undefined)) return undefined;
  const { re, im } = shapeRows(basis, roots);
  const feed = feedsOf(forms, roots, re, im);
  const nothing = { re: new Float64Array(feed.re.length), im: new Float64Array(feed.re.length) };
  const rest = new Float64Array(0);
  const parts: TransferParts = {
    modal: {
      count: roots.length,
      rest: 0,
      inputs: by.length,
      block: rest,
      lambdaRe: Float64Array.from(roots, (root) => root.re),
      lambdaIm: Float64Array.from(roots, (root) => root.im),
      weight: Float64Array.from(roots, (root) => (root.im === 0 ? 1 : 2)),
    },
    free: n,
    shapeRe: transpose(re, roots.length, n),
    shapeIm: transpose(im, roots.length, n),
    shapeRest: rest,
    direct: new Float64Array(n * by.length),
    feeds: [feed, nothing, nothing].map((f) => ({ ...f, rest })),
  };
  return { at: transferOf(parts), many: blockOf(parts) };
}

/** psi^T f over the norm, for each root and force. */
function feedsOf(
  forms: readonly LinearForm[],
  roots: readonly Root[],
  re: Float64Array,
  im: Float64Array,
): { re: Float64Array; im: Float64Array } {
  const [n, inputs] = [re.length / roots.length, forms.length];
  const feed = { re: new Float64Array(roots.length * inputs), im: new Float64Array(roots.length * inputs) };
  roots.forEach(({ norm = [0, 0] }, k) => {
    const square = norm[0] * norm[0] + norm[1] * norm[1];
    forms.forEach((form, j) => {
      const a = formValue(form, re.subarray(k * n, (k + 1) * n));
      const b = formValue(form, im.subarray(k * n, (k + 1) * n));
      feed.re[k * inputs + j] = (a * norm[0] + b * norm[1]) / square;
      feed.im[k * inputs + j] = (b * norm[0] - a * norm[1]) / square;
    });
  });
  return feed;
}

/** Shapes of roots over the coordinates, one a row. */
function shapeRows({ undamped }: ModalBasis, roots: readonly Root[]): { re: Float64Array; im: Float64Array } {
  const { count: n, vectors } = undamped;
  const rows = (part: "re" | "im"): Float64Array => {
    const given = new Float64Array(roots.length * n);
    roots.forEach(({ shape }, k) => {
      given.set(shape[part], k * n);
    });
    return roots[0]?.shape.basis === "inertial" ? given : multiply(given, vectors, roots.length, n, n);
  };
  return { re: rows("re"), im: rows("im") };
}
