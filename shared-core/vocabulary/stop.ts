import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, choice, NAME, statement } from "./statement.ts";

export const stop: StatementDescription = statement({
  keyword: "stop",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "stiffness",
  details: [
    amount("stiffness", "stiffness", "stiffness once it is touched", "2 MN/m", {
      positive: true,
      required: true,
    }),
    amount("gap", "travel", "travel before it is touched", "12 mm", { standard: "0 mm" }),
    amount("damping", "damping", "damping while it is touched", "600 N*s/m", { standard: "0 N*s/m" }),
    choice(
      "side",
      ["above", "below", "both"],
      "whether it acts at travel above the gap, below minus the gap, or both",
    ),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "An elastic stop that acts beyond a gap and never pulls.",
  text: "",
  example: "",
  snippet: "stop $1 between $2 and $3 = $4 MN/m\n    gap = $5 mm",
  notYet: true,
});
