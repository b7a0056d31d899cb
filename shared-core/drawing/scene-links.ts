/** What joins and drives, as symbols with their leads and words. */

import { hatched, placedPath, round } from "./path.ts";
import { type PlacedLink, type Port, SYMBOL, SYMBOL_HALF } from "./placed.ts";
import type { SceneAnchor, SceneItem, SceneLabel, ScenePart } from "./scene.ts";
import { DRIVES, OTHER, SYMBOLS, type SymbolPart, TURNING_SYMBOLS } from "./symbols.ts";
import { LINE_HEIGHT, type Words } from "./words.ts";

export interface LinkFrame {
  readonly placed: PlacedLink;
  readonly words: Words;
  readonly says: string;
  /** Of each port, in order. */
  readonly anchors: readonly SceneAnchor[];
}

const HALF = SYMBOL / 2;

export function linkItem(frame: LinkFrame): SceneItem {
  const { link, x, y } = frame.placed;
  const half = isLevel(frame.placed) ? HALF : SYMBOL_HALF;
  return {
    name: link.name,
    keyword: link.keyword,
    family: link.keyword in DRIVES && link.keyword !== "point" ? "drives" : "joins",
    parts: partsOf(frame),
    labels: link.keyword === "pendulum" ? [] : labelsOf(frame, half),
    box: { x: round(x - half), y: round(y - HALF), width: 2 * half, height: SYMBOL },
    says: frame.says,
  };
}

/** Ground under a link that ends there. */
export function groundItem({ link, x, groundY }: PlacedLink): SceneItem {
  const { line, strokes } = hatched(x - 15, x + 15, groundY - 7);
  const rides = { on: "rest" } as const;
  return {
    name: "ground",
    keyword: "ground",
    family: "ground",
    parts: [
      { path: line, style: "line", rides },
      { path: strokes, style: "thin", rides },
    ],
    labels: [],
    box: { x: round(x - 15), y: round(groundY - 8), width: 30, height: 8 },
    says: `ground under ${link.name}`,
  };
}

/** Both ends on one level: the symbol lies between them. */
const isLevel = ({ ports }: PlacedLink): boolean =>
  ports.length === 2 && ports.every(({ side }) => side === "above");

function partsOf(frame: LinkFrame): ScenePart[] {
  const { link, ports } = frame.placed;
  const drive = DRIVES[link.keyword];
  if (drive !== undefined) return driveParts(frame, drive);
  const turning = link.turning ? TURNING_SYMBOLS[link.keyword] : undefined;
  const symbol = turning ?? SYMBOLS[link.keyword] ?? OTHER;
  if (ports.length > 2 || (ports.length === 2 && ports.every(({ side }) => side === "below"))) {
    return manyParts(frame, symbol);
  }
  return isLevel(frame.placed) ? levelParts(frame, symbol) : uprightParts(frame, symbol);
}

function driveParts(
  { placed: { x, y, ports }, anchors }: LinkFrame,
  symbol: readonly SymbolPart[],
): ScenePart[] {
  const rides = { on: "anchor", anchor: anchors[0] } as const;
  const end = ports[0].side === "above" ? y + HALF : y - HALF;
  return [
    { path: line(x, end, ports[0]), style: "line", rides },
    ...symbol.map(({ path, style }) => ({ path: placedPath(path, x, y), style, rides })),
  ];
}

function uprightParts({ placed, anchors }: LinkFrame, symbol: readonly SymbolPart[]): ScenePart[] {
  const { x, y, ports, groundY } = placed;
  const above = ports.findIndex(({ side }) => side === "below");
  const below = ports.findIndex(({ side }) => side === "above");
  const floor: Port = { x, y: groundY - 7, node: -1, side: "above", point: "" };
  const still = (port: Port): SceneAnchor => ({ x: round(port.x), y: round(port.y), sways: [] });
  const open: Port = { ...floor, y: y - HALF };
  const [high, low] = [
    ports[above] ?? open,
    ports[below] ?? (placed.link.grounded ? floor : { ...floor, y: y + HALF }),
  ];
  const [upper, lower] = [anchors[above] ?? still(high), anchors[below] ?? still(low)];
  const leads = { upper: line(x, y - HALF, high), lower: line(x, y + HALF, low) };
  return assembled(symbol, leads, { upper, lower }, (path) => placedPath(path, x, y));
}

function levelParts({ placed, anchors }: LinkFrame, symbol: readonly SymbolPart[]): ScenePart[] {
  const { x, y, ports } = placed;
  const [left, right] = ports[0].x <= ports[1].x ? [0, 1] : [1, 0];
  const leads = { upper: elbow(x - HALF, y, ports[left]), lower: elbow(x + HALF, y, ports[right]) };
  const ends = { upper: anchors[left], lower: anchors[right] };
  return assembled(symbol, leads, ends, (path) => placedPath(path, x, y, true));
}

/** Three ends and more: leads stretch, the symbol stays. */
function manyParts({ placed, anchors }: LinkFrame, symbol: readonly SymbolPart[]): ScenePart[] {
  const { x, y, ports } = placed;
  return [
    ...ports.map(({ side, ...port }, i): ScenePart => {
      const at = side === "above" ? y + HALF : y - HALF;
      const to: SceneAnchor = { x: round(x), y: round(at), sways: [] };
      return {
        path: line(x, at, { side, ...port }),
        style: "line",
        rides: { on: "stretch", from: anchors[i], to },
      };
    }),
    ...symbol.map(
      ({ path, style }): ScenePart => ({ path: placedPath(path, x, y), style, rides: { on: "rest" } }),
    ),
  ];
}

function assembled(
  symbol: readonly SymbolPart[],
  leads: { readonly upper: string; readonly lower: string },
  ends: { readonly upper: SceneAnchor; readonly lower: SceneAnchor },
  put: (path: string) => string,
): ScenePart[] {
  const stretch = { on: "stretch", from: ends.upper, to: ends.lower } as const;
  const goes = (which: SymbolPart["goes"]): ScenePart["rides"] =>
    which === "both" ? stretch : { on: "anchor", anchor: ends[which] };
  const split = symbol.some((part) => part.goes !== "both");
  return [
    { path: leads.upper, style: "line", rides: goes(split ? "upper" : "both") },
    { path: leads.lower, style: "line", rides: goes(split ? "lower" : "both") },
    ...symbol.map((part): ScenePart => ({ path: put(part.path), style: part.style, rides: goes(part.goes) })),
  ];
}

const line = (x: number, y: number, to: Port): string =>
  `M${round(x)},${round(y)}L${round(to.x)},${round(to.y)}`;

/** From a lying symbol down past its words, then to what it stands on. */
const elbow = (x: number, y: number, to: Port): string =>
  `M${round(x)},${round(y)}V${round(y + HALF)}L${round(to.x)},${round(to.y)}`;

function labelsOf({ placed, words }: LinkFrame, half: number): SceneLabel[] {
  const { x, y, room } = placed;
  const lines = [words.name, ...words.values];
  const left = x + half + 6 + (half === HALF ? 4 : 0);
  const top = y - (lines.length * LINE_HEIGHT) / 2;
  return lines.map((text, i) => ({
    text,
    role: i === 0 ? "name" : "value",
    x: round(left),
    y: round(top + i * LINE_HEIGHT + 11),
    align: "start",
    box: { x: round(left), y: round(top + i * LINE_HEIGHT), width: round(room.width), height: LINE_HEIGHT },
  }));
}
