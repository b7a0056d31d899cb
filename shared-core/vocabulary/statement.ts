import type { Motion } from "../mechanics/builder.ts";
import type { DetailGrammar, HeadPart, HeadValue } from "../syntax/grammar.ts";
import type { DetailContent, DetailDescription, Measure, StatementDescription } from "./description.ts";

/** A description with its grammar given as a head only; the rest follows from the details. */
export type StatementDraft = Omit<StatementDescription, "grammar"> & {
  readonly head: readonly HeadPart[];
  readonly value: HeadValue;
  readonly openDetails?: boolean;
  readonly holdsStatements?: boolean;
};

/** Completes a description with the grammar that follows from its head and details. */
export function statement(draft: StatementDraft): StatementDescription {
  const { head, value, openDetails, holdsStatements, ...description } = draft;
  const { keyword, principal, details } = description;
  return {
    ...description,
    grammar: {
      keyword,
      head,
      value,
      principal,
      details: details.map(detailGrammar),
      openDetails,
      holdsStatements,
    },
  };
}

export function detailGrammar({ key, content }: DetailDescription): DetailGrammar {
  return { key, rows: rowsOf(content) };
}

/** The name of the statement. */
export const NAME: HeadPart = { kind: "name", slot: "name" };

/** `between A and B`, slots a and b. */
export const BETWEEN: readonly HeadPart[] = [
  { kind: "word", word: "between" },
  { kind: "place", slot: "a" },
  { kind: "word", word: "and" },
  { kind: "place", slot: "b" },
];

/** A fixed word and a reference in the slot of that name: `on COORDINATE`. */
export const wordAndPlace = (word: string, slot = word): readonly HeadPart[] => [
  { kind: "word", word },
  { kind: "place", slot },
];

/** `at (x, y, z)`. */
export const AT_POINT: readonly HeadPart[] = [
  { kind: "word", word: "at" },
  { kind: "tuple", slot: "at" },
];

type Extra = Partial<Omit<DetailDescription, "key" | "content" | "says" | "example">>;

/** A detail that holds one number of a measure. */
export function amount(
  key: string,
  measure: Measure,
  says: string,
  example: string,
  extra: Extra & { readonly positive?: boolean; readonly orRange?: boolean } = {},
): DetailDescription {
  const { positive, orRange, ...rest } = extra;
  return { key, content: { is: "quantity", measure, positive, orRange }, says, example, ...rest };
}

/** A detail that holds one word of a list; the first is taken when it is left out, unless `standard` says otherwise. */
export function choice(
  key: string,
  words: readonly string[],
  says: string,
  extra: Extra = {},
): DetailDescription {
  return { key, content: { is: "word", words }, says, example: words[0], standard: words[0], ...extra };
}

/** A detail of any other content. */
export function detail(
  key: string,
  content: DetailContent,
  says: string,
  example: string,
  extra: Extra = {},
): DetailDescription {
  return { key, content, says, example, ...extra };
}

export const SLIDING: readonly Motion[] = ["sliding"];
export const TURNING: readonly Motion[] = ["turning"];
export const CHARGE: readonly Motion[] = ["charge"];

/** Lines of a text: an empty one parts two paragraphs. */
export function prose(...lines: readonly string[]): string {
  return lines
    .map((line) => (line === "" ? "\n\n" : line))
    .join(" ")
    .replace(/ ?\n\n ?/g, "\n\n");
}

function rowsOf(content: DetailContent): "table" | "list" | undefined {
  switch (content.is) {
    case "table":
      return "table";
    case "quantities":
    case "expressions":
    case "names":
    case "words":
    case "changes":
      return "list";
    default:
      return undefined;
  }
}
