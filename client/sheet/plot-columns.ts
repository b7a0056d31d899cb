import type { Drawn } from "./plot-layout.ts";
import { firstFrom } from "./pyramid.ts";

/** What a long curve does within one column of pixels; heights in the pixels of the page, downwards. */
export interface Column {
  /** Which one, from the left. */
  readonly at: number;
  readonly enters: number;
  readonly leaves: number;
  readonly highest: number;
  readonly lowest: number;
}

export interface ColumnSpan {
  /** Samples that are shown, the last one not included. */
  readonly first: number;
  readonly last: number;
  readonly columns: number;
  readonly from: number;
  readonly to: number;
  readonly isLog: boolean;
}

/** Of each column the lowest and the highest value: no peak is lost, however narrow. Columns without a value are left out. */
export function columnsOf(
  { curve, heights }: Drawn,
  { first, last, columns, from, to, isLog }: ColumnSpan,
  heightOf: (value: number) => number,
): Column[] {
  const pair = new Float64Array(2);
  const ratio = isLog ? Math.log(to / from) : 0;
  const found: Column[] = [];
  let start = first;
  for (let at = 0; at < columns && start < last; at++) {
    const share = (at + 1) / columns;
    const edge = isLog ? from * Math.exp(ratio * share) : from + share * (to - from);
    const end = at === columns - 1 ? last : Math.min(last, firstFrom(curve.x, edge));
    if (end <= start) continue;
    heights.extremes(start, end, pair);
    if (pair[0] <= pair[1]) {
      found.push({
        at,
        enters: heightOf(curve.y[start]),
        leaves: heightOf(curve.y[end - 1]),
        lowest: heightOf(pair[0]),
        highest: heightOf(pair[1]),
      });
    }
    start = end;
  }
  return found;
}

/** Pixels up and down in a column, on average, up to which a curve is still a line to the eye; chosen by looking. */
const CALM = 12;

export const isCalm = (columns: readonly Column[]): boolean =>
  columns.reduce((sum, { lowest, highest }) => sum + lowest - highest, 0) <= CALM * columns.length;

/** The way of a line through each column: in, to its ends in the order in which it meets them, out. */
export function wayThrough({ enters, leaves, lowest, highest }: Column): readonly number[] {
  const ends = leaves < enters ? [lowest, highest] : [highest, lowest];
  return [enters, ...ends, leaves].filter(Number.isFinite);
}
