import type { Assembly, LinearForm, Motion } from "../../mechanics/assembly.ts";
import { sumTerms, systemTerms, type Term, toDense } from "../../mechanics/matrices.ts";
import { asymmetry } from "../../numerics/products.ts";
import { symmetricEigen } from "../../numerics/symmetric-eigen.ts";
import { nameSpan, placeOf, statementOf } from "../places.ts";
import type { Rule } from "../rule.ts";
import { type FreeShape, onShape, squareOnShape } from "../shapes.ts";
import { percent, perLength } from "../wording.ts";

/** A negative eigenvalue smaller than this part of the largest is rounding. */
const ROUNDING = 1e-10;

/** It buckles or topples: something pushes away from rest harder than what holds. */
export const staticInstability: Rule = {
  code: "static-instability",
  cost: "modes",
  check({ model, assembly }) {
    const found = staticInstabilityOf(assembly);
    if (found === undefined) return [];
    const { pusher, held, mover } = found;
    const statement = statementOf(model, mover.owner);
    return [
      {
        span: placeOf(model, pusher.name, "stiffness"),
        message: `\`${mover.name}\` does not return to rest: \`${pusher.name}\` pushes it away with ${perLength(pusher.stiffness, pusher.motion)}, and what holds it is ${percent(held)} of what pushes`,
        hint: "stiffen what holds it or take load off what pushes",
        related:
          statement === undefined
            ? undefined
            : [{ span: nameSpan(statement), message: `\`${mover.name}\` moves away` }],
      },
    ];
  },
};

interface StaticInstability {
  readonly pusher: Pusher;
  readonly mover: Assembly["coordinates"][number];
  /** Share of the pushing stiffness that the holding one makes up. */
  readonly held: number;
}

interface Pusher {
  readonly name: string;
  readonly stiffness: number;
  readonly motion: Motion;
}

/**
 * The most negative direction of the stiffness. Coordinates are scaled by the size of what acts on each (a
 * congruence, which keeps the number of negative eigenvalues: Sylvester's law of inertia), so that metres and
 * radians can stand in one matrix. A stiffness that is not symmetric (flow, control) has no energy to judge;
 * its growth shows in the modes.
 */
export function staticInstabilityOf(assembly: Assembly): StaticInstability | undefined {
  if (!KNOWN.has(assembly)) KNOWN.set(assembly, findInstability(assembly));
  return KNOWN.get(assembly);
}

/** Three rules ask for it. */
const KNOWN = new WeakMap<Assembly, StaticInstability | undefined>();

function findInstability(assembly: Assembly): StaticInstability | undefined {
  const terms = systemTerms(assembly).stiffness;
  const n = assembly.free;
  if (n === 0 || terms.every(({ row, column, value }) => row === column && value >= 0)) return undefined;
  const stiffness = toDense(sumTerms(terms, n));
  const scale = coordinateScale(terms, n);
  const scaled = stiffness.map((value, at) => value * scale[Math.floor(at / n)] * scale[at % n]);
  if (asymmetry(scaled, n) > ROUNDING) return undefined;
  const eigen = symmetricEigen(scaled, n);
  if (!eigen.ok) return undefined;
  const { values, vectors } = eigen.value;
  const largest = Math.max(Math.abs(values[0]), Math.abs(values[n - 1]));
  if (largest === 0 || values[0] > -ROUNDING * largest) return undefined;
  const re = Float64Array.from({ length: n }, (_, i) => vectors[i * n] * scale[i]);
  return blame(assembly, { re, im: new Float64Array(n) });
}

function coordinateScale(terms: readonly Term[], n: number): Float64Array {
  const sum = new Float64Array(n);
  for (const { row, column, value } of terms) {
    row.coordinates.forEach((i, k) => {
      const at = column.coordinates.indexOf(i);
      if (at >= 0) sum[i] += Math.abs(value * row.factors[k] * column.factors[at]);
    });
  }
  return sum.map((value) => (value > 0 ? 1 / Math.sqrt(value) : 1));
}

function blame(assembly: Assembly, shape: FreeShape): StaticInstability | undefined {
  let pushing = 0;
  let holding = 0;
  let most = 0;
  let pusher: Pusher | undefined;
  const take = (energy: number, by: () => Pusher): void => {
    if (energy >= 0) holding += energy;
    else pushing -= energy;
    if (energy >= most) return;
    most = energy;
    pusher = by();
  };
  for (const element of assembly.elements) {
    take(element.stiffness * squareOnShape(element.form, shape), () => element);
  }
  for (const { owner, matrix, row, column, value } of assembly.extras ?? []) {
    if (matrix !== "stiffness") continue;
    const energy = value * onShape(row, shape)[0] * onShape(column, shape)[0];
    take(energy, () => ({ name: owner, stiffness: value, motion: motionOf(assembly, row) }));
  }
  const size = (coordinate: Assembly["coordinates"][number]): number => squareOnShape(coordinate.form, shape);
  const mover = [...assembly.coordinates].sort((a, b) => size(b) - size(a))[0];
  return pusher === undefined || mover === undefined ? undefined : { pusher, mover, held: holding / pushing };
}

function motionOf(assembly: Assembly, form: LinearForm): Motion {
  const [first] = form.coordinates;
  return assembly.coordinates.find((c) => c.form.coordinates.includes(first))?.motion ?? "sliding";
}
