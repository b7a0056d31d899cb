import type { Ruler } from "../drawing/ruler.ts";
import type { Scene } from "../drawing/scene.ts";
import type { Range } from "../text/span.ts";
import type { UnitSystem } from "../units/show.ts";
import type { CurvePanel } from "../writing/figure/figure.ts";

/**
 * Everything that the response sheet shows of one file and one case, in the order in which it is read. Numbers
 * stand in the chosen units and texts are ready: a page lays them out and computes nothing.
 */
export interface SheetContent {
  readonly title: string;
  /** Path of the model. */
  readonly file: string;
  readonly units: UnitSystem;
  /** The first is the model as written. */
  readonly cases: readonly string[];
  readonly case: string;
  /** Why there are no numbers, or why they are old: shown above the rest, which stays. */
  readonly notice?: string;
  /** True when the numbers are of an earlier text. */
  readonly stale: boolean;
  /** `holds 7 of 8 · 4.1 Hz · 12.6 Hz`. */
  readonly summary: string;
  /** The same of the shown case with moved numbers; left out where none is moved. */
  readonly moved?: string;
  /** The revision whose answer is drawn under today's; left out where none is chosen. */
  readonly earlier?: SheetEarlier;
  readonly scene: Scene;
  /** null: there are no modes. */
  readonly ruler: Ruler | null;
  /** What can set the drawing in motion; modes first. */
  readonly motions: readonly SheetMotion[];
  readonly cards: readonly SheetCard[];
  readonly ledger: readonly LedgerRow[];
  readonly knobs: readonly Knob[];
  /** Lines at the foot. */
  readonly cautions: readonly string[];
}

export interface SheetEarlier {
  /** How it is called. */
  readonly label: string;
  /** Its frequencies and verdicts in one line: `holds 6 of 8 · 4.0 Hz · 12.6 Hz`. */
  readonly summary: string;
  /** Why nothing of it is drawn. */
  readonly reason?: string;
}

/**
 * Values of all coordinates of the scene, scaled so that the largest size is 1. A mode: coordinate i moves as
 * Re((re[i] + i im[i]) e^{i phase}). A history: `frames` rows of `coordinates` values, at equal steps; none unless it
 * is the chosen motion.
 */
export type SheetMotion =
  | {
      readonly kind: "mode";
      /** `mode:1`, as on the ruler. */
      readonly id: string;
      /** `mode 1 · 4.12 Hz`. */
      readonly label: string;
      readonly re: Float64Array;
      readonly im: Float64Array;
    }
  | {
      readonly kind: "history";
      /** `history:stop`. */
      readonly id: string;
      readonly label: string;
      readonly frames: number;
      /** Time from one frame to the next, s. */
      readonly stepS: number;
      /** Row by row; length frames * coordinates. */
      readonly values: Float64Array;
    };

interface CardBase {
  /** Name of the ask; `modes`. */
  readonly name: string;
  /** `sweep run_up`. */
  readonly title: string;
  /** Where the ask stands; left out where modes are shown without being asked. */
  readonly range?: Range;
  /** One sentence for readers who do not see the picture. */
  readonly description: string;
}

export type SheetCard = ModesCard | PlotCard | ReasonCard;

export interface ModesCard extends CardBase {
  readonly kind: "modes";
  readonly modes: readonly {
    /** Of its motion. */
    readonly id: string;
    readonly label: string;
    /** `damping ratio 3.1 %`. */
    readonly damping: string;
    /** Undamped shape, -1 to 1, over `Scene.coordinates`. */
    readonly shape: Float64Array;
    /** Share of the strain energy by element, largest first; what is small is summed up as `others`. */
    readonly energy: readonly { readonly name: string; readonly share: number; readonly text: string }[];
  }[];
  readonly table: SheetTable;
}

export interface PlotCard extends CardBase {
  readonly kind: "sweep" | "history";
  /** One a unit. Curves carry a role: the answer, the written model under moved knobs, an earlier one, a limit. */
  readonly panels: readonly CurvePanel[];
  /** Sweeps: degrees, -180 to 180, and continued over the jumps. */
  readonly phase?: { readonly wrapped: CurvePanel; readonly unwrapped: CurvePanel };
  /** `unit.velocity peaks at 12.1 mm/s at 4.1 Hz`, one a quantity. */
  readonly peaks: readonly string[];
  /** A readable selection of rows; CSV has them all. */
  readonly table: SheetTable;
}

/** An answer that is not there: not computed by this version, or failed. */
export interface ReasonCard extends CardBase {
  readonly kind: "reason";
  readonly reason: string;
}

export interface SheetTable {
  readonly head: readonly string[];
  readonly rows: readonly (readonly string[])[];
  /** Set where rows were left out: `200 of 12,000 rows`. */
  readonly left?: string;
}

export interface LedgerRow {
  readonly name: string;
  readonly range: Range;
  /** The condition as it stands in the text. */
  readonly condition: string;
  /** All cases in which it is judged. */
  readonly verdicts: readonly LedgerVerdict[];
}

export interface LedgerVerdict {
  readonly case: string;
  /** null: could not be computed. */
  readonly holds: boolean | null;
  /** Inside its own margin, or not under its tolerances. */
  readonly thin: boolean;
  /** `3.95 Hz`. */
  readonly value: string | null;
  readonly limit: string | null;
  /** Share of the limit that is left; negative when it fails. */
  readonly margin: number | null;
  /** `12 % left`, `8 % over`. */
  readonly marginText: string;
  readonly message: string;
  /** What was found at the chosen earlier revision; left out where it did not stand there or none is chosen. */
  readonly earlier?: string;
}

/** A `let` that can be moved. Values in SI, rates in Hz; a shown number is a value divided by `factor`. */
export interface Knob {
  readonly name: string;
  readonly range: Range;
  readonly written: number;
  /** Where it stands now. */
  readonly value: number;
  readonly from: number;
  readonly to: number;
  readonly step: number;
  readonly unit: string;
  readonly factor: number;
  /** As it stands in the text: `26.5 N/mm +/- 8 %`. */
  readonly text: string;
  /** Its note. */
  readonly note?: string;
}
