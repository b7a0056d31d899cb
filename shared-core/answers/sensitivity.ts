/**
 * Derivatives of the elastic modes' frequencies by the terms of M and K.
 *
 * d lambda = phi^T (dK - lambda dM) phi with phi^T M phi = 1; places without inertia need no care, because the
 * strain energy is stationary in them. In a group of equal roots the derivatives along a change are the
 * eigenvalues of the same form restricted to the group (Lancaster, On eigenvalues of matrices dependent on a
 * parameter, Numerische Mathematik 6, 1964), ascending, so that the modes stay numbered by frequency for a
 * growing parameter.
 */
import type { Assembly } from "../mechanics/assembly.ts";
import { flatForms, formValues } from "../mechanics/flat-forms.ts";
import { symmetricEigen } from "../numerics/symmetric-eigen.ts";
import type { ModalBasis } from "./modes-basis.ts";

/** Derivatives of one mode's frequency by each value alone. Hz per SI unit of the value. */
export interface TermDerivatives {
  /** By each inertia's value (kg, kg*m^2), in the order of the assembly. */
  readonly inertias: Float64Array;
  /** By each element's stiffness (N/m, N*m/rad). */
  readonly stiffnesses: Float64Array;
  /** By each element's inertance. */
  readonly inertances: Float64Array;
}

/** What changes together with one parameter: derivative of each value by it; empty arrays are zeros. */
export interface ValueChanges {
  readonly inertias?: ArrayLike<number>;
  readonly stiffnesses?: ArrayLike<number>;
}

export interface FrequencySensitivity {
  /** Number of elastic modes. */
  readonly count: number;
  /** By each value alone, of elastic mode `number` (from 1). Meaningless on its own where roots are equal. */
  terms(number: number): TermDerivatives;
  /** Derivative (Hz) of elastic mode `number` along a change of many values; equal roots are parted. */
  along(number: number, changes: ValueChanges): number;
  /**
   * The same from two assemblies of the same structure a small step before and after, `step` apart in the
   * parameter; forms (bind factors, lengths) may change as well. Error of second order in the step.
   */
  between(number: number, before: Assembly, after: Assembly, step: number): number;
}

/** Roots nearer than this share of themselves are treated as equal. */
const EQUAL = 1e-7;

export function frequencySensitivity(basis: ModalBasis): FrequencySensitivity {
  const { assembly, undamped } = basis;
  const first = undamped.free + undamped.held;
  const { values, count } = undamped;
  const inertias = flatForms(assembly.inertias);
  const elements = flatForms(assembly.elements.map(({ form, stiffness }) => ({ form, value: stiffness })));
  const travels = (r: number) => formValues(elements, basis.shape(r), 0, new Float64Array(elements.count));
  const motions = (r: number) => formValues(inertias, basis.shape(r), 0, new Float64Array(inertias.count));
  // f = sqrt(lambda) / (2 pi), so df = d lambda / (8 pi^2 f); a root of zero has no such derivative.
  const perRoot = (r: number) => (values[r] > 0 ? 1 / (4 * Math.PI * Math.sqrt(values[r])) : Number.NaN);
  const inForm = (r: number, change: (p: number, q: number) => number): number => {
    const group = equalRoots(values, r, first);
    const a = new Float64Array(group.length * group.length);
    group.forEach((p, i) => {
      group.forEach((q, j) => {
        a[i * group.length + j] = change(p, q);
      });
    });
    const solved = symmetricEigen(a, group.length, { vectors: false });
    return solved.ok ? solved.value.values[group.indexOf(r)] * perRoot(r) : Number.NaN;
  };
  return {
    count: count - first,
    terms(number) {
      const r = first + number - 1;
      const scale = perRoot(r);
      const t = travels(r);
      return {
        inertias: motions(r).map((x) => -values[r] * x * x * scale),
        stiffnesses: t.map((x) => x * x * scale),
        inertances: t.map((x) => -values[r] * x * x * scale),
      };
    },
    along(number, changes) {
      const r = first + number - 1;
      return inForm(r, (p, q) => {
        const stiff = weightedProduct(changes.stiffnesses, travels(p), travels(q));
        return stiff - values[r] * weightedProduct(changes.inertias, motions(p), motions(q));
      });
    },
    between(number, before, after, step) {
      const r = first + number - 1;
      const [low, high] = [energyForms(before), energyForms(after)];
      return inForm(r, (p, q) => {
        const [x, y] = [basis.shape(p), basis.shape(q)];
        return (high(x, y, values[r]) - low(x, y, values[r])) / step;
      });
    },
  };
}

/** x^T (K - lambda M) y of an assembly. */
function energyForms(assembly: Assembly): (x: Float64Array, y: Float64Array, lambda: number) => number {
  const inertias = flatForms(assembly.inertias);
  const elements = flatForms(assembly.elements.map(({ form, stiffness }) => ({ form, value: stiffness })));
  const product = (forms: typeof inertias, x: Float64Array, y: Float64Array) =>
    weightedProduct(
      forms.value,
      formValues(forms, x, 0, new Float64Array(forms.count)),
      formValues(forms, y, 0, new Float64Array(forms.count)),
    );
  return (x, y, lambda) => product(elements, x, y) - lambda * product(inertias, x, y);
}

function weightedProduct(weights: ArrayLike<number> | undefined, x: Float64Array, y: Float64Array): number {
  let sum = 0;
  for (let i = 0; weights !== undefined && i < weights.length; i++) sum += weights[i] * x[i] * y[i];
  return sum;
}

/** Neighbours of root r that equal it. */
function equalRoots(values: Float64Array, r: number, first: number): number[] {
  const same = (s: number, t: number) => Math.abs(values[s] - values[t]) <= EQUAL * Math.abs(values[t]);
  let low = r;
  let high = r;
  while (low > first && same(low - 1, low)) low--;
  while (high + 1 < values.length && same(high + 1, high)) high++;
  return Array.from({ length: high - low + 1 }, (_, i) => low + i);
}
