/** What a coordinate measures: a displacement (m), an angle (rad) or a charge (C). */
export type Motion = "sliding" | "turning" | "charge";

/**
 * A linear form over the free coordinates and the supports:
 * sum of `factors[i] * q[coordinates[i]]` plus sum of `supportFactors[i] * support[supports[i]]`.
 * Ground has no entry: it stands still.
 */
export interface LinearForm {
  readonly coordinates: readonly number[];
  readonly factors: readonly number[];
  readonly supports: readonly number[];
  readonly supportFactors: readonly number[];
}

/** A named coordinate. A bound one has a form over others; a free one is a unit vector. */
export interface CoordinateInfo {
  readonly name: string;
  readonly motion: Motion;
  readonly form: LinearForm;
  /** Name of the statement it comes from. */
  readonly owner: string;
  readonly massless: boolean;
  readonly startsAt: number;
  readonly startsMoving: number;
  /** Direction in which gravity pulls along the coordinate: 1, -1, or 0 for off. */
  readonly weight: number;
  /** Mass on which gravity acts (0 for a turning coordinate or a junction). */
  readonly gravityMass: number;
}

export interface SupportInfo {
  readonly name: string;
  readonly motion: Motion;
}

/** An inertia term: `value * form form^T` is added to the mass matrix. */
export interface InertiaInfo {
  readonly owner: string;
  readonly form: LinearForm;
  readonly value: number;
  /** True for inerters: no weight, not part of the moving mass. */
  readonly relative: boolean;
  /** Value of the form when every coordinate that moves moves by one; left out: 1, and 0 for a relative one. */
  readonly rigid?: number;
}

/**
 * A term that is no sum of squares: `value * row column^T` is added to a matrix. Feeds, gyroscopic terms,
 * transducers; a coordinate's own equation is the row.
 */
export interface ExtraTerm {
  readonly owner: string;
  readonly matrix: "mass" | "damping" | "stiffness";
  readonly row: LinearForm;
  readonly column: LinearForm;
  readonly value: number;
}

/** A joining element, already multiplied by its count. Travel = form; a positive force pulls the ends together. */
export interface ElementInfo {
  readonly name: string;
  readonly keyword: string;
  readonly motion: Motion;
  readonly form: LinearForm;
  readonly count: number;
  /** N/m or N*m/rad. */
  readonly stiffness: number;
  /** N*s/m or N*m*s/rad; viscous, without what `assume stiffness_damping` adds. */
  readonly damping: number;
  /** kg or kg*m^2, relative to both ends. */
  readonly inertance: number;
  readonly lossFactor: number;
  /** Force at zero travel. */
  readonly preload: number;
  readonly ratedTravel?: number;
  /** For one of the `count`: compare with the force divided by the count. */
  readonly ratedForce?: number;
}

/** A row of samples over time: `times` ascending, linear between. */
export interface Samples {
  readonly times: Float64Array;
  readonly values: Float64Array;
}

/** A function of time with its own kinks, where it is not smooth. Values SI. */
export interface TimeFunction {
  at(time: number): number;
  readonly kinks: readonly number[];
  /** Fastest rate that matters, in Hz, for choosing the first step; 0 when unknown. */
  readonly fastestHz: number;
}

/** What a drive does, in SI (rates in Hz, angles in rad). */
export type DriveShape =
  | { readonly kind: "none" }
  | {
      readonly kind: "sine";
      readonly amplitude?: number;
      readonly frequencyHz?: number;
      readonly phase: number;
      readonly order: number;
      readonly speed?: readonly [number, number];
    }
  | {
      readonly kind: "unbalance";
      readonly unbalance: number;
      readonly frequencyHz?: number;
      readonly phase: number;
      readonly speed?: readonly [number, number];
    }
  | {
      readonly kind: "pulse";
      readonly shape: PulseShape;
      readonly peak: number;
      readonly duration: number;
      readonly rise: number;
      readonly fall: number;
      readonly start: number;
    }
  | { readonly kind: "step"; readonly step: number; readonly start: number; readonly rise: number }
  | { readonly kind: "impulse"; readonly impulse: number; readonly start: number }
  | {
      readonly kind: "chirp";
      readonly fromHz: number;
      readonly toHz: number;
      readonly amplitude?: number;
      readonly unbalance?: number;
      readonly lasting: number;
      readonly phase: number;
    }
  | { readonly kind: "law"; readonly law: TimeFunction }
  | { readonly kind: "record"; readonly samples: Samples }
  | {
      readonly kind: "speed-curve";
      readonly speedsHz: readonly number[];
      readonly torques: readonly number[];
    };

export type PulseShape =
  | "half_sine"
  | "haversine"
  | "triangle"
  | "rectangle"
  | "rising_sawtooth"
  | "falling_sawtooth"
  | "trapezoid";

export interface DriveInfo {
  readonly name: string;
  readonly keyword: "force" | "torque" | "motion";
  /** A force acts along a form over free coordinates; a motion moves a support. */
  readonly on:
    | { readonly kind: "form"; readonly form: LinearForm }
    | { readonly kind: "support"; readonly support: number };
  /** For a motion: what its values are. */
  readonly derivative: 0 | 1 | 2;
  readonly shape: DriveShape;
  /** SI unit of its values, as text. */
  readonly unit: string;
  /** `order` times the running speed and so on: written frequency in Hz, or undefined. For sine with a range the middle is not taken: undefined. */
  readonly writtenHz?: number;
  /** For judging: the band of frequencies (Hz) it runs through, or one frequency twice. */
  readonly bandHz?: readonly [number, number];
}

/**
 * One linear system, in SI, ready for answers. Matrices are sums over `inertias` and `elements`; the free
 * coordinates are those not bound. M = sum v f f^T over inertias (inerters included there as relative ones),
 * K = sum stiffness f f^T, C = sum damping f f^T + massDamping M + stiffnessDamping K.
 */
export interface Assembly {
  /** Number of free coordinates. */
  readonly free: number;
  readonly coordinates: readonly CoordinateInfo[];
  readonly supports: readonly SupportInfo[];
  readonly inertias: readonly InertiaInfo[];
  readonly elements: readonly ElementInfo[];
  readonly drives: readonly DriveInfo[];
  /** Terms beside the sums of squares, in a fixed order. */
  readonly extras?: readonly ExtraTerm[];
  /** m/s^2. */
  readonly gravity: number;
  /** Damping ratio added to every mode. */
  readonly modalDamping: number;
  /** 1/s. */
  readonly massDamping: number;
  /** s. */
  readonly stiffnessDamping: number;
  /** Half-width of the resonance band, as a share. */
  readonly resonanceBand: number;
}

/** A part of a quantity such as `feet.force` or `a.displacement - b.displacement`. */
export type QuantityTerm =
  /** The coordinate's displacement (0), velocity (1) or acceleration (2). */
  | {
      readonly of: "coordinate";
      readonly coordinate: number;
      readonly derivative: 0 | 1 | 2;
      readonly factor: number;
    }
  | {
      readonly of: "support";
      readonly support: number;
      readonly derivative: 0 | 1 | 2;
      readonly factor: number;
    }
  | {
      readonly of: "element";
      readonly element: number;
      readonly measure: ElementMeasure;
      readonly factor: number;
    };

/** power = force * rate (mean over a cycle in a steady answer); energy = stored: half stiffness travel^2 + half inertance rate^2. */
export type ElementMeasure = "travel" | "rate" | "force" | "power" | "energy";

/** A quantity an ask or an expectation speaks of. Groups, reactions and differences are sums of terms. */
export interface QuantityRef {
  /** As the series is called in answers: canonical text. */
  readonly text: string;
  readonly terms: readonly QuantityTerm[];
  /** SI unit as text: `m/s`. A turning rate is in `rad/s`. */
  readonly unit: string;
}
