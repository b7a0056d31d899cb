import type { ElementShare, Mode, ModeTable } from "../answers/answer.ts";
import type { Assembly, LinearForm } from "../mechanics/assembly.ts";

/** A complex number for each free coordinate. */
export interface FreeShape {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Index among the named coordinates of each free coordinate: the one whose form is that unit vector. */
export function freeCoordinates(assembly: Assembly): Int32Array {
  const known = FREE.get(assembly);
  if (known !== undefined) return known;
  const named = new Int32Array(assembly.free).fill(-1);
  assembly.coordinates.forEach(({ form }, index) => {
    const alone = form.coordinates.length === 1 && form.supports.length === 0 && form.factors[0] === 1;
    if (alone && named[form.coordinates[0]] < 0) named[form.coordinates[0]] = index;
  });
  FREE.set(assembly, named);
  return named;
}

/** Rules ask for every mode of an assembly. */
const FREE = new WeakMap<Assembly, Int32Array>();

/** A shape over the named coordinates brought to the free ones. */
export function freeShape(assembly: Assembly, shape: Mode["shape"]): FreeShape {
  const named = freeCoordinates(assembly);
  const pick = (from: Float64Array): Float64Array => {
    const to = new Float64Array(named.length);
    for (let i = 0; i < named.length; i++) to[i] = named[i] < 0 ? 0 : from[named[i]];
    return to;
  };
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
  const { coordinates, factors } = form;
  let re = 0;
  let im = 0;
  for (let i = 0; i < coordinates.length; i++) {
    re += factors[i] * shape.re[coordinates[i]];
    im += factors[i] * shape.im[coordinates[i]];
  }
  return re * re + im * im;
}

/** Elastic modes, from the lowest. */
export const elasticModes = (table: ModeTable): readonly (Mode & { number: number; frequencyHz: number })[] =>
  table.modes.filter(
    (mode): mode is Mode & { number: number; frequencyHz: number } =>
      mode.number !== null && mode.number > 0 && mode.frequencyHz !== null,
  );

/** The element that holds most of a mode's strain energy. */
export const stiffestShare = (mode: Mode): string | undefined => largestShare(mode)?.name;

/** The same with its share. */
export function largestShare(mode: Mode): ElementShare | undefined {
  if ("largestShare" in mode) return mode.largestShare;
  const { energyShare } = mode;
  let most: string | undefined;
  for (const name of Object.keys(energyShare)) {
    const share = energyShare[name];
    if (Number.isFinite(share) && (most === undefined || share > energyShare[most])) most = name;
  }
  return most === undefined ? undefined : { name: most, share: energyShare[most] };
}
