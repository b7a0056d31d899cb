/** What stands where in a drawing, in pixels, y downwards. */
import type { GraphLink, GraphNode } from "./graph.ts";
import type { WordRoom } from "./words.ts";

export interface PlacedNode {
  readonly node: GraphNode;
  readonly room: WordRoom;
  /** It stands elsewhere already: a high drawing is folded here. */
  readonly isCopy: boolean;
  /** Of the symbol. */
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Where a link meets a node. */
export interface Port {
  readonly x: number;
  readonly y: number;
  /** Index of the node in the graph. */
  readonly node: number;
  /** Above its node, or below it. */
  readonly side: "above" | "below";
  /** Name of a point of a body, written inside beside the port. */
  readonly point: string;
}

export interface PlacedLink {
  readonly link: GraphLink;
  readonly room: WordRoom;
  /** Middle of the symbol. */
  readonly x: number;
  readonly y: number;
  /** In the order of `link.ends`. */
  readonly ports: readonly Port[];
  /** Level of ground below it, for a link that ends there. */
  readonly groundY: number;
}

export interface Layout {
  readonly width: number;
  readonly height: number;
  readonly nodes: readonly PlacedNode[];
  readonly links: readonly PlacedLink[];
}

/** Height of every symbol between two nodes. */
export const SYMBOL = 46;
/** Half its width. */
export const SYMBOL_HALF = 13;
/** Between systems, and between the columns of a folded one. */
export const BLOCK_GAP = 36;
