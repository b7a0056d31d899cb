/**
 * Requests and notifications beside those of the language server protocol. One version number for all of them;
 * a client that sees another one than its own says so and uses the standard protocol only.
 */
import type { ModelSummary } from "../features/summary-content.ts";
import type { Range } from "../text/span.ts";

export const PROTOCOL_VERSION = 2;

/** Request: the summary of a file, computed now if need be. */
export const SUMMARY = "thrum/summary";
/** Notification from the server: numbers of a file are being computed, or are there. */
export const STATE = "thrum/state";
/** Request: everything the response sheet shows of a file (sheet.ts). */
export const SHEET = "thrum/sheet";
/** Request: the edit that puts a value into the text, keeping unit and tolerance as written. */
export const WRITE_VALUE = "thrum/writeValue";
/** Request: an answer as CSV text, as a string; where there is none, an error that says why. */
export const CSV = "thrum/csv";
/** Request: rows copied from a table as statements. */
export const ROWS = "thrum/rows";
/** Request from the server, when the client offers it: the text of a file that only the client can read. */
export const READ_FILE = "thrum/readFile";
/** Request from the server, when the client offers it: the models of a folder that only the client can search. */
export const FIND_MODELS = "thrum/findModels";

/** What a client may say of itself when it starts the server (`initializationOptions`); everything may be missing. */
export interface InitializationOptions {
  /** The client's `PROTOCOL_VERSION`; with another one than the server's it gets the standard protocol only. */
  readonly protocol?: number;
  /** It answers `READ_FILE` and `FIND_MODELS`, for folders that are not on disk. */
  readonly readsFiles?: boolean;
  /** Where the pages of docs/ lie, ending in `/`; links of diagnostics and hovers lead there. */
  readonly docs?: string;
  /** Settings of a client that answers no `workspace/configuration`, as it would answer for `thrum`. */
  readonly settings?: unknown;
}

export interface SummaryParams {
  readonly uri: string;
}

export type { CaseVerdict, ExpectationSummary } from "../features/summary-content.ts";

export interface Summary extends ModelSummary {
  readonly protocol: number;
  readonly uri: string;
  /** Version of the document the numbers belong to. */
  readonly version: number | null;
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
  /** `modes`, or the name of an ask. */
  readonly ask: string;
  /** Default: as written. */
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

export interface ReadFileParams {
  readonly uri: string;
  /** As it was at this revision of the client's source control; default: as it is. */
  readonly revision?: string;
}

export type ReadFileResult =
  | { readonly text: string }
  | { readonly why: "missing" | "unreadable"; readonly detail: string };

export interface FindModelsParams {
  /** URI of a folder. */
  readonly folder: string;
}

/** URIs. */
export type FindModelsResult = readonly string[];
