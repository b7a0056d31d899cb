import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, detail, NAME, statement } from "./statement.ts";

export const damper: StatementDescription = statement({
  keyword: "damper",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "damping",
  details: [
    amount("damping", "damping", "force over rate, of one", "2.1 kN*s/m"),
    amount(
      "quadratic",
      "quadratic",
      "force grows by this times the rate squared, against the motion",
      "35 N*s^2/m^2",
      {
        standard: "0 N*s^2/m^2",
        notYet: true,
      },
    ),
    detail(
      "law",
      { is: "law", variables: ["rate"], measure: "force" },
      "force as an expression in rate",
      "900 N*s/m * rate",
      {
        notYet: true,
      },
    ),
    amount("rated_force", "force", "force that one may see; more is warned of", "15 kN", { positive: true }),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "Resists the rate at which its ends part or close.",
  text: "",
  example: "",
  snippet: "damper $1 between $2 and $3 = $4 kN*s/m",
  assemble: (values, builder) => {
    builder.element(values.name, values.motion, values.end("a"), values.end("b"), {
      keyword: "damper",
      damping: values.number("damping") ?? 0,
      ratedForce: values.number("rated_force"),
      count: values.count,
    });
  },
});
