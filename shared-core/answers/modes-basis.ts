/**
 * The undamped modes of an assembly over its free coordinates, and what follows from them at once: energy
 * shares, loss factors as modal damping, participation. Everything beyond the roots is computed when asked for.
 */
import type { Assembly, LinearForm, Motion } from "../mechanics/assembly.ts";
import { type FlatForms, flatForms, formValues } from "../mechanics/flat-forms.ts";
import { formValue } from "../mechanics/forms.ts";
import { recoverValues, reduceSystem } from "../mechanics/massless.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type ComplexRoots, complexRoots } from "./modes-roots.ts";
import { type UndampedModes, undampedModes } from "./modes-undamped.ts";

/** Unit motion of the base a participation is counted in. */
export type Direction = "line" | "turn";

export interface ModalBasis {
  readonly assembly: Assembly;
  readonly undamped: UndampedModes;
  /** Shape of undamped mode r (free and damper-held ones first) over the free coordinates, phi^T M phi = 1. */
  shape(r: number): Float64Array;
  /** Share of the strain energy by element, in their order; undefined where there is none to share. */
  energyShares(r: number): Float64Array | undefined;
  /** Loss factors of the elements as a damping ratio: half the sum of loss factor times energy share. */
  lossRatio(r: number): number;
  /** 2 zeta omega of modal damping, with or without the loss factors, for every undamped mode. 1/s. */
  modalRates(withLoss: boolean): Float64Array;
  /** The complex roots with all damping that the mode table counts. */
  complexRoots(): Outcome<ComplexRoots>;
  /** Participation of mode r as normalised here, and the moving mass, in each direction that has any. */
  participation(r: number): readonly { direction: Direction; factor: number; total: number }[];
}

/** Spring energies of both signs that cancel to this share of their size are not shared out. */
const CANCELLED = 1e-12;

/** Solves the undamped problem of an assembly. Fails, with the reason, where it has none. */
export function modalBasis(assembly: Assembly): Outcome<ModalBasis> {
  if (assembly.free === 0) return fail("nothing in it can move");
  const reduction = reduceSystem(assembly);
  if (!reduction.ok) return fail(reduction.reason);
  const undamped = undampedModes(reduction.value);
  if (!undamped.ok) return fail(undamped.reason);
  return succeed(new Basis(assembly, undamped.value));
}

class Basis implements ModalBasis {
  readonly assembly: Assembly;
  readonly undamped: UndampedModes;
  readonly #shapes: (Float64Array | undefined)[];
  readonly #lossy: boolean;
  #roots: Outcome<ComplexRoots> | undefined;
  #springs: FlatForms | undefined;
  #inertias: FlatForms | undefined;
  #loads: ReturnType<typeof directionLoads> | undefined;

  constructor(assembly: Assembly, undamped: UndampedModes) {
    this.assembly = assembly;
    this.undamped = undamped;
    this.#shapes = new Array(undamped.count);
    this.#lossy = assembly.elements.some(({ lossFactor, stiffness }) => lossFactor * stiffness !== 0);
  }

  shape(r: number): Float64Array {
    const known = this.#shapes[r];
    if (known !== undefined) return known;
    const { condensed, vectors, count } = this.undamped;
    const shape = recoverValues(condensed, vectors.subarray(r * count, (r + 1) * count));
    this.#shapes[r] = shape;
    return shape;
  }

  energyShares(r: number): Float64Array | undefined {
    const { elements } = this.assembly;
    this.#springs ??= flatForms(elements.map(({ form, stiffness }) => ({ form, value: stiffness })));
    const { count, value } = this.#springs;
    const strains = formValues(this.#springs, this.shape(r), 0, new Float64Array(count));
    let sum = 0;
    let size = 0;
    const energies = strains.map((s, e) => value[e] * s * s);
    for (const energy of energies) {
      sum += energy;
      size += Math.abs(energy);
    }
    const { free, held } = this.undamped;
    if (r < free + held || Math.abs(sum) <= CANCELLED * size) return undefined;
    return energies.map((energy) => energy / sum);
  }

  lossRatio(r: number): number {
    const shares = this.#lossy ? this.energyShares(r) : undefined;
    if (shares === undefined) return 0;
    let sum = 0;
    this.assembly.elements.forEach(({ lossFactor }, e) => {
      sum += (lossFactor * shares[e]) / 2;
    });
    return sum;
  }

  modalRates(withLoss: boolean): Float64Array {
    const { values } = this.undamped;
    return values.map((value, r) => {
      if (!(value > 0)) return 0;
      const ratio = this.assembly.modalDamping + (withLoss ? this.lossRatio(r) : 0);
      return 2 * ratio * Math.sqrt(value);
    });
  }

  complexRoots(): Outcome<ComplexRoots> {
    this.#roots ??= complexRoots(this.undamped, this.assembly.massDamping, this.modalRates(true));
    return this.#roots;
  }

  participation(r: number): { direction: Direction; factor: number; total: number }[] {
    const shape = this.shape(r);
    this.#inertias ??= flatForms(this.assembly.inertias);
    this.#loads ??= directionLoads(this.assembly);
    const travels = formValues(this.#inertias, shape, 0, new Float64Array(this.#inertias.count));
    return [...this.#loads].map(([direction, loads]) => {
      let factor = 0;
      let total = 0;
      for (const { index, load, mass } of loads) {
        factor += load * travels[index];
        total += mass;
      }
      return { direction, factor, total };
    });
  }
}

/** Inertias that a base moving along or turning by one loads: value times its motion, and mass that moves. */
function directionLoads(assembly: Assembly): Map<Direction, { index: number; load: number; mass: number }[]> {
  const motions = new Map<string, Motion>();
  for (const { name, motion } of assembly.elements) motions.set(name, motion);
  for (const { owner, motion } of assembly.coordinates) motions.set(owner, motion);
  const loads = new Map<Direction, { index: number; load: number; mass: number }[]>();
  assembly.inertias.forEach(({ owner, form, value, relative, rigid = 1 }, index) => {
    if (relative || rigid === 0 || form.coordinates.length === 0) return;
    const motion = motions.get(owner) ?? motionOf(assembly, form);
    if (motion === "charge") return;
    const direction = motion === "turning" ? "turn" : "line";
    const list = loads.get(direction) ?? [];
    loads.set(direction, list);
    list.push({ index, load: value * rigid, mass: value * rigid * rigid });
  });
  return loads;
}

function motionOf(assembly: Assembly, form: LinearForm): Motion {
  const found = assembly.coordinates.find((c) => c.form.coordinates.includes(form.coordinates[0]));
  return found?.motion ?? "sliding";
}

/** Values of all named coordinates for values of the free ones. */
export const namedValues = (assembly: Assembly, q: Float64Array): Float64Array =>
  Float64Array.from(assembly.coordinates, ({ form }) => formValue(form, q));
