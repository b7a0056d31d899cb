/**
 * What the server and the side that computes numbers say to each other. That side may be a thread of its own, so
 * everything is plain data; it holds the models with their reports, and answers what needs both.
 */
import type { Diagnostic, FileContent, ModelSummary, Unit, UnitSystem } from "../shared-core/index.ts";
import type { NumericArgs, NumericFeature } from "./numeric-features.ts";

/** A file that a model read. Its content travels once; afterwards `id` stands for it. */
export interface ReadFile {
  readonly path: string;
  readonly id: number;
  readonly content?: FileContent;
}

export interface TextMessage {
  readonly say: "text";
  readonly uri: string;
  /** Counts the states of a model: its text, the files it reads. */
  readonly serial: number;
  readonly file: string;
  readonly text: string;
  readonly reads: readonly ReadFile[];
  readonly units: UnitSystem;
  /** Units that the language does not spell itself and that a text has met. */
  readonly learned: readonly Unit[];
}

/** What a model was at a revision; the newest one told counts. */
export interface EarlierMessage {
  readonly say: "earlier";
  readonly uri: string;
  readonly revision: string;
  readonly file: string;
  readonly text: string;
  /** By path, everything that it read then. */
  readonly reads: readonly (readonly [path: string, content: FileContent])[];
  /** As in a text. */
  readonly learned: readonly Unit[];
}

export type ToEngine =
  | TextMessage
  | EarlierMessage
  /** Computes everything about the newest text. One that is open goes before those that are not. */
  | { readonly say: "judge"; readonly uri: string; readonly serial: number; readonly open: boolean }
  /** Ends a computation, running or waiting. */
  | { readonly say: "stop"; readonly uri: string }
  | { readonly say: "units"; readonly uri: string; readonly units: UnitSystem }
  | { readonly say: "forget"; readonly uri: string; readonly contents: readonly number[] }
  | AskMessage;

export interface AskMessage {
  readonly say: "ask";
  readonly id: number;
  readonly uri: string;
  readonly feature: NumericFeature;
  readonly args: NumericArgs<NumericFeature>;
}

/** What is said of a model, as far as it has been computed. */
export interface Judged {
  /** `modes`: without answers and expectations, which follow. */
  readonly upTo: "modes" | "answers";
  readonly diagnostics: readonly Diagnostic[];
  readonly accepted: readonly { readonly diagnostic: Diagnostic; readonly reason: string }[];
  readonly faults: readonly { readonly where: string; readonly case: string; readonly error: string }[];
  readonly summary: SummaryOfModel;
}

/** The part of a summary that does not depend on documents and versions, and what a status says of it. */
export type SummaryOfModel = ModelSummary & { readonly state: string };

export type FromEngine =
  | { readonly say: "started"; readonly uri: string; readonly serial: number }
  | { readonly say: "judged"; readonly uri: string; readonly serial: number; readonly judged: Judged }
  /** A computation ended before it was done, and no newer one of this model has taken its place. */
  | { readonly say: "stopped"; readonly uri: string; readonly serial: number }
  | { readonly say: "answer"; readonly id: number; readonly value: unknown }
  | { readonly say: "fault"; readonly id?: number; readonly where: string; readonly error: string }
  /** The engine broke down and has started anew: it knows nothing any more. `uri` is what it was computing. */
  | { readonly say: "restarted"; readonly uri?: string; readonly error: string };

export interface Engine {
  tell(message: ToEngine): void;
  /** Set once, before the first message. */
  onSaid: (message: FromEngine) => void;
  end(): void;
}
