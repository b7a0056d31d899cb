import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, NAME, statement } from "./statement.ts";

export const friction: StatementDescription = statement({
  keyword: "friction",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "force",
  details: [
    amount("force", "force", "friction force while it slides", "1.8 kN", { positive: true, required: true }),
    amount("static_force", "force", "friction force it takes to break away", "2.3 kN", {
      positive: true,
      standard: "the force while it slides",
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "Coulomb friction: a constant force against the rate, or sticking.",
  text: "",
  example: "",
  snippet: "friction $1 between $2 and $3 = $4 kN",
  notYet: true,
});
