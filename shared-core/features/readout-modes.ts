/** Small numbers read from the mode table and the terms of the equations: parts, held frequencies, first-order moves. */
import type { Mode } from "../answers/answer.ts";
import type { FrequencySensitivity, ValueChanges } from "../answers/sensitivity.ts";
import { elasticModes, type FreeShape, freeShape, squareOnShape } from "../judgement/shapes.ts";
import type { Assembly, LinearForm } from "../mechanics/assembly.ts";

export type ElasticMode = ReturnType<typeof elasticModes>[number];
export { elasticModes };

/** Indices of the elements of a statement: its own, or those of its directions (`mount_a.x`). */
export function elementsOf({ elements }: Assembly, name: string): readonly number[] {
  return indicesOf(elements, (element) => element.name === name || element.name.startsWith(`${name}.`));
}

/** Indices of the coordinates of a statement. */
export function coordinatesOf({ coordinates }: Assembly, owner: string): readonly number[] {
  return indicesOf(coordinates, (coordinate) => coordinate.owner === owner);
}

function indicesOf<T>(list: readonly T[], wanted: (each: T) => boolean): readonly number[] {
  return list.flatMap((each, index) => (wanted(each) ? [index] : []));
}

/** Share of a mode's kinetic energy that is in what a statement moves, 0 to 1; own masses of springs left out. */
export function motionShare(assembly: Assembly, mode: Mode, owner: string): number {
  const shape = freeShape(assembly, mode.shape);
  let [own, all] = [0, 0];
  for (const inertia of assembly.inertias) {
    const energy = inertia.value * squareOnShape(inertia.form, shape);
    all += energy;
    if (inertia.owner === owner) own += energy;
  }
  return all > 0 ? own / all : 0;
}

/** Share of a mode's strain energy in the elements of a statement. */
export function strainShare(mode: Mode, names: readonly string[]): number {
  const share = (name: string): number => mode.shareOf?.(name) ?? mode.energyShare[name] ?? 0;
  return names.reduce((sum, name) => sum + share(name), 0);
}

/**
 * Natural frequency (Hz) of a coordinate while every other free coordinate is held still: sqrt(k/m) of its own
 * entries of K and M. What is bound to it moves along.
 * undefined: it has no inertia of its own, nothing pulls it back, or it moves with several others.
 */
export function heldFrequency(assembly: Assembly, coordinate: number): number | undefined {
  const form = assembly.coordinates[coordinate]?.form;
  if (form === undefined || form.coordinates.length !== 1) return undefined;
  const free = form.coordinates[0];
  const mass = diagonal(assembly.inertias, free) + extraDiagonal(assembly, "mass", free);
  const springs = assembly.elements.map(({ form: travel, stiffness }) => ({
    form: travel,
    value: stiffness,
  }));
  const stiffness = diagonal(springs, free) + extraDiagonal(assembly, "stiffness", free);
  if (!(mass > 0 && stiffness > 0)) return undefined;
  return Math.sqrt(stiffness / mass) / (2 * Math.PI);
}

function diagonal(
  terms: readonly { readonly form: LinearForm; readonly value: number }[],
  free: number,
): number {
  return terms.reduce((sum, { form, value }) => sum + value * factorAt(form, free) ** 2, 0);
}

function extraDiagonal({ extras = [] }: Assembly, matrix: "mass" | "stiffness", free: number): number {
  return extras
    .filter((extra) => extra.matrix === matrix)
    .reduce((sum, { row, column, value }) => sum + value * factorAt(row, free) * factorAt(column, free), 0);
}

function factorAt(form: LinearForm, free: number): number {
  const at = form.coordinates.indexOf(free);
  return at < 0 ? 0 : form.factors[at];
}

/** Changes of an assembly's numbers when the stiffness of these elements grows by a share of it. */
export function stifferBy(assembly: Assembly, elements: readonly number[], share: number): ValueChanges {
  const stiffnesses = new Float64Array(assembly.elements.length);
  for (const i of elements) stiffnesses[i] = share * assembly.elements[i].stiffness;
  return { stiffnesses };
}

/** The same for the inertances of these elements. */
export function heavierBy(assembly: Assembly, elements: readonly number[], share: number): ValueChanges {
  const names = new Set(elements.map((i) => assembly.elements[i].name));
  const inertias = Float64Array.from(assembly.inertias, ({ owner, relative, value }) =>
    relative && names.has(owner) ? share * value : 0,
  );
  return { inertias };
}

/** First-order move (Hz) of elastic mode `number`; 0 where it cannot be told. */
export function moveOf(sensitivity: FrequencySensitivity, number: number, changes: ValueChanges): number {
  if (!(1 <= number && number <= sensitivity.count)) return 0;
  const moved = sensitivity.along(number, changes);
  return Number.isFinite(moved) ? moved : 0;
}

/**
 * Damping ratio that dampers give to a mode, each by itself: c (travel of the shape)^2 / (2 w m). Exact where
 * damping does not couple the modes, of first order in it otherwise.
 */
export function dampingGiven(assembly: Assembly, mode: ElasticMode, elements: readonly number[]): number {
  const shape = freeShape(assembly, mode.shape);
  const modalMass = mode.modalMass ?? totalMass(assembly, shape);
  if (!(modalMass > 0 && mode.frequencyHz > 0)) return 0;
  const power = elements.reduce(
    (sum, i) => sum + assembly.elements[i].damping * squareOnShape(assembly.elements[i].form, shape),
    0,
  );
  return power / (4 * Math.PI * mode.frequencyHz * modalMass);
}

const totalMass = (assembly: Assembly, shape: FreeShape): number =>
  assembly.inertias.reduce((sum, { form, value }) => sum + value * squareOnShape(form, shape), 0);

/** The first modes and those with the largest weight, at most `most`, from the lowest. */
export function modesWorthSaying<T extends { readonly number: number }>(
  modes: readonly T[],
  weight: (mode: T) => number,
  { first, most }: { readonly first: number; readonly most: number },
): readonly T[] {
  const weights = new Map(modes.map((mode) => [mode, weight(mode)]));
  const byWeight = [...modes].sort((a, b) => (weights.get(b) ?? 0) - (weights.get(a) ?? 0));
  const kept = new Set(modes.slice(0, first));
  for (const mode of byWeight) {
    if (kept.size >= most) break;
    if ((weights.get(mode) ?? 0) > WORTH) kept.add(mode);
  }
  return modes.filter((mode) => kept.has(mode));
}

/** A mode with less than this share is not worth a line; chosen by reading. */
const WORTH = 0.01;
