/**
 * Requests and notifications beside those of the language server protocol. One version number for all of them;
 * a client that sees another one than its own says so and uses the standard protocol only.
 */
import type { Range } from "../text/span.ts";

export const PROTOCOL_VERSION = 1;

/** Request: the summary of a file, computed now if need be. */
export const SUMMARY = "thrum/summary";
/** Notification from the server: numbers of a file are being computed, or are there. */
export const STATE = "thrum/state";
/** Request: everything the response sheet shows of a file (sheet.ts). */
export const SHEET = "thrum/sheet";
/** Request: the edit that puts a value into the text, keeping unit and tolerance as written. */
export const WRITE_VALUE = "thrum/writeValue";
/** Request: an answer as CSV text. */
export const CSV = "thrum/csv";
/** Request: rows copied from a table as statements. */
export const ROWS = "thrum/rows";

export interface SummaryParams {
  readonly uri: string;
}

/** One expectation in one case, as the test explorer and the status show it. */
export interface CaseVerdict {
  /** "as written" or the name of the case. */
  readonly case: string;
  readonly holds: boolean | null;
  /** `3.95 Hz`; null when it could not be computed. */
  readonly value: string | null;
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

export interface Summary {
  readonly protocol: number;
  readonly uri: string;
  /** Version of the document the numbers belong to. */
  readonly version: number | null;
  readonly title?: string;
  readonly cases: readonly string[];
  /** Elastic natural frequencies as written, as shown. */
  readonly frequencies: readonly string[];
  readonly expectations: readonly ExpectationSummary[];
  readonly errors: number;
  readonly warnings: number;
}

export interface StateParams {
  readonly uri: string;
  readonly version: number | null;
  readonly state: "warming" | "busy" | "ready";
  /** `holds 7 of 8 · 4.1 Hz · 12.6 Hz`. */
  readonly text: string;
}

export interface WriteValueParams {
  readonly uri: string;
  /** Name of the `let`. */
  readonly name: string;
  /** SI value, rates in Hz. */
  readonly value: number;
}

export interface WriteValueResult {
  readonly edits: readonly { readonly range: Range; readonly newText: string }[];
  /** Why there is none. */
  readonly refused?: string;
}

export interface CsvParams {
  readonly uri: string;
  readonly ask: string;
  readonly case?: string;
}

export interface RowsParams {
  readonly uri: string;
  /** Text from the clipboard, columns parted by tabs. */
  readonly text: string;
}

export interface RowsResult {
  readonly text: string | null;
  readonly refused?: string;
}
