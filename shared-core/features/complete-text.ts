/** Offers inside notes and inside the quotes of a path. */
import { CODES } from "../diagnostics/codes.ts";
import { type Span, span } from "../text/span.ts";
import { detailOf } from "../vocabulary/registry.ts";
import { descriptionOf } from "./complete-context.ts";
import { ownersOf, type TypedLine } from "./complete-line.ts";
import type { Offer } from "./complete-offers.ts";
import { relativePath } from "./move.ts";

/** Tags people write, and the codes that can be accepted. */
export function noteOffers(line: TypedLine): readonly Offer[] {
  if (line.inside?.kind !== "note") return [];
  const written = line.tree.text.slice(line.inside.offset, line.offset);
  if (/^>[ \t]*accept[ \t]+[a-z-]*$/.test(written)) {
    const codes = Object.entries(CODES).filter(([, severity]) => severity !== "error");
    return codes.map(([label]) => ({ label, kind: "tag", insert: `${label}: `, rank: 0 }));
  }
  if (!/^>[ \t]*[\p{L}_]*$/u.test(written)) return [];
  return TAGS.map(([label, detail]) => ({
    label,
    kind: "tag",
    detail,
    insert: label === "accept" ? "accept " : `${label}: `,
    rank: 0,
  }));
}

export function noteSpan({ tree, offset, inside }: TypedLine): Span {
  const written = tree.text.slice(inside?.offset ?? offset, offset);
  const word = /[\p{L}_-]*$/u.exec(written)?.[0] ?? "";
  return span(offset - word.length, offset);
}

/** What a path is typed for. */
interface Files {
  /** Path of the model itself. */
  readonly own: string;
  readonly all: readonly string[];
}

/** Paths inside the quotes that are open, with the span they replace. */
export function textOffers(
  line: TypedLine,
  files: Files,
): { offers: readonly Offer[]; span: Span } | undefined {
  const { inside, tree, offset } = line;
  const keyword = line.words[0]?.text;
  const { statement } = ownersOf(line);
  const description = statement && descriptionOf(statement);
  const content = description && keyword !== undefined ? detailOf(description, keyword)?.content : undefined;
  const isRecord = (content?.is === "text" && content.file) || (content?.is === "table" && content.orFile);
  if (!inside || (keyword !== "use" && !isRecord)) return undefined;
  const closed = inside.length > 1 && tree.text[inside.offset + inside.length - 1] === '"';
  const end = closed ? inside.offset + inside.length - 1 : Math.max(offset, inside.offset + inside.length);
  const offers = fileOffers(files, keyword === "use", "", closed ? "" : '"');
  return { offers, span: span(inside.offset + 1, end) };
}

/** Paths with their quotes, where none is open yet. */
export const quotedOffers = (line: TypedLine, files: Files): readonly Offer[] =>
  fileOffers(files, line.words[0]?.text === "use", '"', '"');

function fileOffers(
  { own, all }: Files,
  models: boolean,
  opening: string,
  closing: string,
): readonly Offer[] {
  const fitting = all.filter((path) => path !== own && path.endsWith(".thrum") === models);
  return fitting.map((path) => {
    const label = relativePath(own, path);
    return { label, kind: "file", insert: opening + label.replaceAll('"', '""') + closing, rank: 0 };
  });
}

const TAGS = [
  ["source", "where the number comes from"],
  ["owner", "who answers for it"],
  ["checked", "who looked at it, and when"],
  ["accept", "silences a warning here, with its reason"],
] as const;
