/** Where everything of a drawing stands, in pixels, y downwards; from names and joints only. */
import { BlockLayout, type RoomOf } from "./block-layout.ts";
import type { SystemGraph } from "./graph.ts";
import { BLOCK_GAP, type Layout, type PlacedLink, type PlacedNode } from "./placed.ts";
import { blocksOf } from "./rows.ts";

const MARGIN = 14;
/** Blocks stand side by side up to this width. */
const PAGE = 820;

export function layoutSystem(graph: SystemGraph, roomOf: RoomOf): Layout {
  const blocks = blocksOf(graph).map((block) => new BlockLayout(graph, block, roomOf).place());
  const nodes: PlacedNode[] = [];
  const links: PlacedLink[] = [];
  let [x, y, tallest, widest] = [MARGIN, MARGIN, 0, 0];
  for (const line of linesOf(blocks)) {
    tallest = Math.max(...line.map(({ height }) => height));
    for (const block of line) {
      // Blocks of a line stand on one level.
      const [dx, dy] = [x, y + tallest - block.height];
      nodes.push(...block.nodes.map((node) => ({ ...node, x: node.x + dx, y: node.y + dy })));
      links.push(...block.links.map((link) => moved(link, dx, dy)));
      x += block.width + BLOCK_GAP;
    }
    widest = Math.max(widest, x - BLOCK_GAP);
    [x, y] = [MARGIN, y + tallest + BLOCK_GAP];
  }
  const height = blocks.length === 0 ? 2 * MARGIN : y - BLOCK_GAP + MARGIN;
  return { width: widest + MARGIN, height, nodes, links };
}

function linesOf(blocks: readonly Layout[]): Layout[][] {
  const lines: Layout[][] = [];
  let width = Number.POSITIVE_INFINITY;
  for (const block of blocks) {
    if (width + block.width > PAGE) {
      lines.push([]);
      width = 0;
    }
    lines[lines.length - 1].push(block);
    width += block.width + BLOCK_GAP;
  }
  return lines;
}

function moved(link: PlacedLink, dx: number, dy: number): PlacedLink {
  const ports = link.ports.map((port) => ({ ...port, x: port.x + dx, y: port.y + dy }));
  return { ...link, x: link.x + dx, y: link.y + dy, groundY: link.groundY + dy, ports };
}
