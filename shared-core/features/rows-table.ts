/** Rows copied from a table: cells, numbers as people write them, units in headers. */
import type { Kind } from "../units/dimension.ts";
import { unitFromText } from "../units/known-kinds.ts";
import { isUnitName } from "../units/lookup.ts";
import { NUMBER } from "../units/quantity.ts";
import { nearestUnits } from "../units/unit-of.ts";

export interface Column {
  /** Without its unit: `mass`. */
  readonly title: string;
  /** As the language spells it; undefined: the header names none. */
  readonly unit?: string;
  readonly kind?: Kind;
  readonly cells: readonly string[];
}

export interface Table {
  readonly columns: readonly Column[];
  readonly rows: number;
}

export type Read<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly reason: string };

const fail = (reason: string): { readonly ok: false; readonly reason: string } => ({ ok: false, reason });

/** Longer texts are no table that somebody copied. */
const MOST_ROWS = 5000;

/** Text with columns parted by tabs, its first row the header. */
export function readTable(text: string): Read<Table> {
  const lines = text.split(/\r\n|\r|\n/).filter((line) => line.trim() !== "");
  const rows = lines.map((line) => line.split("\t").map((cell) => cell.replaceAll("\u00a0", " ").trim()));
  const width = Math.max(0, ...rows.map((row) => row.length));
  if (width < 2) return fail("the columns of a table are parted by tabs, and there is one column only");
  if (rows.length > MOST_ROWS)
    return fail(`the table has ${rows.length} rows, at most ${MOST_ROWS} are taken`);
  const [header, ...body] = rows;
  if (header.some((cell) => isNumberText(cell))) {
    return fail("the first row is no header; it names the columns with their units, as `mass (kg)`");
  }
  if (body.length === 0) return fail("there is a header and no row below it");
  const columns: Column[] = [];
  for (let i = 0; i < width; i++) {
    const column = readColumn(
      header[i] ?? "",
      body.map((row) => row[i] ?? ""),
    );
    if (!column.ok) return column;
    columns.push(column.value);
  }
  return { ok: true, value: { columns, rows: body.length } };
}

/** A number in the language's spelling, digits as written; `26,5` is 26.5, `1,234` is refused. */
export function readNumber(cell: string): Read<string> {
  const text = cell.replaceAll("−", "-").replaceAll(/[ \u2009\u202f'](?=\d{3}\b)/g, "");
  if (PLAIN.test(text)) return { ok: true, value: text.replace(/^\+/, "") };
  if (/^[+-]?\d+,\d{3}$/.test(text))
    return fail(`\`${cell}\` may be ${text.replace(",", ".")} or ${text.replace(",", "")}`);
  if (/^[+-]?\d+,\d+$/.test(text)) return { ok: true, value: text.replace(",", ".") };
  if (/^[+-]?\d{1,3}(,\d{3})+\.\d+$/.test(text)) return { ok: true, value: text.replaceAll(",", "") };
  if (/^[+-]?\d{1,3}(\.\d{3})+,\d+$/.test(text)) {
    return { ok: true, value: text.replaceAll(".", "").replace(",", ".") };
  }
  return fail(`\`${cell}\` is no number`);
}

/** A unit in the language's spelling with its kind. */
export function readUnit(written: string): Read<{ readonly text: string; readonly kind: Kind }> {
  const text = spelled(written);
  if (text === "" || text === "-" || text === "1") return { ok: true, value: { text: "", kind: NUMBER } };
  const near = nearestUnits(text);
  // `Nm` in front is two units without their sign.
  const meant = text.replace(/^\p{L}+/u, (name) => {
    const [first, ...others] = isUnitName(name) ? [] : nearestUnits(name);
    return first?.includes("*") && others.length === 0 ? first : name;
  });
  try {
    return { ok: true, value: { text: meant, kind: unitFromText(meant.replaceAll(/[()]/g, "")).kind } };
  } catch {
    const hint = near.length > 0 ? `; ${near.join(" or ")}?` : "";
    return fail(`\`${written}\` in the header is no unit${hint}`);
  }
}

export const isNumberText = (cell: string): boolean => readNumber(cell).ok;

/** Whether a cell is meant as a number, if only in part. */
export const startsAsNumber = (cell: string): boolean =>
  /^[+\-−±]?\s*[.,]?\d+([.,\d\s]*$|\s*[^\d\s]*$|[eE])/.test(cell);

const PLAIN = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?$/;

/** `mass (kg)`, `k [N/mm]`, `mass / kg`, `k in N/mm`, `mass, kg`. */
const HEADERS: readonly RegExp[] = [
  /^(.*?)\s*[[(]\s*([^\])]*)\s*[\])]$/,
  /^(.*?)\s+\/\s+(\S+)$/,
  /^(.*?)\s+in\s+(\S+)$/,
  /^(.*?),\s*(\S+)$/,
];

function readColumn(header: string, cells: readonly string[]): Read<Column> {
  const plain = { title: header, cells };
  const [, title, written] = HEADERS.map((form) => form.exec(header)).find((match) => match !== null) ?? [];
  if (title === undefined || written === undefined || !cells.some(startsAsNumber)) {
    return { ok: true, value: plain };
  }
  const unit = readUnit(written);
  if (!unit.ok) return unit;
  return { ok: true, value: { title, unit: unit.value.text, kind: unit.value.kind, cells } };
}

/** Signs that tables have and the language spells otherwise. */
function spelled(written: string): string {
  return written
    .trim()
    .replaceAll("²", "^2")
    .replaceAll("³", "^3")
    .replaceAll("⁴", "^4")
    .replaceAll(/[·⋅×•]/g, "*")
    .replaceAll("°", "deg")
    .replaceAll(/\s*([*/])\s*/g, "$1")
    .replaceAll(/(?<=[A-Za-z])\s+(?=[A-Za-z])/g, "*");
}
