/** Offers made of what fits: what is shown, what is typed, in which order. */

import type { Motion } from "../mechanics/builder.ts";
import { kindOfLet } from "../model/inspect.ts";
import type { HeadPart } from "../syntax/grammar.ts";
import type { StatementNode } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Kind } from "../units/dimension.ts";
import { unitFromText } from "../units/known-kinds.ts";
import { isNumber, NUMBER, RATE, sameKind } from "../units/quantity.ts";
import { formatNumber, siUnit } from "../units/show.ts";
import type {
  DetailDescription,
  Family,
  QuantityDescription,
  StatementDescription,
} from "../vocabulary/description.ts";
import { FUNCTIONS, type FunctionDescription, signature } from "../vocabulary/functions.ts";
import { dimensionOf, unitsOf } from "../vocabulary/measures.ts";
import { type Candidate, type Names, visible } from "./complete-names.ts";
import { fitsKind, type WantedNumber } from "./complete-wanted.ts";

export type CompletionKind =
  | Exclude<Family, "file" | "numbers">
  | "keyword"
  | "parameter"
  | "case"
  | "limit"
  | "kit"
  | "detail"
  | "unit"
  | "word"
  | "constant"
  | "function"
  | "quantity"
  | "component"
  | "file"
  | "tag";

export interface Completion {
  readonly label: string;
  readonly kind: CompletionKind;
  /** One line: `26.5 N/mm`, `between A and B = VALUE`. */
  readonly detail?: string;
  /** Markdown. */
  readonly documentation?: string;
  /** Plain text in place of `replace`. */
  readonly insert: string;
  /** The same with `$1`, `${1:…}` where the cursor goes; for editors that take snippets. */
  readonly snippet?: string;
  /** The word under the cursor, as far as the cursor. */
  readonly insertSpan: Span;
  /** The whole word under the cursor. */
  readonly replaceSpan: Span;
  /** Sorts by fit. */
  readonly sort: string;
  /** Read and checked, but not computed by this version. */
  readonly notYet?: boolean;
}

/** An offer before its place is known. */
export type Offer = Omit<Completion, "insertSpan" | "replaceSpan" | "sort" | "insert"> & {
  readonly insert?: string;
  /** 0 fits best. */
  readonly rank: number;
};

export function keywordOffers(all: readonly StatementDescription[], behind: string): readonly Offer[] {
  return all.map(({ keyword, says, snippet, notYet, grammar, example }) => ({
    label: keyword,
    kind: "keyword",
    detail: says,
    documentation: `\`\`\`thrum\n${example.trim().split("\n").slice(0, 12).join("\n")}\n\`\`\``,
    ...(behind === "" ? { snippet } : {}),
    notYet,
    rank: notYet ? 2 : grammar.head.length === 0 ? 1 : 0,
  }));
}

/** Kinds of an ask, each with its details. */
export function kindOffers(asks: readonly StatementDescription[], behind: string): readonly Offer[] {
  return asks.map(({ variant = "", says, snippet, notYet }) => ({
    label: variant,
    kind: "asks",
    detail: says,
    ...(behind === "" ? { snippet: snippet.replace(/^ask /, "") } : {}),
    notYet,
    rank: notYet ? 1 : 0,
  }));
}

export function detailOffers(
  details: readonly DetailDescription[],
  motions: readonly Motion[],
  behind: string,
): readonly Offer[] {
  return details.map((detail) => {
    const { key, says, standard, notYet, required } = detail;
    const rest = standard === undefined ? "" : `\n\nLeft out: ${standard}`;
    return {
      label: key,
      kind: "detail",
      detail: says,
      documentation: `\`${key} = ${detail.example}\`${rest}`,
      ...(behind === "" ? { snippet: `${key} = ${valueSnippet(detail, motions)}`, insert: `${key} = ` } : {}),
      notYet,
      rank: notYet ? 2 : required ? 0 : 1,
    };
  });
}

export function candidateOffers(candidates: readonly Candidate[], { model }: Names): readonly Offer[] {
  return candidates.map((each) => ({
    label: each.label,
    kind: kindOfCandidate(each),
    detail: headText(each, model.tree.text),
    rank: each.label === "ground" ? 1 : 0,
  }));
}

/** Numbers, functions and constants that fit; what fits exactly comes first. */
export function numberOffers(wanted: WantedNumber, names: Names, own?: StatementNode): readonly Offer[] {
  const lets = visible(names).filter(({ keyword, node, label }) => {
    if (keyword !== "let" || (node && node === own)) return false;
    return node === undefined || fitsKind(wanted, kindOfLet(names.model, label));
  });
  const functions = FUNCTIONS.filter((fn) => functionFits(fn, wanted));
  const bare = wanted.kinds === undefined || wanted.kinds.some(isNumber);
  const constants = bare ? CONSTANTS : [];
  return [
    ...candidateOffers([...lets, ...wanted.also], names),
    ...wanted.variables.map(
      (label): Offer => ({ label, kind: "constant", detail: VARIABLE_WORDS[label], rank: 0 }),
    ),
    ...functions.map((fn) => functionOffer(fn, wanted)),
    { ...IF, rank: 4 },
    ...constants.map(([label, detail]): Offer => ({ label, kind: "constant", detail, rank: 5 })),
  ];
}

export function unitOffers(units: readonly string[], blank: string): readonly Offer[] {
  return units.map((unit) => ({
    label: unit,
    kind: "unit",
    detail: unitText(unit),
    ...(blank === "" ? {} : { insert: blank + unit }),
    rank: 0,
  }));
}

export function quantityOffers(
  quantities: readonly QuantityDescription[],
  motion: Motion | undefined,
): readonly Offer[] {
  return quantities.map(({ name, measure, says }) => {
    const kind = dimensionOf(measure, motion ?? "sliding");
    const unit = kind ? siUnit(kind) : "1";
    return { label: name, kind: "quantity", detail: unit === "1" ? says : `${says}, in ${unit}`, rank: 0 };
  });
}

/** Arguments that are written with their names: `at: 20 Hz`. */
export const argumentOffers = (
  parameters: readonly { readonly name: string; readonly says: string }[],
): readonly Offer[] =>
  parameters.map(({ name, says }) => ({
    label: name,
    kind: "word",
    detail: says,
    insert: `${name}: `,
    rank: 0,
  }));

export const wordOffers = (words: readonly string[], detail?: string): readonly Offer[] =>
  words.map((label) => ({ label, kind: "word", detail, rank: 0 }));

export const componentOffers = (components: readonly string[]): readonly Offer[] =>
  components.map((label) => ({ label, kind: "component", detail: DIRECTION_WORDS[label], rank: 0 }));

/** The word that comes next in a head, or the words of a closed list. */
export function headPartWords(part: HeadPart): readonly string[] {
  if (part.kind === "word") return [part.word];
  if (part.kind === "choice") return part.choices;
  return part.kind === "either"
    ? part.ways.flatMap(([first]) => (first?.kind === "word" ? [first.word] : []))
    : [];
}

const CONSTANTS = [
  ["pi", "3.14159…"],
  ["e", "2.71828…"],
] as const;

const VARIABLE_WORDS: Readonly<Record<string, string>> = {
  t: "the time",
  travel: "the travel",
  rate: "the rate, a plain 1/s where it turns",
};

const DIRECTION_WORDS: Readonly<Record<string, string>> = {
  x: "along x",
  y: "along y",
  z: "along z",
  rx: "turning about x",
  ry: "turning about y",
  rz: "turning about z",
};

const IF: Omit<Offer, "rank"> = {
  label: "if",
  kind: "function",
  detail: "if(condition, then, else)",
  documentation: "The second value where the condition holds, else the third.",
  insert: "if(",
  snippet: "if($1, $2, $3)",
};

function functionFits(fn: FunctionDescription, { kinds, answers }: WantedNumber): boolean {
  if (fn.group === "answer" && !answers) return false;
  const { result } = fn;
  if (kinds === undefined) return true;
  if (result.is === "same" || result.is === "root" || result.is === "series") return true;
  const fits = (kind: Kind | undefined) => kind !== undefined && kinds.some((each) => sameKind(each, kind));
  if (result.is === "place") return fits(RATE) || fits(dimensionOf("time"));
  const motions: readonly Motion[] = result.motion ? [result.motion] : ["sliding", "turning"];
  return motions.some((motion) => fits(dimensionOf(result.measure, motion)));
}

function functionOffer(fn: FunctionDescription, { kinds, answers }: WantedNumber): Offer {
  const bare = kinds?.some((kind) => sameKind(kind, NUMBER)) ?? false;
  const general = fn.group === "math" ? (bare ? 2 : 3) : fn.group === "answer" || !answers ? 1 : 3;
  const { name, says, formula, validity, notYet, parameters, example } = fn;
  const more = [says, formula && `\`${formula}\``, validity, `As in \`${example}\``].filter((each) => each);
  return {
    label: name,
    kind: "function",
    detail: signature(fn),
    documentation: more.join("\n\n"),
    insert: parameters.length === 0 ? `${name}()` : `${name}(`,
    snippet: parameters.length === 0 ? `${name}()` : `${name}($1)`,
    notYet,
    rank: notYet ? 6 : general,
  };
}

function kindOfCandidate({ keyword, family }: Candidate): CompletionKind {
  if (keyword === "let") return "parameter";
  if (keyword === "case" || keyword === "limit" || keyword === "kit") return keyword;
  return family === "file" || family === "numbers" ? "parameter" : family;
}

/** The head of a statement without its name, for the line beside an offer. */
function headText({ node, keyword, label, file }: Candidate, text: string): string {
  if (label === "ground") return "the support that is always there";
  if (file !== undefined) return `${keyword}, in ${file}`;
  if (node === undefined) return keyword === "let" ? "a parameter of the kit" : "a place of the kit";
  const head = text.slice(node.headSpan.start, node.headSpan.end);
  return keyword === "let" ? head.replace(/^let\s+\S+\s*=\s*/, "") : head;
}

/** `1 N/mm is 1000 N/m`. */
function unitText(unit: string): string | undefined {
  try {
    const { factor, kind } = unitFromText(unit.replaceAll(/[()]/g, ""));
    const si = siUnit(kind);
    if (si === unit) return "SI unit";
    return `1 ${unit} is ${formatNumber(factor, 7)}${si === "1" ? "" : ` ${si}`}`;
  } catch {
    return undefined;
  }
}

/** What is typed behind `key =`, with its places. */
function valueSnippet({ content, example, key }: DetailDescription, motions: readonly Motion[]): string {
  switch (content.is) {
    case "word":
      return `\${1|${content.words.join(",")}|}`;
    case "quantity":
      return withUnit(
        example,
        content.measure === "any" ? [] : unitsOf(content.measure, motions[0] ?? "sliding"),
      );
    case "table":
      return `\n    \${1:${escaped(example)}}`;
    case "text":
      return content.file || key.endsWith("column")
        ? `"\${1:${escaped(example.replaceAll('"', ""))}}"`
        : `\${1:${escaped(example)}}`;
    default:
      return `\${1:${escaped(example)}}`;
  }
}

/** `${1:26.5} N/mm`: the number is the place, its unit stays; a unit for what does not fit is changed for one that does. */
function withUnit(example: string, units: readonly string[]): string {
  const [, number, unit] = /^(-?[\d.e-]+)(?: (.+))?$/.exec(example) ?? [];
  if (number === undefined) return `\${1:${escaped(example)}}`;
  if (unit === undefined) return `\${1:${number}}`;
  const fits = units.length === 0 || units.some((each) => likeUnit(each, unit));
  return `\${1:${number}} ${escaped(fits ? unit : units[0])}`;
}

function likeUnit(a: string, b: string): boolean {
  try {
    return sameKind(unitFromText(a).kind, unitFromText(b).kind);
  } catch {
    return false;
  }
}

const escaped = (text: string): string => text.replaceAll(/[\\$}]/g, (sign) => `\\${sign}`);
