import { type Span, span } from "../text/span.ts";
import { Cursor, type ParseState, shorten } from "./cursor.ts";
import { name } from "./expressions.ts";
import type { DetailGrammar } from "./grammar.ts";
import {
  detailsOf,
  endOf,
  extend,
  type OpenDetail,
  type OpenStatement,
  startWithNotes,
} from "./open-statement.ts";
import type { PendingNotes } from "./pending-notes.ts";
import { type DetailNode, type Item, type NameNode, ROLE, type TreeLine } from "./tree.ts";
import { items, tableRow } from "./values.ts";

/** Whether the line reads `key =` or `key.part =`, or is the bare key of a detail that takes rows. */
export function startsDetail(owner: OpenStatement, c: Cursor): boolean {
  if (c.kind !== "name") return false;
  const next = c.wordAhead(1);
  if (next === "=") return true;
  if (next === ".") return c.wordAhead(3) === "=";
  return next === "" && grammarOf(owner, c.word)?.rows !== undefined;
}

/** KEY ["." COMPONENT] "=" ITEMS, or the key alone with rows below it. */
export function detail(owner: OpenStatement, c: Cursor, notes: PendingNotes): void {
  const { state, line } = c;
  closeDetail(state, owner);
  const start = c.offset;
  const above = place(owner, c, notes, "detail", owner.level + 1);
  const key = name(c, ROLE.key);
  const component = c.accept(".") && c.kind === "name" ? name(c, ROLE.key) : undefined;
  const known = grammarOf(owner, key.text);
  const unknown = !known && !owner.grammar?.openDetails;
  if (unknown) sayUnknown(owner, c, key);
  const equals = c.accept("=");
  const found: Item[] = equals && !c.atEnd ? items(c) : [];
  const node = {
    kind: "detail" as const,
    span: span(startWithNotes(above, start), endOf(state, line)),
    notes: [...above],
    key,
    component,
    items: found,
    broken: c.failed || unknown,
  };
  const before = earlier(owner, node);
  if (before) {
    sayRepeated(state, owner, node, before);
    node.broken = true;
  } else remember(owner, node);
  owner.node.details.push(node);
  owner.detail = { node, line, rows: unknown ? "any" : known?.rows };
}

/** A row under the open detail. */
export function row(owner: OpenStatement, c: Cursor, notes: PendingNotes): void {
  const open = owner.detail;
  if (!open) return;
  const above = place(owner, c, notes, "row", owner.level + 2);
  open.node.notes.push(...above);
  if (open.rows === "any") {
    c.line.readable = false;
  } else if (open.rows === "table") {
    addTableRow(open.node, c);
  } else if (open.rows === "list") {
    open.node.items.push(...items(c));
  }
  open.node.span = span(open.node.span.start, endOf(c.state, c.line));
  if (c.failed) open.node.broken = true;
}

/** An indented line that is neither detail nor row: says why, and keeps the detail if its key is known. */
export function brokenDetail(owner: OpenStatement, c: Cursor, notes: PendingNotes): void {
  const open = owner.detail;
  place(owner, c, notes, "lost", owner.level + 1);
  if (open && c.line.indent > open.line.indent) {
    c.failAt(lineText(c), `\`${shorten(open.node.key.text)}\` takes no rows`);
    return;
  }
  if (c.kind === "name" && grammarOf(owner, c.word)) {
    missingEquals(owner, c);
    return;
  }
  c.expected("a detail, written `key = value`", { hint: tableHint(owner) });
}

/** Called when no more rows can come. */
export function closeDetail(state: ParseState, owner: OpenStatement): void {
  const open = owner.detail;
  owner.detail = undefined;
  if (!open || open.node.broken || open.node.items.length > 0 || open.node.table) return;
  const c = new Cursor(state, open.line);
  while (!c.atEnd) c.take();
  const what =
    open.rows === "table" ? "rows below" : open.rows === "list" ? "a value, or one a row below" : "a value";
  c.expected(what);
  open.node.broken = true;
}

const grammarOf = (owner: OpenStatement, key: string): DetailGrammar | undefined =>
  owner.grammar && detailsOf(owner.grammar).get(key);

const keyOf = (node: DetailNode): string =>
  node.component ? `${node.key.text}.${node.component.text}` : node.key.text;

const lineText = (c: Cursor) => span(c.offset, endOf(c.state, c.line));

function place(
  owner: OpenStatement,
  c: Cursor,
  notes: PendingNotes,
  role: TreeLine["role"],
  level: number,
): DetailNode["notes"] {
  c.line.role = role;
  c.line.level = level;
  extend(c.state, owner, c.line);
  return notes.take(level).notes;
}

function addTableRow(node: OpenDetail["node"], c: Cursor): void {
  if (node.items.length > 0)
    c.failAt(lineText(c), "rows stand below a detail that has its value on its line");
  const cells = tableRow(c);
  node.table ??= [];
  if (!c.failed) node.table.push(cells);
}

/** `count 4`: the key is right, only its sign is missing. */
function missingEquals(owner: OpenStatement, c: Cursor): void {
  const start = c.offset;
  const key = name(c, ROLE.key);
  const edits = [{ span: span(c.taken, c.taken), text: " =" }];
  c.expected(`\`=\` behind \`${key.text}\``, { fixes: [{ title: "Add `=`", edits, safe: true }] });
  const whole = span(start, endOf(c.state, c.line));
  const node: DetailNode = { kind: "detail", span: whole, notes: [], key, items: [], broken: true };
  if (!owner.byKey?.has(key.text)) remember(owner, node);
  owner.node.details.push(node);
}

function sayUnknown(owner: OpenStatement, c: Cursor, key: NameNode): void {
  const known = owner.grammar ? [...detailsOf(owner.grammar).keys()] : [];
  const near = c.state.suggest(key.text, known);
  const edits = near ? [{ span: key.span, text: near }] : [];
  c.state.say({
    code: "unknown-detail",
    severity: "error",
    message: `\`${owner.node.keyword.text}\` has no detail \`${shorten(key.text)}\``,
    hint: known.length > 0 ? `it takes ${known.join(", ")}` : "it takes no details",
    span: key.span,
    fixes: near ? [{ title: `Write \`${near}\``, edits, safe: false }] : [],
  });
}

type Earlier = { readonly at: Span; readonly inHead: boolean };

/** Given before: the same key, the whole beside one of its components, or the head's value beside its detail. */
function earlier(owner: OpenStatement, node: DetailNode): Earlier | undefined {
  const { byKey, grammar } = owner;
  const key = node.key.text;
  const whole = byKey?.get(key);
  const same = whole ?? byKey?.get(node.component ? keyOf(node) : `${key}.`);
  if (same) return { at: same.span, inHead: false };
  const inHead = owner.node.value !== undefined && grammar?.principal === key;
  return inHead ? { at: owner.node.headSpan, inHead } : undefined;
}

function remember(owner: OpenStatement, node: DetailNode): void {
  owner.byKey ??= new Map();
  owner.byKey.set(keyOf(node), node);
  // Marks that one component at least is given, for the whole that may come behind it.
  if (node.component) owner.byKey.set(`${node.key.text}.`, node);
}

function sayRepeated(state: ParseState, owner: OpenStatement, node: DetailNode, before: Earlier): void {
  const key = shorten(keyOf(node));
  state.say({
    code: "duplicate-name",
    severity: "error",
    message: before.inHead
      ? `\`${key}\` is given behind \`=\` already`
      : `\`${key}\` is given twice in this \`${shorten(owner.node.keyword.text)}\``,
    span: span(node.key.span.start, node.component ? node.component.span.end : node.key.span.end),
    related: [{ span: before.at, message: "here it is given first" }],
  });
}

/** Rows without the key they belong under. */
function tableHint(owner: OpenStatement): string | undefined {
  const table = owner.grammar?.details.find((detail) => detail.rows === "table");
  return table ? `rows of numbers stand one step deeper, under \`${table.key} =\`` : undefined;
}
