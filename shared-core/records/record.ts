import { nearest } from "../text/nearest.ts";
import { CsvReader, type CsvRow, type Delimiter, recordNumber } from "./csv.ts";

/** Which columns of a file are wanted: header names, or numbers counted from 1. */
export interface ColumnWish {
  readonly what: string;
  readonly column: string | number;
}

/** What is wrong with a file, in words that stand behind "FILE: ". Lines and columns count from 1. */
export interface RecordProblem {
  readonly message: string;
  readonly hint?: string;
  readonly line?: number;
  readonly column?: number;
  /** Set where a column was not found: the name that was probably meant. */
  readonly nearest?: string;
}

/** Columns of numbers read from a text, in the order of the wishes; all of one length. */
export interface TableReading {
  readonly columns: readonly Float64Array[];
  readonly header?: readonly string[];
  readonly problems: readonly RecordProblem[];
}

/** So many bad rows are told one by one; the rest is a count. */
export const ROWS_TOLD = 5;

/**
 * Reads columns of numbers. Rows with anything else than a finite number in a wanted column are left out and
 * told. `ascending` names the wish whose values must rise from row to row (a time).
 */
export function readColumns(text: string, wishes: readonly ColumnWish[], ascending?: number): TableReading {
  const reading = new ColumnReading(wishes, ascending);
  const reader = new CsvReader((row, delimiter) => reading.row(row, delimiter));
  for (let at = 0; at < text.length; at += CHUNK) reader.push(text.slice(at, at + CHUNK));
  reader.end();
  return reading.finish();
}

/** The names in the first row, or undefined where the first row holds numbers. */
export function readHeader(text: string): readonly string[] | undefined {
  let header: readonly string[] | undefined;
  let seen = false;
  const reader = new CsvReader((row, delimiter) => {
    if (seen) return;
    seen = true;
    if (isHeader(row, delimiter)) header = row.fields;
  });
  reader.push(text.slice(0, CHUNK));
  reader.end();
  return header;
}

/** How many columns the first row has. */
export function countColumns(text: string): number {
  let count = 0;
  const reader = new CsvReader((row) => {
    if (count === 0) count = row.fields.length;
  });
  reader.push(text.slice(0, CHUNK));
  reader.end();
  return count;
}

/** UTF-16 units read at once; bounds the copies a reader makes. */
const CHUNK = 1 << 16;

class ColumnReading {
  readonly #wishes: readonly ColumnWish[];
  readonly #ascending: number | undefined;
  readonly #problems: RecordProblem[] = [];
  readonly #columns: Float64Array[];
  #count = 0;
  #bad = 0;
  #header: readonly string[] | undefined;
  #places: readonly number[] | undefined;
  #stopped = false;

  constructor(wishes: readonly ColumnWish[], ascending: number | undefined) {
    this.#wishes = wishes;
    this.#ascending = ascending;
    this.#columns = wishes.map(() => new Float64Array(1024));
  }

  row(row: CsvRow, delimiter: Delimiter): void {
    if (this.#stopped) return;
    if (row.torn) {
      this.#stop({ message: `line ${row.line} opens a quote that is never closed`, line: row.line });
      return;
    }
    if (this.#places === undefined) {
      const header = isHeader(row, delimiter);
      if (header) this.#header = row.fields;
      this.#find(row.fields.length);
      if (header || this.#stopped) return;
    }
    this.#take(row, delimiter);
  }

  finish(): TableReading {
    if (this.#bad > ROWS_TOLD) {
      this.#problems.push({ message: `${this.#bad - ROWS_TOLD} more rows are not readable` });
    }
    if (!this.#stopped && this.#count === 0 && this.#bad === 0) {
      this.#problems.push({ message: "holds no rows of numbers" });
    }
    return {
      columns: this.#columns.map((column) => column.slice(0, this.#count)),
      ...(this.#header ? { header: this.#header } : {}),
      problems: this.#problems,
    };
  }

  #stop(problem: RecordProblem): void {
    this.#problems.push(problem);
    this.#stopped = true;
  }

  #find(width: number): void {
    const places: number[] = [];
    for (const wish of this.#wishes) {
      const place = this.#placeOf(wish, width);
      if (typeof place !== "number") {
        this.#stop(place);
        return;
      }
      places.push(place);
    }
    this.#places = places;
  }

  #placeOf(wish: ColumnWish, width: number): number | RecordProblem {
    if (typeof wish.column === "number") {
      if (Number.isInteger(wish.column) && 1 <= wish.column && wish.column <= width) return wish.column - 1;
      const has = width === 1 ? "1 column" : `${width} columns`;
      return { message: `has ${has}, the ${wish.what} was to be column ${wish.column}` };
    }
    const header = this.#header;
    if (header === undefined) {
      return {
        message: `has no header, so no column is called "${wish.column}"`,
        hint: `columns can be counted, from 1: ${wish.what} = 2`,
      };
    }
    const place = header.indexOf(wish.column);
    if (place >= 0) return place;
    const meant = nearest(wish.column, header);
    return {
      message: `has no column "${wish.column}" for the ${wish.what}; it has ${listed(header)}`,
      line: 1,
      ...(meant === undefined ? {} : { nearest: meant }),
    };
  }

  #take(row: CsvRow, delimiter: Delimiter): void {
    const values: number[] = [];
    for (let w = 0; w < this.#wishes.length; w++) {
      const place = (this.#places as readonly number[])[w];
      const field = row.fields[place];
      const value = field === undefined ? Number.NaN : numberIn(field, delimiter);
      if (!Number.isFinite(value)) {
        this.#tell(badField(row, place, this.#wishes[w], delimiter));
        return;
      }
      values.push(value);
    }
    const a = this.#ascending;
    if (a !== undefined && this.#count > 0 && !(values[a] > this.#columns[a][this.#count - 1])) {
      const before = this.#columns[a][this.#count - 1];
      this.#tell({
        message: `line ${row.line}: ${this.#wishes[a].what} ${values[a]} does not come after ${before}`,
        line: row.line,
        column: row.columns[(this.#places as readonly number[])[a]],
      });
      return;
    }
    if (this.#count === this.#columns[0].length) this.#grow();
    for (let w = 0; w < values.length; w++) this.#columns[w][this.#count] = values[w];
    this.#count++;
  }

  #tell(problem: RecordProblem): void {
    this.#bad++;
    if (this.#bad <= ROWS_TOLD) this.#problems.push(problem);
  }

  #grow(): void {
    for (let w = 0; w < this.#columns.length; w++) {
      const longer = new Float64Array(2 * this.#columns[w].length);
      longer.set(this.#columns[w]);
      this.#columns[w] = longer;
    }
  }
}

function badField(row: CsvRow, place: number, wish: ColumnWish, delimiter: Delimiter): RecordProblem {
  const field = row.fields[place];
  const at = { line: row.line, column: row.columns[place] ?? 1 };
  if (field === undefined) {
    const count = row.fields.length === 1 ? "1 field" : `${row.fields.length} fields`;
    return { ...at, message: `line ${row.line} has ${count}, the ${wish.what} was to be field ${place + 1}` };
  }
  if (field === "") return { ...at, message: `line ${row.line}: the ${wish.what} is empty` };
  const shown = field.length > 30 ? `${field.slice(0, 30)}…` : field;
  const comma = delimiter === "," ? "" : " (decimal commas are read, thousands separators are not)";
  const separator = /\d[.,' ]\d{3}[.,]/.test(field) ? comma : "";
  return { ...at, message: `line ${row.line}: "${shown}" stands where a number was expected${separator}` };
}

/** The first row is a header when no field of it is a number. */
const isHeader = (row: CsvRow, delimiter: Delimiter): boolean =>
  row.fields.every((field) => Number.isNaN(numberIn(field, delimiter)));

/** A point always reads; a comma too where it does not part fields. */
function numberIn(field: string, delimiter: Delimiter): number {
  const plain = recordNumber(field, false);
  return Number.isNaN(plain) && delimiter !== "," ? recordNumber(field, true) : plain;
}

function listed(names: readonly string[]): string {
  const shown = names.slice(0, 8).map((name) => `"${name}"`);
  return names.length > 8 ? `${shown.join(", ")} and ${names.length - 8} more` : shown.join(", ");
}
