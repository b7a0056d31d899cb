/** Small systems written by hand for the tests of mechanics and modes. */
import type { Assembly, CoordinateInfo, LinearForm, Motion } from "../../shared-core/mechanics/assembly.ts";
import type { ElementProperties } from "../../shared-core/mechanics/builder.ts";
import { buildSystem } from "../../shared-core/mechanics/builder-sum.ts";
import { combineForms, coordinateForm, groundForm, supportForm } from "../../shared-core/mechanics/forms.ts";

type Joint = Partial<Omit<ElementProperties, "keyword">> & {
  name?: string;
  /** Coordinate or support names, `ground` where left out. */
  a: string;
  b?: string;
  /** Own mass, shared between the ends. */
  mass?: number;
};

export interface SystemSketch {
  masses?: Record<string, number>;
  inertias?: Record<string, number>;
  junctions?: readonly string[];
  turningJunctions?: readonly string[];
  /** Bound coordinate: factors over other (free) names; may have a mass or an inertia of its own. */
  binds?: Record<string, Record<string, number>>;
  supports?: readonly string[];
  weights?: Record<string, number>;
  joints: readonly Joint[];
  gravity?: number;
  modalDamping?: number;
  massDamping?: number;
  stiffnessDamping?: number;
}

/** Builds the assembly of a sketch through the builder, as a model does. */
export function sketch(system: SystemSketch): Assembly {
  const masses = system.masses ?? {};
  const inertias = system.inertias ?? {};
  const binds = system.binds ?? {};
  const turning = new Set([...Object.keys(inertias), ...(system.turningJunctions ?? [])]);
  const names = [
    ...new Set([
      ...Object.keys(masses),
      ...Object.keys(inertias),
      ...(system.junctions ?? []),
      ...(system.turningJunctions ?? []),
      ...Object.keys(binds),
    ]),
  ];
  const supports = system.supports ?? [];
  const free = names.filter((name) => !(name in binds));
  const forms = new Map<string, LinearForm>([["ground", groundForm]]);
  free.forEach((name, i) => {
    forms.set(name, coordinateForm(i));
  });
  supports.forEach((name, i) => {
    forms.set(name, supportForm(i));
  });
  const formOf = (name: string): LinearForm => {
    const form = forms.get(name);
    if (form === undefined) throw new Error(`no end called ${name}`);
    return form;
  };
  for (const [name, factors] of Object.entries(binds)) {
    forms.set(name, combineForms(Object.keys(factors).map(formOf), Object.values(factors)));
  }
  const motionOf = (name: string): Motion => (turning.has(name) ? "turning" : "sliding");
  const coordinates = names.map(
    (name): CoordinateInfo => ({
      name,
      motion: motionOf(name),
      form: formOf(name),
      owner: name,
      massless: !(name in masses) && !(name in inertias),
      startsAt: 0,
      startsMoving: 0,
      weight: system.weights?.[name] ?? 0,
      gravityMass: 0,
    }),
  );
  const builder = buildSystem({
    free: free.length,
    coordinates,
    supports: supports.map((name) => ({ name, motion: "sliding" })),
    gravity: system.gravity ?? 9.80665,
    modalDamping: system.modalDamping ?? 0,
    massDamping: system.massDamping ?? 0,
    stiffnessDamping: system.stiffnessDamping ?? 0,
    resonanceBand: 0.2,
  });
  for (const [name, value] of Object.entries({ ...masses, ...inertias }))
    builder.inertia(name, formOf(name), value);
  system.joints.forEach((joint, i) => {
    const { name = `e${i + 1}`, a, b = "ground", mass, ...properties } = joint;
    const keyword = properties.stiffness !== undefined ? "spring" : "damper";
    builder.element(name, motionOf(a), formOf(a), formOf(b), { keyword, count: 1, ...properties });
    if (mass !== undefined) builder.sharedMass(name, formOf(a), formOf(b), mass);
  });
  return builder.finish();
}
