/** Places of one system: rows that pull each other straight, ports, heights. */
import { type Column, columnsOf } from "./columns.ts";
import type { GraphLink, GraphNode, SystemGraph } from "./graph.ts";
import {
  BLOCK_GAP,
  type Layout,
  type PlacedLink,
  type PlacedNode,
  type Port,
  SYMBOL,
  SYMBOL_HALF,
} from "./placed.ts";
import type { Block, Cell } from "./rows.ts";
import { spread, spreadInside } from "./spread.ts";
import { LINE_HEIGHT, nameWidth, type WordRoom } from "./words.ts";

/** From the symbol to its words. */
const WORDS_GAP = 6;
const PORT_PAD = 16;
const WIDEST_NODE = 520;
const LEAST_NODE = 64;
/** Rounds in which rows pull each other straight; with more the examples change by less than a pixel. */
const SWEEPS = 40;
const GAP = 16;

export type RoomOf = (part: GraphNode | GraphLink) => WordRoom;

interface Extent {
  readonly left: number;
  readonly right: number;
}

/** One system whose parts hang together. */
export class BlockLayout {
  readonly #graph: SystemGraph;
  readonly #rows: readonly Cell[][];
  readonly #x = new Map<Cell, number>();
  readonly #extents = new Map<Cell, Extent>();
  readonly #rooms = new Map<Cell, WordRoom>();
  readonly #ports = new Map<Cell, Map<Cell, number[]>>();

  /** @param roomOf what a statement's words take */
  constructor(graph: SystemGraph, block: Block, roomOf: RoomOf) {
    this.#graph = graph;
    this.#rows = block.rows;
    for (const cell of block.rows.flat()) {
      const { nodes, links } = graph;
      this.#rooms.set(cell, roomOf(cell.is === "node" ? nodes[cell.index] : links[cell.index]));
    }
    for (const cell of block.rows.flat())
      if (cell.is === "link") this.#extents.set(cell, this.#linkExtent(cell));
    for (const cell of block.rows.flat())
      if (cell.is === "node") this.#extents.set(cell, this.#nodeExtent(cell));
  }

  place(): Layout {
    this.#spreadRows();
    this.#setPorts();
    const left = Math.min(...this.#all().map((cell) => this.#at(cell) - this.#extent(cell).left));
    const right = Math.max(...this.#all().map((cell) => this.#at(cell) + this.#extent(cell).right));
    for (const cell of this.#all()) this.#x.set(cell, this.#at(cell) - left);
    for (const ports of this.#ports.values()) {
      for (const list of ports.values()) for (let i = 0; i < list.length; i++) list[i] -= left;
    }
    return this.#stack(right - left);
  }

  #all(): Cell[] {
    return this.#rows.flat();
  }
  #at(cell: Cell): number {
    return this.#x.get(cell) as number;
  }
  #extent(cell: Cell): Extent {
    return this.#extents.get(cell) as Extent;
  }
  #room(cell: Cell): WordRoom {
    return this.#rooms.get(cell) as WordRoom;
  }

  #linkExtent(cell: Cell): Extent {
    const { keyword, ends } = this.#graph.links[cell.index];
    if (keyword === "pendulum") return { left: 8, right: 8 };
    // What joins two of one layer lies flat and is wider.
    const level = ends.length > 1 && cell.joined.every(({ row }) => row === cell.joined[0].row);
    const half = level ? SYMBOL / 2 + 4 : SYMBOL_HALF;
    return { left: half, right: half + WORDS_GAP + this.#room(cell).width };
  }

  #nodeExtent(cell: Cell): Extent {
    const { keyword } = this.#graph.nodes[cell.index];
    const { width } = this.#room(cell);
    if (keyword === "junction") return { left: 7, right: 7 + WORDS_GAP + width };
    const own = keyword === "pendulum" ? width + 62 : width + 20;
    const sides = [cell.row - 1, cell.row + 1].map((row) => {
      const links = [...new Set(cell.joined)].filter((link) => link.row === row);
      return Math.max(Math.min(WIDEST_NODE, this.#spanOf(links)), this.#namedPorts(cell, links));
    });
    const half = Math.max(LEAST_NODE, own, ...sides) / 2;
    return { left: half, right: half };
  }

  /** Width that the names of points take on one side of a body. */
  #namedPorts(node: Cell, links: readonly Cell[]): number {
    const ends = links.flatMap((link) => this.#graph.links[link.index].ends);
    const own = ends.filter((end) => end.node === node.index && end.isPoint);
    return own.reduce((sum, { at }) => sum + nameWidth(at) + 10, 2 * PORT_PAD);
  }

  /** Width of a node under which its links of one side could stand straight. */
  #spanOf(links: readonly Cell[]): number {
    let span = 2 * PORT_PAD;
    for (let i = 0; i + 1 < links.length; i++) {
      span += this.#extent(links[i]).right + this.#extent(links[i + 1]).left + GAP;
    }
    return span;
  }

  #apart(row: readonly Cell[]): number[] {
    return row.slice(1).map((cell, i) => this.#extent(row[i]).right + this.#extent(cell).left + GAP);
  }

  #spreadRows(): void {
    for (const row of this.#rows)
      this.#set(
        row,
        row.map(() => 0),
      );
    const widest = this.#widestRow();
    for (let sweep = 0; sweep < SWEEPS; sweep++) {
      for (const row of sweep % 2 === 0 ? this.#rows : [...this.#rows].reverse()) {
        // In the end one row stands still, or all would wander, and those far from it lag behind.
        if (sweep >= SWEEPS / 2 && row === widest) continue;
        this.#set(
          row,
          row.map((cell) => (cell.is === "node" ? this.#wantedByNode(cell) : this.#wantedByLink(cell))),
        );
      }
    }
    for (let k = 0; k < this.#rows.length; k += 2) {
      this.#set(
        this.#rows[k],
        this.#rows[k].map((cell) => this.#wantedByLink(cell)),
      );
    }
  }

  #widestRow(): Cell[] | undefined {
    const widths = this.#rows.map((row) =>
      row.reduce((sum, cell) => sum + this.#extent(cell).left + this.#extent(cell).right, 0),
    );
    return this.#rows[widths.indexOf(Math.max(...widths))];
  }

  #set(row: readonly Cell[], wanted: readonly number[]): void {
    const places = spread(wanted, this.#apart(row));
    row.forEach((cell, i) => {
      this.#x.set(cell, places[i]);
    });
  }

  /** In the middle above or below what it holds, counting words as part of it. */
  #wantedByNode(cell: Cell): number {
    if (cell.joined.length === 0) return this.#at(cell);
    const places = cell.joined.map((link) => this.#at(link));
    return (Math.min(...places) + Math.max(...places)) / 2;
  }

  /** Between its nodes, and where it can stand straight if there is such a place. */
  #wantedByLink(cell: Cell): number {
    const spans = cell.joined.map((node) => {
      const { left, right } = this.#extent(node);
      const pad = this.#graph.nodes[node.index].keyword === "junction" ? 7 : PORT_PAD;
      return [this.#at(node) - left + pad, this.#at(node) + (pad === 7 ? 0 : right - pad)] as const;
    });
    const middle = spans.reduce((sum, [from, to]) => sum + (from + to) / 2, 0) / spans.length;
    const from = Math.max(...spans.map(([start]) => start));
    const to = Math.min(...spans.map(([, end]) => end));
    return from <= to ? Math.max(from, Math.min(to, middle)) : middle;
  }

  #setPorts(): void {
    for (const cell of this.#all()) {
      if (cell.is !== "node") continue;
      for (const row of [cell.row - 1, cell.row + 1]) this.#setSide(cell, row);
    }
  }

  #setSide(node: Cell, row: number): void {
    const { keyword } = this.#graph.nodes[node.index];
    const { left, right } = this.#extent(node);
    const at = this.#at(node);
    const wanted = [...new Set(node.joined)]
      .filter((link) => link.row === row)
      // A link with both ends on one node meets it left and right of its middle.
      .flatMap((link) => this.#wantedPorts(node, link))
      .sort((a, b) => a.x - b.x);
    // The name of a point stays inside its body.
    const pad = (port: { readonly half: number } | undefined) => Math.max(PORT_PAD, (port?.half ?? 0) + 2);
    const inside: [number, number] =
      keyword === "junction"
        ? [at, at]
        : [at - left + pad(wanted[0]), at + right - pad(wanted[wanted.length - 1])];
    const apart = wanted.slice(1).map((port, i) => Math.max(12, port.half + wanted[i].half));
    const places = spreadInside(
      wanted.map(({ x }) => x),
      apart,
      inside,
    );
    wanted.forEach(({ link }, i) => {
      const mine = this.#ports.get(link) ?? new Map<Cell, number[]>();
      this.#ports.set(link, mine);
      mine.set(node, [...(mine.get(node) ?? []), places[i]]);
    });
  }

  #wantedPorts(node: Cell, link: Cell): { x: number; half: number; link: Cell }[] {
    const { ends } = this.#graph.links[link.index];
    const own = ends.filter((end) => end.node === node.index);
    const level = ends.length > 1 && link.joined.every(({ row }) => row === node.row);
    return own.map((end, i) => {
      const shift = level ? this.#levelShift(link, node, own.length, i) : 0;
      const half = end.isPoint ? nameWidth(end.at) / 2 + 4 : 0;
      return { x: this.#at(link) + shift, half, link };
    });
  }

  /** Ends of a flat symbol: left for the node further left. */
  #levelShift(link: Cell, node: Cell, count: number, i: number): number {
    if (count > 1) return (i === 0 ? -1 : 1) * (SYMBOL / 2 + 2);
    const others = link.joined.filter((each) => each !== node);
    const isLeft = others.every((other) => other.order > node.order);
    return (isLeft ? -1 : 1) * (SYMBOL / 2 + 2);
  }

  /** Heights from the bottom up, then y downwards; what is too high is folded into columns. */
  #stack(width: number): Layout {
    const heights = this.#rows.map((row) =>
      row.length === 0 ? 0 : row[0].is === "node" ? this.#nodeRow(row) : this.#linkRow(row),
    );
    const columns = columnsOf(heights, width);
    const height = Math.max(...columns.map((column) => heightOf(column, heights)));
    const nodes: PlacedNode[] = [];
    const links: PlacedLink[] = [];
    columns.forEach(({ from, to }, index) => {
      const placed = new Map<Cell, PlacedNode>();
      const dx = index * (width + BLOCK_GAP);
      const bottoms = heights.map((_, row) => height - heightOf({ from, to: row - 1 }, heights));
      const cells = this.#rows.slice(from, to + 1).flat();
      for (const cell of cells) {
        if (cell.is !== "node") continue;
        const node = this.#placedNode(cell, bottoms[cell.row], heights[cell.row]);
        placed.set(cell, { ...node, x: node.x + dx, isCopy: index > 0 && cell.row === from });
      }
      for (const cell of cells)
        if (cell.is === "link") links.push(this.#placedLink(cell, bottoms[cell.row], dx, placed));
      nodes.push(...placed.values());
    });
    return { width: columns.length * (width + BLOCK_GAP) - BLOCK_GAP, height, nodes, links };
  }

  #nodeRow(row: readonly Cell[]): number {
    return Math.max(...row.map((cell) => nodeHeight(this.#graph.nodes[cell.index], this.#room(cell))));
  }

  #linkRow(row: readonly Cell[]): number {
    const { below, above } = this.#zones(row);
    return below + SYMBOL + above;
  }

  /** Room for the leads below and above the symbols of a row: the further aside they lead, the more. */
  #zones(row: readonly Cell[]): { below: number; above: number } {
    const aside = { below: 0, above: 0 };
    for (const cell of row) {
      for (const [node, places] of this.#ports.get(cell) ?? []) {
        const side = node.row < cell.row ? "below" : "above";
        for (const place of places) aside[side] = Math.max(aside[side], Math.abs(place - this.#at(cell)));
      }
    }
    const zone = (reach: number): number => 14 + Math.min(60, 0.15 * Math.max(0, reach - 30));
    const top = row[0]?.row === this.#rows.length - 1;
    const bottom = row[0]?.row === 0;
    return { below: bottom ? 14 : zone(aside.below), above: top ? 4 : zone(aside.above) };
  }

  /** All of a row are equally high, so that no lead has to pass the corner of a neighbour. */
  #placedNode(cell: Cell, bottom: number, height: number): PlacedNode {
    const node = this.#graph.nodes[cell.index];
    const { left, right } = this.#extent(cell);
    const at = this.#at(cell);
    const width = node.keyword === "junction" ? 14 : left + right;
    return { node, room: this.#room(cell), isCopy: false, x: at - left, y: bottom - height, width, height };
  }

  #placedLink(cell: Cell, bottom: number, dx: number, nodes: ReadonlyMap<Cell, PlacedNode>): PlacedLink {
    const link = this.#graph.links[cell.index];
    const taken = new Map<Cell, number>();
    const ports = link.ends.map((end): Port => {
      const node = cell.joined.find(({ index }) => index === end.node) as Cell;
      const count = taken.get(node) ?? 0;
      taken.set(node, count + 1);
      const box = nodes.get(node) as PlacedNode;
      const side = node.row < cell.row ? "above" : "below";
      const x = dx + (this.#ports.get(cell)?.get(node)?.[count] ?? this.#at(cell));
      const edge = side === "above" ? box.y : box.y + box.height;
      return {
        x,
        y: edge,
        node: end.node,
        side,
        point: end.isPoint ? end.at : "",
      };
    });
    const y = bottom - this.#zones(this.#rows[cell.row]).below - SYMBOL / 2;
    return { link, room: this.#room(cell), x: dx + this.#at(cell), y, ports, groundY: bottom };
  }
}

const heightOf = ({ from, to }: Column, heights: readonly number[]): number =>
  heights.slice(from, to + 1).reduce((sum, each) => sum + each, 0);

/** Height of a node's symbol by keyword; labels stand inside but for junctions and supports. */
function nodeHeight({ keyword, points }: GraphNode, { lines }: WordRoom): number {
  if (keyword === "junction") return 18;
  if (keyword === "support") return 34;
  if (keyword === "pendulum") return Math.max(64, lines * LINE_HEIGHT + 16);
  const pointLines = keyword === "body" && points.length > 0 ? 2 * LINE_HEIGHT : 0;
  return Math.max(34, lines * LINE_HEIGHT + 12) + pointLines;
}
