import type { Analysis } from "../answers/analysis.ts";
import type { HistoryAnswer, ModeTable, SweepAnswer } from "../answers/answer.ts";
import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import type { Expectation, Instance, Model } from "../model/model.ts";
import type { Kind } from "../units/dimension.ts";
import type { Judged } from "./rule.ts";

/** What became of one expectation in one case. Numbers in SI, rates in Hz. */
export interface Verdict {
  readonly name: string;
  readonly expectation: Expectation;
  /** null: it could not be computed, and `reason` says why. */
  readonly holds: boolean | null;
  readonly reason?: string;
  readonly value: number | null;
  readonly limit: number | null;
  readonly kind: Kind;
  /** SI unit as text, `Hz` for rates, `1` for a bare number. */
  readonly unit: string;
  /** Share of the limit that is left; negative when it fails. */
  readonly margin: number | null;
  /** With `tolerance = worst_case` or a share: what was found. */
  readonly tolerance?: {
    readonly kind: "worst_case" | "share";
    readonly holds: boolean | null;
    readonly worst: number | null;
    /** Draw positions (owner -> value in SI) at the worst. */
    readonly at?: Readonly<Record<string, number>>;
    /** "proven" over all corners, or "searched". */
    readonly how?: "proven" | "searched";
    /** Of a share: the part of the draws in which it holds, and how many were drawn. */
    readonly share?: number;
    readonly samples?: number;
    /** Why `holds` is null. */
    readonly reason?: string;
  };
  /** The parameter that matters most: relative change of the value per relative change of it. */
  readonly mattersMost?: { readonly name: string; readonly sensitivity: number };
}

export type AnswerResult =
  | { readonly ok: true; readonly value: SweepAnswer | HistoryAnswer }
  | { readonly ok: false; readonly kind: string; readonly reason: string };

export interface CaseReport {
  readonly name: string;
  readonly instance: Instance;
  readonly analysis: Analysis;
  readonly modes:
    | { readonly ok: true; readonly table: ModeTable }
    | { readonly ok: false; readonly reason: string };
  /** By ask name, in file order, all asks but `modes`. */
  readonly answers: ReadonlyMap<string, AnswerResult>;
  readonly verdicts: readonly Verdict[];
  /** The verdicts with what was learnt on the way, for the next text that means the same. */
  readonly judged?: readonly Judged[];
}

/** Everything said about one file: the command line prints it, the editor and the sheet show it. */
export interface FileReport {
  readonly file: string;
  readonly model: Model;
  /** Text and judgement together, in order of place. Accepted ones are not in it but in `accepted`. */
  readonly diagnostics: readonly Diagnostic[];
  readonly accepted: readonly { readonly diagnostic: Diagnostic; readonly reason: string }[];
  readonly cases: readonly CaseReport[];
  /** Rules that broke: a defect of Thrum, to be shown and logged; what the other rules say stands. */
  readonly faults: readonly InternalFault[];
}

/** An exception inside one rule or one piece of judging. */
export interface InternalFault {
  /** Code of the rule, or what was being judged. */
  readonly where: string;
  readonly case: string;
  readonly error: unknown;
}

export interface JudgeOptions {
  /** How far to go: `modes` leaves out answers and expectations, `text` modes as well. Default: everything. */
  readonly upTo?: "text" | "modes" | "answers";
  /** Called between pieces of work; when it answers true the work ends with what is there. */
  readonly cancelled?: () => boolean;
}
