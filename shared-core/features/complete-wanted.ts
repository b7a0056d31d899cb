/** What fits at a place of a value: numbers of a kind, names, quantities, words, units, files. */
import type { Motion } from "../mechanics/builder.ts";
import { drivesAsk, kindOfText } from "../model/inspect.ts";
import type { StatementNode } from "../syntax/tree.ts";
import { likelyUnits } from "../units/describe.ts";
import type { Kind } from "../units/dimension.ts";
import { KNOWN_KINDS, knownKind } from "../units/known-kinds.ts";
import { isNumber, NUMBER, RATE, sameKind } from "../units/quantity.ts";
import type { DetailContent, Measure } from "../vocabulary/description.ts";
import { argumentKinds, functionOf, type ParameterDescription } from "../vocabulary/functions.ts";
import { dimensionOf, unitsOf } from "../vocabulary/measures.ts";
import { type Candidate, coordinates, elements, motionsOf, type Names, visible } from "./complete-names.ts";
import { type OpenCall, parameterOf, type ValuePlace } from "./complete-value.ts";

export type Wanted =
  | { readonly is: "number"; readonly number: WantedNumber }
  | { readonly is: "names"; readonly candidates: readonly Candidate[] }
  /** Things with quantities; with `bare`, an element stands for its force. */
  | { readonly is: "quantities"; readonly bare: boolean }
  | { readonly is: "words"; readonly words: readonly string[] }
  | { readonly is: "unit"; readonly units: readonly string[] }
  /** Arguments that are written with their names, beside numbers where those fit too. */
  | {
      readonly is: "arguments";
      readonly parameters: readonly { readonly name: string; readonly says: string }[];
      readonly number?: WantedNumber;
    }
  | { readonly is: "file" }
  | { readonly is: "nothing" };

export interface WantedNumber {
  /** undefined: of any kind. */
  readonly kinds?: readonly Kind[];
  /** The likeliest first. */
  readonly units: readonly string[];
  /** Whether functions of the answers may stand here. */
  readonly answers: boolean;
  /** Variables of a law. */
  readonly variables: readonly string[];
  /** Names that fit beside numbers: drives where a range of rates is wanted. */
  readonly also: readonly Candidate[];
}

/** Where a value stands. */
export interface ValueContext {
  readonly names: Names;
  readonly statement?: StatementNode;
  readonly keyword: string;
  readonly askKind?: string;
  readonly content: DetailContent | { readonly is: "bind" } | { readonly is: "like"; readonly kind: Kind };
  readonly answers: boolean;
  readonly text: string;
}

const NOTHING: Wanted = { is: "nothing" };

/** What fits where the cursor stands in a value. */
export function wantedAt(context: ValueContext, place: ValuePlace): Wanted {
  const { call } = place;
  if (call) return wantedInCall(context, place, call);
  if (place.part === "tolerance") return toleranceOf(context, place);
  if (context.content.is === "bind") return byContent(context, place);
  if (place.sibling || place.inProduct) return number(context, kindsBeside(context, place));
  return place.part === "at" ? number(context, [RATE]) : byContent(context, place);
}

/** Units that fit numbers of these kinds, the likeliest first; of all kinds where none is named. */
export function unitsFor(
  kinds: readonly Kind[] | undefined,
  measure?: Measure,
  motions: readonly Motion[] = ["sliding"],
): readonly string[] {
  if (kinds === undefined) return ALL_UNITS;
  const likely = measure
    ? motions.flatMap((motion) => unitsOf(measure, motion))
    : kinds.flatMap((kind) => likelyUnits(kind));
  if (measure === "number" || kinds.every(isNumber)) return [...new Set(likely)];
  const scales = kinds.flatMap((kind) => {
    const known = knownKind(kind);
    return [...(known?.scales ?? []), ...(known?.inch ? [known.inch] : [])].map(({ text }) => text);
  });
  return [...new Set([...likely, ...scales])].filter((unit) => unit !== "1");
}

const ALL_UNITS: readonly string[] = [...new Set(KNOWN_KINDS.flatMap(({ likely }) => likely))];

function number(
  context: ValueContext,
  kinds: readonly Kind[] | undefined,
  more: Partial<WantedNumber> = {},
): Wanted {
  const { content, answers } = context;
  const variables = content.is === "law" ? content.variables : [];
  return { is: "number", number: { kinds, units: unitsFor(kinds), answers, variables, also: [], ...more } };
}

/** The kind of the other side; undefined (any) in a product, or where the other side has none yet. */
function kindsBeside(
  { names, text }: ValueContext,
  { sibling, inProduct }: ValuePlace,
): readonly Kind[] | undefined {
  if (inProduct || sibling === undefined) return undefined;
  const kind = kindOfText(names.model, text.slice(sibling.start, sibling.end));
  return kind && [kind];
}

/** A share, or a number like the value itself. */
function toleranceOf(context: ValueContext, place: ValuePlace): Wanted {
  const kinds = kindsBeside(context, place);
  const own = kinds && !isNumber(kinds[0]) ? unitsFor(kinds) : [];
  return number(context, [NUMBER, ...(kinds ?? [])], { units: ["%", ...own] });
}

function byContent(context: ValueContext, place: ValuePlace): Wanted {
  const { content, names } = context;
  switch (content.is) {
    case "quantity":
    case "at":
    case "law":
    case "tuple":
    case "range":
      return ofMeasure(context, content.measure);
    case "word":
      return place.listed.length > 0 ? NOTHING : { is: "words", words: content.words };
    case "words":
      return { is: "words", words: content.words.filter((word) => !place.listed.includes(word)) };
    case "tolerance":
      return { is: "words", words: ["nominal", "worst_case"] };
    case "text":
      return content.file ? { is: "file" } : NOTHING;
    case "table":
      return content.orFile ? { is: "file" } : NOTHING;
    case "quantities":
      return { is: "quantities", bare: false };
    case "expressions":
      return number(context, undefined);
    case "names":
      return { is: "names", candidates: namesFor(context, content, place) };
    case "changes":
      return { is: "names", candidates: visible(names).filter(({ keyword }) => keyword === "let") };
    case "unit":
      return { is: "unit", units: valueUnits(context) };
    case "like":
      return number(context, [content.kind]);
    case "bind":
      return number(context, undefined, { units: [], also: coordinates(names) });
  }
}

function ofMeasure(context: ValueContext, measure: Measure): Wanted {
  const motions = motionsOf(context.statement, context.names);
  if (measure === "any" && context.keyword === "motion") {
    const kinds = motions.flatMap((motion) =>
      MOTION_VALUES.flatMap((each) => dimensionOf(each, motion) ?? []),
    );
    return number(context, kinds, { units: valueUnits(context) });
  }
  const kinds = motions.flatMap((motion) => dimensionOf(measure, motion) ?? []);
  if (kinds.length === 0) return number(context, undefined);
  return number(context, kinds, { units: unitsFor(kinds, measure, motions) });
}

const MOTION_VALUES: readonly Measure[] = ["travel", "speed", "acceleration"];

/** Units of what a drive gives. */
function valueUnits({ keyword, statement, names }: ValueContext): readonly string[] {
  const motions = motionsOf(statement, names);
  const measures: readonly Measure[] = keyword === "motion" ? MOTION_VALUES : ["force"];
  return [...new Set(motions.flatMap((motion) => measures.flatMap((measure) => unitsOf(measure, motion))))];
}

function namesFor(
  { names, statement, keyword, askKind }: ValueContext,
  content: Extract<DetailContent, { is: "names" }>,
  { listed }: ValuePlace,
): readonly Candidate[] {
  const own = statement?.slots.name?.kind === "name" ? statement.slots.name.text : undefined;
  const { families, keywords } = content;
  return visible(names).filter((each) => {
    if (listed.includes(each.label) || each.label === own) return false;
    if (keywords ? !keywords.includes(each.keyword) : !families.includes(each.family)) return false;
    if (families.includes("joins") && !keywords) {
      // `like` takes an element of the same keyword; a group takes any element.
      return keyword === "group" ? !["group", "part"].includes(each.keyword) : each.keyword === keyword;
    }
    return (
      askKind === undefined || !families.includes("drives") || drivesAsk(names.model, each.label, askKind)
    );
  });
}

function wantedInCall(context: ValueContext, place: ValuePlace, call: OpenCall): Wanted {
  const parameter = parameterOf(call);
  if (place.sibling || place.inProduct) return number(context, kindsBeside(context, place));
  if (parameter === undefined) return namedOrNumber(context, call);
  const { content } = parameter;
  const { names } = context;
  const of = (test: (each: Candidate) => boolean): Wanted => ({
    is: "names",
    candidates: visible(names).filter(test),
  });
  switch (content.is) {
    case "number":
      return numberArgument(context, parameter, call);
    case "list":
      return number(context, [NUMBER], { units: [] });
    case "range":
      return number(context, [RATE], { also: visible(names).filter(({ family }) => family === "drives") });
    case "ask":
      return of(
        ({ keyword, label }) => keyword === "ask" && content.kinds.includes(kindOfAsk(names, label) ?? ""),
      );
    case "series":
      return { is: "quantities", bare: true };
    case "element":
      return { is: "names", candidates: elements(names) };
    case "pendulum":
      return of(({ keyword }) => keyword === "pendulum");
    case "let":
      return of(({ keyword }) => keyword === "let");
    case "limit":
      return of(({ keyword }) => keyword === "limit");
    case "word":
      return { is: "words", words: content.words };
    case "expression":
      return number(context, undefined);
  }
}

/** Behind the last argument in order come those with names; a kit takes its parameters either way. */
function namedOrNumber(context: ValueContext, call: OpenCall): Wanted {
  const any = number(context, undefined);
  if (call.argument !== undefined) return any;
  const given = new Set(call.named);
  const fn = functionOf(call.callee);
  if (fn) {
    const parameters = fn.parameters.filter(({ name, named }) => named && !given.has(name));
    return parameters.length > 0 ? { is: "arguments", parameters } : NOTHING;
  }
  const kit = context.names.model.entities.get(call.callee)?.node.slots.parameters;
  if (kit?.kind !== "parameters" || any.is !== "number") return any;
  const rest = kit.items.slice(given.size > 0 ? 0 : call.index).filter(({ text }) => !given.has(text));
  const parameters = rest.map(({ text }) => ({ name: text, says: "a parameter of the kit" }));
  return { is: "arguments", parameters, number: any.number };
}

const kindOfAsk = ({ model }: Names, name: string): string | undefined =>
  model.entities.get(name)?.description.variant;

/** A number of the parameter's kind; `at` is a rate or a time, as the ask runs; like arguments go together. */
function numberArgument(context: ValueContext, parameter: ParameterDescription, call: OpenCall): Wanted {
  const { content } = parameter;
  if (content.is !== "number") return NOTHING;
  const kinds = argumentKinds(content);
  if (kinds.length > 0) {
    return number(context, kinds, {
      units: unitsFor(kinds, content.measure, content.motions ?? ["sliding"]),
    });
  }
  const kind = kindOfText(context.names.model, call.before.at(-1) ?? "");
  if (parameter.name === "at") {
    const isHistory = kindOfAsk(context.names, call.before[0] ?? "") === "history";
    return number(context, [isHistory ? (dimensionOf("time") ?? NUMBER) : RATE]);
  }
  if (parameter.name === "band" && kind)
    return number(context, [kind, NUMBER], { units: ["%", ...unitsFor([kind])] });
  return number(context, parameter.repeated && kind ? [kind] : undefined);
}

/** Whether a number of a kind fits. */
export const fitsKind = ({ kinds }: WantedNumber, kind: Kind | undefined): boolean =>
  kinds === undefined || kind === undefined || kinds.some((each) => sameKind(each, kind));
