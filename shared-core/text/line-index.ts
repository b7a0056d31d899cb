import type { Position, Range, Span, TextEdit } from "./span.ts";

/**
 * Turns offsets into lines and characters and back. Both count from 0 in UTF-16 units. A line ends at `\n`,
 * `\r\n` or a lone `\r`, as editors count them. Out-of-range input is clamped, never refused.
 */
export class LineIndex {
  /** Offset of the first character of each line, ascending; the first is 0. */
  readonly starts: readonly number[];
  readonly length: number;
  readonly #text: string;

  constructor(text: string) {
    this.#text = text;
    this.length = text.length;
    this.starts = lineStarts(text);
  }

  get lineCount(): number {
    return this.starts.length;
  }

  /** The line that holds an offset, by bisection. */
  lineAt(offset: number): number {
    let lo = 0;
    let hi = this.starts.length - 1;
    while (lo < hi) {
      const middle = (lo + hi + 1) >> 1;
      if (this.starts[middle] <= offset) lo = middle;
      else hi = middle - 1;
    }
    return lo;
  }

  position(offset: number): Position {
    const inside = Math.max(0, Math.min(offset, this.length));
    const line = this.lineAt(inside);
    return { line, character: inside - this.starts[line] };
  }

  /** A character behind the end of its line stands for that end, as the editors' protocol has it. */
  offset(position: Position): number {
    if (position.line < 0) return 0;
    if (position.line >= this.starts.length) return this.length;
    const span = this.lineSpan(position.line);
    return Math.min(span.start + Math.max(0, position.character), span.end);
  }

  range(span: Span): Range {
    return { start: this.position(span.start), end: this.position(span.end) };
  }

  span(range: Range): Span {
    return { start: this.offset(range.start), end: this.offset(range.end) };
  }

  /** A line without its line ending. */
  lineSpan(line: number): Span {
    const start = this.starts[line];
    let end = line + 1 < this.starts.length ? this.starts[line + 1] : this.length;
    if (end > start && this.#text.charCodeAt(end - 1) === NEWLINE) end--;
    if (end > start && this.#text.charCodeAt(end - 1) === RETURN) end--;
    return { start, end };
  }

  lineText(line: number): string {
    const { start, end } = this.lineSpan(line);
    return this.#text.slice(start, end);
  }
}

/** The text with the edits made. They may come in any order; they must not overlap. */
export function applyEdits(text: string, edits: readonly TextEdit[]): string {
  const sorted = [...edits].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
  const parts: string[] = [];
  let at = 0;
  for (const edit of sorted) {
    parts.push(text.slice(at, edit.span.start), edit.text);
    at = edit.span.end;
  }
  parts.push(text.slice(at));
  return parts.join("");
}

/** The line ending that the text uses first; `\n` where it has none. */
export function lineEnding(text: string): "\n" | "\r\n" | "\r" {
  const newline = text.indexOf("\n");
  const lone = text.indexOf("\r");
  if (lone < 0) return "\n";
  if (newline === lone + 1) return "\r\n";
  return newline < 0 || lone < newline ? "\r" : "\n";
}

const NEWLINE = 10;
const RETURN = 13;

function lineStarts(text: string): number[] {
  const starts = [0];
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code === NEWLINE || (code === RETURN && text.charCodeAt(i + 1) !== NEWLINE)) starts.push(i + 1);
  }
  return starts;
}
