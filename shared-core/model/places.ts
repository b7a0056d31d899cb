import type { Motion } from "../mechanics/builder.ts";
import type { Expression, NameNode, PathNode, StatementNode } from "../syntax/tree.ts";
import { sameKind } from "../units/quantity.ts";
import { DIRECTIONS } from "../vocabulary/coordinate-quantities.ts";
import { type Given, givenDetails, hasRequired, sayUnknownName, singleValue, wordOf } from "./details.ts";
import { addPlanned, type Draft, sayNotYet, spoil } from "./draft.ts";
import { meaningOf } from "./expression.ts";
import { Findings, orList, replaceFix } from "./findings.ts";
import { aKeyword, type Described, nameSpan } from "./names.ts";
import { planNumber } from "./number.ts";
import type { Place, PlannedNumber, PlannedStatement } from "./plan.ts";
import { type Wanted, wantedOf } from "./typed.ts";

const MOVES: ReadonlyMap<string, Motion> = new Map([
  ["mass", "sliding"],
  ["inertia", "turning"],
  ["junction", "sliding"],
]);

/** Takes a statement that can move into the draft: coordinates and supports, with their start values. */
export function planMoving(statement: Described, draft: Draft): void {
  const { node, name, description } = statement;
  if (name === undefined || description.notYet) {
    if (description.notYet) sayNotYet(draft, node.keyword.span, `\`${node.keyword.text}\``);
    spoil(draft, name);
    return;
  }
  const given = givenDetails(statement, draft);
  const complete = hasRequired(statement, given, draft);
  const kind = given.details.get("kind");
  const word = kind && wordOf(kind, wordsIn(kind), draft.findings);
  if (!given.sound || !complete || (kind !== undefined && word === undefined)) spoil(draft, name);
  if (node.keyword.text === "support") {
    declareSupport(name, word ?? "sliding", draft);
    return;
  }
  const motion: Motion = word === "turning" ? "turning" : (MOVES.get(node.keyword.text) ?? "sliding");
  declareCoordinate(statement, name, motion, given.details, draft);
}

const wordsIn = ({ description: { content } }: Given): readonly string[] =>
  content.is === "word" ? content.words : [];

function declareSupport(name: string, kind: string, draft: Draft): void {
  if (kind !== "body") {
    draft.supportByName.set(name, draft.supports.length);
    draft.supports.push({ name, motion: kind === "turning" ? "turning" : "sliding" });
    return;
  }
  for (const direction of DIRECTIONS) {
    const full = `${name}.${direction}`;
    draft.supportByName.set(full, draft.supports.length);
    draft.supports.push({ name: full, motion: direction.startsWith("r") ? "turning" : "sliding" });
  }
}

function declareCoordinate(
  statement: Described,
  name: string,
  motion: Motion,
  details: ReadonlyMap<string, Given>,
  draft: Draft,
): void {
  const { node, description } = statement;
  const numbers = new Map<string, PlannedNumber>();
  const positive = new Set<string>();
  if (movesOtherwise(statement, details, motion, draft)) return;
  for (const [key, given] of details) {
    if (given.description.content.is !== "quantity") continue;
    const number = planQuantity(given, motion, name, draft);
    if (number === undefined) spoil(draft, name);
    else numbers.set(key, number);
    if (given.description.content.positive) positive.add(key);
  }
  const weightGiven = details.get("weight");
  const weight = weightGiven && wordOf(weightGiven, wordsIn(weightGiven), draft.findings);
  if (weightGiven !== undefined && weight === undefined) spoil(draft, name);
  const index = draft.coordinates.length;
  draft.coordinateByName.set(name, index);
  draft.coordinates.push({
    name,
    motion,
    owner: name,
    massless: node.keyword.text === "junction",
    weight: weight === "positive" ? 1 : weight === "negative" ? -1 : 0,
    mass: motion === "sliding" ? numbers.get("mass") : undefined,
    startsAt: numbers.get("starts_at"),
    startsMoving: numbers.get("starts_moving"),
  });
  const planned: PlannedStatement = {
    name,
    node,
    description,
    motion,
    ends: { name: { is: "coordinate", index, motion } },
    numbers,
    ats: NO_ATS,
    words: NO_WORDS,
    positive,
  };
  addPlanned(draft, planned);
}

/** What moves has neither. */
const NO_ATS: PlannedStatement["ats"] = new Map();
const NO_WORDS: PlannedStatement["words"] = new Map();

/**
 * Whether a `mass` is given as a moment of inertia, or an `inertia` as a mass: that is said here, and as it stays
 * open how the thing moves, whatever is joined to it stays quiet.
 */
function movesOtherwise(
  { node, name = "" }: Described,
  details: ReadonlyMap<string, Given>,
  motion: Motion,
  draft: Draft,
): boolean {
  const keyword = node.keyword.text;
  const other = { mass: "inertia", inertia: "mass" }[keyword];
  const given = details.get(keyword);
  const [item] = given?.items ?? [];
  if (other === undefined || given === undefined || item?.kind !== "value") return false;
  if (isLiteralOf(item.expression, wantedOf(keyword as "mass" | "inertia"), draft)) return false;
  const quiet = { ...draft.numbers, findings: new Findings(), newDraw: () => 0 };
  if (planNumber(item, quiet, wantedOf(other as "mass" | "inertia"), name) === undefined) return false;
  spoil(draft, name);
  const hint = other === "inertia" ? "what turns is an `inertia`" : "what slides is a `mass`";
  if (planQuantity(given, motion, name, draft, { hint }) !== undefined) return false;
  return true;
}

/** Whether an expression is plainly what is wanted: a literal with a unit that can only be read as that unit. */
function isLiteralOf(node: Expression, wanted: Wanted | undefined, { numbers }: Draft): boolean {
  if (node.kind !== "number" || node.unit?.factors.length !== 1 || node.value === 0) return false;
  const unit = meaningOf(node.unit, { ...numbers, findings: new Findings(), root: node });
  return unit !== undefined && wanted?.kinds.length === 1 && sameKind(wanted.kinds[0], unit.kind);
}

/** The number of a detail whose content is a quantity; undefined where it has an error, which has been said. */
export function planQuantity(
  given: Given,
  motion: Motion,
  owner: string,
  draft: Draft,
  options: { readonly copies?: number; readonly hint?: string } = {},
): PlannedNumber | undefined {
  const { content } = given.description;
  if (content.is !== "quantity") return undefined;
  const value = singleValue(given, draft.findings);
  if (value === undefined) return undefined;
  const label = `${owner}.${given.key}`;
  return planNumber(value, draft.numbers, quantityWanted(given, motion, options.hint), label, options.copies);
}

function quantityWanted(given: Given, motion: Motion, hint: string | undefined): Wanted | undefined {
  const { content } = given.description;
  return content.is === "quantity" ? wantedOf(content.measure, motion, hint) : undefined;
}

/** Where a reference points; undefined where it points nowhere, which has been said or was said before. */
export function resolvePlace(path: PathNode, draft: Draft, forWhat = "an end"): Place | undefined {
  const [first, second, third] = path.names;
  if (first === undefined) return undefined;
  if (first.text === "ground") {
    if (second !== undefined) sayNoPart(first, second, draft.findings);
    return second === undefined ? { is: "ground" } : undefined;
  }
  const entity = draft.main.names.get(first.text);
  if (entity === undefined) {
    const hint = "what moves is defined by `mass`, `inertia`, `junction` or `support`";
    sayUnknownName(first, placeNames(draft), draft.findings, hint);
    return undefined;
  }
  if (draft.unsound.has(first.text) && !draft.coordinateByName.has(first.text)) return undefined;
  const coordinate = draft.coordinateByName.get(first.text);
  if (coordinate !== undefined) {
    if (second !== undefined) sayNoPart(first, second, draft.findings);
    const { motion } = draft.coordinates[coordinate];
    return second === undefined ? { is: "coordinate", index: coordinate, motion } : undefined;
  }
  if (entity.keyword === "support") return supportPlace(first, second, third, draft);
  draft.findings.say(
    "wrong-kind",
    path.span,
    `\`${first.text}\` is ${aKeyword(entity.keyword)}; ${forWhat} is something that moves, a support or ground`,
    {
      related: [{ span: nameSpan(entity.node), message: `\`${first.text}\` is defined here` }],
    },
  );
  return undefined;
}

function supportPlace(
  first: NameNode,
  second: NameNode | undefined,
  third: NameNode | undefined,
  draft: Draft,
): Place | undefined {
  const name = second === undefined ? first.text : `${first.text}.${second.text}`;
  const index = draft.supportByName.get(name);
  if (index !== undefined && third === undefined) {
    return { is: "support", index, motion: draft.supports[index].motion };
  }
  if (second !== undefined) {
    sayNoPart(first, third ?? second, draft.findings);
    return undefined;
  }
  const fixes = DIRECTIONS.slice(0, 3).map((direction) =>
    replaceFix(`Write \`${first.text}.${direction}\``, first.span, `${first.text}.${direction}`),
  );
  const message = `\`${first.text}\` is a support of kind body; which direction is meant, ${orList(DIRECTIONS)}?`;
  draft.findings.say("wrong-kind", first.span, message, { fixes });
  return undefined;
}

function sayNoPart(first: NameNode, part: NameNode, findings: Findings): void {
  findings.say(
    "unknown-name",
    part.span,
    `\`${first.text}\` moves one way only and has no \`${part.text}\``,
    {
      fixes: [
        replaceFix(`Write \`${first.text}\``, { start: first.span.start, end: part.span.end }, first.text),
      ],
    },
  );
}

function* placeNames(draft: Draft): Iterable<string> {
  yield "ground";
  yield* draft.coordinateByName.keys();
  yield* draft.supportByName.keys();
}

export function placeOfSlot(
  node: StatementNode,
  slot: string,
  draft: Draft,
  forWhat?: string,
): Place | undefined {
  const value = node.slots[slot];
  return value?.kind === "path" ? resolvePlace(value, draft, forWhat) : undefined;
}

export const pathText = (path: PathNode): string => path.names.map(({ text }) => text).join(".");

/** "slides", "turns": what a motion does, in a message. */
export const motionWord = (motion: Motion): string =>
  ({ sliding: "slides", turning: "turns", charge: "carries charge" })[motion];
