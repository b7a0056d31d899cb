import { applyEdits, lineEnding } from "../text/line-index.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { BYTE_ORDER_MARK } from "./characters.ts";
import { gapBetween } from "./spacing.ts";
import type { Tree, TreeLine } from "./tree.ts";

/**
 * A statement with its notes, details and rows, and the blank and comment lines behind it: what is formatted
 * together or not at all. A block that holds a line which could not be read is left alone, since the
 * indentation of its lines means something only together.
 */
export interface Block {
  readonly span: Span;
  /** Changes of blanks only; empty where the block has its canonical layout or could not be read. */
  readonly edits: readonly TextEdit[];
}

/** The text in its canonical layout. Tokens, comments and notes stay, and so does what the text means. */
export function format(tree: Tree): string {
  return applyEdits(tree.text, formatEdits(tree));
}

/** The edits that lead to the canonical layout, in order of place; with `ranges`, of the blocks they touch. */
export function formatEdits(tree: Tree, ranges?: readonly Span[]): TextEdit[] {
  const blocks = formatBlocks(tree);
  const touched = ranges
    ? blocks.filter((block) =>
        ranges.some((range) => range.start <= block.span.end && block.span.start <= range.end),
      )
    : blocks;
  return touched.flatMap((block) => block.edits);
}

/** All blocks of a text, in order; together they cover it. */
export function formatBlocks(tree: Tree): Block[] {
  const { lines } = tree;
  const starts = blockStarts(lines);
  return starts.map((first, i) => {
    const last = (starts[i + 1] ?? lines.length) - 1;
    const place = span(lines[first].span.start, lines[last].span.end);
    const readable = lines.slice(first, last + 1).every((line) => line.readable && line.role !== "conflict");
    return { span: place, edits: readable ? new BlockFormatter(tree, first, last).run() : [] };
  });
}

const STEP = "    ";

/** Lines that start a block: a statement in column 1, or the notes above it, which may stand loose above a detail too. */
function blockStarts(lines: readonly TreeLine[]): number[] {
  const starts: number[] = [];
  let notes: number | undefined;
  for (const [i, { role, level }] of lines.entries()) {
    if (role === "blank" || role === "comment" || role === "conflict") continue;
    if (role === "note" && level === 0) {
      notes ??= i;
      continue;
    }
    if (level === 0) starts.push(notes ?? i);
    notes = undefined;
  }
  // What stands above the first statement belongs to it.
  starts[0] = 0;
  return starts;
}

class BlockFormatter {
  readonly #edits: TextEdit[] = [];
  readonly #tree: Tree;
  readonly #first: number;
  readonly #last: number;
  readonly #levels: readonly number[];

  constructor(tree: Tree, first: number, last: number) {
    this.#tree = tree;
    this.#first = first;
    this.#last = last;
    this.#levels = levelsOf(tree.lines.slice(first, last + 1));
  }

  run(): TextEdit[] {
    for (let i = this.#first; i <= this.#last; i++) {
      if (this.#tree.lines[i].role === "blank") i = this.#blankLines(i);
      else this.#line(i);
    }
    this.#finalNewline();
    return this.#edits;
  }

  /** One of a run of blank lines stays, none at either end of the file. Returns the last of the run. */
  #blankLines(first: number): number {
    const { lines, text } = this.#tree;
    let last = first;
    while (last < this.#last && lines[last + 1].role === "blank") last++;
    const start = Math.max(lines[first].span.start, topOf(text));
    const end = lines[last + 1]?.span.start ?? text.length;
    const atEdge = first === 0 || last === lines.length - 1;
    // What stays of the run is its first line ending; the last line of a file has none to keep.
    const ending = text.slice(lines[first].span.end, lines[first + 1]?.span.start ?? text.length);
    this.#replace(start, end, atEdge ? "" : ending);
    return last;
  }

  #line(index: number): void {
    const { lines, tokens } = this.#tree;
    const line = lines[index];
    let before = -1;
    for (let i = line.first; i < line.last; i++) {
      if (tokens[i].kind === "blank") continue;
      if (before < 0) this.#indent(line, tokens[i].offset, this.#levels[index - this.#first]);
      else this.#gap(before, i);
      before = i;
    }
    if (before < 0) return;
    const { kind, offset, length } = tokens[before];
    if (kind === "note") this.#noteSign(offset, length);
    this.#replace(offset + length, line.span.end, "");
  }

  #indent(line: TreeLine, end: number, level: number): void {
    const start = line.span.start === 0 ? topOf(this.#tree.text) : line.span.start;
    this.#replace(start, end, STEP.repeat(level));
  }

  #gap(before: number, after: number): void {
    const { tokens } = this.#tree;
    const { offset, length } = tokens[before];
    this.#replace(offset + length, tokens[after].offset, gapBetween(this.#tree, before, after));
  }

  /** One blank between `>` and the text, where there is none; more are the writer's own layout. */
  #noteSign(offset: number, length: number): void {
    const next = this.#tree.text[offset + 1];
    if (length > 1 && next !== " " && next !== "\t") this.#replace(offset + 1, offset + 1, " ");
  }

  #finalNewline(): void {
    const { lines, text } = this.#tree;
    const isLast = this.#last === lines.length - 1;
    if (!isLast || lines[this.#last].role === "blank") return;
    this.#edits.push({ span: span(text.length, text.length), text: lineEnding(text) });
  }

  #replace(start: number, end: number, text: string): void {
    if (this.#tree.text.slice(start, end) !== text) this.#edits.push({ span: span(start, end), text });
  }
}

/**
 * A comment in column 1 stays there; an indented one goes with what it stands above, else with what is above
 * it. All other lines have the level the parser found.
 */
function levelsOf(lines: readonly TreeLine[]): number[] {
  const levels = lines.map(({ level }) => level);
  const isCode = ({ role }: TreeLine) => role !== "comment" && role !== "blank";
  let below = 0;
  for (let i = lines.length - 1; i >= 0; i--) {
    if (isCode(lines[i])) below = levels[i];
    else levels[i] = below;
  }
  let above = 0;
  for (const [i, line] of lines.entries()) {
    if (isCode(line)) above = Math.max(1, levels[i]);
    else if (line.indent === 0) levels[i] = 0;
    else if (levels[i] === 0) levels[i] = above;
  }
  return levels;
}

const topOf = (text: string): number => (text.charCodeAt(0) === BYTE_ORDER_MARK ? 1 : 0);
