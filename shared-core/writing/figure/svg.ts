import {
  type BarPanel,
  type Curve,
  type CurvePanel,
  curveWords,
  DASHES,
  type Figure,
  type FigureTheme,
  type Mark,
  NEUTRAL,
} from "./figure.ts";
import { type Box, type CurveLayout, layoutCurves } from "./layout.ts";

export interface SvgOptions {
  /** Pixels. */
  readonly width: number;
  readonly height: number;
  readonly theme?: FigureTheme;
}

const FONT_SIZE = 11;
/** A sans-serif letter is about so wide. */
const LETTER = 0.6 * FONT_SIZE;
const LINE = 15;
const GAP = 14;
const MARGIN = { left: 58, right: 14, top: 22, bottom: 34 };

/** The figure as SVG text that stands alone: no style sheet, no script, nothing from outside. */
export function figureSvg(figure: Figure, options: SvgOptions): string {
  const { width, height, theme = NEUTRAL } = options;
  const names = legendNames(figure);
  const legend = legendRows(names, width);
  const boxes = panelBoxes(figure, width, height, legend.length * LINE);
  const parts = figure.panels.map((panel, i) =>
    panel.kind === "curves"
      ? curvePanel(panel, boxes[i], theme, i === lastCurves(figure))
      : barPanel(panel, boxes[i], theme),
  );
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}" role="img" font-family="sans-serif" font-size="${FONT_SIZE}" fill="${theme.ink}">`,
    `<title>${escapeText(figure.title)}</title>`,
    `<desc>${escapeText(figure.description)}</desc>`,
    `<text x="${MARGIN.left}" y="14" font-weight="bold">${escapeText(figure.title)}</text>`,
    ...parts.flat(),
    ...legendParts(legend, height, theme),
    "</svg>",
    "",
  ].join("\n");
}

/** Text made safe inside an element or a quoted attribute; characters that XML 1.0 forbids are left out. */
export function escapeText(text: string): string {
  return text
    .replace(FORBIDDEN_IN_XML, "")
    .replaceAll("&", "&amp;")
    .replaceAll("<", "&lt;")
    .replaceAll(">", "&gt;")
    .replaceAll('"', "&quot;");
}

// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is to be left out
const FORBIDDEN_IN_XML = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/g;

const WIDEST_BAR = 36;

const px = (value: number): string => `${Math.round(value * 100) / 100}`;

function panelBoxes(figure: Figure, width: number, height: number, below: number): Box[] {
  const total = figure.panels.reduce((sum, panel) => sum + panel.share, 0);
  const usable = height - MARGIN.top - MARGIN.bottom - below - GAP * (figure.panels.length - 1);
  let top = MARGIN.top;
  return figure.panels.map((panel) => {
    const tall = Math.max(10, (usable * panel.share) / total);
    const box = {
      left: MARGIN.left,
      top,
      width: Math.max(10, width - MARGIN.left - MARGIN.right),
      height: tall,
    };
    top += tall + GAP;
    return box;
  });
}

const lastCurves = (figure: Figure): number =>
  figure.panels.findLastIndex((panel) => panel.kind === "curves");

function curvePanel(panel: CurvePanel, box: Box, theme: FigureTheme, labelled: boolean): string[] {
  const layout = layoutCurves(panel, box);
  return [
    ...gridParts(layout, box, theme, labelled),
    axisTitle(panel.y.label, panel.y.unit, box, theme),
    ...(labelled ? [xTitle(panel, box)] : []),
    ...layout.paths.map(
      ({ path, ...curve }) =>
        `<path d="${path}" fill="none" ${strokeOf(curve, theme)} stroke-linejoin="round"/>`,
    ),
    ...layout.marks.flatMap(({ x, y, label }) => [
      `<circle cx="${px(x)}" cy="${px(y)}" r="2.5" fill="${theme.ink}"/>`,
      markLabel({ x, y, label }, box),
    ]),
  ];
}

/** Above its point, and inside the panel. */
function markLabel({ x, y, label }: Mark, box: Box): string {
  const half = (LETTER * [...label].length) / 2;
  const middle = Math.max(box.left + half, Math.min(box.left + box.width - half, x));
  return `<text x="${px(middle)}" y="${px(Math.max(box.top + FONT_SIZE, y - 6))}" text-anchor="middle">${escapeText(label)}</text>`;
}

function gridParts(layout: CurveLayout, box: Box, theme: FigureTheme, labelled: boolean): string[] {
  const bottom = box.top + box.height;
  const right = box.left + box.width;
  return [
    ...layout.yTicks.flatMap(({ at, label }) => [
      `<path d="M${px(box.left)},${px(at)}H${px(right)}" stroke="${theme.grid}"/>`,
      `<text x="${px(box.left - 6)}" y="${px(at + 4)}" text-anchor="end" fill="${theme.quiet}">${label}</text>`,
    ]),
    ...layout.xTicks.map(
      ({ at }) => `<path d="M${px(at)},${px(box.top)}V${px(bottom)}" stroke="${theme.grid}"/>`,
    ),
    ...(labelled ? layout.xTicks : []).map(
      ({ at, label }) =>
        `<text x="${px(at)}" y="${px(bottom + 14)}" text-anchor="middle" fill="${theme.quiet}">${label}</text>`,
    ),
    `<path d="M${px(box.left)},${px(box.top)}V${px(bottom)}H${px(right)}" fill="none" stroke="${theme.quiet}"/>`,
  ];
}

const withUnit = (label: string, unit: string): string => (unit === "" ? label : `${label} in ${unit}`);

function axisTitle(label: string, unit: string, box: Box, theme: FigureTheme): string {
  const [x, y] = [12, box.top + box.height / 2];
  return `<text x="${x}" y="${px(y)}" transform="rotate(-90 ${x} ${px(y)})" text-anchor="middle" fill="${theme.quiet}">${escapeText(withUnit(label, unit))}</text>`;
}

function xTitle(panel: CurvePanel, box: Box): string {
  return `<text x="${px(box.left + box.width)}" y="${px(box.top + box.height + 28)}" text-anchor="end">${escapeText(withUnit(panel.x.label, panel.x.unit))}</text>`;
}

function barPanel(panel: BarPanel, box: Box, theme: FigureTheme): string[] {
  const middle = box.top + box.height / 2;
  const step = box.width / Math.max(1, panel.bars.length);
  const wide = Math.min(WIDEST_BAR, step * 0.5);
  const tall = (box.height - LINE * 2) / 2;
  // Where names have no room beside each other, every so many bars one is named.
  const longest = Math.max(1, ...panel.bars.map(({ name }) => [...name].length));
  const every = Math.ceil((LETTER * longest + 6) / step);
  return [
    `<text x="${px(box.left)}" y="${px(box.top + 10)}">${escapeText(panel.title)}</text>`,
    `<path d="M${px(box.left)},${px(middle)}H${px(box.left + box.width)}" stroke="${theme.quiet}"/>`,
    ...panel.bars.flatMap(({ name, value }, i) => {
      const size = Math.abs(value) * tall;
      const x = box.left + step * i;
      return [
        `<rect x="${px(x + (step - wide) / 2)}" y="${px(value > 0 ? middle - size : middle)}" width="${px(wide)}" height="${px(size)}" fill="${theme.curves[0]}"/>`,
        ...(i % every === 0
          ? [
              `<text x="${px(x + step / 2)}" y="${px(value > 0 ? middle + 12 : middle - 4)}" text-anchor="middle" fill="${theme.quiet}">${escapeText(name)}</text>`,
            ]
          : []),
      ];
    }),
  ];
}

/** What is shown in its colour; what lies under it faint, an earlier revision broad as a shadow; limits dotted. */
function strokeOf({ style, role = "answer" }: Ink, theme: FigureTheme): string {
  const pattern = role === "limit" ? "1 4" : DASHES[style % DASHES.length];
  const dash = pattern === "" ? "" : ` stroke-dasharray="${pattern}"`;
  const colour = role === "answer" ? theme.curves[style % theme.curves.length] : theme.quiet;
  return `stroke="${colour}" ${STROKES[role]}${dash}`;
}

const STROKES = {
  answer: 'stroke-width="1.5"',
  written: 'stroke-width="1.1"',
  earlier: 'stroke-width="3.4" stroke-opacity="0.4"',
  limit: 'stroke-width="1.4"',
} as const;

type Ink = Pick<Curve, "style" | "role">;

interface LegendEntry extends Ink {
  readonly name: string;
  readonly left: number;
}

function legendNames(figure: Figure): Map<string, Ink> {
  const curves = figure.panels.flatMap((panel) => (panel.kind === "curves" ? panel.curves : []));
  return new Map(curves.map((curve) => [curveWords(curve), curve]));
}

function legendRows(names: ReadonlyMap<string, Ink>, width: number): LegendEntry[][] {
  const rows: LegendEntry[][] = [];
  let left = Number.POSITIVE_INFINITY;
  for (const [name, { style, role }] of names) {
    const wide = 30 + LETTER * [...name].length + 14;
    if (left + wide > width) {
      rows.push([]);
      left = MARGIN.left;
    }
    rows[rows.length - 1].push({ name, style, role, left });
    left += wide;
  }
  return rows;
}

function legendParts(rows: readonly LegendEntry[][], height: number, theme: FigureTheme): string[] {
  return rows.flatMap((row, i) => {
    const y = height - LINE * (rows.length - i) + 10;
    return row.flatMap(({ name, left, ...ink }) => [
      `<path d="M${px(left)},${px(y - 4)}h24" ${strokeOf(ink, theme)}/>`,
      `<text x="${px(left + 30)}" y="${px(y)}">${escapeText(name)}</text>`,
    ]);
  });
}
