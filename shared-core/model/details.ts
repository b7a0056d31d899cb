import type { DetailNode, Item, NameNode, TableRow, ValueNode } from "../syntax/tree.ts";
import { nearest } from "../text/nearest.ts";
import { cover, type Span } from "../text/span.ts";
import type { DetailDescription, StatementDescription } from "../vocabulary/description.ts";
import { detailOf } from "../vocabulary/registry.ts";
import { type Draft, sayNotYet } from "./draft.ts";
import { editsFix, type Findings, orList, replaceFix } from "./findings.ts";
import { aKeyword, type Described, nameSpan } from "./names.ts";

/** A detail that is given: in the head, on a line of its own, or taken over by `like`. */
export interface Given {
  readonly key: string;
  readonly description: DetailDescription;
  readonly items: readonly Item[];
  readonly table?: readonly TableRow[];
  /** Of the key, or of the value in the head. */
  readonly span: Span;
  readonly node?: DetailNode;
}

export interface GivenDetails {
  readonly details: ReadonlyMap<string, Given>;
  /** False where something was wrong; it has been said. */
  readonly sound: boolean;
}

/** The details of a statement that can be used, those of the element it is `like` included. */
export function givenDetails(statement: Described, draft: Draft): GivenDetails {
  const known = draft.given.get(statement);
  if (known !== undefined) return known;
  const own = ownDetails(statement, draft);
  const like = own.details.get("like");
  if (like === undefined) {
    draft.given.set(statement, own);
    return own;
  }
  draft.likeOpen.push(statement);
  const other = likeOf(statement, like, draft);
  draft.likeOpen.pop();
  const details = new Map(own.details);
  for (const [key, given] of other?.details ?? []) if (!details.has(key)) details.set(key, given);
  const merged = { details, sound: own.sound && (other?.sound ?? false) };
  draft.given.set(statement, merged);
  return merged;
}

/** Longer chains of `like` are cut; chosen so that following one stays far from the end of the stack. */
const LONGEST_LIKE = 1500;

function ownDetails({ node, description }: Described, draft: Draft): GivenDetails {
  const details = new Map<string, Given>();
  let sound = !node.broken;
  const { principal } = description;
  const inHead = principal === undefined ? undefined : detailOf(description, principal);
  // A head that could not be read to its end holds part of a value, and that has been said.
  if (inHead !== undefined && node.value !== undefined && node.value.length > 0 && !node.broken) {
    const span = cover(node.value[0].span, node.value[node.value.length - 1].span);
    details.set(inHead.key, { key: inHead.key, description: inHead, items: node.value, span });
  }
  for (const detail of node.details) {
    const given = detail.broken ? undefined : ownDetail(detail, description, draft);
    if (given === undefined) sound = false;
    else details.set(given.key, given);
  }
  return { details, sound };
}

function ownDetail(detail: DetailNode, description: StatementDescription, draft: Draft): Given | undefined {
  const key = detail.key.text;
  const known = detailOf(description, key);
  if (known === undefined) {
    sayUnknownDetail(detail.key, description, draft.findings);
    return undefined;
  }
  if (known.notYet) {
    sayNotYet(draft, detail.key.span, `\`${key}\``);
    return undefined;
  }
  if (detail.component !== undefined && known.content.is !== "tuple") {
    draft.findings.say(
      "unknown-detail",
      detail.component.span,
      `\`${key}\` has no component \`${detail.component.text}\``,
    );
    return undefined;
  }
  const { items, table } = detail;
  return { key, description: known, items, ...(table ? { table } : {}), span: detail.key.span, node: detail };
}

function sayUnknownDetail(key: NameNode, description: StatementDescription, findings: Findings): void {
  const keys = description.details.map((detail) => detail.key);
  const near = nearest(key.text, keys);
  const what = `\`${description.keyword}${description.variant ? ` ${description.variant}` : ""}\``;
  findings.say("unknown-detail", key.span, `${what} has no detail \`${key.text}\``, {
    hint: keys.length > 0 ? `it takes ${keys.join(", ")}` : "it takes no details",
    fixes: near === undefined ? [] : [replaceFix(`Write \`${near}\``, key.span, near)],
  });
}

function likeOf(statement: Described, like: Given, draft: Draft): GivenDetails | undefined {
  const name = nameItem(like.items[0]);
  if (name === undefined) {
    draft.findings.say(
      "wrong-kind",
      like.span,
      "`like` takes the name of one element, as in `like = mounts`",
    );
    return undefined;
  }
  const keyword = statement.node.keyword.text;
  const other = draft.byName.get(name.text);
  if (other === undefined) {
    sayUnknownName(name, namesOfKeyword(keyword, draft), draft.findings);
    return undefined;
  }
  if (other.node.keyword.text !== keyword) {
    const message = `\`${name.text}\` is ${aKeyword(other.node.keyword.text)}; a ${keyword} can only be like a ${keyword}`;
    draft.findings.say("wrong-kind", name.span, message);
    return undefined;
  }
  const isCircle = draft.likeOpen.includes(other);
  if (isCircle || draft.likeOpen.length > LONGEST_LIKE) {
    const message = isCircle
      ? `\`${other.name}\` is like itself`
      : `this chain of \`like\` is longer than ${LONGEST_LIKE} elements`;
    draft.findings.say("circular-definition", name.span, message, {
      related: [{ span: nameSpan(other.node), message: `\`${other.name}\` stands here` }],
    });
    return undefined;
  }
  return givenDetails(other, draft);
}

function* namesOfKeyword(keyword: string, draft: Draft): Iterable<string> {
  for (const { node, name } of draft.statements) {
    if (node.keyword.text === keyword && name !== undefined) yield name;
  }
}

/** Says which required detail is missing; true when none is. */
export function hasRequired(statement: Described, given: GivenDetails, draft: Draft): boolean {
  const { node, description } = statement;
  let complete = true;
  for (const detail of description.details) {
    const broken = node.details.some((each) => each.key.text === detail.key);
    const lost = node.broken && detail.key === description.principal;
    if (!detail.required || detail.notYet || given.details.has(detail.key) || broken || lost) continue;
    complete = false;
    sayMissing(statement, detail, draft.findings);
  }
  return complete;
}

/** Says that a detail is missing, with the line that would give it. */
export function sayMissing(
  { node, description, name }: Described,
  detail: DetailDescription,
  findings: Findings,
): void {
  // A detail that could not be read, or is none, may be the one that is missing.
  const unread = node.details.some(
    ({ broken, key }) => broken || detailOf(description, key.text) === undefined,
  );
  if (node.broken || unread) return;
  const what = [node.keyword.text, description.variant, name === description.variant ? undefined : name]
    .filter((word) => word !== undefined)
    .join(" ");
  const principal = description.principal === detail.key;
  const example = principal ? `${what} = ${detail.example}` : `${detail.key} = ${detail.example}`;
  const end = node.headSpan.end;
  const line = principal ? ` = ${detail.example}` : `\n    ${detail.key} = ${detail.example}`;
  const canAdd = detail.content.is !== "table";
  findings.say("missing-detail", nameSpan(node), `\`${what}\` needs \`${detail.key}\`: ${detail.says}`, {
    hint: `as in \`${example}\``,
    fixes: canAdd ? [editsFix(`Add \`${example}\``, [{ span: { start: end, end }, text: line }])] : [],
  });
}

/** A single name: `positive`, `mounts`. */
export function nameItem(item: Item | undefined): NameNode | undefined {
  if (item?.kind !== "value" || item.tolerance || item.within) return undefined;
  const { expression } = item;
  return expression.kind === "path" && expression.names.length === 1 ? expression.names[0] : undefined;
}

/** One word of a list; undefined where it is none of them, which is said. */
export function wordOf(given: Given, words: readonly string[], findings: Findings): string | undefined {
  const [item] = given.items;
  const name = nameItem(item);
  if (name !== undefined && given.items.length === 1 && words.includes(name.text)) return name.text;
  const span = item?.span ?? given.span;
  const near = name === undefined ? undefined : nearest(name.text, words);
  const foundText = name === undefined ? "" : `, found \`${name.text}\``;
  findings.say("wrong-kind", span, `\`${given.key}\` is ${orList(words)}${foundText}`, {
    fixes: near === undefined ? [] : [replaceFix(`Write \`${near}\``, span, near)],
  });
  return undefined;
}

/** The one value of a detail; undefined where it holds something else, which is said. */
export function singleValue(given: Given, findings: Findings): ValueNode | undefined {
  const [item] = given.items;
  if (given.items.length === 1 && item?.kind === "value") return item;
  const span = given.items.length > 1 ? given.items[1].span : (item?.span ?? given.span);
  const found = given.items.length > 1 ? `${given.items.length} values` : itemWords(item);
  findings.say("wrong-kind", span, `\`${given.key}\` takes one number, found ${found}`, {
    hint: `as in \`${given.key} = ${given.description.example}\``,
  });
  return undefined;
}

export function itemWords(item: Item | undefined): string {
  if (item === undefined) return "rows";
  return { value: "a number", range: "a range", at: "a value at a rate", text: "a text in quotes" }[
    item.kind
  ];
}

/** Says that nothing has this name, with the nearest of those that would fit. */
export function sayUnknownName(
  name: NameNode,
  candidates: Iterable<string>,
  findings: Findings,
  hint?: string,
): void {
  const near = findings.suggest(name.text, candidates);
  findings.say("unknown-name", name.span, `nothing is called \`${name.text}\``, {
    about: name.text,
    hint,
    fixes: near === undefined ? [] : [replaceFix(`Write \`${near}\``, name.span, near)],
  });
}
