import type { Scene, SceneItem, SceneLabel } from "../../drawing/scene.ts";
import { type FigureTheme, NEUTRAL } from "./figure.ts";
import { escapeText } from "./svg.ts";

/** A drawn system as SVG text that stands alone. Every item is a group with the name of its statement. */
export function sceneSvg(scene: Scene, title: string, theme: FigureTheme = NEUTRAL): string {
  const { width, height } = scene;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}" role="img" font-family="sans-serif" fill="none" stroke-linecap="round" stroke-linejoin="round">`,
    `<title>${escapeText(title)}</title>`,
    `<desc>${escapeText(scene.description)}</desc>`,
    ...scene.items.flatMap((item) => itemParts(item, theme)),
    "</svg>",
    "",
  ].join("\n");
}

function itemParts(item: SceneItem, theme: FigureTheme): string[] {
  const colour =
    item.family === "drives" ? theme.curves[1] : item.family === "joins" ? theme.curves[0] : theme.ink;
  const styles = {
    line: `stroke="${colour}" stroke-width="1.5"`,
    body: `stroke="${colour}" stroke-width="1.5" fill="${theme.grid}"`,
    solid: `fill="${colour}"`,
    thin: `stroke="${colour}" stroke-width="1"`,
    dashed: `stroke="${colour}" stroke-width="1.5" stroke-dasharray="3 3"`,
  };
  return [
    `<g data-name="${escapeText(item.name)}"><title>${escapeText(item.says)}</title>`,
    ...item.parts.map(({ path, style }) => `<path d="${path}" ${styles[style]}/>`),
    ...item.labels.map((label) => labelPart(label, theme)),
    "</g>",
  ];
}

function labelPart({ text, role, x, y, align }: SceneLabel, theme: FigureTheme): string {
  const face =
    role === "name" ? `font-size="12" fill="${theme.ink}"` : `font-size="11" fill="${theme.quiet}"`;
  const anchor = align === "start" ? "" : ` text-anchor="${align}"`;
  return `<text x="${x}" y="${y}"${anchor} ${face}>${escapeText(text)}</text>`;
}
