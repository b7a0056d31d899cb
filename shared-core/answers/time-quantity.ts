/**
 * Quantities as sums over motions along forms, the same for steady answers and for histories.
 *
 * A force of an element is stiffness * travel + damping * rate + inertance * acceleration + preload, where
 * `stiffness_damping` adds its share to the damping of each spring, so that forces and equations of motion agree.
 */
import type { Assembly, ElementInfo, LinearForm, QuantityRef } from "../mechanics/assembly.ts";

/** `factor` times derivative `derivative` of the motion along `form`. */
export interface MotionTerm {
  readonly form: LinearForm;
  readonly derivative: 0 | 1 | 2;
  readonly factor: number;
  /** Share of the factor that is hysteretic, i * loss * factor, in a steady answer. */
  readonly loss: number;
}

/** factor * a * b: a power or a stored energy. */
export interface ProductTerm {
  readonly kind: "power" | "energy";
  /** Which term of the quantity it belongs to: an element's energies of travel and of rate share one. */
  readonly owner: number;
  readonly factor: number;
  readonly a: readonly MotionTerm[];
  /** Constant part of `a` (a preload), which counts in time only. */
  readonly aConstant: number;
  readonly b: readonly MotionTerm[];
}

export interface QuantityParts {
  readonly linear: readonly MotionTerm[];
  /** Preloads; not in a steady answer. */
  readonly constant: number;
  readonly products: readonly ProductTerm[];
}

export function quantityParts(assembly: Assembly, quantity: QuantityRef): QuantityParts {
  const linear: MotionTerm[] = [];
  const products: ProductTerm[] = [];
  let constant = 0;
  for (const [owner, term] of quantity.terms.entries()) {
    const { factor } = term;
    if (term.of === "coordinate") {
      const { form } = assembly.coordinates[term.coordinate];
      linear.push({ form, derivative: term.derivative, factor, loss: 0 });
    } else if (term.of === "support") {
      linear.push({ form: supportOnly(term.support), derivative: term.derivative, factor, loss: 0 });
    } else {
      const element = assembly.elements[term.element];
      const { form } = element;
      switch (term.measure) {
        case "travel":
          linear.push({ form, derivative: 0, factor, loss: 0 });
          break;
        case "rate":
          linear.push({ form, derivative: 1, factor, loss: 0 });
          break;
        case "force":
          linear.push(...forceTerms(assembly, element, factor));
          constant += factor * element.preload;
          break;
        case "power":
          products.push({
            kind: "power",
            owner,
            factor,
            a: forceTerms(assembly, element, 1),
            aConstant: element.preload,
            b: [{ form, derivative: 1, factor: 1, loss: 0 }],
          });
          break;
        case "energy":
          products.push(...energyTerms(element, owner, factor));
          break;
      }
    }
  }
  return { linear, constant, products };
}

function forceTerms(assembly: Assembly, element: ElementInfo, factor: number): MotionTerm[] {
  const { form, stiffness, damping, inertance, lossFactor } = element;
  const terms: MotionTerm[] = [];
  const viscous = damping + assembly.stiffnessDamping * stiffness;
  if (stiffness !== 0) terms.push({ form, derivative: 0, factor: factor * stiffness, loss: lossFactor });
  if (viscous !== 0) terms.push({ form, derivative: 1, factor: factor * viscous, loss: 0 });
  if (inertance !== 0) terms.push({ form, derivative: 2, factor: factor * inertance, loss: 0 });
  return terms;
}

function energyTerms(
  { form, stiffness, inertance }: ElementInfo,
  owner: number,
  factor: number,
): ProductTerm[] {
  const half = (derivative: 0 | 1, size: number): ProductTerm => {
    const motion: MotionTerm[] = [{ form, derivative, factor: 1, loss: 0 }];
    return { kind: "energy", owner, factor: 0.5 * factor * size, a: motion, aConstant: 0, b: motion };
  };
  const terms: ProductTerm[] = [];
  if (stiffness !== 0) terms.push(half(0, stiffness));
  if (inertance !== 0) terms.push(half(1, inertance));
  return terms;
}

function supportOnly(support: number): LinearForm {
  return { coordinates: [], factors: [], supports: [support], supportFactors: [1] };
}
