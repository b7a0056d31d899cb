/** One column of a CSV file; all columns of a file are equally long. */
export interface CsvColumn {
  readonly head: string;
  readonly values: ArrayLike<number | string | null>;
}

/** CSV as RFC 4180 has it: CRLF, a head line, quotes where a cell needs them. What has no finite value is empty. */
export function csvText(columns: readonly CsvColumn[]): string {
  const length = Math.max(0, ...columns.map((column) => column.values.length));
  const lines = [columns.map((column) => cell(column.head)).join(",")];
  for (let row = 0; row < length; row++)
    lines.push(columns.map((column) => cell(column.values[row])).join(","));
  return `${lines.join("\r\n")}\r\n`;
}

function cell(value: number | string | null | undefined): string {
  if (value === null || value === undefined) return "";
  if (typeof value === "number") return Number.isFinite(value) ? String(value) : "";
  return /[",\r\n]/.test(value) ? `"${value.replaceAll('"', '""')}"` : value;
}
