/** Damping beside a spring: as a ratio at a frequency, as a damper of its own, or added where there is none. */

import { instantiate } from "../model/instantiate.ts";
import type { Model } from "../model/model.ts";
import type { DetailNode, StatementNode, Tree } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { formatNumber } from "../units/show.ts";
import { pathIn } from "./complete-names.ts";
import { occurrences } from "./navigate-names.ts";
import { slice } from "./navigate-nodes.ts";
import {
  type CodeAction,
  freeName,
  linesBehind,
  nameOf,
  refused,
  STEP,
  statementAt,
  withoutLines,
} from "./refactor-edits.ts";
import type { View } from "./view.ts";

const KIND = "refactor.rewrite";

export function dampingActions(view: View, range: Span): readonly CodeAction[] {
  const { tree } = view.model;
  const statement = statementAt(tree, range);
  if (!statement || statement.broken || nameOf(statement) === "") return [];
  if (statement.keyword.text === "damper") return ratioOfDamper(view, statement);
  if (statement.keyword.text !== "spring") return [];
  const ratio = detailIn(statement, "damping_ratio");
  return ratio ? [damperOfRatio(view.model, statement, ratio)] : addDamper(view.model, statement);
}

/** `5 % at 12 Hz` of a stiffness k is a damper of 2 zeta k / omega: written as that very expression. */
function damperOfRatio(model: Model, spring: StatementNode, ratio: DetailNode): CodeAction {
  const { tree } = model;
  const name = nameOf(spring);
  const title = `Write the damping ratio of \`${name}\` as a damper`;
  const [at] = ratio.items;
  const value = numberOf(spring, "stiffness");
  if (at?.kind !== "at" || !value)
    return refused(title, KIND, `\`${name}\` has no stiffness or no rate behind \`at\``);
  if (value.tolerance || at.value.tolerance) {
    return refused(
      title,
      KIND,
      "a tolerance is written on it, and a damper of its own would not be drawn with it; give the number a `let` first",
    );
  }
  const force = forceNamed(model, name);
  if (force) return refused(title, KIND, `${force} takes its force, which would lose the damper's part`);
  const [zeta, rate] = [factor(tree, at.value.expression), factor(tree, at.at)];
  const damping = `2 * ${zeta} * ${factor(tree, value.expression)} / (2 * pi * ${rate})`;
  const damper = freeName(model, `${name}_damping`);
  const edits = [
    withoutLines(tree, ratio.span),
    linesBehind(tree, spring, damperLines(tree, spring, damper, damping)),
  ];
  return { title, kind: KIND, edits: merged(edits, tree, spring), safe: true };
}

/** The last line of the spring may be the one that goes: then both edits are one. */
function merged(edits: readonly { span: Span; text: string }[], tree: Tree, spring: StatementNode) {
  const [gone, added] = edits;
  if (added.span.start < gone.span.start || gone.span.end < added.span.start) return edits;
  const rest = tree.text.slice(added.span.end, gone.span.end) === "" ? "" : "\n";
  const isLast = spring.details.at(-1)?.key.text === "damping_ratio";
  return isLast ? [{ span: gone.span, text: `${gone.text}${added.text.slice(1)}${rest}` }] : edits;
}

/** A damper beside one spring as the ratio that it gives at the mode in which the spring works most. */
function ratioOfDamper(view: View, damper: StatementNode): readonly CodeAction[] {
  const { model, report, stale } = view;
  const { tree } = model;
  const name = nameOf(damper);
  const [spring, another] = tree.statements.filter(
    (each) => each.keyword.text === "spring" && sameEnds(each, damper),
  );
  if (!spring || another) return [];
  const title = `Write \`${name}\` as the damping ratio of \`${nameOf(spring)}\``;
  const odd = damper.details.find(({ key }) => key.text !== "damping" && key.text !== "count");
  const reason =
    (odd ? `it has \`${odd.key.text}\`` : undefined) ??
    (numberOf(damper, "damping")?.tolerance ? "its tolerance is a draw of its own" : undefined) ??
    (numberOf(spring, "stiffness")?.tolerance
      ? "the ratio would move with the tolerance of the stiffness"
      : undefined) ??
    (detailIn(spring, "damping_ratio") ? `\`${nameOf(spring)}\` has a damping ratio` : undefined) ??
    (damper.notes.length > 0 ? "its notes would have no place" : undefined) ??
    named(model, name) ??
    forceNamed(model, nameOf(spring));
  if (reason) return [refused(title, KIND, reason)];
  const modes = report?.cases[0]?.modes;
  if (!modes?.ok || stale) return [refused(title, KIND, "the modes of this text are not computed yet")];
  const elastic = modes.table.modes.filter(({ number, frequencyHz }) => number && frequencyHz);
  const share = (mode: (typeof elastic)[number]) => mode.energyShare[nameOf(spring)] ?? 0;
  const mode = elastic.reduce((best, each) => (share(each) > share(best) ? each : best), elastic[0]);
  const rate = Number((mode?.frequencyHz ?? 0).toPrecision(3));
  const { elements } = instantiate(model, 0).assembly;
  const of = (statement: StatementNode) => elements.find((each) => each.name === nameOf(statement));
  const [stiffness, damping] = [of(spring)?.stiffness ?? 0, of(damper)?.damping ?? 0];
  if (!(rate > 0) || !(stiffness > 0)) return [refused(title, KIND, "no mode strains the spring")];
  const ratio = (Math.PI * rate * damping) / stiffness;
  const line = `damping_ratio = ${formatNumber(100 * ratio, 6)} % at ${rate} Hz`;
  const edits = [linesBehind(tree, spring, [`${STEP}${line}`]), withoutLines(tree, damper.span)];
  return [{ title: `${title}: ${line}`, kind: KIND, edits, safe: false }];
}

/** A damper of 5 % of critical damping across a spring that has none. */
function addDamper(model: Model, spring: StatementNode): readonly CodeAction[] {
  const { tree } = model;
  if (tree.statements.some((each) => each.keyword.text === "damper" && sameEnds(each, spring))) return [];
  const name = nameOf(spring);
  const title = `Add a damper across \`${name}\``;
  const stiffness = numberOf(spring, "stiffness");
  const mass = [pathIn(spring, "a"), pathIn(spring, "b")]
    .map((end) => tree.statements.find((each) => MASSES.has(each.keyword.text) && nameOf(each) === end))
    .find((each) => each !== undefined);
  const inertia = mass && numberOf(mass, mass.keyword.text);
  if (!stiffness || !inertia)
    return [refused(title, KIND, "neither end is a mass or an inertia with a number")];
  const k = slice(tree, stiffness.expression.span);
  const damping = `0.05 * critical_damping(${k}, ${slice(tree, inertia.expression.span)})`;
  const damper = freeName(model, `${name}_damper`);
  const lines = damperLines(tree, spring, damper, damping);
  return [{ title, kind: KIND, edits: [linesBehind(tree, spring, lines)], safe: false }];
}

const MASSES: ReadonlySet<string> = new Set(["mass", "inertia"]);

function damperLines(tree: Tree, spring: StatementNode, name: string, damping: string): readonly string[] {
  const count = detailIn(spring, "count");
  const [a, b] = [pathIn(spring, "a"), pathIn(spring, "b")];
  const head = `damper ${name} between ${a} and ${b} = ${damping}`;
  return count
    ? [head, `${STEP}${slice(tree, { start: count.key.span.start, end: count.span.end })}`]
    : [head];
}

function sameEnds(one: StatementNode, other: StatementNode): boolean {
  const [a, b, c, d] = [pathIn(one, "a"), pathIn(one, "b"), pathIn(other, "a"), pathIn(other, "b")];
  return a !== undefined && b !== undefined && ((a === c && b === d) || (a === d && b === c));
}

const detailIn = (statement: StatementNode, key: string): DetailNode | undefined =>
  statement.details.find((detail) => detail.key.text === key);

function numberOf(statement: StatementNode, key: string) {
  const [item] = statement.value ?? detailIn(statement, key)?.items ?? [];
  return item?.kind === "value" ? item : undefined;
}

/** Text that multiplies as one factor. */
function factor(tree: Tree, expression: { readonly kind: string; readonly span: Span }): string {
  const text = slice(tree, expression.span);
  return ["number", "path", "call", "parenthesis"].includes(expression.kind) ? text : `(${text})`;
}

/** What names a joining element at all. */
function named({ tree }: Model, name: string): string | undefined {
  const found = occurrences(tree).find(({ key, role }) => key === name && role === "reference");
  return found && `\`${found.statement.keyword.text} ${nameOf(found.statement)}\` names it`;
}

/** What takes the force, power or energy of a spring, which its damper is a part of. */
function forceNamed({ tree }: Model, name: string): string | undefined {
  const found = occurrences(tree).find(({ key, role, path }) => {
    if (key !== name || role !== "reference") return false;
    const quantity = path?.names[1]?.text;
    return quantity !== "travel" && quantity !== "rate" && quantity !== "twist";
  });
  return found && `\`${found.statement.keyword.text} ${nameOf(found.statement)}\``;
}
