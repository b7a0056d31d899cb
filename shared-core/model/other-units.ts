import { learnUnit, lookupUnit } from "../units/lookup.ts";
import { loadOtherUnits } from "../units/other-units.ts";
import type { Model } from "./model.ts";

/** Longest name worth asking for. */
const LONGEST = 30;

/**
 * Looks up, in the large table of mathjs, the names that a model took for no unit or for an unknown name, and
 * learns those that are units. True: understanding the text again gives more. The table is loaded only when such
 * a name is there; a unit once learned is known to every model, as if it stood in the table of the language.
 */
export async function learnUnits(model: Model): Promise<boolean> {
  const names = wantedNames(model);
  if (names.size === 0) return false;
  resolver ??= loadOtherUnits();
  const resolve = await resolver;
  let learned = false;
  for (const name of names) {
    const unit = resolve(name);
    if (unit === undefined) continue;
    learnUnit(unit);
    learned = true;
  }
  return learned;
}

/** Loaded once: it takes some 100 ms, and a text that is being typed asks again and again. */
let resolver: ReturnType<typeof loadOtherUnits> | undefined;

function wantedNames({ diagnostics, tree }: Model): ReadonlySet<string> {
  const names = new Set<string>();
  for (const { code, span } of diagnostics) {
    if (code !== "unknown-unit" && code !== "unknown-name") continue;
    for (const [name] of tree.text.slice(span.start, span.end).matchAll(/[A-Za-z][A-Za-z0-9]*/g)) {
      if (name.length <= LONGEST && lookupUnit(name) === undefined) names.add(name);
    }
  }
  return names;
}
