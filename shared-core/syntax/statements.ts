/**
 * Lines -> statements, details and rows, by indentation. Recovery is by line: whatever a line holds, the next
 * one is read as if nothing had happened. Slightly longer than other files because the places a line can take
 * are told apart in one class that holds what is open above it.
 */
import type { Fix } from "../diagnostics/diagnostic.ts";
import { lineEnding } from "../text/line-index.ts";
import { type Span, span } from "../text/span.ts";
import { Cursor, type ParseState, shorten } from "./cursor.ts";
import { brokenDetail, closeDetail, detail, row, startsDetail } from "./details.ts";
import { name } from "./expressions.ts";
import type { StatementGrammar } from "./grammar.ts";
import { definingName, headParts, type Slots, writtenAs } from "./heads.ts";
import { detailsOf, endOf, extend, type OpenStatement, startOf } from "./open-statement.ts";
import { PendingNotes } from "./pending-notes.ts";
import {
  type Item,
  type NameNode,
  type NoteNode,
  ROLE,
  type StatementNode,
  type Tree,
  type TreeLine,
} from "./tree.ts";
import { items } from "./values.ts";
import { VERSIONS, versionLine } from "./version.ts";

export interface Outline {
  readonly statements: readonly StatementNode[];
  readonly looseNotes: readonly NoteNode[];
  readonly version: Tree["version"];
}

export function readStatements(state: ParseState, lines: readonly TreeLine[]): Outline {
  return new StatementReader(state, lines).run();
}

/** What a step of indentation is in a fix. */
const STEP = "    ";

/** What stands behind the name in the head of a statement. */
const AFTER_NAME: ReadonlySet<string> = new Set(["=", "between", "on", "of", "in", "from"]);

class StatementReader {
  readonly #state: ParseState;
  readonly #lines: readonly TreeLine[];
  readonly #notes: PendingNotes;
  readonly #statements: StatementNode[] = [];
  /** The statement in column 1 that is open. */
  #top: OpenStatement | undefined;
  /** The statement inside a kit that is open. */
  #inner: OpenStatement | undefined;
  /** Indentation of the first line in the open kit: its column 1. */
  #kitIndent: number | undefined;
  #version: Tree["version"];
  /** The first line that says something; where `thrum 1` belongs. */
  #first: TreeLine | undefined;
  #versionSeen = false;

  constructor(state: ParseState, lines: readonly TreeLine[]) {
    this.#state = state;
    this.#lines = lines;
    this.#notes = new PendingNotes(state, lines);
  }

  run(): Outline {
    for (const [index, line] of this.#lines.entries()) {
      if (line.role === "blank") this.#notes.drop();
      else if (line.role === "note") this.#note(line, index);
      else if (line.role === "lost") this.#content(line);
    }
    this.#notes.drop();
    this.#close();
    if (!this.#versionSeen) this.#sayVersionMissing();
    return { statements: this.#statements, looseNotes: this.#notes.loose, version: this.#version };
  }

  #note(line: TreeLine, index: number): void {
    const owner = this.#inner ?? this.#top;
    if (line.indent === 0 || !owner?.lost) {
      this.#notes.add(line, index);
      return;
    }
    line.level = owner.level + 1;
    line.readable = false;
  }

  #content(line: TreeLine): void {
    const c = new Cursor(this.#state, line);
    const top = this.#top;
    if (line.indent === 0) {
      this.#statement(c, 0);
    } else if (!top) {
      this.#orphan(c);
    } else if (top.grammar?.holdsStatements && !top.lost) {
      this.#kitIndent ??= line.indent;
      const direct = line.indent <= this.#kitIndent || !this.#inner;
      if (direct && startsDetail(top, c) && this.#isDetailOf(top, c.word)) detail(top, c, this.#notes);
      else if (direct) this.#statement(c, 1);
      else if (this.#inner) this.#indented(this.#inner, c);
    } else {
      this.#indented(top, c);
    }
    this.#first ??= line;
    if (this.#inner && this.#top) extend(this.#state, this.#top, line);
  }

  /** A line under a statement: detail, row, or something misplaced. */
  #indented(owner: OpenStatement, c: Cursor): void {
    if (owner.lost) {
      this.#notes.forget();
      c.line.level = owner.level + 1;
      c.line.readable = false;
      extend(this.#state, owner, c.line);
      return;
    }
    const open = owner.detail;
    if (startsDetail(owner, c)) detail(owner, c, this.#notes);
    else if (open?.rows && c.line.indent > open.line.indent) row(owner, c, this.#notes);
    else if (this.#looksLikeStatement(c, owner)) this.#misplaced(c, owner.level);
    else brokenDetail(owner, c, this.#notes);
  }

  #orphan(c: Cursor): void {
    if (this.#looksLikeStatement(c, undefined)) {
      this.#misplaced(c, 0);
      return;
    }
    this.#notes.forget();
    c.line.level = 1;
    c.failAt(
      span(c.offset, endOf(this.#state, c.line)),
      "an indented line belongs to a statement above it, and there is none",
    );
  }

  /**
   * A keyword with a name or a text behind it. Where the statement above takes that word as a detail, as `mass`
   * does, more is wanted, since `mass b` may be a detail without its `=`.
   */
  #looksLikeStatement(c: Cursor, owner: OpenStatement | undefined): boolean {
    if (c.kind !== "name" || !this.#state.options.grammar.has(c.word)) return false;
    const [, second, third] = c.ahead(3);
    if (second?.kind !== "name" && second?.kind !== "string") return false;
    if (!owner || !this.#isDetailOf(owner, c.word)) return true;
    return third !== undefined && AFTER_NAME.has(this.#state.textOf(third));
  }

  #isDetailOf(owner: OpenStatement, key: string): boolean {
    return owner.grammar !== undefined && detailsOf(owner.grammar).has(key);
  }

  /** A statement that lost its place; it is read where it belongs. */
  #misplaced(c: Cursor, level: number): void {
    const edits = [{ span: span(c.line.span.start, c.offset), text: STEP.repeat(level) }];
    this.#say(c, c.span, `the statement \`${c.word}\` starts in column ${level * STEP.length + 1}`, [
      { title: "Move it there", edits, safe: false },
    ]);
    this.#statement(c, level);
  }

  #statement(c: Cursor, level: number): void {
    const word = c.word;
    if (c.kind !== "name") {
      this.#noKeyword(c, level);
    } else if (word === "thrum" && level === 0) {
      this.#versionStatement(c);
    } else if (c.wordAhead(1) === "=" && this.#withoutKeyword(c, level)) {
      return;
    } else {
      const grammar = this.#state.options.grammar.get(word);
      const keyword = name(c, ROLE.keyword);
      if (grammar?.holdsStatements && level > 0) this.#kitInKit(c, keyword);
      else if (grammar) this.#head(c, keyword, grammar, level);
      else this.#unknownKeyword(c, keyword, level);
    }
  }

  #noKeyword(c: Cursor, level: number): void {
    const keyword: NameNode = { kind: "name", span: span(c.offset, c.offset), text: "" };
    c.expected("a statement, which starts with a keyword such as `mass` or `spring`");
    this.#notes.forget();
    this.#open(c, this.#newStatement(c, keyword, level, { lost: true }), false);
  }

  #versionStatement(c: Cursor): void {
    this.#close();
    this.#notes.drop();
    this.#top = undefined;
    c.line.role = "version";
    const place = c.span;
    const version = versionLine(c);
    this.#version ??= version;
    if (this.#versionSeen) this.#say(c, place, "the version of the language is said twice", []);
    else if (this.#first)
      this.#say(c, place, "`thrum` and its version come first in the file", this.#moveUp(c.line));
    this.#versionSeen = true;
  }

  /** `count = 4` or `x = 3 kg` in column 1: a detail that lost its indentation, or a `let` that lost its keyword. */
  #withoutKeyword(c: Cursor, level: number): boolean {
    const owner = level === 0 ? this.#top : this.#inner;
    const at = span(c.offset, c.offset);
    if (owner && this.#isNamelessHead(owner, c.word)) return false;
    if (owner && !owner.lost && this.#isDetailOf(owner, c.word)) {
      const edits = [{ span: span(c.line.span.start, c.offset), text: STEP.repeat(level + 1) }];
      const title = "Indent it";
      this.#say(c, c.span, `the detail \`${c.word}\` is indented under its statement`, [
        { title, edits, safe: true },
      ]);
      detail(owner, c, this.#notes);
      return true;
    }
    const grammar = this.#state.options.grammar.get("let");
    if (!grammar || this.#state.options.grammar.has(c.word)) return false;
    this.#say(
      c,
      c.span,
      `\`${shorten(c.word)} = …\` needs a keyword in front; \`let\` makes it a parameter`,
      [{ title: "Add `let`", edits: [{ span: at, text: "let " }], safe: true }],
    );
    this.#head(c, { kind: "name", span: at, text: "let" }, grammar, level);
    return true;
  }

  /** `mass = 60 kg` below a mass that has its mass: no detail of it, but a statement that lacks its name. */
  #isNamelessHead({ node, grammar }: OpenStatement, word: string): boolean {
    return node.value !== undefined && grammar?.principal === word && this.#state.options.grammar.has(word);
  }

  #kitInKit(c: Cursor, keyword: NameNode): void {
    this.#notes.forget();
    c.failAt(keyword.span, "a kit cannot stand inside a kit");
    this.#open(c, this.#newStatement(c, keyword, 1, { lost: true }), true);
  }

  #unknownKeyword(c: Cursor, keyword: NameNode, level: number): void {
    const { grammar } = this.#state.options;
    const near = this.#state.suggest(keyword.text, [...grammar.keys(), "thrum"]);
    const fixes = near
      ? [{ title: `Write \`${near}\``, edits: [{ span: keyword.span, text: near }], safe: false }]
      : [];
    this.#say(c, keyword.span, `\`${shorten(keyword.text)}\` is not a statement`, fixes);
    // A misspelt `thrum 1` is no missing one.
    if (near === "thrum" && level === 0 && !this.#first) this.#versionSeen = true;
    const meant = near ? grammar.get(near) : undefined;
    if (meant && !meant.holdsStatements) this.#head(c, keyword, meant, level);
    else {
      const defined = definingName(c);
      const slots: Slots = defined ? { name: defined } : {};
      this.#open(c, this.#newStatement(c, keyword, level, { lost: true, slots }), true);
    }
  }

  /** The parts behind the keyword and the value behind `=`. */
  #head(c: Cursor, keyword: NameNode, grammar: StatementGrammar, level: number): void {
    const slots: Slots = {};
    headParts(c, grammar, slots);
    const value = c.failed ? undefined : headValue(c, keyword, grammar);
    this.#open(c, this.#newStatement(c, keyword, level, { slots, value, grammar }), true);
  }

  #newStatement(
    c: Cursor,
    keyword: NameNode,
    level: number,
    read: { slots?: Slots; value?: Item[]; grammar?: StatementGrammar; lost?: boolean },
  ): OpenStatement {
    const { line } = c;
    if (level === 0) this.#close();
    else if (this.#inner) closeDetail(this.#state, this.#inner);
    const { notes, line: firstLine } = this.#notes.take(level);
    line.role = read.grammar ? "statement" : "lost";
    line.level = level;
    const headSpan = span(startOf(this.#state, line), endOf(this.#state, line));
    const start = notes.length > 0 ? notes[0].span.start : headSpan.start;
    return {
      node: {
        kind: "statement",
        span: span(start, headSpan.end),
        keyword,
        notes,
        slots: read.slots ?? {},
        value: read.value,
        headSpan,
        details: [],
        inner: [],
        broken: !line.readable,
        first: (firstLine ?? line).first,
        last: line.last,
      },
      grammar: read.grammar,
      level,
      byKey: undefined,
      detail: undefined,
      lost: read.lost ?? false,
    };
  }

  /** Makes a statement the open one of its level; one without a keyword does not join the tree. */
  #open(c: Cursor, statement: OpenStatement, joins: boolean): void {
    if (c.line.level === 0) {
      this.#top = statement;
      if (joins) this.#statements.push(statement.node);
    } else {
      this.#inner = statement;
      if (joins) this.#top?.node.inner.push(statement.node);
    }
  }

  #close(): void {
    if (this.#inner) closeDetail(this.#state, this.#inner);
    if (this.#top) closeDetail(this.#state, this.#top);
    this.#inner = undefined;
    this.#kitIndent = undefined;
  }

  /** Says the one error of a line that is read nevertheless. */
  #say(c: Cursor, place: Span, message: string, fixes: Fix[]): void {
    if (!c.failed) this.#state.say({ code: "syntax", severity: "error", message, span: place, fixes });
    c.line.readable = false;
    c.quiet = true;
  }

  #moveUp(line: TreeLine): Fix[] {
    const { text } = this.#state;
    const written = text.slice(line.span.start, line.span.end).trim();
    const behind = this.#lines[this.#lines.indexOf(line) + 1]?.span.start ?? line.span.end;
    const top = this.#topOfFile();
    const edits = [
      { span: span(top, top), text: `${written}${lineEnding(text)}` },
      { span: span(line.span.start, behind), text: "" },
    ];
    return [{ title: "Move it to the top", edits, safe: true }];
  }

  #sayVersionMissing(): void {
    const { text } = this.#state;
    const top = this.#topOfFile();
    const version = `thrum ${VERSIONS.at(-1)}`;
    this.#state.diagnostics.unshift({
      code: "version-missing",
      severity: "warning",
      message: `the file does not say its version of the language; \`${version}\` comes first`,
      span: this.#first ? new Cursor(this.#state, this.#first).span : span(top, top),
      fixes: [
        {
          title: `Add \`${version}\``,
          edits: [{ span: span(top, top), text: `${version}${lineEnding(text)}` }],
          safe: true,
        },
      ],
    });
  }

  /** Behind the byte order mark, where there is one. */
  #topOfFile(): number {
    return this.#state.text.charCodeAt(0) === 0xfeff ? 1 : 0;
  }
}

/** What stands behind `=` in a head. */
function headValue(c: Cursor, keyword: NameNode, grammar: StatementGrammar): Item[] | undefined {
  const place = c.offset;
  const hint = writtenAs(grammar);
  if (!c.accept("=")) {
    if (grammar.value === "required" && c.atEnd) c.expected("`=` and a value", { hint });
    else if (!c.atEnd) {
      c.expected(grammar.value === "none" ? "the end of the line" : "`=` or the end of the line", { hint });
    }
    return undefined;
  }
  if (grammar.value !== "none") return items(c);
  c.failAt(c.from(place), `\`${keyword.text}\` takes no value behind \`=\``, { hint });
  return undefined;
}
