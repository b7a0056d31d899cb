import { floatingNames } from "../../mechanics/massless.ts";
import { span } from "../../text/span.ts";
import { growingModes } from "../growth.ts";
import { nameSpan } from "../places.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";

/** Modes or an answer that could not be computed, for a reason that nothing else has said. */
export const noConvergence: Rule = {
  code: "no-convergence",
  cost: "modes",
  check(context) {
    const { instance, assembly, modes } = context;
    if (assembly.free === 0 || instance.diagnostics.some(({ severity }) => severity === "error")) return [];
    if (!modes.ok) {
      if (floatingNames(assembly).length > 0) return [];
      const ask = instance.asks.find(({ kind }) => kind === "modes");
      const first = instance.model.tree.statements[0];
      return [
        {
          span: ask !== undefined ? nameSpan(ask.node) : first === undefined ? span(0, 0) : nameSpan(first),
          message: `the modes could not be found: ${modes.reason}`,
        },
      ];
    }
    return growingModes(modes).length > 0 ? [] : unanswered(context);
  },
};

function unanswered({ instance, answers }: RuleContext): readonly Finding[] {
  return instance.asks.flatMap((ask) => {
    const answer = answers.get(ask.name);
    if (ask.kind === "later" || answer === undefined || answer.ok) return [];
    return [{ span: nameSpan(ask.node), message: `\`${ask.name}\` could not be answered: ${answer.reason}` }];
  });
}
