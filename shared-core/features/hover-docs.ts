/** Reference text for words of the language, from the vocabulary. */
import type { Motion } from "../mechanics/assembly.ts";
import type { HeadPart } from "../syntax/grammar.ts";
import type {
  DetailContent,
  DetailDescription,
  Measure,
  QuantityDescription,
  StatementDescription,
} from "../vocabulary/description.ts";
import { type FunctionDescription, signature } from "../vocabulary/functions.ts";
import { unitsOf, wordsOf } from "../vocabulary/measures.ts";
import { type Block, lines, type Phrase } from "./readout.ts";

/** A keyword: its form, what it is for, the text of its page, its details. */
export function statementDocs(description: StatementDescription): readonly Block[] {
  const { says, text, details, keys = [], quantities, notYet } = description;
  return [
    { kind: "code", text: formOf(description) },
    lines(says, notYet ? NOT_YET : undefined),
    { kind: "prose", markdown: text },
    lines(
      named(
        "details",
        details.map(({ key }) => key),
      ),
      named(
        "keys",
        keys.map(({ key }) => key),
      ),
      named(
        "quantities",
        quantities.map(({ name }) => name),
      ),
    ),
  ];
}

const NOT_YET = "It is read and checked; this version does not compute it.";

const named = (what: string, names: readonly string[]): Phrase | undefined =>
  names.length === 0 ? undefined : `${what}: ${names.map((name) => `\`${name}\``).join(", ")}`;

/** `spring NAME between A and B = STIFFNESS`. */
export function formOf({ keyword, variant, grammar, principal }: StatementDescription): string {
  const head = grammar.head.map((part) => partForm(part, variant)).filter((part) => part !== "");
  const value = principal === undefined ? "VALUE" : principal.toUpperCase();
  const tail = { none: "", optional: ` [= ${value}]`, required: ` = ${value}` }[grammar.value];
  return `${[keyword, ...head].join(" ")}${tail}`;
}

function partForm(part: HeadPart, variant: string | undefined): string {
  switch (part.kind) {
    case "word":
      return part.word;
    case "choice":
      return variant ?? part.slot.toUpperCase();
    case "text":
      return '"…"';
    case "parameters":
      return "(…)";
    case "call":
      return "KIT(…)";
    case "tuple":
      return "(x, y, z)";
    case "either":
      return part.ways.map((way) => way.map((each) => partForm(each, variant)).join(" ")).join(" | ");
    default:
      return "optional" in part && part.optional ? `[${part.slot.toUpperCase()}]` : part.slot.toUpperCase();
  }
}

/** A detail: what it holds, as it would be typed, what holds where it is left out. */
export function detailDocs(detail: DetailDescription, motion: Motion = "sliding"): readonly Block[] {
  const { key, says, example, standard, required, notYet } = detail;
  return [
    { kind: "code", text: `${key} = ${example}` },
    lines(
      says,
      contentSays(detail.content, motion),
      standard === undefined ? undefined : `left out: ${standard}`,
      required ? "it may not be left out" : undefined,
      notYet ? NOT_YET : undefined,
    ),
  ];
}

function contentSays(content: DetailContent, motion: Motion): Phrase | undefined {
  switch (content.is) {
    case "quantity":
      return `${measureSays(content.measure, motion)}${content.positive ? ", above zero" : ""}${content.orRange ? ", or a range" : ""}`;
    case "tuple":
      return `${content.components.join(", ")}: ${measureSays(content.measure, motion)}`;
    case "at":
      return `${measureSays(content.measure, motion)}, at a rate`;
    case "range":
      return `a range of ${measureSays(content.measure, motion)}`;
    case "law":
      return `${measureSays(content.measure, motion)} as an expression in ${content.variables.join(", ")}`;
    case "word":
      return `one of ${content.words.map((word) => `\`${word}\``).join(", ")}`;
    case "words":
      return `some of ${content.words.map((word) => `\`${word}\``).join(", ")}`;
    case "table":
      return `rows of ${content.columns.map(({ name }) => name).join(", ")}${content.orFile ? ", or a file" : ""}`;
    default:
      return undefined;
  }
}

/** `a stiffness, in N/mm, kN/m, N/m`. */
export function measureSays(measure: Measure, motion: Motion = "sliding"): Phrase {
  const units = unitsOf(measure, motion);
  return units.length === 0
    ? wordsOf(measure, motion)
    : `${wordsOf(measure, motion)}, in ${units.join(", ")}`;
}

export function quantityDocs(name: string, quantity: QuantityDescription, motion?: Motion): readonly Block[] {
  return [lines(`\`${name}\`: ${quantity.says}`, measureSays(quantity.measure, motion))];
}

/** A function: its signature, what it computes, its arguments, formula, range and source. */
export function functionDocs(fn: FunctionDescription): readonly Block[] {
  const { says, parameters, formula, validity, source, example, notYet } = fn;
  return [
    { kind: "code", text: signature(fn) },
    lines(says, notYet ? NOT_YET : undefined),
    lines(
      ...parameters.map((parameter) => parameterSays(fn, parameter.name)),
      formula === undefined ? undefined : `formula: \`${formula}\``,
      validity === undefined ? undefined : `holds for: ${validity}`,
      source === undefined ? undefined : `source: ${source}`,
    ),
    { kind: "code", text: example },
  ];
}

/** One argument of a function. */
export function parameterSays(fn: FunctionDescription, name: string): Phrase | undefined {
  const parameter = fn.parameters.find((each) => each.name === name);
  if (parameter === undefined) return undefined;
  const { content, says, standard } = parameter;
  const motion = content.is === "number" ? content.motions?.[0] : undefined;
  const measure = content.is === "number" ? ` (${measureSays(content.measure, motion)})` : "";
  return `\`${name}\`: ${says}${measure}${standard === undefined ? "" : `, ${standard} where it is left out`}`;
}

/** Words that no table of the vocabulary holds. */
export const WORDS: ReadonlyMap<string, Phrase> = new Map([
  ["thrum", "The number of the language that the file is written in; this build reads version 1."],
  ["normal", "The band is three standard deviations of a normal distribution."],
  ["lognormal", "The band is three standard deviations of the logarithm."],
  ["uniform", "Every value of the band is as likely; this holds where nothing is said."],
  ["within", "The range in which tuning, fitting and the knobs of the sheet may move the number."],
  ["as", "States the unit of a bare number or of a rate, or the unit in which a value is shown."],
  ["at", "The rate at which the share in front of it holds, or the place of a mount or point."],
  ["between", "The two ends, A and B. Travel is A minus B; a positive force pulls them together."],
  ["pi", "Circumference of a circle over its diameter, 3.14159265…"],
  ["e", "Base of the natural logarithm, 2.71828182…"],
  ["t", "Time, in a law of a drive."],
  ["travel", "Displacement of A minus that of B, in a law of an element."],
  ["rate", "Rate of travel in a law of an element; in a law of a torque the plain angular 1/s."],
  ["ground", "A support of every kind that is always there and stands still."],
  ["if", "`if(condition, then, else)`: only the branch that holds is evaluated."],
  ["and", "Both conditions hold."],
  ["or", "One of the conditions holds, or both."],
  ["not", "The condition does not hold."],
]);

/** Pages that belong to no statement, relative to docs/. */
export const PAGES = {
  numbers: "language.md#2-numbers",
  /** What the reference holds; where a word may belong to several statements. */
  reference: "reference/README.md",
  kits: "reference/kit.md",
  functions: "reference/functions.md",
  units: "reference/units.md",
} as const;

/** The reference page of a statement, of each kind of ask its own. */
export const statementPage = ({ keyword, variant }: StatementDescription): string =>
  variant === undefined && keyword === "ask"
    ? PAGES.reference
    : `reference/${variant === undefined ? keyword : `${keyword}-${variant}`}.md`;

/** The page of a message that can be accepted. */
export const diagnosticPage = (code: string): string => `diagnostics/${code}.md`;
