import { line } from "d3-shape";
import { keepExtremes } from "../decimate.ts";
import { type Scale, scaleBetween, scaleOver, tickLabel } from "../scales.ts";
import type { Axis, Curve, CurvePanel, Mark } from "./figure.ts";

/** A rectangle in pixels, y downwards. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** Where everything of a panel stands, in pixels; painters only put it on paper. */
export interface CurveLayout {
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly PlacedTick[];
  readonly yTicks: readonly PlacedTick[];
  /** SVG path strings. */
  readonly paths: readonly ({ readonly path: string } & Pick<Curve, "style" | "role">)[];
  readonly marks: readonly Mark[];
}

export interface PlacedTick {
  readonly at: number;
  readonly label: string;
}

const PIXELS_PER_X_TICK = 70;
const PIXELS_PER_Y_TICK = 26;

export function layoutCurves(panel: CurvePanel, box: Box): CurveLayout {
  const x = axisScale(
    panel.x,
    panel.curves.map((curve) => curve.x),
    [],
  );
  const y = axisScale(
    panel.y,
    panel.curves.map((curve) => curve.y),
    panel.marks.map((mark) => mark.y),
  );
  const toX = (value: number): number => box.left + x.place(value) * box.width;
  const toY = (value: number): number => box.top + (1 - y.place(value)) * box.height;
  const xTicks = ticksOf(panel.x, x, box.width / PIXELS_PER_X_TICK);
  const yTicks = ticksOf(panel.y, y, box.height / PIXELS_PER_Y_TICK);
  return {
    x,
    y,
    xTicks: xTicks.map((tick) => ({ at: toX(tick.value), label: tick.label })),
    yTicks: yTicks.map((tick) => ({ at: toY(tick.value), label: tick.label })),
    paths: panel.curves.map((curve) => ({
      path: pathOf(curve.x, curve.y, toX, toY, { y, box }),
      style: curve.style,
      role: curve.role,
    })),
    marks: panel.marks.map((mark) => ({ ...mark, x: toX(mark.x), y: toY(mark.y) })),
  };
}

function ticksOf(axis: Axis, scale: Scale, room: number): readonly { value: number; label: string }[] {
  const own = axis.ticks?.map((value) => ({ value, label: tickLabel(value) }));
  return own ?? scale.ticks(Math.max(2, room));
}

/** A log axis that follows its data leaves this share of its length above the highest peak for its name. */
const HEADROOM = 0.12;

function axisScale(axis: Axis, data: readonly ArrayLike<number>[], more: readonly number[]): Scale {
  if (axis.from !== undefined && axis.to !== undefined) return scaleBetween(axis.scale, axis.from, axis.to);
  const scale = scaleOver(axis.scale, ...data, more);
  return axis.scale === "log"
    ? scaleBetween("log", scale.from, scale.to * (scale.to / scale.from) ** HEADROOM)
    : scale;
}

function pathOf(
  x: ArrayLike<number>,
  y: ArrayLike<number>,
  toX: (value: number) => number,
  toY: (value: number) => number,
  { y: scale, box }: { readonly y: Scale; readonly box: Box },
): string {
  const heights = Float64Array.from(y, (value) => scale.place(value));
  // Two columns a pixel: what is left out could not be told apart.
  const kept = keepExtremes((i) => (toX(x[i]) - box.left) * 2, heights, Math.ceil(box.width * 2));
  const draw = line<number>()
    .x((i) => toX(x[i]))
    // A little outside is enough to leave the picture; SVG cannot hold what is far outside.
    .y((i) => Math.max(box.top - 1, Math.min(box.top + box.height + 1, toY(y[i]))))
    .defined((i) => Number.isFinite(y[i]))
    .digits(2);
  return draw(kept) ?? "";
}
