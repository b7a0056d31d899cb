import { floatingNames } from "../../mechanics/massless.ts";
import { span } from "../../text/span.ts";
import { nameSpan, statementOf } from "../places.ts";
import type { Rule } from "../rule.ts";

/** A place that can move and has neither inertia nor anything that holds it: the equations leave it anywhere. */
export const noInertia: Rule = {
  code: "no-inertia",
  cost: "modes",
  check({ model, assembly, modes }) {
    if (modes.ok) return [];
    return floatingNames(assembly).map((name) => {
      const owner = assembly.coordinates.find((coordinate) => coordinate.name === name)?.owner ?? name;
      const statement = statementOf(model, owner);
      return {
        span: statement === undefined ? span(0, 0) : nameSpan(statement),
        message: `\`${name}\` has no inertia, and no spring or damper holds it: it could be anywhere`,
        hint: "join it with a spring, or make it a mass",
        key: name,
      };
    });
  },
};
