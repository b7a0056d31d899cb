import type { CurvePanel, Scale } from "../../shared-core/index.ts";
import { svg } from "./dom.ts";
import { type Geometry, type PanelBox, ticksOn, valueAt } from "./plot-layout.ts";
import { nearestTo } from "./pyramid.ts";

const PIXELS_PER_X_TICK = 76;
const PIXELS_PER_Y_TICK = 30;
const LETTER = 6.6;

export interface AxesOf {
  readonly panel: CurvePanel;
  readonly box: PanelBox;
  readonly geometry: Geometry;
  readonly x: Scale;
  readonly y: Scale;
  /** The panel at the bottom carries the numbers of the shared axis. */
  readonly last: boolean;
}

/** Rules, numbers and titles of one panel. */
export function axes({ panel, box, geometry, x, y, last }: AxesOf): SVGElement[] {
  const { left, right } = geometry;
  const bottom = box.top + box.height;
  const across = (share: number) => left + share * (right - left);
  const up = (share: number) => bottom - share * box.height;
  const xTicks = ticksOn(x, panel.x, (right - left) / PIXELS_PER_X_TICK);
  const yTicks = ticksOn(y, panel.y, box.height / PIXELS_PER_Y_TICK);
  const words = (text: string, attributes: Record<string, string | number>) => svg("text", attributes, text);
  return [
    ...yTicks.map(({ at }) => svg("path", { class: "grid", d: `M${left},${up(at)}H${right}` })),
    ...xTicks.map(({ at }) => svg("path", { class: "grid", d: `M${across(at)},${box.top}V${bottom}` })),
    svg("path", { class: "axis", d: `M${left},${bottom}H${right}` }),
    ...yTicks.map(({ at, label }) =>
      words(label, { class: "number", x: left - 7, y: up(at) + 3.5, "text-anchor": "end" }),
    ),
    ...(last ? xTicks : []).map(({ at, label }) =>
      words(label, { class: "number", x: across(at), y: bottom + 15, "text-anchor": "middle" }),
    ),
    words(withUnit(panel.y), { class: "title", x: left, y: box.top - 5 }),
    ...(last
      ? [words(withUnit(panel.x), { class: "title", x: right, y: bottom + 32, "text-anchor": "end" })]
      : []),
  ];
}

/** Named points, each name where it covers fewest curves; one that would cover another name is left away. */
export function marks(of: AxesOf): SVGElement[] {
  const { panel, box, geometry, x, y } = of;
  const { left, right } = geometry;
  const taken: Place[] = [];
  // The highest first: nothing stands above it.
  return [...panel.marks]
    .sort((a, b) => b.y - a.y)
    .flatMap((mark) => {
      const [across, share] = [x.place(mark.x), y.place(mark.y)];
      if (!(across >= 0 && across <= 1 && share >= -0.01 && share <= 1.01)) return [];
      const [px, py] = [left + across * (right - left), box.top + (1 - share) * box.height];
      const dot = svg("circle", { class: "peak", cx: px, cy: py, r: 2.5 });
      const half = (LETTER * [...mark.label].length) / 2;
      const free = placesAround(px, py, half, of).filter(
        (place) => !taken.some((other) => touch(place, other)),
      );
      if (free.length === 0) return [dot];
      const covered = free.map((place) => coveredBy(place, of));
      const place = free[covered.indexOf(Math.min(...covered))];
      taken.push(place);
      const middle = (place.from + place.to) / 2;
      return [
        dot,
        svg("text", { class: "name", x: middle, y: place.y, "text-anchor": "middle" }, mark.label),
      ];
    });
}

/** Where a name may stand: from, to and the line it stands on, in pixels. */
interface Place {
  readonly from: number;
  readonly to: number;
  readonly y: number;
}

/** From a line of words up to the top of its letters. */
const TALL = 10;

const touch = (a: Place, b: Place): boolean => a.from < b.to && b.from < a.to && Math.abs(a.y - b.y) < 13;

/** Above its point if it can be; the first of equals is taken. */
function placesAround(px: number, py: number, half: number, { box, geometry }: AxesOf): Place[] {
  const { left, right } = geometry;
  const at = (middle: number, y: number): Place => {
    const inside = Math.max(left + half, Math.min(right - half, middle));
    const line = Math.max(box.top + TALL - 1, Math.min(box.top + box.height - 3, y));
    return { from: inside - half - 4, to: inside + half + 4, y: line };
  };
  const beside = half + 9;
  return [at(px, py - 8), at(px, py - 20), at(px - beside, py - 4), at(px + beside, py - 4), at(px, py + 17)];
}

/** How many of the columns under a name a curve runs through. */
function coveredBy({ from, to, y: line }: Place, { panel, box, geometry, x, y }: AxesOf): number {
  const { left, right } = geometry;
  let count = 0;
  for (let i = 0; i <= PROBES; i++) {
    const value = valueAt(x, (from + (i / PROBES) * (to - from) - left) / (right - left));
    for (const curve of panel.curves) {
      const height = box.top + (1 - y.place(curve.y[nearestTo(curve.x, value)])) * box.height;
      if (height > line - TALL - 1 && height < line + 3) count++;
    }
  }
  return count;
}

const PROBES = 12;

export const withUnit = ({ label, unit }: { readonly label: string; readonly unit: string }): string =>
  unit === "" ? label : `${label} in ${unit}`;
