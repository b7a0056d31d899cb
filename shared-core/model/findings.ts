import { CODES, type DiagnosticCode } from "../diagnostics/codes.ts";
import type { Diagnostic, Fix, RelatedPlace, Severity } from "../diagnostics/diagnostic.ts";
import { nearest } from "../text/nearest.ts";
import type { Span, TextEdit } from "../text/span.ts";

/** What a diagnostic may have beside its code, place and sentence. */
export interface Details {
  readonly hint?: string;
  readonly related?: readonly RelatedPlace[];
  readonly fixes?: readonly Fix[];
  readonly severity?: Severity;
  readonly tag?: "unnecessary";
  /** What the mistake is about: of several findings with one cause the first is said and names the places of the others. */
  readonly about?: string;
}

/** Places of one mistake beyond the first that are listed; more would be a list to read. */
const MOST_PLACES = 12;

/** How many mistyped names of one file get a suggestion; looking one up costs as much as there are names. */
const MOST_SUGGESTIONS = 200;

/** Collects what is said about one file. One mistake, one message: a code is said once at a place. */
export class Findings {
  readonly list: Diagnostic[] = [];
  readonly #said = new Set<string>();
  /** Where in the list a cause was said first. */
  readonly #causes = new Map<string, number>();
  #suggestionsLeft = MOST_SUGGESTIONS;

  say(code: DiagnosticCode, span: Span, message: string, details: Details = {}): void {
    const place = `${code} ${span.start} ${span.end}`;
    if (this.#said.has(place)) return;
    this.#said.add(place);
    const { severity = CODES[code], about, ...rest } = details;
    const first = about === undefined ? undefined : this.#causes.get(`${code} ${about}`);
    if (first !== undefined) {
      this.list[first] = merged(this.list[first], span, rest.fixes ?? []);
      return;
    }
    if (about !== undefined) this.#causes.set(`${code} ${about}`, this.list.length);
    this.list.push({ code, severity, message, span, ...rest });
  }

  /** Takes over what another collection holds. */
  take(other: Findings): void {
    for (const { code, span, message, ...rest } of other.list) this.say(code, span, message, rest);
  }

  /** The candidate that a mistyped name most likely meant; none any more in a file nobody typed. */
  suggest(word: string, candidates: Iterable<string>): string | undefined {
    if (this.#suggestionsLeft === 0) return undefined;
    this.#suggestionsLeft--;
    return nearest(word, candidates);
  }

  get hasErrors(): boolean {
    return this.list.some((diagnostic) => diagnostic.severity === "error");
  }
}

/** One more place of a mistake that was said: it is named, and a fix of the same title cures both. */
function merged(first: Diagnostic, span: Span, fixes: readonly Fix[]): Diagnostic {
  const related = first.related ?? [];
  if (related.length >= MOST_PLACES && fixes.length === 0) return first;
  const same = (fix: Fix) => fixes.find(({ title }) => title === fix.title)?.edits ?? [];
  return {
    ...first,
    ...(related.length < MOST_PLACES ? { related: [...related, { span, message: "here too" }] } : {}),
    ...(first.fixes
      ? { fixes: first.fixes.map((fix) => ({ ...fix, edits: [...fix.edits, ...same(fix)] })) }
      : {}),
  };
}

/** A fix that puts one text in the place of another. */
export function replaceFix(title: string, span: Span, text: string, safe = false): Fix {
  return { title, edits: [{ span, text }], safe };
}

/** A fix that adds a text behind a place. */
export function insertFix(title: string, at: number, text: string, safe = false): Fix {
  return { title, edits: [{ span: { start: at, end: at }, text }], safe };
}

export function editsFix(title: string, edits: readonly TextEdit[], safe = false): Fix {
  return { title, edits, safe };
}

/** `a`, `a or b`, `a, b or c`, each in backticks. */
export function orList(words: readonly string[]): string {
  const quoted = words.map((word) => `\`${word}\``);
  if (quoted.length < 2) return quoted.join("");
  return `${quoted.slice(0, -1).join(", ")} or ${quoted.at(-1)}`;
}
