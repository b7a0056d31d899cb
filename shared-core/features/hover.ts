/**
 * What stands at a place of the text, told to a person: numbers from the newest report, reference text from the
 * vocabulary, notes from the author.
 *
 * Nothing is answered anew: what a hover adds to the report is read from the analyses in it, of first order where
 * something would have to change.
 */
import { CODES } from "../diagnostics/codes.ts";
import type { Motion } from "../mechanics/assembly.ts";
import type { Entity } from "../model/model.ts";
import { type CallNode, ROLE, type StatementNode, type UnitNode } from "../syntax/tree.ts";
import type { StatementDescription } from "../vocabulary/description.ts";
import { functionOf } from "../vocabulary/functions.ts";
import { describe, detailOf } from "../vocabulary/registry.ts";
import {
  detailDocs,
  diagnosticPage,
  functionDocs,
  PAGES,
  parameterSays,
  quantityDocs,
  statementDocs,
  statementPage,
  WORDS,
} from "./hover-docs.ts";
import { notesOf, silencedBy } from "./hover-notes.ts";
import { entityReadout, staleLine } from "./hover-statement.ts";
import { literalReadout, unitReadout } from "./hover-unit.ts";
import { type Block, type Hover, lines, type Phrase, withoutEmpty } from "./readout.ts";
import { markdownOf } from "./readout-markdown.ts";
import { coordinatesOf, elementsOf } from "./readout-modes.ts";
import { numbersOf, show, showHz } from "./readout-numbers.ts";
import { noteAt, numberAt, pathAt, type TextPlace, textPlace } from "./readout-place.ts";
import { textOf } from "./readout-text.ts";
import type { View } from "./view.ts";

export type { Hover } from "./readout.ts";

/** undefined where there is nothing to say. Costs no new answer: some milliseconds from a report that is there. */
export function hover(view: View, offset: number): Hover | undefined {
  const place = textPlace(view.model.tree, offset);
  const found = place && readoutAt(view, place);
  if (place === undefined || found === undefined) return undefined;
  const blocks = withoutEmpty(found.blocks);
  if (blocks.length === 0) return undefined;
  const page = found.page === undefined ? {} : { page: found.page };
  return { span: found.span ?? place.span, markdown: markdownOf(blocks), text: textOf(blocks), ...page };
}

interface Readout {
  readonly blocks: readonly Block[];
  readonly page?: string;
  /** Where it is more than the token. */
  readonly span?: TextPlace["span"];
}

function readoutAt(view: View, place: TextPlace): Readout | undefined {
  if (place.token.kind === "note") return acceptReadout(view, place);
  if (place.token.kind === "number" && place.role !== ROLE.unit) return literalAt(place);
  switch (place.role) {
    case ROLE.keyword:
      return keywordReadout(view, place);
    case ROLE.choice:
      return choiceReadout(view, place);
    case ROLE.definition:
      return definitionReadout(view, place);
    case ROLE.key:
      return keyReadout(view, place);
    case ROLE.unit:
      return unitAt(place);
    case ROLE.callee:
      return calleeReadout(view, place);
    case ROLE.argument:
      return argumentReadout(place);
    case ROLE.reference:
      return referenceReadout(view, place);
    default:
      return wordReadout(place);
  }
}

/** An acceptance: the message that it silences. */
function acceptReadout(view: View, place: TextPlace): Readout | undefined {
  const note = noteAt(place) ?? place.statement?.notes.find(({ span }) => span.start === place.span.start);
  if (note?.accept === undefined || place.statement === undefined) return undefined;
  const { code, reason } = note.accept;
  const silenced = silencedBy(place.statement, code, view.report);
  const says =
    silenced.length === 0
      ? "silences nothing in the numbers that are there"
      : `silences: ${silenced.join("; ")}`;
  return {
    blocks: [lines(`accepted \`${code}\`: ${reason}`, says)],
    page: code in CODES ? diagnosticPage(code) : undefined,
    span: note.accept.codeSpan,
  };
}

function literalAt(place: TextPlace): Readout | undefined {
  const literal = numberAt(place);
  const blocks = literal && literalReadout(literal);
  return blocks && { blocks, page: PAGES.numbers, span: literal.span };
}

function unitAt(place: TextPlace): Readout | undefined {
  const unit = place.chain.findLast((node) => node.kind === "unit") as UnitNode | undefined;
  const blocks = unit && unitReadout(unit);
  if (blocks === undefined) return undefined;
  const literal = numberAt(place);
  return {
    blocks: [...blocks, ...((literal && literalReadout(literal)) ?? [])],
    page: PAGES.units,
    span: unit?.span,
  };
}

function descriptionAt({ innermost }: TextPlace): StatementDescription | undefined {
  if (innermost === undefined) return undefined;
  const kind = innermost.slots.kind;
  return describe(innermost.keyword.text, kind?.kind === "name" ? kind.text : undefined);
}

/** What an ask or an expectation found stands before what the word means. */
function keywordReadout(view: View, place: TextPlace): Readout | undefined {
  const description = descriptionAt(place);
  if (description === undefined) return wordReadout(place);
  const docs = statementDocs(description);
  const page = statementPage(description);
  const answers = description.family === "asks" || description.family === "holds";
  const entity = answers && place.statement ? entityOf(view, place.statement) : undefined;
  if (entity === undefined) return { blocks: docs, page };
  return { blocks: [...entityReadout(view, entity), ...docs.slice(0, 2)], page };
}

/** The kind of an ask, or the key of an assumption. */
function choiceReadout(view: View, place: TextPlace): Readout | undefined {
  const description = descriptionAt(place);
  const key = description?.keys?.find((each) => each.key === place.text);
  if (description === undefined) return undefined;
  if (key === undefined) return keywordReadout(view, place);
  return {
    blocks: [
      ...detailDocs(key),
      ...(place.statement ? notesOf(place.statement, view.model, view.report) : []),
    ],
    page: statementPage(description),
  };
}

function definitionReadout(view: View, place: TextPlace): Readout | undefined {
  const { statement, innermost } = place;
  if (statement === undefined || innermost === undefined) return undefined;
  if (innermost !== statement) return innerReadout(view, innermost, place.text);
  const entity = entityOf(view, statement);
  if (entity === undefined) return innerReadout(view, statement, place.text);
  return { blocks: entityReadout(view, entity), page: statementPage(entity.description) };
}

/** A statement without a place in the namespace: inside a kit, or the second of a name. */
function innerReadout(view: View, statement: StatementNode, name: string): Readout | undefined {
  const description = describe(statement.keyword.text);
  if (description === undefined) return undefined;
  return {
    blocks: [
      { kind: "title", keyword: description.keyword, name },
      lines(description.says),
      ...notesOf(statement, view.model, view.report),
    ],
    page: statementPage(description),
  };
}

/** The key of a detail; in a case, the number it replaces. */
function keyReadout(view: View, place: TextPlace): Readout | undefined {
  const description = descriptionAt(place);
  if (description === undefined) return undefined;
  const page = statementPage(description);
  if (description.keyword === "case") return entityNamed(view, place.text);
  const key = place.detail?.key.text ?? place.text;
  const detail = detailOf(description, key);
  return detail && { blocks: detailDocs(detail, motionAt(view, place)), page };
}

function calleeReadout(view: View, place: TextPlace): Readout | undefined {
  const fn = functionOf(place.text);
  if (fn === undefined) return WORDS.has(place.text) ? wordReadout(place) : entityNamed(view, place.text);
  return { blocks: functionDocs(fn), page: PAGES.functions };
}

function argumentReadout(place: TextPlace): Readout | undefined {
  const call = place.chain.findLast((node) => node.kind === "call") as CallNode | undefined;
  const fn = call && functionOf(call.callee.text);
  const says = fn && parameterSays(fn, place.text);
  return says === undefined ? undefined : { blocks: [lines(says)], page: PAGES.functions };
}

/** A name that refers to something: the thing itself, a direction of it, or a quantity behind its dot. */
function referenceReadout(view: View, place: TextPlace): Readout | undefined {
  const path = pathAt(place);
  const index = path?.names.findIndex(({ span }) => span.start === place.span.start) ?? 0;
  if (path !== undefined && index > 0)
    return behindDot(
      view,
      path.names.map(({ text }) => text),
      index,
      path.span,
    );
  const inKit = kitReadout(view, place);
  if (inKit !== undefined) return inKit;
  return entityNamed(view, place.text) ?? wordReadout(place);
}

/** Parameters, ends and statements of a kit hide outer names. */
function kitReadout(view: View, { statement, text }: TextPlace): Readout | undefined {
  if (statement?.keyword.text !== "kit") return undefined;
  const { parameters } = statement.slots;
  if (parameters?.kind === "parameters" && parameters.items.some((each) => each.text === text)) {
    return {
      blocks: [lines(`\`${text}\`: a parameter of the kit, given where a part of it is placed`)],
      page: PAGES.kits,
    };
  }
  const inner = statement.inner.find(({ slots }) => slots.name?.kind === "name" && slots.name.text === text);
  return inner && innerReadout(view, inner, text);
}

/** `velocity` of `unit.velocity`: what it is, and its peak in each answer that lists it. */
function behindDot(
  view: View,
  names: readonly string[],
  index: number,
  span: TextPlace["span"],
): Readout | undefined {
  const whole = names.slice(0, index + 1).join(".");
  if (names[0] === "ground" && names[index] === "reaction") {
    return {
      blocks: [lines(`\`${whole}\`: force on it, summed over what is joined to it`)],
      page: PAGES.reference,
      span,
    };
  }
  const entity = view.model.entities.get(names[0]);
  const quantity = entity?.description.quantities.find(({ name }) => name === names[index]);
  if (entity === undefined) return undefined;
  if (quantity === undefined) {
    const direction = entity.description.components?.includes(names[index]);
    return direction
      ? {
          blocks: [lines(`\`${whole}\`: direction ${names[index]}`)],
          page: statementPage(entity.description),
          span,
        }
      : undefined;
  }
  return {
    blocks: [...quantityDocs(whole, quantity, motionOf(view, entity)), ...peaksOf(view, whole)],
    page: statementPage(entity.description),
    span,
  };
}

function peaksOf(view: View, quantity: string): readonly Block[] {
  const numbers = numbersOf(view);
  if (numbers === undefined) return [];
  const said = [...numbers.asWritten.answers].flatMap(([ask, result]): Phrase[] => {
    if (!result.ok) return [];
    const peak = result.value.peaks.get(quantity);
    const unit = result.value.series.get(quantity)?.unit;
    if (peak === undefined || unit === undefined || "reason" in peak) return [];
    const at = result.value.kind === "sweep" ? showHz(numbers, peak.at) : show(numbers, "s", peak.at);
    return [`in \`${ask}\`: up to ${show(numbers, unit, Math.abs(peak.value))} at ${at}`];
  });
  return said.length === 0 ? [] : [...staleLine(view), lines(...said)];
}

function wordReadout({ text }: TextPlace): Readout | undefined {
  const says = WORDS.get(text);
  return says === undefined ? undefined : { blocks: [lines(says)], page: PAGES.numbers };
}

function entityNamed(view: View, name: string): Readout | undefined {
  const entity = view.model.entities.get(name);
  return entity && { blocks: entityReadout(view, entity), page: statementPage(entity.description) };
}

function entityOf({ model }: View, statement: StatementNode): Entity | undefined {
  const written = statement.slots.name;
  if (written?.kind === "name") {
    const entity = model.entities.get(written.text);
    return entity?.node === statement ? entity : undefined;
  }
  return [...model.entities.values()].find(({ node }) => node === statement);
}

/** How the statement at a place moves, as far as numbers tell. */
function motionAt(view: View, { statement }: TextPlace): Motion | undefined {
  const entity = statement && entityOf(view, statement);
  return entity && motionOf(view, entity);
}

function motionOf(view: View, { name }: Entity): Motion | undefined {
  const assembly = numbersOf(view)?.asWritten.instance.assembly;
  if (assembly === undefined) return undefined;
  const [coordinate] = coordinatesOf(assembly, name);
  const [element] = elementsOf(assembly, name);
  return coordinate === undefined
    ? assembly.elements[element]?.motion
    : assembly.coordinates[coordinate].motion;
}
