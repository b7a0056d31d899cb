import { type Span, span } from "../text/span.ts";

/**
 * A conflict that a merge left behind. Where it is whole, its first side is read and the other sides are
 * skipped, so that the rest of the file still makes sense; where it is not, only its marker lines are skipped.
 */
export interface Conflict {
  /** From its first marker line to its last, line endings excluded. */
  readonly span: Span;
  /** Lines to skip, markers included. Ascending, without overlap. */
  readonly skipped: readonly Span[];
  /** The text of both sides, when the conflict is whole. */
  readonly sides?: readonly [Span, Span];
}

/** All conflicts of a text, in order of place. Linear in its length. */
export function findConflicts(text: string): Conflict[] {
  const conflicts: Conflict[] = [];
  let open: Marker[] = [];
  const close = () => {
    if (open.length > 0) conflicts.push(conflictOf(open));
    open = [];
  };
  for (const marker of markers(text)) {
    const last = open.at(-1)?.sign ?? "";
    if (RANK[marker.sign] <= (RANK[last] ?? -1)) close();
    open.push(marker);
    if (marker.sign === ">") close();
  }
  close();
  return conflicts;
}

interface Marker {
  readonly sign: string;
  readonly span: Span;
  /** Where the line behind its line ending starts. */
  readonly next: number;
}

/** The order in which a merge writes its markers. */
const RANK: Readonly<Record<string, number>> = { "<": 0, "|": 1, "=": 2, ">": 3 };

function conflictOf(marks: readonly Marker[]): Conflict {
  const first = marks[0];
  const last = marks[marks.length - 1];
  const whole = span(first.span.start, last.span.end);
  const middle = marks.find((mark) => mark.sign === "=");
  if (first.sign !== "<" || last.sign !== ">" || !middle) {
    return { span: whole, skipped: marks.map((mark) => mark.span) };
  }
  return {
    span: whole,
    skipped: [first.span, span(marks[1].span.start, last.span.end)],
    sides: [span(first.next, marks[1].span.start), span(middle.next, last.span.start)],
  };
}

/** Seven like signs in column 1, alone or with a blank and a label behind them. */
function markers(text: string): Marker[] {
  const pattern = /(?<![^\r\n])(?:<{7}|\|{7}|={7}|>{7})(?![^ \t\r\n])[^\r\n]*/g;
  const found: Marker[] = [];
  for (const match of text.matchAll(pattern)) {
    const end = match.index + match[0].length;
    const ending = text.startsWith("\r\n", end) ? 2 : end < text.length ? 1 : 0;
    found.push({ sign: match[0][0], span: span(match.index, end), next: end + ending });
  }
  return found;
}
