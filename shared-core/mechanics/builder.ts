import type { DriveInfo, LinearForm, Motion } from "./assembly.ts";

export type { Motion } from "./assembly.ts";

/** One end of an element or the target of a drive, resolved to a form; ground is the empty form. */
export type End = LinearForm;

/** Properties of an element as its statement gives them, for one of its `count`. SI. */
export interface ElementProperties {
  readonly keyword: string;
  readonly stiffness?: number;
  readonly damping?: number;
  readonly inertance?: number;
  readonly lossFactor?: number;
  readonly preload?: number;
  readonly ratedTravel?: number;
  readonly ratedForce?: number;
  readonly count: number;
}

/**
 * Collects what the statements of a model put into the equations of motion. Implemented in builder-sum.ts;
 * coordinates, supports and binds are declared first, so that every end has its form.
 */
export interface SystemBuilder {
  /** Adds `value * form form^T` to the mass matrix, owned by a statement. */
  inertia(owner: string, form: LinearForm, value: number, options?: { relative?: boolean }): void;
  /** A joining element between two ends. */
  element(name: string, motion: Motion, a: End, b: End, properties: ElementProperties): void;
  /** An element's own mass, shared consistently between its ends: m/6 [2 1; 1 2]. */
  sharedMass(owner: string, a: End, b: End, mass: number): void;
  drive(drive: DriveInfo): void;
}
