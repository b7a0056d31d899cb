/** Rows `from` to `to` (inclusive) of a block; the last of one column stands again as the first of the next. */
export interface Column {
  readonly from: number;
  readonly to: number;
}

/** Higher blocks, in pixels, are folded into columns: about a page that can be seen at once. */
const HIGHEST = 1100;
/** Columns that would be wider together than this are not made. */
const WIDEST = 1200;

/** Folds rows of these heights; only between links, so that every other row may begin a column. */
export function columnsOf(heights: readonly number[], width: number): Column[] {
  const total = heights.reduce((sum, each) => sum + each, 0);
  const count = Math.max(1, Math.min(Math.ceil(total / HIGHEST), Math.floor(WIDEST / width)));
  const wanted = total / count;
  const columns: Column[] = [];
  let [from, height] = [0, 0];
  heights.forEach((each, row) => {
    height += each;
    const isNode = row % 2 === 1;
    const isLast = row >= heights.length - 2;
    if (!isNode || isLast || count === 1 || height < wanted) return;
    columns.push({ from, to: row });
    [from, height] = [row, each];
  });
  return [...columns, { from, to: heights.length - 1 }];
}
