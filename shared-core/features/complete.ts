/** Completion: finds out what is being typed and offers what fits there, and nothing else. */
import { SHAPES } from "../model/drive-shapes.ts";
import { placeAt } from "../syntax/search.ts";
import type { StatementNode } from "../syntax/tree.ts";
import { type Span, span } from "../text/span.ts";
import type { StatementDescription } from "../vocabulary/description.ts";
import { ASKS, detailOf, STATEMENTS } from "../vocabulary/registry.ts";
import { descriptionOf, headDescription, rowContent, valueAt } from "./complete-context.ts";
import { headSpot } from "./complete-head.ts";
import { isUnitWord, ownersOf, type TypedLine, typedLine, type Word, wordsBefore } from "./complete-line.ts";
import {
  elements,
  membersOf,
  motionsOf,
  type Names,
  placesFor,
  visible,
  withQuantities,
} from "./complete-names.ts";
import {
  argumentOffers,
  type Completion,
  candidateOffers,
  componentOffers,
  detailOffers,
  headPartWords,
  keywordOffers,
  kindOffers,
  numberOffers,
  type Offer,
  quantityOffers,
  unitOffers,
  wordOffers,
} from "./complete-offers.ts";
import { noteOffers, noteSpan, quotedOffers, textOffers } from "./complete-text.ts";
import { parameterOf, type ValuePlace } from "./complete-value.ts";
import { unitsFor, type ValueContext, type Wanted, wantedAt } from "./complete-wanted.ts";
import type { View } from "./view.ts";

export type { Completion, CompletionKind } from "./complete-offers.ts";

export interface CompleteOptions {
  /** Files of the workspace that a model may use or read, by path from the root. */
  readonly files?: readonly string[];
  /** True where somebody asked for offers; typing alone gets none right behind a digit. */
  readonly explicit?: boolean;
}

/** What may be typed at an offset, the best fit first. Nothing is offered inside comments. */
export function complete(view: View, offset: number, options: CompleteOptions = {}): readonly Completion[] {
  const line = typedLine(view.model.tree, Math.max(0, Math.min(offset, view.model.tree.text.length)));
  const typing: Typing = { view, line, options };
  const unit = line.inside ? undefined : unitRun(line);
  if (unit) return placed(behindNumber(typing, unit), unit.span, line.offset);
  if (line.inside?.kind === "string") {
    const text = textOffers(line, filesOf(typing));
    return text ? placed(text.offers, text.span, line.offset) : [];
  }
  const typed = line.inside?.kind === "note" ? noteSpan(line) : line.typed;
  return placed(line.inside ? noteOffers(line) : offers(typing), typed, line.offset);
}

interface Typing {
  readonly view: View;
  readonly line: TypedLine;
  readonly options: CompleteOptions;
}

const filesOf = ({ view, options }: Typing) => ({ own: view.model.file, all: options.files ?? [] });

/** The unit that is typed behind a number. */
interface UnitRun {
  readonly span: Span;
  /** Blanks between the number and the unit. */
  readonly blank: boolean;
  /** True while no letter of it has been typed. */
  readonly empty: boolean;
  readonly words: readonly Word[];
}

const NUMBER_AND_UNIT =
  /(?<![\p{L}\p{M}_\d.])(?:\d+(?:\.\d*)?(?:[eE][+-]?\d+)?|\.\d+)([ \t]*)((?:1\/)?[\p{L}µΩ%(][\p{L}\p{M}\d_^*/·()-]*)?$/u;

function unitRun({ tree, line, offset }: TypedLine): UnitRun | undefined {
  const match = NUMBER_AND_UNIT.exec(tree.text.slice(line.span.start, offset));
  if (!match) return undefined;
  const unit = match[2] ?? "";
  const start = offset - unit.length;
  const end =
    offset + (/^[\p{L}\p{M}\d_^*/·µΩ%]*/u.exec(tree.text.slice(offset, line.span.end))?.[0].length ?? 0);
  const words = wordsBefore(tree, line, start).filter((word) => !isUnitWord(word) || word.end <= start);
  return { span: span(start, unit === "" ? offset : end), blank: match[1] !== "", empty: unit === "", words };
}

/** Units, and the words that may follow a bare number: `3 to 5`, `0.3 at 2 Hz`. */
function behindNumber(typing: Typing, unit: UnitRun): readonly Offer[] {
  const { line, options } = typing;
  if (unit.empty && !unit.blank && !options.explicit) return [];
  const operand = unit.words.at(-1);
  const before = operand?.kind === "number" ? unit.words.slice(0, -1) : unit.words;
  const found = valueAt(typing.line, typing.view, before);
  if (found === undefined) return [];
  const { context, place } = found;
  const behind = { ...place, next: "operator" as const, itemWords: ["0"] };
  const wanted = wantedAt(context, place);
  const units =
    wanted.is === "number" || wanted.is === "arguments"
      ? (wanted.number?.units ?? [])
      : wanted.is === "words"
        ? ["%"]
        : wanted.is === "unit"
          ? wanted.units
          : [];
  const isAny = "number" in wanted && wanted.number !== undefined && wanted.number.kinds === undefined;
  const known = isAny ? unitsUsed(line, units) : units;
  return [
    ...unitOffers(known, unit.blank ? "" : " "),
    ...(unit.blank ? operatorOffers(context, behind) : []),
  ];
}

/** Of all units, those that the file has first. */
function unitsUsed({ tree }: TypedLine, units: readonly string[]): readonly string[] {
  const used = new Set<string>();
  for (const match of tree.text.matchAll(/\d[ \t]+([\p{L}%][\p{L}\d^*/·]*)/gu)) used.add(match[1]);
  const all = units.length > 0 ? units : unitsFor(undefined);
  return [...all.filter((unit) => used.has(unit)), ...all.filter((unit) => !used.has(unit))];
}

function offers(typing: Typing): readonly Offer[] {
  const { line, view } = typing;
  const { statement, kit, detailLine } = ownersOf(line);
  const names: Names = { model: view.model, kit };
  if (statement && detailLine && line.indent > detailLine.indent && line.words[1]?.text !== "=") {
    return rowOffers(typing, statement, detailLine.span.start, names);
  }
  if (line.words.length === 0) return lineStart(typing, statement, kit, names);
  if (statement) return inDetail(typing, statement, names);
  return line.indent > 0 && !kit ? [] : inHead(typing, names);
}

/** The first word of a line: a statement, or a detail of the one above. */
function lineStart(
  { line, view }: Typing,
  statement: StatementNode | undefined,
  kit: StatementNode | undefined,
  names: Names,
): readonly Offer[] {
  if (statement) return keyOffers(statement, line, names);
  if (kit)
    return keywordOffers(
      STATEMENTS.filter(({ family, keyword }) => isInKit(family, keyword)),
      line.behind,
    );
  if (line.indent > 0) return [];
  const { version } = view.model.tree;
  const isHere =
    version !== undefined &&
    line.line.span.start <= version.span.start &&
    version.span.end <= line.line.span.end;
  const isFirst =
    (!version || isHere) && view.model.tree.lines.slice(0, line.index).every(({ role }) => role === "blank");
  const start: Offer[] = isFirst
    ? [{ label: "thrum 1", kind: "keyword", detail: "the version of the language", rank: 0 }]
    : [];
  return [...start, ...keywordOffers(STATEMENTS, line.behind)];
}

const isInKit = (family: string, keyword: string): boolean =>
  family === "moves" || family === "joins" || keyword === "let";

/** Details that a statement takes and does not have yet. */
function keyOffers(statement: StatementNode, line: TypedLine, names: Names): readonly Offer[] {
  const here = line.line.span;
  const given = statement.details.filter(({ key }) => key.span.start < here.start || here.end < key.span.end);
  const keys = new Set(given.map(({ key }) => key.text));
  if (statement.keyword.text === "case") {
    const lets = visible(names).filter(({ keyword, label }) => keyword === "let" && !keys.has(label));
    return candidateOffers(lets, names).map((each) =>
      line.behind === "" ? { ...each, insert: `${each.label} = ` } : each,
    );
  }
  const description = descriptionOf(statement);
  if (description === undefined) return [];
  const shaped = description.family === "drives" ? keysOfShapes(keys) : undefined;
  const motions = motionsOf(statement, names);
  const fitting = description.details.filter(({ key, whenMotion }) => {
    if (keys.has(key) || (statement.value && key === description.principal)) return false;
    if (shaped && !shaped.has(key)) return false;
    return !whenMotion || whenMotion.some((motion) => motions.includes(motion));
  });
  return detailOffers(fitting, motions, line.behind);
}

/** Details of the shapes that the given ones can still make; undefined: none is given, and all can be made. */
function keysOfShapes(given: ReadonlySet<string>): ReadonlySet<string> | undefined {
  if (given.size === 0) return undefined;
  const open = SHAPES.filter(({ takes }) => [...given].every((key) => takes.includes(key)));
  const keys = new Set(open.flatMap(({ takes }) => takes));
  // A chirp takes the one or the other.
  if (given.has("unbalance")) keys.delete("amplitude");
  if (given.has("amplitude")) keys.delete("unbalance");
  return keys;
}

function inDetail(typing: Typing, statement: StatementNode, names: Names): readonly Offer[] {
  const { words } = typing.line;
  const description = descriptionOf(statement);
  const content = description && detailOf(description, words[0].text)?.content;
  if (words[1]?.text === "." && words.length === 2) {
    return content?.is === "tuple" ? componentOffers(content.components) : [];
  }
  const found = valueAt(typing.line, typing.view, words);
  return found ? valueOffers(found.context, found.place, names, typing) : [];
}

function rowOffers(
  typing: Typing,
  statement: StatementNode,
  detailStart: number,
  names: Names,
): readonly Offer[] {
  const content = rowContent(statement, typing.line, detailStart);
  if (content === undefined || content.is === "table") return [];
  const found = valueAt(typing.line, typing.view, typing.line.words);
  return found ? valueOffers(found.context, found.place, names, typing) : [];
}

function inHead(typing: Typing, names: Names): readonly Offer[] {
  const { line } = typing;
  const description = headDescription(line);
  if (description === undefined) return [];
  const spot = headSpot(description, line.words.slice(1));
  const node = placeAt(line.tree, line.words[0].start)?.innermost;
  const { keyword } = description;
  if (spot.is === "equals") return wordOffers(["="]);
  if (spot.is === "part") {
    const { part } = spot;
    if (part.kind === "place") return candidateOffers(placesFor(keyword, part.slot, names, node), names);
    if (part.kind === "call")
      return candidateOffers(
        visible(names).filter(({ keyword: of }) => of === "kit"),
        names,
      );
    if (part.kind === "text") return keyword === "use" ? quotedOffers(line, filesOf(typing)) : [];
    if (keyword === "ask" && part.kind === "choice") return kindOffers(ASKS, line.behind);
    if (keyword === "assume" && part.kind === "choice") return assumeOffers(description);
    return wordOffers(headPartWords(part));
  }
  if (spot.is === "member") {
    const { components, inner } = membersOf(spot.path, names);
    return [...componentOffers(components), ...candidateOffers(inner, names)];
  }
  const found = valueAt(line, typing.view, line.words);
  return found ? valueOffers(found.context, found.place, names, typing) : [];
}

const assumeOffers = ({ keys = [] }: StatementDescription): readonly Offer[] =>
  keys.map(({ key, says, example }) => ({
    label: key,
    kind: "word",
    detail: says,
    snippet: `${key} = \${1:${example}}`,
    rank: 0,
  }));

function valueOffers(
  context: ValueContext,
  place: ValuePlace,
  names: Names,
  typing: Typing,
): readonly Offer[] {
  if (place.next === "member") return memberOffers(context, place, names);
  if (place.next === "unit") return unitOffers(unitsFor(undefined), "");
  if (place.behindTuple) return tupleUnits(context, place);
  if (place.next === "operator") return operatorOffers(context, place);
  const wanted = wantedAt(context, place);
  return wantedOffers(wanted, context, names, typing);
}

function wantedOffers(
  wanted: Wanted,
  { content, statement }: ValueContext,
  names: Names,
  typing: Typing,
): readonly Offer[] {
  switch (wanted.is) {
    case "number": {
      const starts = content.is === "range" ? wordOffers(["from"]) : [];
      return [...starts, ...numberOffers(wanted.number, names, statement)];
    }
    case "names":
      return candidateOffers(wanted.candidates, names);
    case "arguments":
      return [
        ...argumentOffers(wanted.parameters),
        ...(wanted.number ? numberOffers(wanted.number, names, statement) : []),
      ];
    case "quantities":
      return candidateOffers(
        wanted.bare ? [...new Set([...withQuantities(names), ...elements(names)])] : withQuantities(names),
        names,
      );
    case "words":
      return wordOffers(wanted.words);
    case "unit":
      return unitOffers(wanted.units, "");
    case "file":
      return quotedOffers(typing.line, filesOf(typing));
    case "nothing":
      return [];
  }
}

function tupleUnits(context: ValueContext, place: ValuePlace): readonly Offer[] {
  const wanted = wantedAt(context, place);
  return wanted.is === "number" ? unitOffers(wanted.number.units, "") : [];
}

/** Behind a dot: directions, quantities, or the inner names of a part. */
function memberOffers({ content }: ValueContext, { path, call }: ValuePlace, names: Names): readonly Offer[] {
  const { components, quantities, inner, motion } = membersOf(path, names);
  const takesPlaces = (content.is === "bind" || content.is === "names") && !call;
  return [
    ...componentOffers(components),
    ...(takesPlaces ? [] : quantityOffers(quantities, motion)),
    ...candidateOffers(inner, names),
  ];
}

/** Words that may stand behind an operand. */
function operatorOffers({ content, names, keyword }: ValueContext, place: ValuePlace): readonly Offer[] {
  if (place.itemWords.length === 0) return [];
  const { part, call, itemWords, inProduct } = place;
  if (call) {
    const isRange = parameterOf(call)?.content.is === "range";
    return wordOffers([
      ...(isRange ? ["to"] : []),
      ...(call.callee === "if" && call.index === 0 ? ["and", "or"] : []),
      "as",
    ]);
  }
  const has = (word: string) => itemWords.includes(word);
  if (part === "tolerance")
    return wordOffers(
      has("normal") || has("uniform") || has("lognormal")
        ? ["within"]
        : ["normal", "uniform", "lognormal", "within"],
    );
  if (part === "within") return wordOffers(has("to") ? [] : ["to"]);
  if (content.is === "changes") return wordOffers(has("from") ? ["to"] : ["from"]);
  if (content.is === "range") return wordOffers(has("to") ? [] : ["to"]);
  if (content.is === "at" && part === "value") return wordOffers(["at"]);
  const takesRange = content.is === "quantity" && content.orRange && !has("to") && !inProduct;
  const takesNumber =
    content.is === "quantity" || content.is === "like" || (content.is === "expressions" && keyword === "let");
  const words = [
    ...(takesRange ? ["to"] : []),
    ...(takesNumber && !has("to") ? ["within"] : []),
    ...(takesNumber || keyword === "expect" ? ["as"] : []),
  ];
  return names.model ? wordOffers(words) : [];
}

/** Gives each offer its place and order; of two with one label the first stays. */
function placed(all: readonly Offer[], typed: Span, offset: number): readonly Completion[] {
  const seen = new Set<string>();
  const unique = all.filter(({ label }) => !seen.has(label) && seen.add(label));
  const ordered = [...unique].sort((a, b) => a.rank - b.rank);
  return ordered.map(({ rank, ...offer }, i) => ({
    ...offer,
    insert: offer.insert ?? offer.label,
    insertSpan: span(typed.start, Math.max(typed.start, offset)),
    replaceSpan: typed,
    sort: `${rank}${String(i).padStart(4, "0")}`,
  }));
}
