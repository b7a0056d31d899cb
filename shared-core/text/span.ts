/** A half-open stretch of text, in UTF-16 units from the start of the file. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** One replacement in a text. Edits of one list never overlap. */
export interface TextEdit {
  readonly span: Span;
  readonly text: string;
}

/** A place as editors count it: both from 0, `character` in UTF-16 units. */
export interface Position {
  readonly line: number;
  readonly character: number;
}

export interface Range {
  readonly start: Position;
  readonly end: Position;
}

export const span = (start: number, end: number): Span => ({ start, end });

/** The smallest span that holds both. */
export const cover = (a: Span, b: Span): Span => ({
  start: Math.min(a.start, b.start),
  end: Math.max(a.end, b.end),
});

export const contains = (outer: Span, offset: number): boolean =>
  outer.start <= offset && offset <= outer.end;
