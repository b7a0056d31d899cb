import {
  type Axis,
  type CurvePanel,
  type Scale,
  scaleBetween,
  scaleOver,
  tickLabel,
} from "../../shared-core/index.ts";
import { firstFrom, Pyramid } from "./pyramid.ts";

/** Shown part of the axis along the bottom, as shares of the whole; [0, 1] is all of it. */
export type Part = readonly [from: number, to: number];

export interface Drawn {
  readonly curve: CurvePanel["curves"][number];
  readonly heights: Pyramid;
}

export interface PanelData {
  readonly panel: CurvePanel;
  readonly curves: readonly Drawn[];
}

export interface PanelBox {
  readonly top: number;
  readonly height: number;
}

export interface Geometry {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly panels: readonly PanelBox[];
}

export const MARGIN = { left: 62, right: 16, top: 16, bottom: 40 };
const GAP = 28;
/** Height of a panel of share 1, in pixels. */
const SHARE = 92;

export function geometryOf(panels: readonly CurvePanel[], width: number): Geometry {
  const boxes: PanelBox[] = [];
  let top = MARGIN.top;
  for (const { share } of panels) {
    boxes.push({ top, height: share * SHARE });
    top += share * SHARE + GAP;
  }
  const height = top - GAP + MARGIN.bottom;
  return {
    width,
    height,
    left: MARGIN.left,
    right: Math.max(MARGIN.left + 50, width - MARGIN.right),
    panels: boxes,
  };
}

export function prepared(panels: readonly CurvePanel[]): PanelData[] {
  return panels.map((panel) => ({
    panel,
    curves: panel.curves.map((curve) => ({ curve, heights: new Pyramid(curve.y) })),
  }));
}

/** The whole axis along the bottom, which all panels share. */
export function wholeX(panels: readonly PanelData[], linear: boolean): Scale {
  const axis = panels[0]?.panel.x;
  const kind = linear ? "linear" : (axis?.scale ?? "linear");
  if (axis?.from !== undefined && axis.to !== undefined && axis.from < axis.to)
    return scaleBetween(kind, axis.from, axis.to);
  const ends = panels.flatMap(({ curves }) => curves.map(({ curve: { x } }) => [x[0], x[x.length - 1]]));
  return scaleOver(kind, ...ends);
}

/** The shown part of a scale as a scale of its own. */
export function partOf(whole: Scale, [from, to]: Part): Scale {
  return scaleBetween(whole.kind, valueAt(whole, from), valueAt(whole, to));
}

/** The value at a share of a scale. */
export function valueAt({ kind, from, to }: Scale, share: number): number {
  return kind === "log" ? from * (to / from) ** share : from + share * (to - from);
}

/** Room above the highest value of a log axis for the names of peaks. */
const HEADROOM = 10 ** 0.2;
/** How far below its top a log axis reaches where values touch zero. */
const DEPTH = 1e-4;

/** The upright axis of a panel; it follows what is shown of the curves. */
export function panelY({ panel, curves }: PanelData, x: Scale, linear: boolean): Scale {
  const { y } = panel;
  const kind = linear ? "linear" : y.scale;
  if (y.from !== undefined && y.to !== undefined) return scaleBetween(kind, y.from, y.to);
  const ends: number[] = [];
  const pair = new Float64Array(2);
  for (const { curve, heights } of curves) {
    const from = Math.max(0, firstFrom(curve.x, x.from) - 1);
    const to = Math.min(curve.x.length, firstFrom(curve.x, x.to) + 1);
    heights.extremes(from, to, pair);
    if (pair[1] >= pair[0]) ends.push(kind === "log" && pair[0] <= 0 ? pair[1] * DEPTH : pair[0], pair[1]);
  }
  const scale = scaleOver(kind, ends);
  return kind === "log" ? scaleBetween("log", scale.from, scale.to * HEADROOM) : scale;
}

export interface Tick {
  readonly at: number;
  readonly label: string;
}

export function ticksOn(scale: Scale, axis: Axis, count: number): Tick[] {
  const own = axis.ticks?.map((value) => ({ value, label: tickLabel(value) }));
  return (own ?? scale.ticks(Math.max(2, count)))
    .map(({ value, label }) => ({ at: scale.place(value), label }))
    .filter(({ at }) => at >= -1e-9 && at <= 1 + 1e-9);
}
