/** What is said of a named statement, wherever its name stands. */
import type { Entity } from "../model/model.ts";
import type { StatementNode } from "../syntax/tree.ts";
import { siUnit } from "../units/show.ts";
import { askReadout } from "./hover-ask.ts";
import { caseReadout } from "./hover-case.ts";
import { driveReadout } from "./hover-drive.ts";
import { expectReadout } from "./hover-expect.ts";
import { elementTail, groupReadout, joinsReadout } from "./hover-joins.ts";
import { influenceReadout, valueReadout } from "./hover-let.ts";
import { inertiaTail, movesReadout } from "./hover-moves.ts";
import { notesOf } from "./hover-notes.ts";
import { type Block, lines, type Phrase, withoutEmpty } from "./readout.ts";
import { type Numbers, numbersOf, show, showHz } from "./readout-numbers.ts";
import type { View } from "./view.ts";

/** Title, numbers, then notes. */
export function entityReadout(view: View, entity: Entity): readonly Block[] {
  const numbers = numbersOf(view);
  const tail = tailOf(numbers, entity);
  const own = textReadout(view, entity, numbers);
  const computed = withoutEmpty(numbers === undefined ? [] : computedReadout(view, entity, numbers));
  return [
    { kind: "title", keyword: entity.keyword, name: entity.name, tail },
    ...own,
    ...(computed.length === 0 ? [] : staleLine(view)),
    ...computed,
    ...(numbers === undefined && isComputed(entity) ? [lines(whyNoNumbers(view))] : []),
    ...notesOf(entity.node, view.model, view.report),
  ];
}

/** Says that numbers are not those of the text on the screen. */
export function staleLine({ stale }: View): readonly Block[] {
  return stale ? [lines("numbers of an earlier text; new ones are awaited")] : [];
}

const isComputed = ({ description: { family } }: Entity): boolean =>
  family !== "numbers" && family !== "file";

const whyNoNumbers = ({ model }: View): Phrase =>
  model.buildable
    ? "numbers are awaited"
    : "no numbers: an error in what moves, joins or drives leaves no system to compute";

function tailOf(numbers: Numbers | undefined, { name, description }: Entity): Phrase | undefined {
  if (description.family === "asks" && description.variant !== name) return description.variant;
  if (numbers === undefined) return undefined;
  if (description.family === "moves") return inertiaTail(numbers, name);
  return description.family === "joins" ? elementTail(numbers, name) : undefined;
}

/** What the text alone tells. */
function textReadout(view: View, entity: Entity, numbers: Numbers | undefined): readonly Block[] {
  switch (entity.keyword) {
    case "let":
      return valueReadout(view, entity);
    case "case":
      return [
        ...(numbers === undefined ? [] : staleLine(view)),
        ...caseReadout(view.model, numbers, entity.name, view.units),
      ];
    default:
      return [];
  }
}

function computedReadout(view: View, entity: Entity, numbers: Numbers): readonly Block[] {
  const { keyword, name, node, description } = entity;
  if (keyword === "let") return influenceReadout(numbers, name);
  if (keyword === "limit") return limitReadout(numbers, name);
  if (keyword === "group") return groupReadout(numbers, name, groupMembers(node));
  switch (description.family) {
    case "moves":
      return movesReadout(numbers, name);
    case "joins":
      return joinsReadout(numbers, name);
    case "drives":
      return driveReadout(numbers, name);
    case "asks":
      return askReadout(numbers, description.variant ?? "", name);
    case "holds":
      return expectReadout(numbers, view.model, node);
    default:
      return [];
  }
}

/** Names behind `=` of a group. */
function groupMembers({ value = [] }: StatementNode): readonly string[] {
  return value.flatMap((item) =>
    item.kind === "value" && item.expression.kind === "path"
      ? [item.expression.names.map(({ text }) => text).join(".")]
      : [],
  );
}

/** Rows of a limit curve, at most so many. */
const MOST_ROWS = 6;

function limitReadout(numbers: Numbers, name: string): readonly Block[] {
  const limit = numbers.asWritten.instance.limits.get(name);
  if (limit === undefined) return [];
  const si = siUnit(limit.kind);
  const of = limit.of === "rms" ? "of rms values" : "of peaks";
  if (typeof limit.points === "number") return [lines(`${show(numbers, si, limit.points)}, ${of}`)];
  const { points } = limit;
  const more = points.length > MOST_ROWS ? `and ${points.length - MOST_ROWS} more rows` : undefined;
  return [
    lines(
      `a curve ${of}, ${limit.betweenPoints === "log_log" ? "straight on log-log paper" : "straight"} between its points`,
      ...points
        .slice(0, MOST_ROWS)
        .map(({ atHz, value }) => `${showHz(numbers, atHz)}: ${show(numbers, si, value)}`),
      more,
    ),
  ];
}
