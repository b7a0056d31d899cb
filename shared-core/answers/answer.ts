/** What answers look like, in SI (rates in Hz). The same shapes go into the JSON of language.md section 5. */

/** One row of the mode table. */
export interface Mode {
  /** 0 for free (rigid-body) modes, elastic ones from 1; null for roots without an undamped partner. */
  readonly number: number | null;
  /** Undamped natural frequency; null where there is no undamped partner. */
  readonly frequencyHz: number | null;
  readonly dampedFrequencyHz: number;
  /** Damping ratio of the matched root; null for a free mode. */
  readonly dampingRatio: number | null;
  /** [real, imaginary], 1/s. */
  readonly eigenvalue: readonly [number, number];
  /** Both roots of an overdamped mode, 1/s. */
  readonly realRoots?: readonly [number, number];
  /**
   * Undamped shape over the named coordinates in order, largest entry 1 (free and elastic modes); the complex
   * shape of the root, likewise scaled, in `complexShape`.
   */
  readonly shape: { readonly re: Float64Array; readonly im: Float64Array };
  /** Shape of the complex root where dampers couple the modes; left out where it is the undamped one. */
  readonly complexShape?: { readonly re: Float64Array; readonly im: Float64Array };
  /** Modal mass of the shape as scaled above; null without a partner. */
  readonly modalMass: number | null;
  /** Share of the moving mass per direction: `line` (sliding), `turn` (turning). */
  readonly effectiveMass: Readonly<Record<string, number>>;
  /** Participation factor per direction for the shape as scaled above: load by unit base motion over modal mass. */
  readonly participation: Readonly<Record<string, number>>;
  /** Share of the strain energy by element name. */
  readonly energyShare: Readonly<Record<string, number>>;
  /** The largest of these shares, where it is known without writing all of them out; undefined: there is none. */
  readonly largestShare?: ElementShare | undefined;
  /** The share of one element, likewise; 0 where it has none. */
  shareOf?(element: string): number;
}

export interface ElementShare {
  readonly name: string;
  readonly share: number;
}

export interface ModeTable {
  readonly modes: readonly Mode[];
  /** Smallest decay rate (-real part) over all roots but those of free modes, 1/s. */
  readonly stabilityMargin: number;
}

export interface Peak {
  readonly value: number;
  readonly at: number;
}

/** Complex amplitudes of one quantity along the axis; NaN in both parts where it has none, and why. */
export interface SweepSeries {
  readonly unit: string;
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly reason?: string;
}

export interface SweepAnswer {
  readonly kind: "sweep";
  readonly frequencyHz: Float64Array;
  readonly series: ReadonlyMap<string, SweepSeries>;
  /** Largest magnitude, found between samples too; null with a reason where a mode in the band is undamped. */
  readonly peaks: ReadonlyMap<string, Peak | { readonly reason: string }>;
}

export interface HistoryAnswer {
  readonly kind: "history";
  readonly timeS: Float64Array;
  readonly series: ReadonlyMap<string, { readonly unit: string; readonly values: Float64Array }>;
  readonly peaks: ReadonlyMap<string, Peak>;
}
