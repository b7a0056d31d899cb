import type { Span } from "../text/span.ts";

/**
 * What is said to a person at a place of the text, as plain data. A phrase is text for people in which names of
 * the model stand between backticks, as they do in messages.
 */
export type Phrase = string;

export type Block =
  /** `spring mounts · 4 of 26.5 N/mm`. */
  | { readonly kind: "title"; readonly keyword: string; readonly name: string; readonly tail?: Phrase }
  /** Text of the language: a form, a signature. */
  | { readonly kind: "code"; readonly text: string }
  /** Each on a line of its own. */
  | { readonly kind: "lines"; readonly lines: readonly Phrase[] }
  /** Markdown of Thrum's own pages; never text of a model. */
  | { readonly kind: "prose"; readonly markdown: string }
  | { readonly kind: "table"; readonly columns: readonly TableColumn[]; readonly rows: readonly Phrase[][] }
  /** What the author wrote above a statement. */
  | { readonly kind: "notes"; readonly lines: readonly Phrase[] }
  | { readonly kind: "plot"; readonly plot: Plot };

export interface TableColumn {
  readonly head: string;
  /** Numbers stand at the right, words at the left. */
  readonly align: "left" | "right";
}

/** A small picture, once for surfaces that show pictures and once for those that show text. */
export interface Plot {
  /** Stands alone; readable on light and dark grounds. */
  readonly svg: string;
  /** Lines of characters of one width. */
  readonly text: readonly string[];
  /** One sentence for readers who see neither. */
  readonly says: string;
}

/** What a hover shows. `markdown` holds pictures as data, `text` draws them with characters. */
export interface Hover {
  readonly span: Span;
  readonly markdown: string;
  readonly text: string;
  /** The page that says more, relative to docs/: `reference/spring.md`. */
  readonly page?: string;
}

/** A number at the right of its column. */
export const numeric = (head: string): TableColumn => ({ head, align: "right" });
export const wordy = (head: string): TableColumn => ({ head, align: "left" });

export const lines = (...phrases: readonly (Phrase | undefined)[]): Block => ({
  kind: "lines",
  lines: phrases.filter((phrase) => phrase !== undefined),
});

/** Blocks that say something. */
export function withoutEmpty(blocks: readonly Block[]): readonly Block[] {
  return blocks.filter((block) => {
    if (block.kind === "lines" || block.kind === "notes") return block.lines.length > 0;
    return block.kind !== "table" || block.rows.length > 0;
  });
}
