import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, NAME, statement } from "./statement.ts";

export const inerter: StatementDescription = statement({
  keyword: "inerter",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "inertance",
  details: [
    amount("inertance", "inertance", "force over relative acceleration, of one", "120 kg", {
      positive: true,
      required: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "Resists the relative acceleration of its ends, as a flywheel in a screw does.",
  text: "",
  example: "",
  snippet: "inerter $1 between $2 and $3 = $4 kg",
  assemble: (values, builder) => {
    builder.element(values.name, values.motion, values.end("a"), values.end("b"), {
      keyword: "inerter",
      inertance: values.number("inertance") ?? 0,
      count: values.count,
    });
  },
});
