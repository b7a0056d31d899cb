import { resolvePath } from "../model/files.ts";
import type { Model } from "../model/model.ts";
import type { StatementNode, TextNode } from "../syntax/tree.ts";
import { type Span, span } from "../text/span.ts";
import { describe, detailOf } from "../vocabulary/registry.ts";
import { everyStatement } from "./navigate-nodes.ts";
import type { View } from "./view.ts";

/** A path in the text, and the file it leads to. */
export interface DocumentLink {
  /** Without the quotes. */
  readonly span: Span;
  /** Relative to the same root as the path of the model itself. */
  readonly file: string;
  readonly kind: "model" | "record";
}

/** The paths of `use`, of records, and of tables that stand in a file. */
export function documentLinks({ model }: View): readonly DocumentLink[] {
  return pathsOf(model).map(({ node, kind }) => ({
    span: insideQuotes(node),
    file: resolvePath(model.file, node.text),
    kind,
  }));
}

/** Every text of a model that is the path of a file. */
export function pathsOf({
  tree,
}: Pick<Model, "tree">): readonly { node: TextNode; kind: DocumentLink["kind"] }[] {
  return [...everyStatement(tree)].flatMap((statement) => [
    ...usedPath(statement).map((node) => ({ node, kind: "model" as const })),
    ...recordPaths(statement).map((node) => ({ node, kind: "record" as const })),
  ]);
}

export const insideQuotes = ({ span: { start, end } }: TextNode): Span =>
  span(start + 1, Math.max(start + 1, end - 1));

const usedPath = ({ slots }: StatementNode): TextNode[] => (slots.path?.kind === "text" ? [slots.path] : []);

function recordPaths({ keyword, slots, details }: StatementNode): TextNode[] {
  const kind = slots.kind?.kind === "name" ? slots.kind.text : undefined;
  const description = describe(keyword.text, kind);
  return details.flatMap((detail) => {
    const content = description && detailOf(description, detail.key.text)?.content;
    const holdsFile = (content?.is === "text" && content.file) || (content?.is === "table" && content.orFile);
    return holdsFile ? detail.items.filter((item) => item.kind === "text") : [];
  });
}
