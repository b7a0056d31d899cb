import { extent } from "d3-array";
import { format } from "d3-format";
import { scaleLinear, scaleLog } from "d3-scale";

/** How numbers become places along one axis of a picture. */
export interface Scale {
  readonly kind: "linear" | "log";
  readonly from: number;
  readonly to: number;
  /** Share of the axis, 0 at `from` and 1 at `to`; NaN for what the scale cannot show. */
  place(value: number): number;
  /** Round values worth a tick with their labels, about `count` of them, ascending. */
  ticks(count: number): readonly { readonly value: number; readonly label: string }[];
}

/** A log axis never shows more than this many decades below its top: rounding noise is no news. */
const DECADES = 8;

/** A scale over all values, rounded outwards on a linear one; flat and non-positive data are settled here. */
export function scaleOver(kind: "linear" | "log", ...lists: readonly ArrayLike<number>[]): Scale {
  const usable = (value: number): boolean => Number.isFinite(value) && (kind === "linear" || value > 0);
  const ends = lists.map((list) => extent(Array.from(list).filter(usable)));
  const low = Math.min(...ends.map(([least]) => least ?? Number.POSITIVE_INFINITY));
  const high = Math.max(...ends.map(([, most]) => most ?? Number.NEGATIVE_INFINITY));
  if (!(low <= high)) return scaleBetween(kind, kind === "log" ? 0.1 : 0, 1);
  if (kind === "log") {
    const bottom = Math.max(low, high / 10 ** DECADES);
    return scaleBetween(
      kind,
      ...(bottom < high ? ([bottom, high] as const) : ([bottom / 2, high * 2] as const)),
    );
  }
  const room = low < high ? 0 : Math.abs(low) / 2 || 1;
  const [from, to] = scaleLinear()
    .domain([low - room, high + room])
    .nice(6)
    .domain();
  return scaleBetween(kind, from, to);
}

/** A scale with given ends; `from` < `to`, positive on a log scale. */
export function scaleBetween(kind: "linear" | "log", from: number, to: number): Scale {
  const scale = kind === "log" ? scaleLog([from, to], [0, 1]) : scaleLinear([from, to], [0, 1]);
  return {
    kind,
    from,
    to,
    place: (value) => (kind === "log" && !(value > 0) ? Number.NaN : scale(value)),
    ticks: (count) => (kind === "log" ? logTicks(from, to, count) : linearTicks(scale.ticks(count))),
  };
}

type Tick = { readonly value: number; readonly label: string };

function linearTicks(values: readonly number[]): Tick[] {
  return values.map((value) => ({ value, label: tickLabel(value) }));
}

/** Decades; 2 and 5 between them where there is room; linear steps inside less than one decade. */
function logTicks(from: number, to: number, count: number): Tick[] {
  const decades = Math.log10(to / from);
  if (decades < 1)
    return linearTicks(scaleLinear([from, to], [0, 1]).ticks(count)).filter((tick) => tick.value > 0);
  const mantissas = decades * 3 <= count ? [1, 2, 5] : [1];
  const step = Math.max(1, Math.ceil(decades / count));
  const ticks: Tick[] = [];
  for (let power = Math.floor(Math.log10(from)); power <= Math.ceil(Math.log10(to)); power++) {
    if (power % step !== 0) continue;
    for (const mantissa of mantissas) {
      // Through the decimal text, so that a tick at 0.2 is 0.2 and not 0.2 with a tail.
      const value = Number(`${mantissa}e${power}`);
      if (from <= value && value <= to) ticks.push({ value, label: tickLabel(value) });
    }
  }
  return ticks;
}

const scientific = format(".3~e");

/** As short as it can be said: 0.02, 250, 1e-5. */
export function tickLabel(value: number): string {
  const size = Math.abs(value);
  if (size === 0) return "0";
  return size < 1e-3 || size >= 1e5
    ? scientific(value).replace("e+", "e").replace("−", "-")
    : `${Number(value.toPrecision(6))}`;
}
