import type { Span, TextEdit } from "../text/span.ts";
import type { DiagnosticCode } from "./codes.ts";

export type Severity = "error" | "warning" | "hint";

/** An edit that cures a diagnostic. Safe = same physics and nothing lost; only safe ones join "fix all". */
export interface Fix {
  readonly title: string;
  readonly edits: readonly TextEdit[];
  readonly safe: boolean;
}

/** Another place that a diagnostic speaks of; `file` when it is not the file of the diagnostic. */
export interface RelatedPlace {
  readonly span: Span;
  readonly message: string;
  readonly file?: string;
}

/**
 * What Thrum says back about a text. `message` is one sentence in the engineer's words with the numbers in it
 * and no final full stop; `hint` says why it matters or what to do.
 */
export interface Diagnostic {
  readonly code: DiagnosticCode;
  readonly severity: Severity;
  readonly message: string;
  readonly hint?: string;
  readonly span: Span;
  readonly related?: readonly RelatedPlace[];
  readonly fixes?: readonly Fix[];
  /** The case in which it arises, when it does not arise as written. */
  readonly case?: string;
  /** How an editor may dim it. */
  readonly tag?: "unnecessary";
}
