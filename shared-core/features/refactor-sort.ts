import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import { PARSING } from "../model/parsing.ts";
import { format } from "../syntax/formatter.ts";
import { parse } from "../syntax/parser.ts";
import { lineIndexAt } from "../syntax/search.ts";
import type { StatementNode, Tree } from "../syntax/tree.ts";
import { applyEdits, lineEnding } from "../text/line-index.ts";
import type { TextEdit } from "../text/span.ts";
import { describe } from "../vocabulary/registry.ts";
import { type CodeAction, difference, refused } from "./refactor-edits.ts";
import type { View } from "./view.ts";

/** Statements by what they do, in the order in which a model is read; within a family they keep their order. */
export function sortAction({ model }: View): CodeAction | undefined {
  const { tree } = model;
  const title = "Sort the statements";
  const ranks = tree.statements.map(rankOf);
  if (ranks.every((rank, i) => i === 0 || ranks[i - 1] <= rank)) return undefined;
  const reason = whyNot(tree);
  if (reason) return refused(title, "source.sort", reason);
  return { title, kind: "source.sort", edits: difference(tree.text, sorted(tree)), safe: true };
}

/** The canonical layout, with every safe fix made. */
export function tidyAction({ model }: View, diagnostics: readonly Diagnostic[]): CodeAction | undefined {
  const { text } = model.tree;
  const mended = applyEdits(text, safeEdits(diagnostics));
  const tidy = format(parse(mended, PARSING).tree);
  if (tidy === text) return undefined;
  return { title: "Tidy the file", kind: "source.tidy", edits: difference(text, tidy), safe: true };
}

/** The edits of all safe fixes that do not get in each other's way, the first fix of each diagnostic. */
export function safeEdits(diagnostics: readonly Diagnostic[]): readonly TextEdit[] {
  const taken: TextEdit[] = [];
  for (const { fixes = [] } of diagnostics) {
    const safe = fixes.filter((fix) => fix.safe);
    const [fix] = safe;
    if (!fix || safe.length > 1) continue;
    if (fix.edits.every((edit) => taken.every((other) => isApart(edit, other)))) taken.push(...fix.edits);
  }
  return taken;
}

/** Two insertions at one place would leave their order open. */
const isApart = (a: TextEdit, b: TextEdit): boolean =>
  a.span.end < b.span.start ||
  b.span.end < a.span.start ||
  (a.span.end === b.span.start && a.span.start < b.span.start) ||
  (b.span.end === a.span.start && b.span.start < a.span.start);

const ORDER: readonly string[] = ["title", "use", "let", "assume", "limit", "kit"];
const FAMILY_ORDER: readonly string[] = ["moves", "joins", "drives", "asks"];

function rankOf({ keyword }: StatementNode): number {
  const own = ORDER.indexOf(keyword.text);
  if (own >= 0) return own < 2 ? own : 2 + Number(keyword.text === "kit");
  const family = FAMILY_ORDER.indexOf(describe(keyword.text)?.family ?? "");
  if (family >= 0) return ORDER.length + family;
  return ORDER.length + FAMILY_ORDER.length + Number(keyword.text === "expect");
}

function whyNot({ lines, looseNotes }: Tree): string | undefined {
  const lost = lines.findIndex((line) => !line.readable || line.role === "conflict" || line.role === "lost");
  if (lost >= 0) return `line ${lost + 1} cannot be read`;
  if (looseNotes.length > 0) return "a loose note would come to stand above another statement";
  return undefined;
}

/** Blocks of lines: a statement with the comments and notes above it. */
function sorted(tree: Tree): string {
  const { lines, statements, text } = tree;
  const ending = lineEnding(text);
  const firstLines = statements.map((each) => topOf(tree, each));
  const head = lines[firstLines[0]]?.span.start ?? text.length;
  const blocks = statements.map((statement, i) => {
    const last = lineIndexAt(tree, statement.span.end);
    const next = i + 1 < statements.length ? firstLines[i + 1] : lines.length;
    // Comments behind it that stand above nothing stay with it.
    const end = Math.max(next - 1, last);
    const body = text.slice(lines[firstLines[i]].span.start, lines[end].span.end).trimEnd();
    const gap = i > 0 && lines[firstLines[i] - 1]?.role === "blank";
    return { rank: rankOf(statement), body, gap };
  });
  const ordered = [...blocks].sort((a, b) => a.rank - b.rank);
  const parts = ordered.map(({ body, rank, gap }, i) => {
    if (i === 0) return body;
    return `${ending}${gap || ordered[i - 1].rank !== rank ? ending : ""}${body}`;
  });
  return `${text.slice(0, head)}${parts.join("")}${ending}`;
}

/** The first line of a statement's block: its notes, and comments that stand right above. */
function topOf({ lines, ...tree }: Tree, statement: StatementNode): number {
  let first = lineIndexAt({ lines, ...tree }, statement.span.start);
  while (first > 0 && lines[first - 1].role === "comment" && lines[first - 1].indent === 0) first--;
  return first;
}
