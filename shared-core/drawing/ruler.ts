/** The frequency ruler: one log axis; places on it are shares from 0 (left end) to 1. */
export interface Ruler {
  readonly fromHz: number;
  readonly toHz: number;
  /** Unit of the labels: `Hz`. */
  readonly unit: string;
  readonly ticks: readonly { readonly at: number; readonly label: string; readonly major: boolean }[];
  readonly modes: readonly RulerMode[];
  readonly drives: readonly RulerDrive[];
  readonly limits: readonly RulerLimit[];
  /** Drops of the chosen earlier revision. */
  readonly earlier: readonly Pick<RulerMode, "id" | "number" | "at" | "label" | "low" | "high" | "says">[];
  /** How far any mode is from any drive, limit or other mode: `ratio 1.31, 31 % apart`. */
  readonly separations: readonly { readonly a: string; readonly b: string; readonly text: string }[];
  /** One sentence for readers who do not see it. */
  readonly description: string;
}

/** A drop that hangs from the axis. */
export interface RulerMode {
  /** `mode:1`. */
  readonly id: string;
  readonly number: number;
  readonly at: number;
  /** `4.12 Hz`. */
  readonly label: string;
  /** Half-power bandwidth: shares of the axis; equal where there is no damping. */
  readonly low: number;
  readonly high: number;
  /** Resonance band, shares of the axis. */
  readonly bandLow: number;
  readonly bandHigh: number;
  /** `mode 1, 4.12 Hz, damping ratio 3.1 %`. */
  readonly says: string;
  /** A steady drive that excites it stands in its resonance band. */
  readonly danger: boolean;
}

/** A steady drive that stands on the axis: a line, or a bar where its rate is a range. */
export interface RulerDrive {
  /** `drive:imbalance`; `order:vanes_clear:6`. */
  readonly id: string;
  /** An order that an expectation keeps modes clear of; no drive of the model runs there. */
  readonly asked: boolean;
  /** Name of the statement. */
  readonly name: string;
  readonly from: number;
  readonly to: number;
  readonly label: string;
  readonly says: string;
}

/** A limit on `natural_frequency` or `damped_frequency`. */
export interface RulerLimit {
  /** `limit:soft_enough`. */
  readonly id: string;
  /** Name of the expectation. */
  readonly name: string;
  readonly at: number;
  /** On which side the mode must stay. */
  readonly side: "below" | "above";
  readonly mode: number | null;
  readonly holds: boolean | null;
  readonly label: string;
}
