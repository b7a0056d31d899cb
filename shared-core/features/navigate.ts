import { resolvePath } from "../model/files.ts";
import { treeOf } from "../model/inspect.ts";
import type { Model } from "../model/model.ts";
import { placeAt } from "../syntax/search.ts";
import type { Tree } from "../syntax/tree.ts";
import { contains, type Span, type TextEdit } from "../text/span.ts";
import { type Occurrence, occurrenceAt, occurrences } from "./navigate-names.ts";
import type { View } from "./view.ts";

/** A stretch of a file, which need not be the one that is looked at. */
export interface FilePlace {
  readonly file: string;
  readonly span: Span;
}

export interface FileEdits {
  readonly file: string;
  readonly edits: readonly TextEdit[];
}

export interface Highlight {
  readonly span: Span;
  readonly kind: "definition" | "reference";
}

/** Where the name at an offset is defined, in this file or a used one; for a `use`, the file it takes. */
export function definition(view: View, offset: number): readonly FilePlace[] {
  const { model } = view;
  const used = usedFileAt(model, offset);
  if (used !== undefined) return [{ file: used, span: { start: 0, end: 0 } }];
  const symbol = symbolAt(model, offset);
  if (symbol === undefined) return [];
  return placesOf(view, symbol)
    .filter((each) => each.occurrence.role === "definition")
    .map(placeOnly);
}

/** Every place that names what is named at an offset, in all files that see it. */
export function references(view: View, offset: number, withDefinition: boolean): readonly FilePlace[] {
  const symbol = symbolAt(view.model, offset);
  if (symbol === undefined) return [];
  return placesOf(view, symbol)
    .filter(({ occurrence }) => withDefinition || occurrence.role === "reference")
    .map(placeOnly);
}

/** The places of this file that name what is named at an offset. */
export function highlights(view: View, offset: number): readonly Highlight[] {
  const at = occurrenceAt(view.model.tree, offset);
  if (at === undefined) return [];
  return occurrences(view.model.tree)
    .filter(({ key }) => key === at.key)
    .map(({ span, role }) => ({ span, kind: role }));
}

/** A name with the file that defines it. */
export interface SymbolRef {
  readonly key: string;
  readonly file: string;
  readonly occurrence: Occurrence;
}

export interface SymbolPlace extends FilePlace {
  readonly tree: Tree;
  readonly occurrence: Occurrence;
}

export function symbolAt(model: Model, offset: number): SymbolRef | undefined {
  const occurrence = occurrenceAt(model.tree, offset);
  if (occurrence === undefined || occurrence.key === "ground") return undefined;
  return { key: occurrence.key, file: fileOfKey(model, occurrence.key), occurrence };
}

/** Every place of a name: in the file that defines it and in all that use that file, in order. */
export function placesOf(view: View, symbol: SymbolRef): readonly SymbolPlace[] {
  const places: SymbolPlace[] = [];
  for (const { file, tree, sees } of filesAround(view, symbol)) {
    if (!sees) continue;
    for (const occurrence of occurrences(tree)) {
      if (occurrence.key === symbol.key) places.push({ file, span: occurrence.span, tree, occurrence });
    }
  }
  return places;
}

interface FileAround {
  readonly file: string;
  readonly tree: Tree;
  /** Whether the name means the same thing there. */
  readonly sees: boolean;
}

/** This file, the one that defines a name, and the others of the workspace, each once. */
export function filesAround(view: View, symbol: SymbolRef): readonly FileAround[] {
  const around = new Map<string, FileAround>();
  for (const model of [view.model, ...view.others]) {
    if (around.has(model.file)) continue;
    const sees = fileOfKey(model, symbol.key) === symbol.file;
    around.set(model.file, { file: model.file, tree: model.tree, sees });
  }
  const entity = view.model.entities.get(baseOf(symbol.key));
  if (entity !== undefined && !around.has(symbol.file)) {
    around.set(symbol.file, { file: symbol.file, tree: treeOf(view.model, entity), sees: true });
  }
  return [...around.values()];
}

/** Of `foot/rubber`, the kit; else the name itself. */
export const baseOf = (key: string): string => key.split("/")[0];

const fileOfKey = (model: Model, key: string): string => model.entities.get(baseOf(key))?.file ?? model.file;

const placeOnly = ({ file, span }: FilePlace): FilePlace => ({ file, span });

function usedFileAt(model: Model, offset: number): string | undefined {
  const path = placeAt(model.tree, offset)?.statement.slots.path;
  if (path?.kind !== "text" || !contains(path.span, offset)) return undefined;
  return resolvePath(model.file, path.text);
}
