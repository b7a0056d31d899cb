/**
 * Quantities of a model: what `unit.velocity` and its like read. Longer than other files because each sort of
 * owner (coordinate, support, element, group) is one branch of the same walk.
 */
import type { ElementMeasure } from "../mechanics/assembly.ts";
import type { Motion } from "../mechanics/builder.ts";
import type { Expression, NameNode, PathNode } from "../syntax/tree.ts";
import { nearest } from "../text/nearest.ts";
import type { Kind } from "../units/dimension.ts";
import { isNumber, NUMBER } from "../units/quantity.ts";
import { siUnit } from "../units/show.ts";
import type { Measure, QuantityDescription } from "../vocabulary/description.ts";
import { dimensionOf } from "../vocabulary/measures.ts";
import { compile } from "./code.ts";
import { sayUnknownName } from "./details.ts";
import type { Draft } from "./draft.ts";
import { check } from "./expression.ts";
import { orList, replaceFix } from "./findings.ts";
import { agrees } from "./fit.ts";
import { memberNames } from "./groups.ts";
import { aKeyword } from "./names.ts";
import { motionWord } from "./places.ts";
import type { PlannedQuantity, PlannedStatement, PlannedTerm } from "./plan.ts";

/** What a name of a quantity reads: of a coordinate or support, and of an element. */
const DERIVATIVES: ReadonlyMap<string, 0 | 1 | 2> = new Map([
  ["displacement", 0],
  ["angle", 0],
  ["velocity", 1],
  ["speed", 1],
  ["acceleration", 2],
  ["angular_acceleration", 2],
]);

const ELEMENT_MEASURES: ReadonlyMap<string, ElementMeasure> = new Map([
  ["travel", "travel"],
  ["twist", "travel"],
  ["rate", "rate"],
  ["force", "force"],
  ["torque", "force"],
  ["power", "power"],
  ["energy", "energy"],
]);

/** What slides and what turns call the same thing. */
const COUNTERPARTS: ReadonlyMap<string, string> = new Map([
  ...[...DERIVATIVES].map(([name, derivative]) => [name, `derivative ${derivative}`] as const),
  ...ELEMENT_MEASURES,
]);

/** Quantities of a group beside those that its description names: sums too, or common to all of its members. */
const GROUP_EXTRAS = ["travel", "twist", "rate", "power", "energy"];

/**
 * Understands `unit.velocity`, `feet.force`, `a.displacement - b.displacement`, and where `bare` allows it the
 * name of an element or group, which stands for its force. undefined: it has an error, which has been said.
 */
export function planSeries(node: Expression, draft: Draft, bare = false): PlannedQuantity | undefined {
  const terms = seriesTerms(node, draft, bare);
  if (terms === undefined) return undefined;
  return { ...terms, span: node.span };
}

type Series = Omit<PlannedQuantity, "span">;

function seriesTerms(node: Expression, draft: Draft, bare: boolean): Series | undefined {
  switch (node.kind) {
    case "parenthesis":
      return seriesTerms(node.inner, draft, bare);
    case "path":
      return pathSeries(node, draft, bare);
    case "unary": {
      const inner = node.operator === "not" ? noSeries(node, draft) : seriesTerms(node.operand, draft, false);
      return inner && node.operator === "-" ? scaledSeries(inner, () => -1, "-") : inner;
    }
    case "binary":
      return binarySeries(node, draft);
    case "broken":
      return undefined;
    default:
      return noSeries(node, draft);
  }
}

function binarySeries(node: Extract<Expression, { kind: "binary" }>, draft: Draft): Series | undefined {
  const { operator, left, right } = node;
  if (operator === "+" || operator === "-") {
    const [a, b] = [seriesTerms(left, draft, false), seriesTerms(right, draft, false)];
    return a && b && sumOf(node, a, b, draft);
  }
  if (operator !== "*" && operator !== "/") return noSeries(node, draft);
  const leftIsSeries = holdsSeries(left);
  if (leftIsSeries === holdsSeries(right) || (operator === "/" && !leftIsSeries))
    return noSeries(node, draft);
  const [seriesNode, factorNode] = leftIsSeries ? [left, right] : [right, left];
  const series = seriesTerms(seriesNode, draft, false);
  const c = { ...draft.numbers, root: factorNode };
  const factor = check(factorNode, c, { kinds: [NUMBER], says: "a bare number", units: [] });
  if (series === undefined || factor === undefined) return undefined;
  const run = compile(factor.code);
  const text = draft.main.tree.text.slice(factorNode.span.start, factorNode.span.end);
  const shown = leftIsSeries ? `${grouped(series)} ${operator} ${text}` : `${text} * ${grouped(series)}`;
  const scale = operator === "*" ? run : (frame: Parameters<typeof run>[0]) => 1 / run(frame);
  return { ...scaledSeries(series, scale, ""), text: shown };
}

const grouped = (series: Series): string => (series.text.includes(" ") ? `(${series.text})` : series.text);

function sumOf(
  node: Extract<Expression, { kind: "binary" }>,
  a: Series,
  b: Series,
  draft: Draft,
): Series | undefined {
  const like = agrees({ kind: a.kind, code: NO_CODE }, b) && a.unit === b.unit;
  if (!like) {
    const message = `\`${a.text}\` is in ${a.unit} and \`${b.text}\` in ${b.unit}; only like quantities add up`;
    draft.findings.say("unit-mismatch", node.right.span, message);
    return undefined;
  }
  const right = node.operator === "-" ? scaledSeries(b, () => -1, "") : b;
  const shown = node.operator === "-" ? grouped(b) : b.text;
  return { ...a, text: `${a.text} ${node.operator} ${shown}`, terms: [...a.terms, ...right.terms] };
}

const NO_CODE = { op: "constant", value: 1, span: { start: 0, end: 0 } } as const;

function scaledSeries(series: Series, by: PlannedTerm["factor"], sign: string): Series {
  const terms = series.terms.map(({ term, factor }) => ({
    term,
    factor: (frame: Parameters<typeof factor>[0]) => by(frame) * factor(frame),
  }));
  return { ...series, text: sign + grouped(series), terms };
}

/** Whether a node speaks of something with a quantity, rather than of a number. */
function holdsSeries(node: Expression): boolean {
  switch (node.kind) {
    case "path":
      return node.names.length > 1;
    case "parenthesis":
      return holdsSeries(node.inner);
    case "unary":
      return holdsSeries(node.operand);
    case "binary":
      return holdsSeries(node.left) || holdsSeries(node.right);
    default:
      return false;
  }
}

function noSeries(node: Expression, draft: Draft): undefined {
  draft.findings.say(
    "wrong-kind",
    node.span,
    "expected a quantity of the model, as `unit.velocity` or `mounts.force`",
    {
      hint: "quantities may be added, subtracted and multiplied by bare numbers",
    },
  );
  return undefined;
}

function pathSeries(node: PathNode, draft: Draft, bare: boolean): Series | undefined {
  const [first, second, ...more] = node.names;
  if (first === undefined) return undefined;
  if (first.text === "ground") return supportSeries(node, undefined, draft);
  const entity = draft.main.names.get(first.text);
  if (entity === undefined) {
    sayUnknownName(first, namesWithQuantities(draft), draft.findings);
    return undefined;
  }
  if (draft.unsound.has(first.text)) return undefined;
  const coordinate = draft.coordinateByName.get(first.text);
  if (coordinate !== undefined) {
    const { motion } = draft.coordinates[coordinate];
    const chosen = quantityOf(node, second, more, entity.description.quantities, motion, draft);
    const derivative = chosen && DERIVATIVES.get(chosen.name);
    if (chosen === undefined || derivative === undefined) return undefined;
    return series(node, chosen, motion, [{ of: "coordinate", index: coordinate, derivative }]);
  }
  if (entity.keyword === "support") return supportSeries(node, entity.description.quantities, draft);
  if (entity.keyword === "group") return groupSeries(node, draft, bare);
  const element = draft.plannedByName.get(first.text);
  if (element !== undefined) return elementSeries(node, element, draft, bare);
  const hint = "quantities belong to what moves and to what joins, as `unit.velocity` or `mounts.force`";
  draft.findings.say(
    "wrong-kind",
    first.span,
    `\`${first.text}\` is ${aKeyword(entity.keyword)} and has no quantities`,
    { hint },
  );
  return undefined;
}

function* namesWithQuantities(draft: Draft): Iterable<string> {
  yield* draft.coordinateByName.keys();
  yield* draft.elements.keys();
  yield* draft.supportByName.keys();
  yield "ground";
}

function series(
  node: PathNode,
  chosen: QuantityDescription,
  motion: Motion,
  terms: readonly PlannedTerm["term"][],
): Series {
  const kind = kindOfQuantity(chosen.measure, motion);
  return {
    text: node.names.map(({ text }) => text).join("."),
    terms: terms.map((term) => ({ term, factor: () => 1 })),
    unit: unitOfQuantity(chosen.measure, motion, kind),
    kind,
  };
}

const kindOfQuantity = (measure: Measure, motion: Motion): Kind => dimensionOf(measure, motion) ?? NUMBER;

/** SI unit of a series; angles in rad, turning speeds in rad/s. */
function unitOfQuantity(measure: Measure, motion: Motion, kind: Kind): string {
  if (motion === "turning" && kind.rate) return "rad/s";
  if (motion === "turning" && isNumber(kind)) return "rad";
  if (motion === "turning" && measure === "acceleration") return "rad/s^2";
  return measure === "energy" ? "J" : siUnit(kind);
}

/** The quantity behind the dot, of those that fit the motion. */
function quantityOf(
  node: PathNode,
  name: NameNode | undefined,
  more: readonly NameNode[],
  all: readonly QuantityDescription[],
  motion: Motion,
  draft: Draft,
): QuantityDescription | undefined {
  const fitting = all.filter(({ whenMotion }) => whenMotion === undefined || whenMotion.includes(motion));
  const names = fitting.map((each) => each.name);
  const subject = node.names[0].text;
  if (name === undefined) {
    draft.findings.say(
      "wrong-kind",
      node.span,
      `which quantity of \`${subject}\` is meant: ${orList(names)}?`,
      {
        fixes: names
          .slice(0, 4)
          .map((each) => replaceFix(`Write \`${subject}.${each}\``, node.span, `${subject}.${each}`)),
      },
    );
    return undefined;
  }
  const found = fitting.find((each) => each.name === name.text);
  if (found !== undefined && more.length === 0) return found;
  if (found !== undefined) {
    draft.findings.say(
      "unknown-name",
      more[0].span,
      `\`${subject}.${name.text}\` is one number and has no \`${more[0].text}\``,
    );
    return undefined;
  }
  const other = all.find((each) => each.name === name.text);
  const same = COUNTERPARTS.get(name.text);
  const counterpart = fitting.find((each) => same !== undefined && COUNTERPARTS.get(each.name) === same);
  const near = counterpart?.name ?? nearest(name.text, names);
  const fixes = near === undefined ? [] : [replaceFix(`Write \`${near}\``, name.span, near)];
  const hint = `it has ${names.join(", ")}`;
  if (other !== undefined) {
    draft.findings.say(
      "wrong-kind",
      name.span,
      `\`${subject}\` ${motionWord(motion)} and has no ${name.text}`,
      { hint, fixes },
    );
  } else {
    draft.findings.say("unknown-name", name.span, `\`${subject}\` has no quantity \`${name.text}\``, {
      hint,
      fixes,
    });
  }
  return undefined;
}

function elementSeries(
  node: PathNode,
  element: PlannedStatement,
  draft: Draft,
  bare: boolean,
): Series | undefined {
  const [, second, ...more] = node.names;
  const { quantities } = element.description;
  if (second === undefined && bare) {
    const force = quantities.find((each) => each.name === "force");
    return (
      force && series(node, force, element.motion, [{ of: "element", name: element.name, measure: "force" }])
    );
  }
  const chosen = quantityOf(node, second, more, quantities, element.motion, draft);
  const measure = chosen && ELEMENT_MEASURES.get(chosen.name);
  if (chosen === undefined || measure === undefined) return undefined;
  return series(node, chosen, element.motion, [{ of: "element", name: element.name, measure }]);
}

function groupSeries(node: PathNode, draft: Draft, bare: boolean): Series | undefined {
  const [first, second, ...more] = node.names;
  const members = membersOf(first.text, draft);
  if (members === undefined || members.length === 0) return undefined;
  const [{ motion, description }] = members;
  const own = draft.main.names.get(first.text)?.description.quantities ?? [];
  const extras = description.quantities.filter((each) => GROUP_EXTRAS.includes(each.name));
  const all = [...own, ...extras.filter((extra) => !own.some((each) => each.name === extra.name))];
  const chosen =
    second === undefined && bare
      ? all.find((each) => each.name === "force")
      : quantityOf(node, second, more, all, motion, draft);
  const measure = chosen && ELEMENT_MEASURES.get(chosen.name);
  if (chosen === undefined || measure === undefined) return undefined;
  const isCommon = measure === "travel" || measure === "rate";
  if (isCommon && !members.every((member) => sameEnds(member, members[0]))) {
    draft.findings.say(
      "wrong-kind",
      (second ?? first).span,
      `the members of \`${first.text}\` do not lie between the same ends, so it has no one ${second?.text}`,
      {
        hint: `name the member that is meant, as \`${members[0].name}.${second?.text}\``,
      },
    );
    return undefined;
  }
  const counted = isCommon ? members.slice(0, 1) : members;
  return series(
    node,
    chosen,
    motion,
    counted.map(({ name }) => ({ of: "element", name, measure })),
  );
}

/** The planned elements of a group; undefined while one of them has an error. */
export function membersOf(group: string, draft: Draft): readonly PlannedStatement[] | undefined {
  const names = memberNames(group, draft);
  const members = names?.map((name) => draft.plannedByName.get(name));
  return members?.every((member) => member !== undefined) ? (members as PlannedStatement[]) : undefined;
}

function sameEnds(a: PlannedStatement, b: PlannedStatement): boolean {
  return JSON.stringify(a.ends) === JSON.stringify(b.ends);
}

/** Motion of a support, and the force on it: the sum over what is joined to it, along one direction. */
function supportSeries(
  node: PathNode,
  described: readonly QuantityDescription[] | undefined,
  draft: Draft,
): Series | undefined {
  const [first, second, ...more] = node.names;
  const reaction: QuantityDescription = { name: "reaction", measure: "force", says: "" };
  if (described === undefined) {
    const motions = joinedMotions(undefined, draft);
    const motion = motions.includes("turning") && !motions.includes("sliding") ? "turning" : "sliding";
    const chosen = quantityOf(node, second, more, [reaction], motion, draft);
    return chosen && reactionSeries(node, chosen, motion, undefined, draft);
  }
  const whole = draft.supportByName.get(first.text);
  const direction =
    whole === undefined ? draft.supportByName.get(`${first.text}.${second?.text}`) : undefined;
  const index = whole ?? direction;
  if (index === undefined) {
    const hint = "as `floor.z.displacement`";
    draft.findings.say(
      "wrong-kind",
      node.span,
      `\`${first.text}\` is a support of kind body; a direction is missing`,
      { hint },
    );
    return undefined;
  }
  const { motion } = draft.supports[index];
  const [name, ...rest] = whole === undefined ? more : [second, ...more];
  const chosen = quantityOf(
    node,
    name,
    rest.filter((each) => each !== undefined),
    described,
    motion,
    draft,
  );
  if (chosen === undefined) return undefined;
  if (chosen.name === "reaction") return reactionSeries(node, chosen, motion, index, draft);
  const derivative = DERIVATIVES.get(chosen.name);
  return derivative === undefined
    ? undefined
    : series(node, chosen, motion, [{ of: "support", index, derivative }]);
}

function reactionSeries(
  node: PathNode,
  chosen: QuantityDescription,
  motion: Motion,
  index: number | undefined,
  draft: Draft,
): Series {
  return { ...series(node, chosen, motion, []), terms: reactionTerms(index, motion, draft) };
}

const joinedMotions = (index: number | undefined, draft: Draft): Motion[] =>
  draft.planned.filter((each) => sideOf(each, index) !== 0).map((each) => each.motion);

/** A positive force pulls the ends together: along the coordinate on B, against it on A. */
function reactionTerms(index: number | undefined, motion: Motion, draft: Draft): PlannedTerm[] {
  return draft.planned.flatMap((element) => {
    const side = element.motion === motion ? sideOf(element, index) : 0;
    if (side === 0) return [];
    return [
      { term: { of: "element", name: element.name, measure: "force" }, factor: () => side } as PlannedTerm,
    ];
  });
}

/** 1 where the support (ground: undefined) is end B, -1 where it is end A, 0 where it is neither. */
function sideOf({ ends }: PlannedStatement, index: number | undefined): -1 | 0 | 1 {
  const isIt = (end: PlannedStatement["ends"][string] | undefined): boolean =>
    index === undefined ? end?.is === "ground" : end?.is === "support" && end.index === index;
  if (isIt(ends.b)) return 1;
  return isIt(ends.a) ? -1 : 0;
}
