/** Springs merged and split: side by side and one behind the other, with the same physics. */

import { instantiate } from "../model/instantiate.ts";
import type { Model } from "../model/model.ts";
import type { DetailNode, Expression, StatementNode, Tree } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { formatNumber } from "../units/show.ts";
import { pathIn } from "./complete-names.ts";
import { type Occurrence, occurrences } from "./navigate-names.ts";
import { slice } from "./navigate-nodes.ts";
import {
  type CodeAction,
  freeName,
  nameOf,
  refused,
  STEP,
  statementAt,
  withoutLines,
} from "./refactor-edits.ts";
import type { View } from "./view.ts";

const KIND = "refactor.rewrite";

/** What can be done with the spring under the cursor and its neighbours. */
export function springActions({ model }: View, range: Span): readonly CodeAction[] {
  const { tree } = model;
  const spring = statementAt(tree, range);
  if (spring?.keyword.text !== "spring" || spring.broken || nameOf(spring) === "") return [];
  return [
    ...parallelOf(tree, spring).map((other) => mergeParallel(model, spring, other)),
    ...seriesOf(tree, spring).map(({ other, joint }) => mergeSeries(model, spring, other, joint)),
    ...splitParallel(model, spring),
    ...splitSeries(model, spring),
  ];
}

const springsIn = (tree: Tree): readonly StatementNode[] =>
  tree.statements.filter(({ keyword, broken }) => keyword.text === "spring" && !broken);

const endsOf = (spring: StatementNode): readonly (string | undefined)[] => [
  pathIn(spring, "a"),
  pathIn(spring, "b"),
];

function parallelOf(tree: Tree, spring: StatementNode): readonly StatementNode[] {
  const [a, b] = endsOf(spring);
  return springsIn(tree).filter((other) => {
    const [c, d] = endsOf(other);
    return (
      other !== spring && a !== undefined && b !== undefined && ((a === c && b === d) || (a === d && b === c))
    );
  });
}

/** Springs that share a junction with this one. */
function seriesOf(
  tree: Tree,
  spring: StatementNode,
): readonly { other: StatementNode; joint: StatementNode }[] {
  return endsOf(spring).flatMap((end) => {
    const joint = tree.statements.find((each) => each.keyword.text === "junction" && nameOf(each) === end);
    const other = springsIn(tree).find((each) => each !== spring && endsOf(each).includes(end));
    return joint && other && parallelOf(tree, spring).every((each) => each !== other)
      ? [{ other, joint }]
      : [];
  });
}

function mergeParallel(model: Model, spring: StatementNode, other: StatementNode): CodeAction {
  const [first, second] = [spring, other].sort((a, b) => a.span.start - b.span.start);
  const [name, gone] = [nameOf(first), nameOf(second)];
  const title = `Merge \`${gone}\` into \`${name}\``;
  const alike =
    stiffnessText(model.tree, first) === stiffnessText(model.tree, second) &&
    sameDetails(model.tree, first, second, ["count"]);
  const reason = notSimple(model, [first, second], alike) ?? namedAnywhere(model, [first, second]);
  if (reason) return refused(title, KIND, reason);
  const { tree } = model;
  if (alike) {
    const count = countOf(first) + countOf(second);
    return {
      title: `${title} with \`count = ${count}\``,
      kind: KIND,
      edits: [withCount(tree, first, count), removed(tree, second)],
      safe: true,
    };
  }
  const value = `parallel(${termOf(tree, first)}, ${termOf(tree, second)})`;
  const edits = [...withStiffness(tree, first, value), removed(tree, second)];
  return {
    title: `${title}: ${equivalence(model, [first, second], "parallel")}`,
    kind: KIND,
    edits,
    safe: true,
  };
}

function mergeSeries(
  model: Model,
  spring: StatementNode,
  other: StatementNode,
  joint: StatementNode,
): CodeAction {
  const { tree } = model;
  const [first, second] = [spring, other].sort((a, b) => a.span.start - b.span.start);
  const [name, gone, middle] = [first, second, joint].map(nameOf);
  const title = `Merge \`${gone}\` behind \`${name}\``;
  const reason =
    notSimple(model, [first, second], false) ??
    namedAnywhere(model, [first, second]) ??
    namedElsewhere(model, joint, [first, second]) ??
    (sameDetails(tree, first, second, ["count"]) ? undefined : "their details are not alike") ??
    (joint.notes.length > 0 ? `\`${middle}\` has notes, which would have no place` : undefined);
  if (reason) return refused(title, KIND, reason);
  const ends = [...endsOf(first), ...endsOf(second)].filter((end) => end !== middle);
  if (ends[0] === ends[1]) return refused(title, KIND, `both end at \`${ends[0]}\``);
  const slot = pathIn(first, "a") === middle ? "a" : "b";
  const place = first.slots[slot]?.span;
  const value = `series(${termOf(tree, first)}, ${termOf(tree, second)})`;
  const edits = [
    ...(place ? [{ span: place, text: ends[1] ?? "" }] : []),
    ...withStiffness(tree, first, value),
    removed(tree, second),
    removed(tree, joint),
  ];
  return {
    title: `${title}: ${equivalence(model, [first, second], "series")}`,
    kind: KIND,
    edits,
    safe: true,
  };
}

/** A spring of `parallel(…)`, of a sum or of a count, as springs side by side; its name goes to their group. */
function splitParallel(model: Model, spring: StatementNode): readonly CodeAction[] {
  const { tree } = model;
  const value = stiffnessOf(spring);
  const count = countOf(spring);
  const terms =
    value && !value.tolerance ? parallelTerms(value.expression).map((each) => slice(tree, each.span)) : [];
  const parts =
    terms.length > 1
      ? terms
      : count > 1 && count <= MOST_PARTS && value
        ? Array<string>(count).fill(slice(tree, value.span))
        : [];
  if (parts.length === 0) return [];
  const name = nameOf(spring);
  const title = `Split \`${name}\` into ${parts.length} springs side by side`;
  const reason = notSplit(
    model,
    spring,
    terms.length > 1 && count > 1,
    terms.length > 1 ? ["mass", "preload", "like"] : ["like"],
  );
  if (reason) return [refused(title, KIND, reason)];
  const names = partNames(model, name, parts.length);
  const keeps = terms.length > 1 ? [] : ["count"];
  const lines = parts.flatMap((part, i) => springLines(tree, spring, names[i], endsOf(spring), part, keeps));
  const named = occurrences(tree).filter(({ key, role }) => key === name && role === "reference");
  // A group holds joining elements: the parts stand in it, and elsewhere their own group has the name.
  const grouped = named.filter(({ statement }) => statement.keyword.text === "group");
  const group = named.length > grouped.length ? [`group ${name} = ${names.join(", ")}`] : [];
  const inGroups = grouped.map(({ span }) => ({ span, text: names.join(", ") }));
  return [
    { title, kind: KIND, edits: [replaced(tree, spring, [...lines, ...group]), ...inGroups], safe: true },
  ];
}

/** More would be a list to scroll through. */
const MOST_PARTS = 8;

/** A spring of `series(…)`, as springs one behind the other. */
function splitSeries(model: Model, spring: StatementNode): readonly CodeAction[] {
  const { tree } = model;
  const expression = stiffnessOf(spring)?.expression;
  if (expression?.kind !== "call" || expression.callee.text !== "series" || expression.positional.length < 2)
    return [];
  const name = nameOf(spring);
  const parts = expression.positional.map((each) => slice(tree, each.span));
  const title = `Split \`${name}\` into ${parts.length} springs one behind the other`;
  const named = occurrences(tree).find(({ key, role }) => key === name && role === "reference");
  const reason =
    notSplit(model, spring, countOf(spring) > 1, ["mass", "preload", "like", "rated_travel"]) ??
    (named ? `${placeText(named)} names \`${name}\`` : undefined);
  if (reason) return [refused(title, KIND, reason)];
  const names = partNames(model, name, parts.length);
  const joints = parts
    .slice(1)
    .map((_, i) => freeName(model, `${name}_joint${parts.length > 2 ? `_${i + 1}` : ""}`, names));
  const [a, b] = endsOf(spring);
  const places = [a, ...joints, b];
  const turning = model.buildable && elementMotion(model, name) === "turning";
  const lines = [
    ...joints.flatMap((joint) => [`junction ${joint}`, ...(turning ? [`${STEP}kind = turning`] : [])]),
    ...parts.flatMap((part, i) => springLines(tree, spring, names[i], [places[i], places[i + 1]], part, [])),
  ];
  return [{ title, kind: KIND, edits: [replaced(tree, spring, lines)], safe: true }];
}

const elementMotion = (model: Model, name: string): string | undefined =>
  instantiate(model, 0).assembly.elements.find((each) => each.name === name)?.motion;

/** Why two springs cannot become one. */
function notSimple(model: Model, springs: readonly StatementNode[], alike: boolean): string | undefined {
  for (const spring of springs) {
    const name = nameOf(spring);
    const value = stiffnessOf(spring);
    if (!value) return `\`${name}\` has no stiffness of its own`;
    if (value.tolerance && !alike)
      return `the tolerance of \`${name}\` is a draw of its own, which one spring would not have`;
    if (value.within) return `\`${name}\` has a range`;
    const odd = spring.details.find(({ key }) => !MERGED.has(key.text));
    if (odd && !alike) return `\`${name}\` has \`${odd.key.text}\`, which is for one of them`;
    if (spring.notes.length > 0 && spring !== springs[0])
      return `\`${name}\` has notes, which would have no place`;
    if (spring.details.some(({ notes }) => notes.length > 0)) return `a detail of \`${name}\` has notes`;
  }
  const [first, second] = springs;
  if (!sameDetails(model.tree, first, second, ["count", "stiffness"])) return "their details are not alike";
  return undefined;
}

/** Details that hold for two springs as for the one they make, where they are alike. */
const MERGED: ReadonlySet<string> = new Set(["stiffness", "count", "loss_factor", "damping_ratio"]);

function notSplit(
  model: Model,
  spring: StatementNode,
  counted: boolean,
  shared: readonly string[],
): string | undefined {
  if (counted) return "its `count` stands for several already";
  if (spring.details.some(({ notes }) => notes.length > 0))
    return "a detail has notes, which would be said of each part";
  const odd = spring.details.find(({ key }) => shared.includes(key.text));
  if (odd) return `\`${odd.key.text}\` would have to be shared out`;
  if (stiffnessOf(spring)?.within) return "its range is for the whole";
  const like = occurrences(model.tree).find(
    ({ key, detail }) => key === nameOf(spring) && detail?.key.text === "like",
  );
  return like ? `${placeText(like)} is like it` : undefined;
}

/** What names one of two springs: their force and travel would not be those of the one they make. */
function namedAnywhere(model: Model, springs: readonly StatementNode[]): string | undefined {
  for (const spring of springs) {
    const reason = namedElsewhere(model, spring, []);
    if (reason) return reason;
  }
  return undefined;
}

function namedElsewhere(
  model: Model,
  statement: StatementNode,
  by: readonly StatementNode[],
): string | undefined {
  const name = nameOf(statement);
  const found = occurrences(model.tree).find(
    ({ key, role, statement: where }) => key === name && role === "reference" && !by.includes(where),
  );
  return found && `${placeText(found)} names \`${name}\`, which would mean something else`;
}

function placeText({ statement }: Occurrence): string {
  const name = nameOf(statement);
  return `\`${statement.keyword.text}${name === "" ? "" : ` ${name}`}\``;
}

const detailIn = (spring: StatementNode, key: string): DetailNode | undefined =>
  spring.details.find((detail) => detail.key.text === key);

function stiffnessOf(spring: StatementNode) {
  const [item] = spring.value ?? detailIn(spring, "stiffness")?.items ?? [];
  return item?.kind === "value" ? item : undefined;
}

const stiffnessText = (tree: Tree, spring: StatementNode): string => {
  const value = stiffnessOf(spring);
  return value ? slice(tree, value.span) : "";
};

/** A count that is written as a number; 1 where there is none. */
function countOf(spring: StatementNode): number {
  const [item] = detailIn(spring, "count")?.items ?? [];
  if (item === undefined) return 1;
  return item.kind === "value" && item.expression.kind === "number" ? item.expression.value : 1;
}

/** Stiffness with its count, as an argument of a helper. */
function termOf(tree: Tree, spring: StatementNode): string {
  const expression = stiffnessOf(spring)?.expression;
  const text = expression ? slice(tree, expression.span) : "";
  const count = detailIn(spring, "count")?.items[0];
  if (!count) return text;
  const simple = expression?.kind === "number" || expression?.kind === "path" || expression?.kind === "call";
  return `${slice(tree, count.span)} * ${simple ? text : `(${text})`}`;
}

function sameDetails(tree: Tree, a: StatementNode, b: StatementNode, but: readonly string[]): boolean {
  const texts = (spring: StatementNode) =>
    spring.details
      .filter(({ key }) => !but.includes(key.text))
      .map(({ key, items, span }) => `${key.text}=${slice(tree, items[0]?.span ?? span)}`)
      .sort()
      .join("\n");
  return texts(a) === texts(b);
}

/** The parts of `parallel(a, b)` or of `a + b`. */
function parallelTerms(node: Expression): readonly Expression[] {
  if (node.kind === "call" && node.callee.text === "parallel") return node.positional;
  if (node.kind === "parenthesis") return parallelTerms(node.inner);
  if (node.kind === "binary" && node.operator === "+")
    return [...parallelTerms(node.left), ...parallelTerms(node.right)];
  return [node];
}

function partNames(model: Model, name: string, count: number): readonly string[] {
  const names: string[] = [];
  for (let i = 1; i <= count; i++) names.push(freeName(model, `${name}_${i}`, names));
  return names;
}

/** A spring with the details of another, but its count where that is split. */
function springLines(
  tree: Tree,
  spring: StatementNode,
  name: string,
  [a, b]: readonly (string | undefined)[],
  value: string,
  without: readonly string[],
): readonly string[] {
  const details = spring.details.filter(({ key }) => key.text !== "stiffness" && !without.includes(key.text));
  return [
    `spring ${name} between ${a} and ${b} = ${value}`,
    ...details.map((detail) => `${STEP}${slice(tree, detail.span)}`),
  ];
}

const removed = (tree: Tree, { span }: StatementNode) => withoutLines(tree, span);

/** Other lines in the place of a statement; its notes stay above them, comments behind them. */
function replaced(tree: Tree, spring: StatementNode, lines: readonly string[]) {
  const body = { start: spring.headSpan.start, end: spring.span.end };
  const gone = withoutLines(tree, body);
  return { span: { start: gone.span.start, end: gone.span.end }, text: `${lines.join("\n")}\n${gone.text}` };
}

/** The stiffness as a new expression without a count. */
function withStiffness(tree: Tree, spring: StatementNode, value: string) {
  const at = stiffnessOf(spring)?.span;
  const count = detailIn(spring, "count");
  return [...(at ? [{ span: at, text: value }] : []), ...(count ? [withoutLines(tree, count.span)] : [])];
}

function withCount(tree: Tree, spring: StatementNode, count: number) {
  const item = detailIn(spring, "count")?.items[0];
  if (item) return { span: item.span, text: String(count) };
  const end = tree.lines.find(
    ({ span }) => span.start <= spring.headSpan.start && spring.headSpan.end <= span.end,
  )?.span.end;
  return {
    span: { start: end ?? spring.headSpan.end, end: end ?? spring.headSpan.end },
    text: `\n${STEP}count = ${count}`,
  };
}

/** `300 N/m + 600 N/m = 900 N/m`, in SI, where the model has numbers. */
function equivalence(model: Model, springs: readonly StatementNode[], how: "parallel" | "series"): string {
  if (!model.buildable) return how;
  const { elements } = instantiate(model, 0).assembly;
  const stiffnesses = springs.map(
    (spring) => elements.find(({ name }) => name === nameOf(spring))?.stiffness ?? Number.NaN,
  );
  const [first, second] = stiffnesses;
  const unit =
    elements.find(({ name }) => name === nameOf(springs[0]))?.motion === "turning" ? "N*m/rad" : "N/m";
  const shown = (value: number) => `${formatNumber(value)} ${unit}`;
  if (how === "parallel") return `${shown(first)} + ${shown(second)} = ${shown(first + second)}`;
  return `1 / (1 / ${shown(first)} + 1 / ${shown(second)}) = ${shown(1 / (1 / first + 1 / second))}`;
}
