import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, detail, NAME, prose, statement } from "./statement.ts";

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
  text: prose(
    "Resists the rate at which its two ends part or close, with a force in proportion: an oil dashpot, a",
    "film of grease, an eddy-current brake. Between turning coordinates it is torsional, in N*m*s/rad; a",
    "figure in N*m per rpm is taken too and is 9.549 times larger in SI.",
    "",
    "A catalogue often gives a force at a speed. That is the damping constant only where the curve is a",
    "straight line through zero; oil through an orifice goes with the square of the rate. A damper whose",
    "damping is negative feeds energy in, as dry friction, flow past a valve or a badly tuned controller",
    "may do: the model is taken as it is, and `unstable-mode` says which mode grows and how fast.",
    "",
    "A damper alone holds nothing in place. A mass that hangs on dampers only drifts, and its mode stands",
    "as a root without a frequency.",
  ),
  example: `thrum 1
title "Lock gate leaf with its buffer"

mass leaf = 12 t
    starts_moving = 0.15 m/s
spring seal between leaf and ground = 0.8 MN/m
damper buffer between leaf and ground = 65 kN*s/m
    rated_force = 30 kN

ask history closing
    of = leaf.displacement, buffer.force
    lasting = 6 s

expect buffer_holds = peak(closing, buffer.force) <= 12 kN
expect calm_again = settling_time(closing, leaf.displacement, 0.5 mm) <= 3 s
`,
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
