/**
 * Checks of answers by energies added up element by element. Sums of squares lose no digits where stiffnesses lie
 * many orders apart, so they tell when the answer has.
 */

import type { FrequencyResponse } from "../answers/analysis.ts";
import type { Mode } from "../answers/answer.ts";
import { driveGroups, drivePhasor } from "../answers/drive-phasor.ts";
import type { Assembly, QuantityRef } from "../mechanics/assembly.ts";
import { type FlatForms, flatForms, formValues } from "../mechanics/flat-forms.ts";
import { type FreeShape, freeCoordinates, freeShape, onShape, squareOnShape } from "./shapes.ts";

/**
 * Frequency of a mode from Rayleigh's quotient, strain energy over kinetic energy, in Hz: its error is the square
 * of the shape's. Undefined where the shape is complex or the system has no such quotient.
 */
export function frequencyByEnergy(assembly: Assembly, mode: Mode): number | undefined {
  const shape = freeShape(assembly, mode.shape);
  if (shape.im.some((value) => value !== 0)) return undefined;
  const { springs, inertias } = packed(assembly);
  let strain = sumOfSquares(springs, shape.re);
  for (const { matrix, row, column, value } of assembly.extras ?? []) {
    if (matrix === "mass") return undefined;
    if (matrix === "stiffness") strain += value * onShape(row, shape)[0] * onShape(column, shape)[0];
  }
  const inertia = sumOfSquares(inertias, shape.re);
  return strain > 0 && inertia > 0 ? Math.sqrt(strain / inertia) / (2 * Math.PI) : undefined;
}

interface Packed {
  readonly springs: FlatForms;
  readonly inertias: FlatForms;
}

/** Every mode of an assembly is checked, so its forms are packed once. */
const PACKED = new WeakMap<Assembly, Packed>();

function packed(assembly: Assembly): Packed {
  const known = PACKED.get(assembly);
  if (known !== undefined) return known;
  const springs = flatForms(assembly.elements.map(({ form, stiffness }) => ({ form, value: stiffness })));
  const made = { springs, inertias: flatForms(assembly.inertias) };
  PACKED.set(assembly, made);
  return made;
}

function sumOfSquares(forms: FlatForms, shape: Float64Array): number {
  const { count, value } = forms;
  const sizes = formValues(forms, shape, 0, new Float64Array(count));
  let sum = 0;
  for (let e = 0; e < count; e++) sum += value[e] * (sizes[e] * sizes[e]);
  return sum;
}

/** More coordinates would make the check dearer than the sweep. */
const MOST_COORDINATES = 300;

/**
 * How far the steady response to forces is from balance at a frequency: the difference between the work of the
 * forces and the energies stored, over the sum of their sizes. Undefined where it cannot be told: supports that
 * move, drives at several rates, a frequency without a response.
 */
export function imbalanceAt(
  assembly: Assembly,
  response: FrequencyResponse,
  by: readonly number[],
  frequencyHz: number,
): number | undefined {
  const groups = driveGroups(assembly.drives, by);
  if (!groups.ok || groups.value.length !== 1 || (assembly.extras ?? []).length > 0) return undefined;
  if (assembly.free > MOST_COORDINATES || !(frequencyHz > 0)) return undefined;
  const x = responseOf(assembly, response, frequencyHz);
  if (x === undefined) return undefined;
  let balance = 0;
  let size = 0;
  for (const index of by) {
    const drive = assembly.drives[index];
    if (drive.on.kind !== "form") return undefined;
    const [re, im] = drivePhasor(drive, frequencyHz);
    const [xRe, xIm] = onShape(drive.on.form, x);
    const work = re * xRe + im * xIm;
    balance += work;
    // Each drive by itself: of two that cancel each other rounding is left, and no lack of balance.
    size += Math.abs(work);
  }
  const square = (2 * Math.PI * frequencyHz) ** 2;
  const store = (energy: number): void => {
    balance -= energy;
    size += Math.abs(energy);
  };
  for (const { stiffness, form } of assembly.elements) store(stiffness * squareOnShape(form, x));
  for (const { value, form } of assembly.inertias) store(-square * value * squareOnShape(form, x));
  return size > 0 ? Math.abs(balance) / size : undefined;
}

function responseOf(
  assembly: Assembly,
  response: FrequencyResponse,
  frequencyHz: number,
): FreeShape | undefined {
  const named = freeCoordinates(assembly);
  const re = new Float64Array(assembly.free);
  const im = new Float64Array(assembly.free);
  for (let i = 0; i < named.length; i++) {
    const coordinate = assembly.coordinates[named[i]];
    if (coordinate === undefined) return undefined;
    const quantity: QuantityRef = {
      text: `${coordinate.name}.displacement`,
      terms: [{ of: "coordinate", coordinate: named[i], derivative: 0, factor: 1 }],
      unit: "m",
    };
    const at = response.at(quantity, frequencyHz);
    if (!at.ok) return undefined;
    [re[i], im[i]] = at.value;
  }
  return { re, im };
}
