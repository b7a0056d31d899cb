/** Blocks as plain text, for clients that show no Markdown and for readers who see no pictures. */
import { tableLines } from "../writing/table.ts";
import { type Block, withoutEmpty } from "./readout.ts";

export function textOf(blocks: readonly Block[]): string {
  return withoutEmpty(blocks)
    .map((block) => blockLines(block).join("\n"))
    .join("\n\n");
}

function blockLines(block: Block): readonly string[] {
  switch (block.kind) {
    case "title":
      return [`${block.keyword} ${block.name}${block.tail === undefined ? "" : ` · ${block.tail}`}`];
    case "code":
      return [block.text];
    case "lines":
      return block.lines;
    case "prose":
      return [block.markdown];
    case "table":
      return tableLines(block.columns, block.rows);
    case "notes":
      return block.lines.map((line) => `> ${line}`);
    case "plot":
      return [...block.plot.text, block.plot.says];
  }
}
