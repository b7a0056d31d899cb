import type { HeadPart } from "../syntax/grammar.ts";
import type { StatementDescription } from "../vocabulary/description.ts";
import type { Word } from "./complete-line.ts";

/** Where in a head the cursor stands, from the words behind its keyword. */
export type HeadSpot =
  /** This part comes next. */
  | { readonly is: "part"; readonly part: HeadPart }
  /** A direction behind the dot of a place. */
  | { readonly is: "member"; readonly path: readonly string[]; readonly slot: string }
  /** Inside the parentheses of a part. */
  | { readonly is: "inside"; readonly part: HeadPart; readonly words: readonly Word[] }
  | { readonly is: "equals" }
  /** Behind the `=`; the words of the value. */
  | { readonly is: "value"; readonly words: readonly Word[] }
  | { readonly is: "lost" };

const LOST: HeadSpot = { is: "lost" };

export function headSpot({ grammar }: StatementDescription, words: readonly Word[]): HeadSpot {
  const spot = walk(grammar.head, words);
  if (!Array.isArray(spot)) return spot as HeadSpot;
  const rest = spot as readonly Word[];
  const last = grammar.head.at(-1);
  if (rest.length === 0 && last?.kind === "tuple") {
    // Its unit may stand behind the parenthesis.
    return { is: "inside", part: last, words: words.slice(words.findLastIndex(({ text }) => text === "(")) };
  }
  if (grammar.value === "none") return LOST;
  if (rest.length === 0) return { is: "equals" };
  return rest[0].text === "=" ? { is: "value", words: rest.slice(1) } : LOST;
}

/** The spot, or the words that are left behind all parts. */
function walk(parts: readonly HeadPart[], words: readonly Word[]): HeadSpot | readonly Word[] {
  let rest = words;
  for (const [i, part] of parts.entries()) {
    if (part.kind === "either") return walkEither(part, parts.slice(i + 1), rest);
    if (part.kind === "parameters" && rest[0]?.text !== "(") continue;
    if (part.kind === "name" && part.optional && rest.length > 0 && rest[0].kind !== "name") continue;
    if (rest.length === 0) return { is: "part", part };
    const next = behind(part, rest);
    if (!Array.isArray(next)) return next as HeadSpot;
    rest = next;
  }
  return rest;
}

function walkEither(
  part: Extract<HeadPart, { kind: "either" }>,
  after: readonly HeadPart[],
  words: readonly Word[],
): HeadSpot | readonly Word[] {
  if (words.length === 0) return { is: "part", part };
  const way = part.ways.find(([first]) => first?.kind === "word" && first.word === words[0].text);
  return way ? walk([...way, ...after], words) : LOST;
}

/** The words behind a part. */
function behind(part: HeadPart, words: readonly Word[]): HeadSpot | readonly Word[] {
  const [first] = words;
  switch (part.kind) {
    case "word":
      return first.text === part.word ? words.slice(1) : LOST;
    case "place":
      return behindPath(part, words);
    case "name":
    case "choice":
      return first.kind === "name" ? words.slice(1) : LOST;
    case "text":
      return first.kind === "string" ? words.slice(1) : LOST;
    case "call":
      return first.kind === "name" ? behindParenthesis(part, words, 1) : LOST;
    case "parameters":
    case "tuple":
      return behindParenthesis(part, words, 0);
    case "either":
      return LOST;
  }
}

function behindPath(
  part: Extract<HeadPart, { kind: "place" }>,
  words: readonly Word[],
): HeadSpot | readonly Word[] {
  if (words[0].kind !== "name") return LOST;
  const path = [words[0].text];
  let i = 1;
  for (; words[i]?.text === "."; i += 2) {
    if (words[i + 1] === undefined) return { is: "member", path, slot: part.slot };
    path.push(words[i + 1].text);
  }
  return words.slice(i);
}

/** From `(` to its `)`; `skip` words stand in front of it. */
function behindParenthesis(part: HeadPart, words: readonly Word[], skip: number): HeadSpot | readonly Word[] {
  if (words[skip]?.text !== "(") return skip > 0 ? words.slice(skip) : LOST;
  let depth = 0;
  for (let i = skip; i < words.length; i++) {
    if (words[i].text === "(") depth++;
    if (words[i].text === ")" && --depth === 0) return words.slice(i + 1);
  }
  return { is: "inside", part, words };
}
