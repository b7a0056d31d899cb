import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, NAME, statement } from "./statement.ts";

export const cord: StatementDescription = statement({
  keyword: "cord",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "stiffness",
  details: [
    amount("stiffness", "stiffness", "stiffness once it is taut", "85 kN/m", {
      positive: true,
      required: true,
    }),
    amount("slack", "travel", "travel before it is taut", "0.4 m", { standard: "0 m" }),
    amount("damping", "damping", "damping while it is taut", "1.5 kN*s/m", { standard: "0 N*s/m" }),
    amount("rated_force", "force", "tension that one may see; more is warned of", "60 kN", {
      positive: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: [...JOINT_QUANTITIES, { name: "tension", measure: "force", says: "its pull, never negative" }],
  says: "A rope or chain: pulls once its slack is taken up, never pushes.",
  text: "",
  example: "",
  snippet: "cord $1 between $2 and $3 = $4 kN/m\n    slack = $5 m",
  notYet: true,
});
