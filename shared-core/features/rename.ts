import { aKeyword } from "../model/names.ts";
import { PARSING } from "../model/parsing.ts";
import { parse } from "../syntax/parser.ts";
import { placeAt, tokenAt, tokenIndexAt } from "../syntax/search.ts";
import { ROLE, type Tree } from "../syntax/tree.ts";
import { RESERVED } from "../syntax/words.ts";
import { applyEdits } from "../text/line-index.ts";
import type { Span, TextEdit } from "../text/span.ts";
import { isUnitName } from "../units/lookup.ts";
import {
  type FileEdits,
  filesAround,
  placesOf,
  type SymbolPlace,
  type SymbolRef,
  symbolAt,
} from "./navigate.ts";
import { occurrences, unreadableLineWith } from "./navigate-names.ts";
import type { View } from "./view.ts";

export type Prepared = { readonly span: Span; readonly name: string } | { readonly refused: string };
export type Renamed = { readonly files: readonly FileEdits[] } | { readonly refused: string };

/** Whether what stands at an offset has a name that can be changed. */
export function prepareRename(view: View, offset: number): Prepared {
  const symbol = symbolAt(view.model, offset);
  if (symbol === undefined) return { refused: whyNot(view.model.tree, offset) };
  const { span, text } = symbol.occurrence;
  const defined = placesOf(view, symbol).some(({ occurrence }) => occurrence.role === "definition");
  return defined
    ? { span, name: text }
    : { refused: `nothing is called \`${text}\`, so there is nothing to rename` };
}

/**
 * The edits that give what stands at an offset another name, in all files that name it. Refused where the new name
 * is taken, means something else already, or would read differently at one of the places.
 */
export function rename(view: View, offset: number, newName: string): Renamed {
  const prepared = prepareRename(view, offset);
  const symbol = symbolAt(view.model, offset);
  if ("refused" in prepared || symbol === undefined) return prepared as Renamed;
  const name = newName.trim();
  if (name === prepared.name) return { files: [] };
  const refused = notAName(name) ?? taken(view, symbol, name);
  if (refused !== undefined) return { refused };
  const byFile = new Map<string, SymbolPlace[]>();
  for (const place of placesOf(view, symbol)) {
    byFile.set(place.file, [...(byFile.get(place.file) ?? []), place]);
  }
  const files = [...byFile].map(([file, places]) => ({
    file,
    edits: places.map((place) => editOf(place, name)),
  }));
  for (const [file, places] of byFile) {
    const reason = readsOtherwise(
      places,
      files.find((each) => each.file === file)?.edits ?? [],
      symbol,
      name,
    );
    if (reason !== undefined) return { refused: reason };
  }
  return { files };
}

/** Why a text cannot be a name; undefined: it can. */
export function notAName(name: string): string | undefined {
  if (name === "") return "a name has at least one letter";
  const reserved = RESERVED.get(name);
  if (reserved !== undefined) return `\`${name}\` cannot be a name: it is ${reserved}`;
  if (!/^[\p{L}_][\p{L}\p{M}\d_]*$/u.test(name)) {
    return `\`${name}\` cannot be a name: a name starts with a letter or \`_\` and holds letters, digits and \`_\``;
  }
  return isUnitName(name)
    ? `\`${name}\` is a unit: behind a number it would be read as that, not as the name`
    : undefined;
}

/** An unnamed ask gets its name behind its kind. */
function editOf({ span, occurrence }: SymbolPlace, name: string): TextEdit {
  if (!occurrence.implicit) return { span, text: name };
  return { span: { start: span.end, end: span.end }, text: ` ${name}` };
}

/** Whether a statement of one of the files, or of the same kit, has the name already. */
function taken(view: View, symbol: SymbolRef, name: string): string | undefined {
  const [kit, inner] = symbol.key.split("/");
  const key = inner === undefined ? name : `${kit}/${name}`;
  for (const { file, tree, sees } of filesAround(view, symbol)) {
    if (!sees) continue;
    const found = occurrences(tree).find((each) => each.key === key && each.role === "definition");
    const entity =
      inner === undefined && file === view.model.file ? view.model.entities.get(name) : undefined;
    const other = view.others.find((each) => each.file === file)?.entities.get(name);
    const owner = entity ?? other;
    if (found === undefined && owner === undefined) continue;
    if (inner !== undefined) return `\`${name}\` is a name of the kit \`${kit}\` already`;
    const keyword = found?.statement.keyword.text ?? owner?.keyword ?? "let";
    const where = owner?.file ?? file;
    return `\`${name}\` is ${aKeyword(keyword)} already, in \`${where}\``;
  }
  return undefined;
}

/** The new text has to name the same thing at the same places, and nothing else by that name. */
function readsOtherwise(
  places: readonly SymbolPlace[],
  edits: readonly TextEdit[],
  symbol: SymbolRef,
  name: string,
): string | undefined {
  const { tree, file } = places[0];
  const lost = unreadableLineWith(tree, symbol.occurrence.text);
  if (lost)
    return `line ${lost} of \`${file}\` cannot be read, and it holds \`${symbol.occurrence.text}\`; mend it first`;
  const before = occurrences(tree);
  const after = occurrences(parse(applyEdits(tree.text, edits), PARSING).tree);
  const old = symbol.key;
  const [kit, inner] = old.split("/");
  /** The key that a name has to have behind the change. */
  const renamed = (key: string): string => {
    if (key === old) return inner === undefined ? name : `${kit}/${name}`;
    return inner === undefined && key.startsWith(`${old}/`) ? name + key.slice(old.length) : key;
  };
  const wrong = before.find((each, i) => after[i]?.key !== renamed(each.key));
  if (wrong === undefined && after.length === before.length) return undefined;
  return `\`${name}\` would change what ${wrong ? `\`${wrong.text}\`` : "the text"} means: it is hidden by a name inside a kit, or takes one from another statement`;
}

function whyNot(tree: Tree, offset: number): string {
  const index = [tokenIndexAt(tree, offset), tokenIndexAt(tree, Math.max(0, offset - 1))].find(
    (each) => tree.tokens[each]?.kind === "name",
  );
  const token = index === undefined ? tokenAt(tree, offset) : tree.tokens[index];
  if (token === undefined || token.kind !== "name") return "only names can be renamed";
  const word = tree.text.slice(token.offset, token.offset + token.length);
  const role = tree.roles[index ?? 0];
  if (word === "ground") return "`ground` is the support that is always there; it keeps its name";
  const reserved = RESERVED.get(word);
  if (reserved !== undefined && role !== ROLE.unit) return `\`${word}\` is ${reserved}, which keeps its name`;
  if (role === ROLE.unit) return `\`${word}\` is a unit; another unit is a conversion, not a rename`;
  if (role === ROLE.keyword || role === ROLE.word || role === ROLE.choice) {
    return `\`${word}\` is a word of the language`;
  }
  if (role === ROLE.key)
    return `\`${word}\` is a detail of \`${keywordAt(tree, offset)}\`, which the language names`;
  if (role === ROLE.callee) return `\`${word}\` is a function of the language`;
  return `\`${word}\` belongs to the language, not to this file`;
}

const keywordAt = (tree: Tree, offset: number): string =>
  placeAt(tree, offset)?.innermost.keyword.text ?? "its statement";
