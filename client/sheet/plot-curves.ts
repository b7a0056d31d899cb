import { DASHES, type Scale } from "../../shared-core/index.ts";
import { type Column, columnsOf, isCalm, wayThrough } from "./plot-columns.ts";
import type { Drawn, Geometry, PanelBox } from "./plot-layout.ts";
import { firstFrom } from "./pyramid.ts";

export interface CurveInk {
  readonly colour: string;
  readonly width: number;
  readonly dash: string;
}

/** Columns a pixel into which long curves are gathered; what is left out could not be told apart. */
const COLUMNS = 1;
/** Samples a pixel from which on a curve is gathered. */
const DENSE = 3;

export interface CurvePlace {
  readonly geometry: Geometry;
  readonly box: PanelBox;
  readonly x: Scale;
  readonly y: Scale;
  /** An angle: a leap over half the axis comes from its winding up, and is no part of the curve. */
  readonly wraps: boolean;
}

/** Paints curves of one panel; what does not fit is cut off at its box. */
export function paintCurves(
  context: CanvasRenderingContext2D,
  curves: readonly Drawn[],
  place: CurvePlace,
  inkOf: (drawn: Drawn) => CurveInk,
): void {
  const { left, right } = place.geometry;
  context.save();
  context.beginPath();
  context.rect(left, place.box.top - 1, right - left, place.box.height + 2);
  context.clip();
  context.lineJoin = "round";
  for (const drawn of curves) {
    const { colour, width, dash } = inkOf(drawn);
    context.strokeStyle = colour;
    context.lineWidth = width;
    context.setLineDash(dash === "" ? [] : dash.split(" ").map(Number));
    context.fillStyle = colour;
    trace(context, drawn, place);
  }
  context.restore();
}

export const dashOf = (style: number): string => DASHES[style % DASHES.length];

/** A line; through columns where it has more samples than the page has pixels; a band where it would cover them all. */
function trace(context: CanvasRenderingContext2D, drawn: Drawn, place: CurvePlace): void {
  const { x } = drawn.curve;
  const first = Math.max(0, firstFrom(x, place.x.from) - 1);
  const last = Math.min(x.length, firstFrom(x, place.x.to) + 1);
  const { from, to, kind } = place.x;
  const columns = Math.ceil((place.geometry.right - place.geometry.left) * COLUMNS);
  if (last - first <= DENSE * columns) {
    context.beginPath();
    traceSamples(context, drawn, place, [first, last]);
    context.stroke();
    return;
  }
  const span = { first, last, columns, from, to, isLog: kind === "log" };
  const found = columnsOf(drawn, span, (value) => upright(place.y, place.box, value));
  if (isCalm(found)) strokeColumns(context, found, place, columns);
  else fillColumns(context, found, place, columns);
}

function traceSamples(
  context: CanvasRenderingContext2D,
  { curve }: Drawn,
  { geometry: { left, right }, box, x, y, wraps }: CurvePlace,
  [first, last]: readonly [number, number],
): void {
  let [open, before] = [false, 0];
  for (let i = first; i < last; i++) {
    const height = upright(y, box, curve.y[i]);
    const across = left + x.place(curve.x[i]) * (right - left);
    if (!Number.isFinite(height) || !Number.isFinite(across)) {
      open = false;
      continue;
    }
    const leaps = wraps && Math.abs(height - before) > box.height / 2;
    before = height;
    if (open && !leaps) context.lineTo(across, height);
    else context.moveTo(across, height);
    open = true;
  }
}

function strokeColumns(
  context: CanvasRenderingContext2D,
  found: readonly Column[],
  { geometry: { left, right } }: CurvePlace,
  columns: number,
): void {
  const wide = (right - left) / columns;
  context.beginPath();
  let next = -1;
  for (const column of found) {
    const across = left + (column.at + 0.5) * wide;
    for (const height of wayThrough(column)) {
      // A column without a value is a gap.
      if (column.at === next || next < 0) context.lineTo(across, height);
      else context.moveTo(across, height);
      next = column.at;
    }
    next = column.at + 1;
  }
  context.stroke();
}

/** Rectangles one by one are filled far faster than a path of them; dashes across a band would say nothing. */
function fillColumns(
  context: CanvasRenderingContext2D,
  found: readonly Column[],
  { geometry: { left, right } }: CurvePlace,
  columns: number,
): void {
  const wide = (right - left) / columns;
  // On whole pixels of the screen, or thin seams would show between columns.
  const { a: dense } = context.getTransform();
  const edge = (column: number) => Math.round((left + column * wide) * dense) / dense;
  let [before, next]: [number | undefined, number] = [undefined, 0];
  for (const { at, highest, lowest, leaves } of found) {
    // Neighbours touch; behind a column without a value there is none.
    if (at !== next) before = undefined;
    next = at + 1;
    const top = Math.min(before ?? highest, highest);
    const bottom = Math.max(before ?? lowest, lowest);
    const [start, stop] = [edge(at), edge(at + 1)];
    context.fillRect(start, top - THIN / 2, stop - start, bottom - top + THIN);
    before = Number.isNaN(leaves) ? undefined : leaves;
  }
}

/** Height of a column of one value, as thick as a line, in pixels. */
const THIN = 1.5;

/** Pixel of a value; what a log axis cannot show lies at its bottom. NaN stays NaN: a gap. */
function upright(y: Scale, box: PanelBox, value: number): number {
  if (Number.isNaN(value)) return Number.NaN;
  const share = y.kind === "log" && value <= 0 ? -0.1 : y.place(value);
  return box.top + (1 - Math.max(-0.1, Math.min(1.1, share))) * box.height;
}
