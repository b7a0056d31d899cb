import type { Ruler, RulerDrive, RulerLimit, RulerMode } from "../../drawing/ruler.ts";
import { type FigureTheme, NEUTRAL } from "./figure.ts";
import { escapeText } from "./svg.ts";

const SIDE = 28;
const LINE = 14;
/** A sans-serif letter of 11 px, rounded up. */
const LETTER = 6.6;
const AXIS_ROOM = 34;
const DROP = 26;

/** The frequency ruler as SVG text that stands alone: drives and limits above the axis, modes below it. */
export function rulerSvg(ruler: Ruler, title: string, width: number, theme: FigureTheme = NEUTRAL): string {
  const inner = width - 2 * SIDE;
  const x = (share: number): number => Math.round((SIDE + share * inner) * 10) / 10;
  const above = stacked(
    [
      ...ruler.drives.map((drive) => ({ at: x((drive.from + drive.to) / 2), text: drive.label, drive })),
      ...ruler.limits.map((limit) => ({ at: x(limit.at), text: `${limit.name} ${limit.label}`, limit })),
    ],
    width,
  );
  const below = stacked(
    ruler.modes.map((mode) => ({ at: x(mode.at), text: `${mode.number} · ${mode.label}`, mode })),
    width,
  );
  const axis = 30 + LINE * levels(above) + 12;
  const height = axis + AXIS_ROOM + DROP + LINE * levels(below) + 12;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}" role="img" font-family="sans-serif" font-size="11" fill="${theme.ink}">`,
    `<title>${escapeText(title)}</title>`,
    `<desc>${escapeText(ruler.description)}</desc>`,
    `<text x="${SIDE}" y="14" font-weight="bold">${escapeText(title)}</text>`,
    ...ruler.modes.map((mode) => bandPart(mode, x, axis, theme)),
    ...ticks(ruler, x, axis, theme),
    ...above.flatMap((each) =>
      "drive" in each.item
        ? drivePart(each as Placed<{ drive: RulerDrive }>, x, axis, theme)
        : limitPart(each as Placed<{ limit: RulerLimit }>, axis, theme),
    ),
    ...below.flatMap((each) => modePart(each, x, axis, theme)),
    "</svg>",
    "",
  ].join("\n");
}

interface Placed<T> {
  readonly item: T & { readonly at: number; readonly text: string };
  /** Middle of the text. */
  readonly middle: number;
  /** 0 is nearest to the axis. */
  readonly level: number;
}

/** Texts on the lowest level on which they cover no other, from left to right. */
function stacked<T extends { readonly at: number; readonly text: string }>(
  items: readonly T[],
  width: number,
): Placed<T>[] {
  const ends: number[] = [];
  return [...items]
    .sort((a, b) => a.at - b.at)
    .map((item) => {
      const half = ([...item.text].length * LETTER) / 2;
      const middle = Math.max(half + 2, Math.min(width - half - 2, item.at));
      let level = ends.findIndex((end) => middle - half > end + 8);
      if (level < 0) level = ends.length;
      ends[level] = middle + half;
      return { item, middle: Math.round(middle * 10) / 10, level };
    });
}

const levels = (placed: readonly Placed<object>[]): number =>
  placed.reduce((most, { level }) => Math.max(most, level + 1), 0);

/** The resonance band of a mode. */
function bandPart(mode: RulerMode, x: (share: number) => number, axis: number, theme: FigureTheme): string {
  const [from, to] = [x(mode.bandLow), x(mode.bandHigh)];
  const colour = mode.danger ? theme.curves[1] : theme.curves[0];
  return `<path d="M${from},${axis - 8}H${to}V${axis + 8}H${from}Z" fill="${colour}" fill-opacity="${mode.danger ? 0.28 : 0.12}"/>`;
}

function ticks(
  { ticks: all, unit }: Ruler,
  x: (share: number) => number,
  axis: number,
  theme: FigureTheme,
): string[] {
  const marks = all.map(({ at, major }) => `M${x(at)},${axis}v${major ? 7 : 4}`).join("");
  return [
    `<path d="M${x(0)},${axis}H${x(1)}${marks}" fill="none" stroke="${theme.quiet}"/>`,
    ...all
      .filter(({ major }) => major)
      .map(
        ({ at, label }) =>
          `<text x="${x(at)}" y="${axis + 19}" text-anchor="middle" fill="${theme.quiet}">${escapeText(label)}</text>`,
      ),
    `<text x="${x(1) + 4}" y="${axis + 4}" fill="${theme.quiet}">${escapeText(unit)}</text>`,
  ];
}

function drivePart(
  { item: { drive, at, text }, middle, level }: Placed<{ drive: RulerDrive }>,
  x: (share: number) => number,
  axis: number,
  theme: FigureTheme,
): string[] {
  const top = axis - 12 - LINE * level;
  const bar =
    drive.from === drive.to
      ? ""
      : `<path d="M${x(drive.from)},${axis - 6}H${x(drive.to)}" stroke="${theme.curves[1]}" stroke-width="5" stroke-opacity="0.5"/>`;
  return [
    `<g><title>${escapeText(drive.says)}</title>${bar}<path d="M${at},${axis}V${top}" fill="none" ${drive.asked ? `stroke="${theme.quiet}" stroke-dasharray="1 3"` : `stroke="${theme.curves[1]}" stroke-width="2"`}/>`,
    `<text x="${middle}" y="${top - 4}" text-anchor="middle">${escapeText(text)}</text></g>`,
  ];
}

function limitPart(
  { item: { limit, at, text }, middle, level }: Placed<{ limit: RulerLimit }>,
  axis: number,
  theme: FigureTheme,
): string[] {
  const top = axis - 12 - LINE * level;
  const into = limit.side === "below" ? -7 : 7;
  return [
    `<path d="M${at},${axis + 8}V${top}M${at},${axis - 6}h${into}" fill="none" stroke="${theme.ink}" stroke-dasharray="3 2"/>`,
    `<text x="${middle}" y="${top - 4}" text-anchor="middle" fill="${theme.quiet}">${escapeText(text)}</text>`,
  ];
}

/** A drop as wide as its half-power bandwidth, at least so wide that it is seen. */
function modePart(
  { item: { mode, at, text }, middle, level }: Placed<{ mode: RulerMode }>,
  x: (share: number) => number,
  axis: number,
  theme: FigureTheme,
): string[] {
  const half = Math.max(1.5, (x(mode.high) - x(mode.low)) / 2);
  const top = axis + AXIS_ROOM - 8;
  const bottom = top + DROP;
  const colour = mode.danger ? theme.curves[1] : theme.curves[0];
  const y = bottom + 14 + LINE * level;
  return [
    `<g><title>${escapeText(mode.says)}</title><path d="M${at},${axis}V${top}" stroke="${colour}"/>`,
    `<path d="M${at},${top}C${at},${top + 10} ${at + half},${bottom - 14} ${at + half},${bottom - 8}A${half} 8 0 0 1 ${at - half},${bottom - 8}C${at - half},${bottom - 14} ${at},${top + 10} ${at},${top}Z" fill="${colour}"/>`,
    `<path d="M${at},${bottom}V${y - 10}" stroke="${theme.grid}"/>`,
    `<text x="${middle}" y="${y}" text-anchor="middle">${escapeText(text)}</text></g>`,
  ];
}
