import { CODES } from "../diagnostics/codes.ts";
import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import { lineIndexAt, placeAt } from "../syntax/search.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { absorberActions } from "./refactor-absorber.ts";
import { dampingActions } from "./refactor-damping.ts";
import { type CodeAction, withEndings, withoutLines } from "./refactor-edits.ts";
import { expectActions } from "./refactor-expect.ts";
import { extractActions } from "./refactor-extract.ts";
import { inlineActions } from "./refactor-inline.ts";
import { safeEdits, sortAction, tidyAction } from "./refactor-sort.ts";
import { springActions } from "./refactor-springs.ts";
import { convertActions, convertFileActions } from "./refactor-units.ts";
import type { View } from "./view.ts";

export type { CodeAction, CodeActionKind } from "./refactor-edits.ts";

/** A code action with the diagnostic that it cures. */
export interface OfferedAction extends CodeAction {
  readonly diagnostic?: Diagnostic;
  /** The one cure there is, and a safe one. */
  readonly preferred?: boolean;
}

export interface ActionOptions {
  /** Kinds that are wanted, each with what stands below it (`refactor` takes `refactor.inline`); left out: all. */
  readonly only?: readonly string[];
}

/**
 * What can be done at a range: the fixes of the diagnostics that touch it, refactors of what stands there, and what
 * can be done to the whole file. A refused refactor says why in `disabled`. What is done to the whole file takes
 * longest: `only: ["quickfix", "refactor"]` leaves it out.
 */
export function codeActions(
  view: View,
  range: Span,
  diagnostics: readonly Diagnostic[],
  { only }: ActionOptions = {},
): readonly OfferedAction[] {
  const { text } = view.model.tree;
  const touching = diagnostics.filter(({ span: of }) => of.start <= range.end && range.start <= of.end);
  const wanted = (kind: string) => !only || only.some((each) => below(kind, each) || below(each, kind));
  const all: readonly OfferedAction[] = [
    ...(wanted("quickfix") ? touching.flatMap((diagnostic) => fixesOf(view, diagnostic)) : []),
    ...(wanted("refactor") ? refactors(view, range) : []),
    ...(wanted("source") ? sourceActions(view, diagnostics) : []),
  ].filter(({ kind }) => !only || only.some((each) => below(kind, each)));
  return all.map((action) => ({ ...action, edits: withEndings(text, action.edits) }));
}

/** Whether a kind is another one or stands below it. */
const below = (kind: string, other: string): boolean => kind === other || kind.startsWith(`${other}.`);

/** The edits of every safe fix that does not get in another's way. */
export function fixAll(view: View, diagnostics: readonly Diagnostic[]): readonly TextEdit[] {
  return withEndings(view.model.tree.text, safeEdits(diagnostics));
}

function fixesOf(view: View, diagnostic: Diagnostic): readonly OfferedAction[] {
  const { fixes = [] } = diagnostic;
  const cures = fixes.map(({ title, edits, safe }): OfferedAction => {
    const preferred = safe && fixes.length === 1;
    return { title, kind: "quickfix", edits, safe, diagnostic, ...(preferred ? { preferred } : {}) };
  });
  return [...cures, ...takeOut(view, diagnostic), ...accept(view, diagnostic)];
}

/** A number that nothing uses goes, and its notes with it. */
function takeOut({ model: { tree } }: View, diagnostic: Diagnostic): readonly OfferedAction[] {
  if (diagnostic.code !== "unused-number") return [];
  const place = placeAt(tree, diagnostic.span.start);
  if (place === undefined) return [];
  const edits = [withoutLines(tree, place.statement.span)];
  return [{ title: "Take it out", kind: "quickfix", edits, safe: false, diagnostic }];
}

/** Warnings about what a model does can be accepted with a reason; those about its text are cured. */
function accept({ model: { tree } }: View, diagnostic: Diagnostic): readonly OfferedAction[] {
  const { code } = diagnostic;
  if (diagnostic.severity === "error" || CODES[code] === "error" || OF_THE_TEXT.has(code)) return [];
  const place = placeAt(tree, diagnostic.span.start);
  if (place === undefined) return [];
  const { start } = tree.lines[lineIndexAt(tree, place.statement.headSpan.start)].span;
  const edits = [{ span: span(start, start), text: `> accept ${code}: reason\n` }];
  return [
    { title: `Accept \`${code}\` here, with a reason`, kind: "quickfix", edits, safe: false, diagnostic },
  ];
}

const OF_THE_TEXT: ReadonlySet<string> = new Set([
  "loose-note",
  "version-missing",
  "unused-accept",
  "unused-number",
]);

function refactors(view: View, range: Span): readonly CodeAction[] {
  return [
    ...extractActions(view, range),
    ...inlineActions(view, range),
    ...convertActions(view, range),
    ...dampingActions(view, range),
    ...springActions(view, range),
    ...absorberActions(view, range),
    ...expectActions(view, range),
  ];
}

function sourceActions(view: View, diagnostics: readonly Diagnostic[]): readonly CodeAction[] {
  const safe = safeEdits(diagnostics);
  const all: CodeAction = { title: "Make all safe fixes", kind: "source.fixAll", edits: safe, safe: true };
  return [
    ...(safe.length > 0 ? [all] : []),
    ...[tidyAction(view, diagnostics), sortAction(view)].filter((each) => each !== undefined),
    ...convertFileActions(view),
  ];
}
