import type { Range } from "../text/span.ts";

/** One expectation in one case, as the test explorer and the status show it. */
export interface CaseVerdict {
  /** "as written" or the name of the case. */
  readonly case: string;
  readonly holds: boolean | null;
  /** `3.95 Hz`; null when it could not be computed. */
  readonly value: string | null;
  /** `≤ 5.6 Hz`. */
  readonly limit: string | null;
  readonly unit: string;
  /** One sentence: what would have to change, or why it could not be computed. */
  readonly message: string;
  /** The parameter that matters most, with its effect. */
  readonly mattersMost?: string;
}

export interface ExpectationSummary {
  readonly name: string;
  readonly range: Range;
  /** `<=` or `>=` with the limit, as it stands in the text. */
  readonly comparison: string;
  readonly verdicts: readonly CaseVerdict[];
}

/** What a status, a test tree or a list of models shows of a model; nothing of it depends on documents and versions. */
export interface ModelSummary {
  readonly title?: string;
  readonly cases: readonly string[];
  /** Elastic natural frequencies as written, as shown. */
  readonly frequencies: readonly string[];
  readonly expectations: readonly ExpectationSummary[];
  readonly errors: number;
  readonly warnings: number;
}
