import type { Fix } from "../../diagnostics/diagnostic.ts";
import type { Model } from "../../model/model.ts";
import type { StatementNode } from "../../syntax/tree.ts";
import { literalOf, placeOf, statementOf } from "../places.ts";
import type { Rule } from "../rule.ts";
import { length, perLength } from "../wording.ts";
import { staticInstabilityOf } from "./static-instability.ts";

/** A sag beyond this, in metres, is more often a slip between N/m and N/mm than a spring. */
const LARGEST_SAG = 1;

/** A spring that sags more than 1 m under the masses given. */
export const implausibleDeflection: Rule = {
  code: "implausible-deflection",
  cost: "modes",
  check({ model, assembly, analysis }) {
    const statics = analysis.statics();
    // What topples has no sag to speak of; static-instability speaks of it.
    if (!statics.ok || staticInstabilityOf(assembly) !== undefined) return [];
    return assembly.elements.flatMap((element, index) => {
      if (element.motion !== "sliding" || element.stiffness <= 0) return [];
      const sag = statics.value.element(index);
      if (!sag.ok || !(Math.abs(sag.value.travel) > LARGEST_SAG)) return [];
      const statement = statementOf(model, element.name);
      const each = element.stiffness / element.count;
      return [
        {
          span: placeOf(model, element.name, "stiffness"),
          message: `\`${element.name}\` sags ${length(Math.abs(sag.value.travel))} under the masses given, with ${perLength(each, "sliding")}${element.count > 1 ? " each" : ""}`,
          hint: "a thousand times stiffer is meant where N/m stands for N/mm",
          fixes: statement === undefined ? undefined : thousandfold(model, statement),
        },
      ];
    });
  },
};

/** The same number per mm. Changes the physics, so it is offered singly. */
function thousandfold(model: Model, statement: StatementNode): readonly Fix[] | undefined {
  const unit = literalOf(model, statement, "stiffness")?.literal.unit;
  if (unit === undefined || !unit.text.endsWith("/m")) return undefined;
  const text = `${unit.text}m`;
  return [{ title: `Write ${text}`, edits: [{ span: unit.span, text }], safe: false }];
}
