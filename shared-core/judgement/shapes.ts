import type { Mode, ModeTable } from "../answers/answer.ts";
import type { Assembly, LinearForm } from "../mechanics/assembly.ts";

/** A complex number for each free coordinate. */
export interface FreeShape {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Index among the named coordinates of each free coordinate: the one whose form is that unit vector. */
export function freeCoordinates(assembly: Assembly): Int32Array {
  const named = new Int32Array(assembly.free).fill(-1);
  assembly.coordinates.forEach(({ form }, index) => {
    const alone = form.coordinates.length === 1 && form.supports.length === 0 && form.factors[0] === 1;
    if (alone && named[form.coordinates[0]] < 0) named[form.coordinates[0]] = index;
  });
  return named;
}

/** A shape over the named coordinates brought to the free ones. */
export function freeShape(assembly: Assembly, shape: Mode["shape"]): FreeShape {
  const named = freeCoordinates(assembly);
  const pick = (from: Float64Array): Float64Array =>
    Float64Array.from(named, (index) => (index < 0 ? 0 : from[index]));
  return { re: pick(shape.re), im: pick(shape.im) };
}

/** Value of a form on a shape, supports standing still: [re, im]. */
export function onShape(form: LinearForm, shape: FreeShape): readonly [number, number] {
  let re = 0;
  let im = 0;
  for (let i = 0; i < form.coordinates.length; i++) {
    re += form.factors[i] * shape.re[form.coordinates[i]];
    im += form.factors[i] * shape.im[form.coordinates[i]];
  }
  return [re, im];
}

/** Squared size of a form on a shape. */
export function squareOnShape(form: LinearForm, shape: FreeShape): number {
  const [re, im] = onShape(form, shape);
  return re * re + im * im;
}

/** Elastic modes, from the lowest. */
export const elasticModes = (table: ModeTable): readonly (Mode & { number: number; frequencyHz: number })[] =>
  table.modes.filter(
    (mode): mode is Mode & { number: number; frequencyHz: number } =>
      mode.number !== null && mode.number > 0 && mode.frequencyHz !== null,
  );

/** The element that holds most of a mode's strain energy. */
export function stiffestShare(mode: Mode): string | undefined {
  const shares = Object.entries(mode.energyShare).filter(([, share]) => Number.isFinite(share));
  return shares.sort((a, b) => b[1] - a[1])[0]?.[0];
}
