import type { CurvePanel, Scale } from "../../shared-core/index.ts";
import { svg } from "./dom.ts";
import { type Geometry, type PanelBox, ticksOn } from "./plot-layout.ts";

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

/** Named points; a name that would cover another one is left away, its point stays. */
export function marks({ panel, box, geometry, x, y }: AxesOf): SVGElement[] {
  const { left, right } = geometry;
  const taken: { from: number; to: number; y: number }[] = [];
  return panel.marks.flatMap((mark) => {
    const [across, share] = [x.place(mark.x), y.place(mark.y)];
    if (!(across >= 0 && across <= 1 && share >= -0.01 && share <= 1.01)) return [];
    const [px, py] = [left + across * (right - left), box.top + (1 - share) * box.height];
    const dot = svg("circle", { class: "peak", cx: px, cy: py, r: 2.5 });
    const half = (LETTER * [...mark.label].length) / 2;
    const middle = Math.max(left + half, Math.min(right - half, px));
    const place = { from: middle - half - 4, to: middle + half + 4, y: Math.max(box.top + 9, py - 8) };
    if (
      taken.some(
        (other) => other.from < place.to && place.from < other.to && Math.abs(other.y - place.y) < 13,
      )
    )
      return [dot];
    taken.push(place);
    return [dot, svg("text", { class: "name", x: middle, y: place.y, "text-anchor": "middle" }, mark.label)];
  });
}

export const withUnit = ({ label, unit }: { readonly label: string; readonly unit: string }): string =>
  unit === "" ? label : `${label} in ${unit}`;
