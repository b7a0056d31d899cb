import type { FileReport } from "../judgement/report.ts";
import type { Model } from "../model/model.ts";
import type { LineIndex } from "../text/line-index.ts";

/** How numbers are shown: as the author wrote them, in SI, or in inch units. */
export type UnitSystem = "as-written" | "si" | "inch";

/**
 * What a feature looks at. Features are pure functions of a view and a place in the text; who calls them holds
 * the view and decides when its parts are computed.
 */
export interface View {
  /** Of the text as it stands now. */
  readonly model: Model;
  readonly lines: LineIndex;
  readonly units: UnitSystem;
  /** The newest numbers there are; of an earlier text while `stale`. */
  readonly report?: FileReport;
  readonly stale: boolean;
  /** Other models of the workspace, for what crosses files. */
  readonly others: readonly Model[];
}
