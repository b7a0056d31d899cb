import type { Model } from "../model/model.ts";
import type { Kind } from "../units/dimension.ts";
import { knownKind } from "../units/known-kinds.ts";
import { isNumber, sameKind } from "../units/quantity.ts";
import type { Measure } from "../vocabulary/description.ts";
import { dimensionOf } from "../vocabulary/measures.ts";
import { freeName, STEP } from "./refactor-edits.ts";
import {
  type Column,
  isNumberText,
  type Read,
  readNumber,
  readTable,
  readUnit,
  startsAsNumber,
  type Table,
} from "./rows-table.ts";
import type { View } from "./view.ts";

export type Rows = { readonly text: string } | { readonly refused: string };

/**
 * Rows copied from a table, the first of them a header with units (`mass (kg)`, `k [N/mm]`), as statements: masses and
 * inertias, springs and dampers where two columns name their ends, else `let`. Counts, loss factors, tolerances,
 * sources and remarks come along. Refused with the reason where a column has no unit or a cell is no number.
 */
export function rowsToStatements({ model }: View, text: string): Rows {
  const table = readTable(text);
  if (!table.ok) return { refused: table.reason };
  const roles = rolesOf(table.value);
  if (!roles.ok) return { refused: roles.reason };
  const taken: string[] = [];
  const lines: string[] = [];
  for (let row = 0; row < table.value.rows; row++) {
    const made = statementsOf(model, roles.value, row, taken);
    if (!made.ok) return { refused: `row ${row + 2}: ${made.reason}` };
    lines.push(...made.value);
  }
  return { text: `${lines.join("\n")}\n` };
}

interface Roles {
  readonly name?: Column;
  readonly ends?: readonly [Column, Column];
  readonly values: readonly Column[];
  readonly count?: Column;
  readonly loss?: Column;
  readonly tolerance?: Column;
  readonly source?: Column;
  readonly remark?: Column;
}

const NAME = /^(name|id|item|tag|part|designation|element|component|no\.?|nr\.?|#|pos\.?)$/i;
const END_A = /^(between|from|a|i|end a|end 1|node 1|node a|from node)$/i;
const END_B = /^(and|to|b|j|end b|end 2|node 2|node b|to node)$/i;
const COUNT = /^(count|qty\.?|quantity|pieces|pcs\.?|n)$/i;
const LOSS = /^(loss factor|loss_factor|eta|η)$/i;
const TOLERANCE = /^(tol\.?|tolerance|\+\/-|±)$/i;
const SOURCE = /^(source|reference|ref\.?|ticket|drawing)$/i;
const REMARK = /^(note|notes|remark|remarks|comment|comments)$/i;

function rolesOf({ columns }: Table): Read<Roles> {
  const titled = (form: RegExp) => columns.find(({ title }) => form.test(title));
  const isText = ({ cells }: Column) => !cells.some(startsAsNumber);
  const [first, second] = [titled(END_A), titled(END_B)];
  const ends = first && second && isText(first) && isText(second) ? ([first, second] as const) : undefined;
  const special = [COUNT, LOSS, TOLERANCE, SOURCE, REMARK].map(titled);
  const [count, loss, tolerance, source, remark] = special;
  const rest = columns.filter(
    (each) => !ends?.includes(each) && !special.includes(each) && each.cells.some(Boolean),
  );
  const name = titled(NAME) ?? rest.find(isText);
  const values = rest.filter((each) => each !== name);
  const odd = values.find(isText);
  if (odd)
    return {
      ok: false,
      reason: `the column \`${odd.title}\` holds no numbers, and its title says nothing known`,
    };
  if (values.length === 0) return { ok: false, reason: "no column holds numbers with a unit" };
  const bare = values.find(({ unit, cells }) => unit === undefined && cells.some(isNumberText));
  if (bare) {
    return {
      ok: false,
      reason: `the column \`${bare.title}\` has no unit; the header names it, as \`${bare.title} (N/mm)\``,
    };
  }
  return { ok: true, value: { name, ends, values, count, loss, tolerance, source, remark } };
}

interface Value {
  readonly column: Column;
  readonly text: string;
  readonly kind: Kind;
}

function statementsOf(model: Model, roles: Roles, row: number, taken: string[]): Read<readonly string[]> {
  const values: Value[] = [];
  for (const column of roles.values) {
    const value = valueIn(column, row);
    if (value && !value.ok) return value;
    if (value) values.push(value.value);
  }
  if (values.length === 0) return { ok: true, value: [] };
  const written = nameText(roles.name?.cells[row] ?? "");
  const lines: string[] = [];
  for (const value of values) {
    const statement = statementOf(model, roles, row, value, written, values.length > 1, taken);
    if (!statement.ok) return statement;
    lines.push(...statement.value);
  }
  return { ok: true, value: [...notesOf(roles, row), ...lines] };
}

function statementOf(
  model: Model,
  { ends, count, loss, tolerance }: Roles,
  row: number,
  { column, text, kind }: Value,
  written: string,
  several: boolean,
  taken: string[],
): Read<readonly string[]> {
  const keyword = keywordOf(kind, ends !== undefined);
  const wanted = several && !MAIN.has(keyword) ? `${written}_${nameText(column.title)}` : written;
  const name = freeName(model, nameText(wanted) || defaultName(kind, row), taken);
  taken.push(name);
  const band = suffixOf(tolerance, row);
  if (!band.ok) return band;
  const between = ends
    ? ` between ${endIn(model, ends[0].cells[row])} and ${endIn(model, ends[1].cells[row])}`
    : "";
  if (ends && (ends[0].cells[row] === "" || ends[1].cells[row] === ""))
    return { ok: false, reason: "an end is missing" };
  const joins = keyword === "spring" || keyword === "damper";
  const details: string[] = [];
  for (const [key, of, fits] of [
    ["count", count, joins],
    ["loss_factor", loss, keyword === "spring"],
  ] as const) {
    const cell = of?.cells[row] ?? "";
    if (!of || !fits || cell === "") continue;
    const number = readNumber(cell);
    if (!number.ok) return number;
    details.push(`${STEP}${key} = ${number.value}${of.unit ? ` ${of.unit}` : ""}`);
  }
  const head = `${keyword} ${name}${joins ? between : ""} = ${text}${band.value}`;
  return { ok: true, value: [head, ...details] };
}

const MAIN: ReadonlySet<string> = new Set(["mass", "inertia", "spring"]);

function keywordOf(kind: Kind, hasEnds: boolean): "mass" | "inertia" | "spring" | "damper" | "let" {
  const is = (measure: Measure) =>
    (["sliding", "turning"] as const).some((motion) => {
      const wanted = dimensionOf(measure, motion);
      return wanted !== undefined && sameKind(wanted, kind);
    });
  if (hasEnds && is("stiffness")) return "spring";
  if (hasEnds && is("damping")) return "damper";
  if (!hasEnds && is("mass")) return "mass";
  return !hasEnds && is("inertia") ? "inertia" : "let";
}

/** The number of a cell with the unit of its column, or its own; undefined where the cell is empty. */
function valueIn(column: Column, row: number): Read<Value> | undefined {
  const cell = column.cells[row] ?? "";
  if (cell === "" || cell === "-") return undefined;
  const own = column.unit === undefined ? numberWithUnit(cell) : undefined;
  const number = readNumber(own?.number ?? cell);
  if (!number.ok) return number;
  const unit = own ? readUnit(own.unit) : undefined;
  if (unit && !unit.ok) return unit;
  const text = unit?.value.text ?? column.unit ?? "";
  const kind = unit?.value.kind ?? column.kind;
  if (!kind) return { ok: false, reason: `\`${cell}\` has no unit` };
  return { ok: true, value: { column, text: text === "" ? number.value : `${number.value} ${text}`, kind } };
}

/** `26.5 N/mm` in a cell. */
function numberWithUnit(cell: string): { number: string; unit: string } | undefined {
  const match = /^([+-]?[\d.,]+(?:[eE][+-]?\d+)?)\s*([^\d\s].*)$/.exec(cell);
  return match && isNumberText(match[1]) && readUnit(match[2]).ok
    ? { number: match[1], unit: match[2] }
    : undefined;
}

function suffixOf(tolerance: Column | undefined, row: number): Read<string> {
  const cell = (tolerance?.cells[row] ?? "").replace(/^(\+\/-|±)\s*/, "");
  if (!tolerance || cell === "") return { ok: true, value: "" };
  const own = numberWithUnit(cell);
  const number = readNumber(own?.number ?? cell);
  if (!number.ok) return number;
  const unit = own ? own.unit : tolerance.unit;
  if (!unit)
    return { ok: false, reason: `the tolerance \`${cell}\` has no unit; \`%\` or that of the value` };
  return { ok: true, value: ` +/- ${number.value} ${unit}` };
}

function notesOf({ source, remark }: Roles, row: number): readonly string[] {
  const [from, says] = [source, remark].map((column) => (column?.cells[row] ?? "").replaceAll(/\s+/g, " "));
  return [...(says ? [`> ${says}`] : []), ...(from ? [`> source: ${from}`] : [])];
}

/** A title or cell as a name: letters, digits and `_`, small letters. */
function nameText(cell: string): string {
  const text = cell
    .toLowerCase()
    .replaceAll(/[^\p{L}\p{M}\d]+/gu, "_")
    .replaceAll(/^_+|_+$/g, "");
  return text === "" || /^[\p{L}]/u.test(text) ? text : `n_${text}`;
}

function defaultName(kind: Kind, row: number): string {
  const words = isNumber(kind) ? "number" : (knownKind(kind)?.words ?? "a number");
  return `${nameText(words.replace(/^an? /, "").replace(/ or .*/, ""))}_${row + 1}`;
}

/** The name of the model that is meant, whatever its case. */
function endIn({ entities }: Model, cell: string): string {
  const text = nameText(cell);
  if (text === "ground") return text;
  return [...entities.keys()].find((name) => name.toLowerCase() === text) ?? text;
}
