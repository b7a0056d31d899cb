/**
 * A reader of delimited text that is pushed chunk by chunk and hands on row by row, with line and column, so
 * that a long record needs no more memory than its longest row. Delimiters are found by looking at the first
 * two lines: tab, semicolon or comma. Fields may be quoted, quotes inside doubled (RFC 4180); blank lines and
 * lines that start with `#` are passed over. A byte order mark is dropped.
 */
export interface CsvRow {
  /** Line of its first character, counted from 1. */
  readonly line: number;
  /** Blanks round an unquoted field are trimmed. */
  readonly fields: readonly string[];
  /** Column of each field's first character, counted from 1 in UTF-16 units; behind a quoted line break, of the row. */
  readonly columns: readonly number[];
  /** A quote was opened and never closed, or the row is longer than `LONGEST_ROW`. */
  readonly torn?: boolean;
}

export type Delimiter = "," | ";" | "\t";

/** Longer rows are torn off, so that one open quote cannot swallow a file of any size. UTF-16 units. */
export const LONGEST_ROW = 1 << 16;

export class CsvReader {
  readonly #onRow: (row: CsvRow, delimiter: Delimiter) => void;
  #rest = "";
  #line = 1;
  #begun = false;
  #delimiter: Delimiter | undefined;

  constructor(onRow: (row: CsvRow, delimiter: Delimiter) => void) {
    this.#onRow = onRow;
  }

  push(chunk: string): void {
    this.#read(chunk, false);
  }

  /** Call once behind the last chunk: hands on what has no line end. */
  end(): void {
    this.#read("", true);
  }

  #read(chunk: string, last: boolean): void {
    let text = this.#rest + chunk;
    if (!this.#begun && text.length > 0) {
      this.#begun = true;
      if (text.charCodeAt(0) === BYTE_ORDER_MARK) text = text.slice(1);
    }
    this.#delimiter ??= sniff(text, last);
    if (this.#delimiter === undefined) {
      this.#rest = text;
      return;
    }
    let at = 0;
    for (;;) {
      const row = readRow(text, at, this.#delimiter, last);
      if (row === undefined) break;
      if (row.fields.length > 0 || row.torn) {
        this.#onRow(
          { line: this.#line, fields: row.fields, columns: row.columns, ...(row.torn ? { torn: true } : {}) },
          this.#delimiter,
        );
      }
      this.#line += row.lines;
      at = row.next;
    }
    this.#rest = text.slice(at);
  }
}

/**
 * A number as records write it, or NaN: blanks round it, a sign, an exponent, with `decimalComma` a comma in
 * place of the point. `inf` and `nan` are no numbers.
 */
export function recordNumber(field: string, decimalComma: boolean): number {
  const text = decimalComma ? field.replace(",", ".") : field;
  return NUMBER.test(text) ? Number(text) : Number.NaN;
}

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;
const BYTE_ORDER_MARK = 0xfeff;
const QUOTE = 0x22;
const NEWLINE = 0x0a;
const RETURN = 0x0d;
const HASH = 0x23;

interface ReadRow {
  readonly fields: string[];
  readonly columns: number[];
  readonly next: number;
  readonly lines: number;
  readonly torn: boolean;
}

/** The row that starts at `start`; undefined while its end has not come yet. */
function readRow(text: string, start: number, delimiter: Delimiter, last: boolean): ReadRow | undefined {
  if (start >= text.length) return undefined;
  const fields: string[] = [];
  const columns: number[] = [];
  const stop = delimiter.charCodeAt(0);
  let at = start;
  let lines = 0;
  let torn = false;
  if (text.charCodeAt(start) === HASH) {
    const end = lineEnd(text, start, last);
    return end && { fields, columns, next: end.next, lines: 1, torn };
  }
  for (;;) {
    let from = at;
    while (text.charCodeAt(from) === 0x20) from++;
    if (text.charCodeAt(from) === QUOTE) {
      const quoted = readQuoted(text, from + 1, last);
      if (quoted === undefined) {
        if (!tooLong(text, start)) return undefined;
        return { fields, columns, next: start + LONGEST_ROW, lines: 0, torn: true };
      }
      torn ||= quoted.torn;
      lines += quoted.lines;
      at = quoted.next;
      while (at < text.length && !endsField(text.charCodeAt(at), stop)) at++;
      fields.push(quoted.text + text.slice(quoted.next, at).trimEnd());
    } else {
      while (at < text.length && !endsField(text.charCodeAt(at), stop)) at++;
      fields.push(text.slice(from, at).trim());
    }
    columns.push(from - start + 1);
    if (at < text.length && text.charCodeAt(at) === stop) {
      at++;
      continue;
    }
    const end = lineEnd(text, at, last);
    if (end === undefined) {
      if (!tooLong(text, start)) return undefined;
      return { fields, columns, next: at, lines, torn: true };
    }
    const blank = fields.length === 1 && fields[0] === "" && text.charCodeAt(start) !== QUOTE;
    return { fields: blank ? [] : fields, columns, next: end.next, lines: lines + end.lines, torn };
  }
}

const tooLong = (text: string, start: number): boolean => text.length - start > LONGEST_ROW;

const endsField = (code: number, stop: number): boolean =>
  code === stop || code === NEWLINE || code === RETURN;

/** Behind the next line end at or after `from`; undefined when it may still lie in the next chunk. */
function lineEnd(text: string, from: number, last: boolean): { next: number; lines: number } | undefined {
  let at = from;
  while (at < text.length && text.charCodeAt(at) !== NEWLINE && text.charCodeAt(at) !== RETURN) at++;
  if (at >= text.length) return last ? { next: at, lines: 0 } : undefined;
  if (text.charCodeAt(at) === NEWLINE) return { next: at + 1, lines: 1 };
  if (at + 1 >= text.length && !last) return undefined;
  return { next: text.charCodeAt(at + 1) === NEWLINE ? at + 2 : at + 1, lines: 1 };
}

/** The inside of a quoted field from behind its opening quote. */
function readQuoted(text: string, from: number, last: boolean) {
  let at = from;
  for (;;) {
    const quote = text.indexOf('"', at);
    if (quote < 0) {
      if (!last) return undefined;
      return {
        text: text.slice(from),
        next: text.length,
        lines: countLines(text, from, text.length),
        torn: true,
      };
    }
    if (quote + 1 >= text.length && !last) return undefined;
    if (text.charCodeAt(quote + 1) !== QUOTE) {
      const inside = text.slice(from, quote).replaceAll('""', '"');
      return { text: inside, next: quote + 1, lines: countLines(text, from, quote), torn: false };
    }
    at = quote + 2;
  }
}

function countLines(text: string, from: number, to: number): number {
  let lines = 0;
  for (let at = from; at < to; at++) {
    const code = text.charCodeAt(at);
    if (code === NEWLINE || (code === RETURN && text.charCodeAt(at + 1) !== NEWLINE)) lines++;
  }
  return lines;
}

/** The delimiter that stands equally often in the first two lines that hold data; the comma where none does. */
function sniff(text: string, last: boolean): Delimiter | undefined {
  const enough = last || text.length >= LONGEST_ROW;
  const lines = text.replace(/"[^"]*"/g, "q").split(/\r\n|[\r\n]/);
  const open = lines.findIndex((line) => line.includes('"'));
  if (!enough) lines.length = open >= 0 ? open : lines.length - 1;
  const rows = lines.filter((line) => line.trim() !== "" && !line.startsWith("#")).slice(0, 2);
  if (rows.length < 2 && !enough) return undefined;
  const counts = (delimiter: Delimiter) => rows.map((row) => row.split(delimiter).length - 1);
  const candidates: Delimiter[] = ["\t", ";", ","];
  const even = candidates.find((d) => counts(d).every((n, _, all) => n > 0 && n === all[0]));
  return even ?? candidates.find((d) => counts(d).some((n) => n > 0)) ?? ",";
}
