/** Edits that refactors share: lines added and taken out with their comments, names that are free. */
import type { Model } from "../model/model.ts";
import { lineIndexAt } from "../syntax/search.ts";
import type { StatementNode, Tree } from "../syntax/tree.ts";
import { RESERVED } from "../syntax/words.ts";
import { lineEnding } from "../text/line-index.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { isUnitName } from "../units/lookup.ts";
import { occurrences } from "./navigate-names.ts";

export type CodeActionKind =
  | "quickfix"
  | "refactor.extract"
  | "refactor.inline"
  | "refactor.rewrite"
  | "source.fixAll"
  | "source.tidy"
  | "source.sort"
  | "source.convert";

/** Something that can be done to the text at a place. */
export interface CodeAction {
  readonly title: string;
  readonly kind: CodeActionKind;
  /** In the file that is looked at; empty where it is refused. */
  readonly edits: readonly TextEdit[];
  /** Same physics, nothing lost. */
  readonly safe: boolean;
  /** Why it cannot be done here. */
  readonly disabled?: string;
}

export const refused = (title: string, kind: CodeActionKind, disabled: string): CodeAction => ({
  title,
  kind,
  edits: [],
  safe: false,
  disabled,
});

export const STEP = "    ";

/** The statement whose head or details a range touches; inside kits none. */
export function statementAt(tree: Tree, range: Span): StatementNode | undefined {
  const found = tree.statements.find(({ span: of }) => of.start <= range.start && range.end <= of.end);
  return found?.keyword.text === "kit" ? undefined : found;
}

/** Adds lines behind a statement with its details. */
export function linesBehind(tree: Tree, statement: StatementNode, lines: readonly string[]): TextEdit {
  const end = tree.lines[lineIndexAt(tree, statement.span.end)].span.end;
  return { span: span(end, end), text: lines.map((line) => `\n${line}`).join("") };
}

/** Adds lines in front of a statement and its notes. */
export function linesBefore(tree: Tree, statement: StatementNode, lines: readonly string[]): TextEdit {
  const { start } = tree.lines[lineIndexAt(tree, statement.span.start)].span;
  return { span: span(start, start), text: lines.map((line) => `${line}\n`).join("") };
}

/**
 * Takes whole lines out; their comments stay, each on a line of its own, and so do `notes` where they are wanted.
 * Where blank lines would meet, one goes.
 */
export function withoutLines(tree: Tree, of: Span, keep: readonly string[] = []): TextEdit {
  const first = lineIndexAt(tree, of.start);
  const last = lineIndexAt(tree, of.end);
  const comments = tree.tokens
    .slice(tree.lines[first].first, tree.lines[last].last)
    .filter(({ kind }) => kind === "comment")
    .map(({ offset, length }) => tree.text.slice(offset, offset + length));
  const kept = [...comments, ...keep];
  const start = tree.lines[first].span.start;
  const isBlank = (line: number) => tree.lines[line] === undefined || tree.lines[line].role === "blank";
  const joins = kept.length === 0 && isBlank(first - 1) && isBlank(last + 1) && last + 2 < tree.lines.length;
  const next = joins ? last + 2 : last + 1;
  const end = tree.lines[next]?.span.start ?? tree.text.length;
  return { span: span(start, end), text: kept.map((line) => `${line}\n`).join("") };
}

/** A name that nothing has, in the file or in one of its kits. */
export function freeName(model: Model, wanted: string, also: readonly string[] = []): string {
  const taken = new Set([...model.entities.keys(), ...also]);
  for (const { key } of occurrences(model.tree)) for (const part of key.split("/")) taken.add(part);
  const free = (name: string) => !taken.has(name) && !RESERVED.has(name) && !isUnitName(name);
  if (free(wanted)) return wanted;
  for (let n = 2; ; n++) if (free(`${wanted}_${n}`)) return `${wanted}_${n}`;
}

/** Edits with the line endings of the file. */
export function withEndings(text: string, edits: readonly TextEdit[]): readonly TextEdit[] {
  const ending = lineEnding(text);
  if (ending === "\n") return edits;
  return edits.map((edit) => ({ span: edit.span, text: edit.text.replaceAll(/\r\n|\n/g, ending) }));
}

/** One edit that makes one text of another: what they share at both ends stays. */
export function difference(before: string, after: string): readonly TextEdit[] {
  if (before === after) return [];
  const most = Math.min(before.length, after.length);
  let start = 0;
  while (start < most && before[start] === after[start]) start++;
  // A line ending of two characters stays whole.
  if (before[start - 1] === "\r") start--;
  let behind = 0;
  while (behind < most - start && before.at(-1 - behind) === after.at(-1 - behind)) behind++;
  if (behind > 0 && before.at(-behind) === "\n") behind--;
  return [{ span: span(start, before.length - behind), text: after.slice(start, after.length - behind) }];
}

export const nameOf = (statement: StatementNode): string =>
  statement.slots.name?.kind === "name" ? statement.slots.name.text : "";
