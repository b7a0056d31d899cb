import type { Assembly } from "../mechanics/assembly.ts";
import { sameForm } from "../mechanics/forms.ts";
import { instantiate } from "./instantiate.ts";
import type { Derivatives, Model, Overrides, ParameterValue } from "./model.ts";

/**
 * Derivatives of the numbers of an instance by one `let` (by its SI value; a rate by its Hz), or undefined where
 * there is no such let. Central differences of fourth order over a step of 1e-3 of the value: for the sums,
 * products, quotients and powers that models are made of, truncation and rounding are both near 1e-12 of the
 * derivative. They are taken at the numbers that the overrides leave.
 */
export function derivatives(
  model: Model,
  caseIndex: number,
  name: string,
  overrides: Overrides = {},
): Derivatives | undefined {
  const at = instantiate(model, caseIndex, overrides);
  const parameter = at.parameters.get(name);
  if (parameter === undefined) return undefined;
  const step = stepFor(parameter);
  const nominal = overrides.parameters?.get(name) ?? parameter.value;
  const moved = [-2, -1, 1, 2].map((k) => {
    const parameters = new Map(overrides.parameters);
    parameters.set(name, nominal + k * step);
    return instantiate(model, caseIndex, { ...overrides, parameters }).assembly;
  });
  const scalar = (read: (assembly: Assembly) => number): number => slope(moved.map(read), step);
  const column = (length: number, read: (assembly: Assembly, i: number) => number): Float64Array =>
    Float64Array.from({ length }, (_, i) => scalar((assembly) => read(assembly, i)));
  const { inertias, elements } = at.assembly;
  return {
    name,
    inertia: column(inertias.length, (assembly, i) => assembly.inertias[i].value),
    stiffness: column(elements.length, (assembly, i) => assembly.elements[i].stiffness),
    damping: column(elements.length, (assembly, i) => assembly.elements[i].damping),
    inertance: column(elements.length, (assembly, i) => assembly.elements[i].inertance),
    lossFactor: column(elements.length, (assembly, i) => assembly.elements[i].lossFactor),
    preload: column(elements.length, (assembly, i) => assembly.elements[i].preload),
    gravity: scalar((assembly) => assembly.gravity),
    modalDamping: scalar((assembly) => assembly.modalDamping),
    massDamping: scalar((assembly) => assembly.massDamping),
    stiffnessDamping: scalar((assembly) => assembly.stiffnessDamping),
    movesForms: moved.some((assembly) => !sameForms(assembly, at.assembly)),
    movesDrives: moved.some((assembly) => !sameDrives(assembly, at.assembly)),
  };
}

/** Chosen so that the fourth power of it and the rounding of a difference over it are of one size. */
const RELATIVE_STEP = 1e-3;

/** A share of the value; of its band or range where the value is zero. */
function stepFor({ value, low, high, range }: ParameterValue): number {
  if (value !== 0) return RELATIVE_STEP * Math.abs(value);
  const width = low !== undefined && high !== undefined ? high - low : range ? range[1] - range[0] : 0;
  return RELATIVE_STEP * (width > 0 ? width : 1);
}

/** Values at -2, -1, 1, 2 steps. */
function slope([a, b, c, d]: readonly number[], step: number): number {
  return (a - 8 * b + 8 * c - d) / (12 * step);
}

function sameForms(a: Assembly, b: Assembly): boolean {
  return a.coordinates.every((coordinate, i) => sameForm(coordinate.form, b.coordinates[i].form));
}

/** Drives are plain data but for laws, whose values are looked at at a few times. */
function sameDrives(a: Assembly, b: Assembly): boolean {
  return a.drives.every((drive, i) => {
    const [own, other] = [drive.shape, b.drives[i].shape];
    if (own.kind === "law" && other.kind === "law") {
      return LOOKED_AT.every((time) => own.law.at(time) === other.law.at(time));
    }
    if (own.kind === "record" && other.kind === "record") {
      return LOOKED_AT.every((_, k) => own.samples.values[k] === other.samples.values[k]);
    }
    return JSON.stringify(own) === JSON.stringify(other);
  });
}

/** s; irregular, so that no periodic law hides between them. */
const LOOKED_AT = [0, 0.0137, 0.291, 1.733, 11.9];
