/** What moves or stands, as shapes with words in them. */

import { circle, hatched, rectangle, round } from "./path.ts";
import type { PlacedNode, Port } from "./placed.ts";
import type { SceneAnchor, SceneItem, SceneLabel, ScenePart } from "./scene.ts";
import { LINE_HEIGHT, nameWidth, type Words } from "./words.ts";

export interface NodeFrame {
  readonly placed: PlacedNode;
  readonly words: Words;
  readonly says: string;
  /** Moves with it. */
  readonly anchor: SceneAnchor;
  /** Sides on which something meets it. */
  readonly sides: ReadonlySet<Port["side"]>;
  /** Ports at points of a body. */
  readonly pointPorts: readonly Port[];
}

/** Room kept at the left of a pendulum for the bob. */
const BOB_ROOM = 50;

export function nodeItem(frame: NodeFrame): SceneItem {
  const { node, x, y, width, height } = frame.placed;
  return {
    name: node.name,
    keyword: node.keyword,
    family: "moves",
    // What is drawn elsewhere already is only hinted at.
    parts: frame.placed.isCopy
      ? partsOf(frame).map((part) => (part.style === "body" ? { ...part, style: "dashed" } : part))
      : partsOf(frame),
    labels: [...labelsOf(frame), ...frame.pointPorts.map((port) => pointLabel(port, frame.anchor))],
    box: { x: round(x), y: round(y), width: round(width), height: round(height) },
    says: frame.says,
  };
}

function partsOf(frame: NodeFrame): ScenePart[] {
  const { node, x, y, width, height } = frame.placed;
  const rides = { on: "anchor", anchor: frame.anchor } as const;
  const part = (path: string, style: ScenePart["style"] = "line"): ScenePart => ({ path, style, rides });
  const [midX, midY] = [x + width / 2, y + height / 2];
  switch (node.keyword) {
    case "inertia":
      return [
        part(rectangle(x, y, width, height, 6), "body"),
        part(
          `M${round(x + 8)},${round(y + 3)}V${round(y + height - 3)}M${round(x + width - 8)},${round(y + 3)}V${round(y + height - 3)}`,
          "thin",
        ),
      ];
    case "junction":
      return [
        ...(frame.sides.has("above") ? [part(`M${round(midX)},${round(y)}V${round(midY)}`)] : []),
        ...(frame.sides.has("below") ? [part(`M${round(midX)},${round(midY)}V${round(y + height)}`)] : []),
        part(circle(midX, midY, 3.5), "solid"),
      ];
    case "body":
      return [part(rectangle(x, y, width, height, 3), "body"), ...centreMark(x + 15, midY, part)];
    case "pendulum":
      return pendulumParts(frame, part);
    case "loop":
      return [
        part(rectangle(x, y, width, height, 9), "body"),
        part(`M${round(midX + 6)},${round(y)}l-9,-4.5v9Z`, "solid"),
      ];
    case "support": {
      const { line, strokes } = hatched(x, x + width, y + 1);
      return [
        { path: line, style: "line", rides: { on: "rest" } },
        { path: strokes, style: "thin", rides: { on: "rest" } },
      ];
    }
    default:
      return [part(rectangle(x, y, width, height), "body")];
  }
}

/** The mark of a centre of gravity: a circle with two of its quarters filled. */
function centreMark(
  x: number,
  y: number,
  part: (path: string, style: ScenePart["style"]) => ScenePart,
): ScenePart[] {
  const [cx, cy] = [round(x), round(y)];
  return [
    part(circle(x, y, 6), "body"),
    part(
      `M${cx},${cy}V${round(y - 6)}A6 6 0 0 1 ${round(x + 6)},${cy}ZM${cx},${cy}V${round(y + 6)}A6 6 0 0 1 ${round(x - 6)},${cy}Z`,
      "solid",
    ),
  ];
}

/** A frame on its carrier with the bob on a rod. */
function pendulumParts(
  { placed: { node, x, y, width, height }, anchor }: NodeFrame,
  part: (path: string, style?: ScenePart["style"]) => ScenePart,
): ScenePart[] {
  const [pivot, top, bottom] = [round(x + 30), round(y + 4), round(y + height)];
  const hangs = node.statement.details.find(({ key }) => key.text === "hangs")?.items[0];
  const isUp =
    hangs?.kind === "value" && hangs.expression.kind === "path" && hangs.expression.names[0].text === "up";
  const frameLine: ScenePart = {
    path: isUp
      ? `M${round(x)},${bottom}H${round(x + width)}`
      : `M${round(x)},${bottom}H${round(x + width)}M${round(x + 10)},${bottom}V${top}H${pivot}`,
    style: "thin",
    rides: { on: "anchor", anchor: { ...anchor, sways: [] } },
  };
  const [from, to] = isUp ? [bottom, y + 14] : [top, bottom - 14];
  return [
    frameLine,
    part(`M${pivot},${from}L${round(pivot + 6)},${round(to)}`),
    part(circle(pivot + 7, to, 7), "body"),
    part(circle(pivot, from, 2.5), "solid"),
  ];
}

function labelsOf({ placed, words, anchor }: NodeFrame): SceneLabel[] {
  const { node, room, x, y, width, height } = placed;
  const isBeside = node.keyword === "junction";
  const left = isBeside ? x + width + 6 : node.keyword === "pendulum" ? x + BOB_ROOM : x + 10;
  const wide = isBeside ? room.width : x + width - 10 - left;
  const lines = [words.name, ...words.values];
  const middle = node.keyword === "support" ? y + 21 : y + height / 2;
  const top = middle - (lines.length * LINE_HEIGHT) / 2;
  const align = isBeside ? "start" : "middle";
  return lines.map((text, i) => ({
    text,
    role: i === 0 ? "name" : "value",
    x: round(align === "start" ? left : left + wide / 2),
    y: round(top + i * LINE_HEIGHT + 11),
    align,
    box: { x: round(left), y: round(top + i * LINE_HEIGHT), width: round(wide), height: LINE_HEIGHT },
    anchor,
  }));
}

function pointLabel({ x, y, side, point }: Port, anchor: SceneAnchor): SceneLabel {
  const width = nameWidth(point);
  const top = side === "above" ? y + 2 : y - LINE_HEIGHT - 2;
  return {
    text: point,
    role: "value",
    x: round(x),
    y: round(top + 11),
    align: "middle",
    box: { x: round(x - width / 2), y: round(top), width: round(width), height: LINE_HEIGHT },
    anchor,
  };
}
