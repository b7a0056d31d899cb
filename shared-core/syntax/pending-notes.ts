import type { Fix } from "../diagnostics/diagnostic.ts";
import { span } from "../text/span.ts";
import type { ParseState } from "./cursor.ts";
import { noteOf } from "./notes.ts";
import type { NoteNode, TreeLine } from "./tree.ts";

/**
 * Notes on their way to the statement or detail below them. A blank line, or an indentation that does not fit
 * what follows, leaves them loose: one warning for each group.
 */
export class PendingNotes {
  readonly loose: NoteNode[] = [];
  #notes: NoteNode[] = [];
  #lines: TreeLine[] = [];
  /** Index of the line behind the last pending note. */
  #next = 0;
  readonly #state: ParseState;
  readonly #all: readonly TreeLine[];

  constructor(state: ParseState, all: readonly TreeLine[]) {
    this.#state = state;
    this.#all = all;
  }

  add(line: TreeLine, index: number): void {
    let i = line.first;
    while (this.#state.tokens[i].kind !== "note") i++;
    this.#notes.push(noteOf(this.#state.text, this.#state.tokens[i]));
    this.#lines.push(line);
    line.level = line.indent === 0 ? 0 : 1;
    this.#next = index + 1;
  }

  /** Nothing follows that they could belong to. */
  drop(): void {
    if (this.#notes.length > 0) this.#sayLoose(this.#gapFix());
    this.#clear();
  }

  /** What they belong to could not be read; its error is enough. */
  forget(): void {
    this.#clear();
  }

  /** The notes on a line of this level, and the first of their lines. */
  take(level: number): { notes: readonly NoteNode[]; line: TreeLine | undefined } {
    const fits = (line: TreeLine) => (line.indent === 0) === (level === 0);
    const taken = { notes: this.#notes, line: this.#lines.at(0) };
    if (!this.#lines.every(fits)) {
      this.#sayLoose(this.#indentFix(level));
      this.#clear();
      return { notes: [], line: undefined };
    }
    for (const line of this.#lines) line.level = level;
    this.#clear();
    return taken;
  }

  #clear(): void {
    this.#notes = [];
    this.#lines = [];
  }

  #sayLoose(fix: Fix | undefined): void {
    this.loose.push(...this.#notes);
    this.#state.say({
      code: "loose-note",
      severity: "warning",
      message:
        "this note belongs to nothing; it stands directly above its statement, or indented above a detail",
      span: span(this.#notes[0].span.start, this.#notes[this.#notes.length - 1].span.end),
      fixes: fix ? [fix] : [],
    });
  }

  /** Where only blank lines part the notes from a line they fit, taking those out. */
  #gapFix(): Fix | undefined {
    let next = this.#next;
    while (next < this.#all.length && this.#all[next].role === "blank") next++;
    const below = this.#all[next];
    const above = this.#lines[this.#lines.length - 1];
    if (!below || next === this.#next || !["lost", "note"].includes(below.role)) return undefined;
    if ((below.indent === 0) !== (above.indent === 0)) return undefined;
    const gap = span(this.#all[this.#next].span.start, below.span.start);
    return { title: "Join the note to the line below", edits: [{ span: gap, text: "" }], safe: false };
  }

  #indentFix(level: number): Fix {
    const text = "    ".repeat(level);
    const edits = this.#lines.map((line, i) => ({
      span: span(line.span.start, this.#notes[i].span.start),
      text,
    }));
    return { title: "Indent the note as the line below", edits, safe: false };
  }
}
