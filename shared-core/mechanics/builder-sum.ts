import type {
  Assembly,
  CoordinateInfo,
  DriveInfo,
  ElementInfo,
  InertiaInfo,
  LinearForm,
  SupportInfo,
} from "./assembly.ts";
import type { ElementProperties, End, Motion, SystemBuilder } from "./builder.ts";
import { combineForms, sameForm, subtractForms } from "./forms.ts";

/** What a model declares before its statements add their terms. SI. */
export interface SystemDeclaration {
  /** Number of free coordinates: those that are not bound. */
  readonly free: number;
  /** Named coordinates, bound ones included; a `gravityMass` of 0 is filled in from the inertias of its owner. */
  readonly coordinates: readonly CoordinateInfo[];
  readonly supports: readonly SupportInfo[];
  readonly gravity: number;
  readonly modalDamping: number;
  readonly massDamping: number;
  readonly stiffnessDamping: number;
  readonly resonanceBand: number;
}

/** A builder that can be closed. */
export interface SumBuilder extends SystemBuilder {
  /** The equations of motion as collected so far, terms in the order in which they came. */
  finish(): Assembly;
}

/** Collects inertias, elements and drives as sums over linear forms. */
export function buildSystem(declaration: SystemDeclaration): SumBuilder {
  const inertias: InertiaInfo[] = [];
  const elements: ElementInfo[] = [];
  const drives: DriveInfo[] = [];
  /** Own masses of springs, half at each end, for gravity. */
  const halves: { form: LinearForm; mass: number }[] = [];
  return {
    inertia(owner, form, value, options) {
      const relative = options?.relative ?? false;
      inertias.push({ owner, form, value, relative, rigid: relative ? 0 : 1 });
    },
    element(name, motion, a, b, properties) {
      const form = subtractForms(a, b);
      const element = elementInfo(name, motion, form, properties);
      elements.push(element);
      if (element.inertance !== 0) {
        inertias.push({ owner: name, form, value: element.inertance, relative: true, rigid: 0 });
      }
    },
    sharedMass(owner, a, b, mass) {
      inertias.push(...sharedInertias(owner, a, b, mass));
      halves.push({ form: a, mass: mass / 2 }, { form: b, mass: mass / 2 });
    },
    drive(drive) {
      drives.push(drive);
    },
    finish: () => ({
      ...declaration,
      coordinates: declaration.coordinates.map((c) => withGravityMass(c, inertias, halves)),
      inertias: [...inertias],
      elements: [...elements],
      drives: [...drives],
    }),
  };
}

function elementInfo(
  name: string,
  motion: Motion,
  form: LinearForm,
  properties: ElementProperties,
): ElementInfo {
  const { count } = properties;
  return {
    name,
    keyword: properties.keyword,
    motion,
    form,
    count,
    stiffness: count * (properties.stiffness ?? 0),
    damping: count * (properties.damping ?? 0),
    inertance: count * (properties.inertance ?? 0),
    lossFactor: properties.lossFactor ?? 0,
    preload: count * (properties.preload ?? 0),
    ...(properties.ratedTravel === undefined ? {} : { ratedTravel: properties.ratedTravel }),
    ...(properties.ratedForce === undefined ? {} : { ratedForce: properties.ratedForce }),
  };
}

/** m/6 [2 1; 1 2] as a sum of squares: m/4 (a + b)^2 + m/12 (a - b)^2. */
function sharedInertias(owner: string, a: End, b: End, mass: number): InertiaInfo[] {
  const moves = (end: End) => (end.coordinates.length > 0 ? 1 : 0);
  return [
    {
      owner,
      form: combineForms([a, b], [1, 1]),
      value: mass / 4,
      relative: false,
      rigid: moves(a) + moves(b),
    },
    { owner, form: subtractForms(a, b), value: mass / 12, relative: false, rigid: moves(a) - moves(b) },
  ];
}

function withGravityMass(
  coordinate: CoordinateInfo,
  inertias: readonly InertiaInfo[],
  halves: readonly { form: LinearForm; mass: number }[],
): CoordinateInfo {
  if (coordinate.motion !== "sliding") return coordinate;
  let mass = coordinate.gravityMass;
  if (mass === 0) {
    for (const inertia of inertias) {
      if (
        !inertia.relative &&
        inertia.owner === coordinate.owner &&
        sameForm(inertia.form, coordinate.form)
      ) {
        mass += inertia.value;
      }
    }
  }
  for (const half of halves) if (sameForm(half.form, coordinate.form)) mass += half.mass;
  return mass === coordinate.gravityMass ? coordinate : { ...coordinate, gravityMass: mass };
}
