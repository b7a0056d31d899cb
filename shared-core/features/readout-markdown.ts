/**
 * Blocks as Markdown. Whatever comes from the file of a model is escaped, so that a note can neither load a
 * picture nor start a heading.
 */
import { type Block, type Phrase, type Plot, withoutEmpty } from "./readout.ts";
import { base64 } from "./readout-base64.ts";

export function markdownOf(blocks: readonly Block[]): string {
  return withoutEmpty(blocks).map(blockMarkdown).join("\n\n");
}

/** A phrase as Markdown: names between backticks as code, everything else as it reads. */
export function phraseMarkdown(phrase: Phrase): string {
  const parts = phrase.replace(BREAKS, " ").split("`");
  // A backtick without a partner is text.
  const paired = parts.length % 2 === 1 ? parts.length : parts.length - 1;
  return parts
    .map((part, i) => {
      if (i >= paired) return `\\\`${escaped(part)}`;
      if (i % 2 === 0) return i === 0 ? escaped(part).replace(LINE_START, "$1\\$2") : escaped(part);
      return part.trim() === "" ? `\\\`${part}\\\`` : `\`${part.replaceAll("|", "\\|")}\``;
    })
    .join("");
}

/** Any character that ends a line or steers a terminal. */
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is to be left out
const BREAKS = /[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g;
const SPECIAL = /[\\*_[\]<>&|~#$]/g;
/** What would start a list, a quotation or an underlined heading. */
const LINE_START = /^(\s*\d*)([-+=.)])(?=\s|$|[-=])/;

const escaped = (text: string): string => text.replace(SPECIAL, "\\$&");

function blockMarkdown(block: Block): string {
  switch (block.kind) {
    case "title": {
      const tail = block.tail === undefined ? "" : ` · ${phraseMarkdown(block.tail)}`;
      return `**${escaped(block.keyword)}** \`${block.name.replaceAll("`", "")}\`${tail}`;
    }
    case "code":
      return `\`\`\`thrum\n${block.text.replaceAll("```", "")}\n\`\`\``;
    case "lines":
      return block.lines.map(phraseMarkdown).join("  \n");
    case "prose":
      return block.markdown;
    case "table":
      return tableMarkdown(block);
    case "notes":
      return block.lines.map((line) => `> ${phraseMarkdown(line)}`).join("  \n");
    case "plot":
      return pictureMarkdown(block.plot);
  }
}

function tableMarkdown({ columns, rows }: Extract<Block, { kind: "table" }>): string {
  const row = (cells: readonly string[]): string => `| ${cells.join(" | ")} |`;
  return [
    row(columns.map(({ head }) => phraseMarkdown(head))),
    row(columns.map(({ align }) => (align === "right" ? "---:" : ":---"))),
    ...rows.map((cells) => row(columns.map((_, c) => phraseMarkdown(cells[c] ?? "")))),
  ].join("\n");
}

function pictureMarkdown({ svg, says }: Plot): string {
  return `![${escaped(says.replace(BREAKS, " "))}](data:image/svg+xml;base64,${base64(svg)})`;
}
