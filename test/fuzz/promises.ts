import { expect } from "vitest";
import { CODES } from "../../shared-core/diagnostics/codes.ts";
import { formatEdits } from "../../shared-core/syntax/formatter.ts";
import type { Parsed } from "../../shared-core/syntax/parser.ts";
import type { Node, StatementNode, Tree } from "../../shared-core/syntax/tree.ts";
import { applyEdits } from "../../shared-core/text/line-index.ts";
import { outlined } from "../syntax/helpers.ts";

/** What holds of every parsed text, however broken. Throws the first promise that is not kept. */
export function keepsPromises({ tree, diagnostics }: Parsed): void {
  const { text } = tree;
  joinsToText(tree);
  linesCover(tree);
  for (const statement of tree.statements) checkStatement(tree, statement, { start: 0, end: text.length });

  const places = new Set<number>();
  const linesWithSyntaxError = new Set<number>();
  for (const { code, severity, span, message, fixes } of diagnostics) {
    if (!(0 <= span.start && span.start <= span.end && span.end <= text.length))
      fail("a place outside the text", message);
    if (CODES[code] !== severity) fail("a severity of its own", message);
    if (message === "" || message.endsWith(".") || message.length > 250)
      fail("an ill-formed message", message);
    for (const edit of (fixes ?? []).flatMap((fix) => fix.edits)) {
      if (!(0 <= edit.span.start && edit.span.end <= text.length)) fail("a fix outside the text", message);
    }
    if (severity !== "error") continue;
    if (places.has(span.start)) fail("two errors at one place", message);
    places.add(span.start);
    if (code !== "syntax") continue;
    const line = lineOf(tree, span.start);
    if (linesWithSyntaxError.has(line)) fail("two syntax errors on one line", message);
    linesWithSyntaxError.add(line);
    if (tree.lines[line].readable) fail("an error on a line that is called readable", message);
  }
}

/** What formatting promises for every text: only blanks change, what it means stays, and a second time nothing changes. */
export function formatsWell(parsed: Parsed, read: (text: string) => Parsed): void {
  const { tree } = parsed;
  const edits = formatEdits(tree);
  for (const { span } of edits) {
    const { readable, role } = tree.lines[lineOf(tree, span.start)];
    if (!readable || role === "conflict") fail("an edit of a line that does not parse", `at ${span.start}`);
  }
  const text = applyEdits(tree.text, edits);
  const again = read(text);
  same("tokens", solid(tree), solid(again.tree));
  same("meaning", outlined(tree.statements), outlined(again.tree.statements));
  same("notes", notesOf(tree), notesOf(again.tree));
  same("diagnostics", messagesOf(parsed), messagesOf(again));
  same("layout", [text], [applyEdits(text, formatEdits(again.tree))]);
}

/** Tokens that are not blanks; notes and comments without their leading blanks. */
function solid({ text, tokens }: Tree): string[] {
  return tokens
    .filter(({ kind }) => kind !== "blank" && kind !== "newline")
    .map(({ kind, offset, length }) => {
      const word = text.slice(offset, offset + length);
      return kind === "note" ? `>${word.slice(1).trim()}` : word;
    });
}

const notesOf = (tree: Tree): string[] =>
  [
    ...tree.statements.flatMap((s) => [...s.notes, ...s.details.flatMap((d) => d.notes)]),
    ...tree.looseNotes,
  ].map((note) => note.text);

const messagesOf = ({ diagnostics }: Parsed): string[] =>
  diagnostics.map(({ code, message }) => `${code} ${message}`);

function same(what: string, before: readonly string[], after: readonly string[]): void {
  const i = before.findIndex((each, index) => each !== after[index]);
  if (i >= 0 || before.length !== after.length) {
    fail(`formatting changed the ${what}`, `${JSON.stringify(before[i])} became ${JSON.stringify(after[i])}`);
  }
}

function joinsToText(tree: Tree): void {
  let at = 0;
  for (const token of tree.tokens) {
    if (token.offset !== at || token.length < 1) fail("a gap between tokens", `at ${at}`);
    at += token.length;
  }
  expect(at).toBe(tree.text.length);
  expect(tree.roles.length).toBe(tree.tokens.length);
}

function linesCover(tree: Tree): void {
  const { lines, tokens } = tree;
  expect(lines.length).toBeGreaterThan(0);
  let next = 0;
  for (const [i, line] of lines.entries()) {
    if (line.first !== next) fail("a line that starts elsewhere", `line ${i}`);
    next = line.last + 1;
    if (line.level < 0 || line.level > 3) fail("a level out of range", `line ${i}`);
  }
  expect(next).toBe(tokens.length + 1);
}

function checkStatement(tree: Tree, node: StatementNode, outer: Node["span"]): void {
  inside(node, outer, node.keyword.text);
  inside({ span: node.headSpan }, node.span, node.keyword.text);
  if (!(0 <= node.first && node.first < node.last && node.last <= tree.tokens.length))
    fail("a bad token run", node.keyword.text);
  for (const note of node.notes) inside(note, node.span, note.text);
  for (const detail of node.details) {
    inside(detail, node.span, detail.key.text);
    for (const item of detail.items) inside(item, detail.span, detail.key.text);
  }
  for (const item of node.value ?? []) inside(item, node.headSpan, node.keyword.text);
  for (const slot of Object.values(node.slots)) inside(slot, node.headSpan, node.keyword.text);
  for (const inner of node.inner) checkStatement(tree, inner, node.span);
}

function inside({ span }: Node, outer: Node["span"], what: string): void {
  if (!(outer.start <= span.start && span.start <= span.end && span.end <= outer.end)) {
    fail(`a node outside its owner: ${span.start}-${span.end} in ${outer.start}-${outer.end}`, what);
  }
}

function lineOf(tree: Tree, offset: number): number {
  let lo = 0;
  let hi = tree.lines.length - 1;
  while (lo < hi) {
    const middle = (lo + hi + 1) >> 1;
    if (tree.lines[middle].span.start <= offset) lo = middle;
    else hi = middle - 1;
  }
  return lo;
}

function fail(promise: string, what: string): never {
  throw new Error(`${promise}: ${what}`);
}
