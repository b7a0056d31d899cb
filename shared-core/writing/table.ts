/** One column of a text table. */
export interface Column {
  readonly head: string;
  /** Numbers stand at the right, words at the left. */
  readonly align: "left" | "right";
}

const GAP = "  ";

/**
 * Lines of a table whose columns are as wide as their widest cell. A line of the heads comes first unless all
 * heads are empty. `paint` sets a cell apart after its width has been taken.
 */
export function tableLines(
  columns: readonly Column[],
  rows: readonly (readonly string[])[],
  paint: (text: string, row: number, column: number) => string = (text) => text,
): string[] {
  const widths = columns.map(({ head }, c) =>
    Math.max(width(head), ...rows.map((row) => width(row[c] ?? ""))),
  );
  const line = (cells: readonly string[], row: number): string =>
    columns
      .map(({ align }, c) => {
        const cell = cells[c] ?? "";
        const blanks = " ".repeat(widths[c] - width(cell));
        const last = align === "left" && c === columns.length - 1;
        const shown = cell === "" ? "" : paint(cell, row, c);
        return align === "left" ? shown + (last ? "" : blanks) : blanks + shown;
      })
      .join(GAP)
      .trimEnd();
  const heads = columns.map(({ head }) => head);
  return [...(heads.some((head) => head !== "") ? [line(heads, -1)] : []), ...rows.map(line)];
}

/** Columns of a terminal that a text takes, one for each character. */
export const width = (text: string): number => [...text].length;

/** The text cut to a width, with an ellipsis where something is left out. */
export function shorten(text: string, most: number): string {
  const characters = [...text];
  return characters.length <= most ? text : `${characters.slice(0, Math.max(0, most - 1)).join("")}…`;
}
