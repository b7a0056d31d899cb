/** A model as a drawing in trade symbols. */
import type { Assembly } from "../mechanics/assembly.ts";
import type { Model } from "../model/model.ts";
import type { StatementNode } from "../syntax/tree.ts";
import { type GraphLink, type GraphNode, type SystemGraph, systemGraph } from "./graph.ts";
import { layoutSystem } from "./layout.ts";
import { round } from "./path.ts";
import type { Layout, PlacedNode, Port } from "./placed.ts";
import type { Scene, SceneAnchor, SceneItem, Sway } from "./scene.ts";
import { groundItem, linkItem } from "./scene-links.ts";
import { nodeItem } from "./scene-nodes.ts";
import { type ShowValue, type Words, wordsFor } from "./words.ts";

/** From here on a drawing tells less than a chart of the coordinates. */
export const MOST_DRAWN = 30;

/**
 * Draws what a model consists of, whether or not it can be computed. Its places depend on names, joints and units, not on numbers.
 * @param assembly of the shown case; without it nothing in the drawing can be moved
 */
export function systemScene(model: Model, assembly: Assembly | undefined, show: ShowValue): Scene {
  const graph = systemGraph(model.tree.statements);
  const coordinates = assembly?.coordinates.map(({ name }) => name) ?? [];
  const moving = graph.nodes.filter(({ keyword }) => keyword !== "support").length;
  const description = describe(model, graph);
  if (Math.max(coordinates.length, moving) > MOST_DRAWN) {
    return { kind: "chart", width: 0, height: 0, description, coordinates, items: [] };
  }
  const words = new Map<StatementNode, Words>();
  const wordsOf = ({ name, statement }: GraphNode | GraphLink): Words => {
    const known = words.get(statement) ?? wordsFor(name, statement, model.tree.text, show);
    words.set(statement, known);
    return known;
  };
  const layout = layoutSystem(graph, (part) => wordsOf(part).room);
  const painter = new Painter({ graph, layout, assembly, wordsOf });
  return {
    kind: "system",
    width: Math.ceil(layout.width),
    height: Math.ceil(layout.height),
    description,
    coordinates,
    items: painter.items(),
  };
}

interface PainterInput {
  readonly graph: SystemGraph;
  readonly layout: Layout;
  readonly assembly: Assembly | undefined;
  readonly wordsOf: (part: GraphNode | GraphLink) => Words;
}

class Painter {
  readonly #in: PainterInput;
  readonly #boxes: ReadonlyMap<GraphNode, readonly PlacedNode[]>;
  readonly #sways: ReadonlyMap<PlacedNode, readonly Sway[]>;

  constructor(input: PainterInput) {
    this.#in = input;
    const boxes = new Map<GraphNode, PlacedNode[]>();
    for (const box of input.layout.nodes) boxes.set(box.node, [...(boxes.get(box.node) ?? []), box]);
    this.#boxes = boxes;
    this.#sways = new Map(input.layout.nodes.map((box) => [box, this.#swaysOf(box)]));
  }

  items(): SceneItem[] {
    const { layout } = this.#in;
    const met = this.#portsByBox();
    const nodes = layout.nodes.map((placed) => {
      const { node, x, y, width, height } = placed;
      const words = this.#in.wordsOf(node);
      const ports = met.get(placed) ?? [];
      return nodeItem({
        placed,
        words,
        anchor: this.#anchor(placed, x + width / 2, y + height / 2),
        sides: new Set(ports.map(({ port }) => port.side)),
        pointPorts: ports
          .filter(({ port, link }) => port.point !== "" && link.keyword !== "point")
          .map(({ port }) => port),
        says: saying(node, words, ""),
      });
    });
    const links = layout.links.map((placed) => {
      const { link, ports } = placed;
      const words = this.#in.wordsOf(link);
      const anchors = ports.map((port) => this.#anchor(this.#boxAt(port), port.x, port.y));
      return linkItem({ placed, words, anchors, says: saying(link, words, this.#between(link)) });
    });
    const grounds = layout.links.filter(({ link }) => link.grounded).map(groundItem);
    return [...grounds, ...links, ...nodes];
  }

  #portsByBox(): Map<PlacedNode, { port: Port; link: GraphLink }[]> {
    const met = new Map<PlacedNode, { port: Port; link: GraphLink }[]>();
    for (const { link, ports } of this.#in.layout.links) {
      for (const port of ports) {
        const box = this.#boxAt(port);
        const known = met.get(box);
        if (known === undefined) met.set(box, [{ port, link }]);
        else known.push({ port, link });
      }
    }
    return met;
  }

  /** The box that a port stands on: of a node that is drawn twice the one in its column. */
  #boxAt({ node, x, y, side }: Port): PlacedNode {
    const boxes = this.#boxes.get(this.#in.graph.nodes[node]) ?? [];
    const found = boxes.find((box) => {
      const edge = side === "above" ? box.y : box.y + box.height;
      return Math.abs(edge - y) < 0.5 && box.x - 0.5 <= x && x <= box.x + box.width + 0.5;
    });
    return found ?? boxes[0];
  }

  #anchor(box: PlacedNode, x: number, y: number): SceneAnchor {
    return { x: round(x), y: round(y), sways: this.#sways.get(box) ?? [] };
  }

  #between({ ends, grounded, keyword }: GraphLink): string {
    const names = ends.map(({ node, at, isPoint }) => {
      const { name } = this.#in.graph.nodes[node];
      return isPoint ? at : at === "" ? name : `${name}.${at}`;
    });
    const all = [...new Set(names), ...(grounded ? ["ground"] : [])];
    if (all.length === 1) return `${keyword === "motion" ? "of" : "on"} ${all[0]}`;
    return `between ${all.join(" and ")}`;
  }

  /** How the coordinates of a node move it in the picture. */
  #swaysOf(box: PlacedNode): Sway[] {
    const { name, keyword } = box.node;
    const coordinates = this.#in.assembly?.coordinates ?? [];
    const middle = { aboutX: round(box.x + box.width / 2), aboutY: round(box.y + box.height / 2) };
    const pivot = { aboutX: round(box.x + 30), aboutY: round(box.y + 4) };
    return coordinates.flatMap((each, coordinate) => {
      if (each.owner !== name) return [];
      const direction = each.name.slice(name.length + 1);
      const turning = each.motion === "turning" ? "turn" : "";
      const [dx, dy, turn] =
        DIRECTIONS[direction] ?? (turning ? [0, 0, 1] : each.motion === "charge" ? [1, 0, 0] : [0, -1, 0]);
      return [{ coordinate, dx, dy, turn, ...(keyword === "pendulum" ? pivot : middle) }];
    });
  }
}

/** Directions of a body as seen from the side, x to the right, z up, y to the back. */
const DIRECTIONS: Readonly<Record<string, readonly [number, number, number]>> = {
  x: [1, 0, 0],
  y: [0.5, -0.35, 0],
  z: [0, -1, 0],
  rx: [0, 0, 0.4],
  ry: [0, 0, 1],
  rz: [0.3, 0, 0],
};

function saying(
  { keyword, name }: { keyword: string; name: string },
  { whole }: Words,
  where: string,
): string {
  return [`${keyword} ${name}`, ...whole, ...(where === "" ? [] : [where])].join(", ");
}

function describe({ title }: Model, { nodes, links }: SystemGraph): string {
  const counts = new Map<string, number>();
  for (const { keyword } of [...nodes, ...links.filter((link) => link.keyword !== "pendulum")]) {
    counts.set(keyword, (counts.get(keyword) ?? 0) + 1);
  }
  const list = [...counts].map(([keyword, count]) => `${count} × ${keyword}`).join(", ");
  return `${title === undefined ? "The system" : title}: ${list === "" ? "nothing to draw" : list}.`;
}
