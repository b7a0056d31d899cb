import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, detail, NAME, statement } from "./statement.ts";

export const spring: StatementDescription = statement({
  keyword: "spring",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "stiffness",
  details: [
    amount("stiffness", "stiffness", "force over travel, of one", "26.5 N/mm"),
    amount("loss_factor", "share", "structural damping: k (1 + i eta) in sweeps and random answers", "0.03", {
      standard: "0",
    }),
    detail(
      "damping_ratio",
      { is: "at", measure: "share" },
      "a damper 2 zeta k / omega beside it, zeta at that frequency",
      "5 % at 12 Hz",
    ),
    amount("cubic", "cubic", "force grows by this times the travel cubed", "4e6 N/m^3", {
      standard: "0 N/m^3",
      notYet: true,
    }),
    detail(
      "law",
      { is: "law", variables: ["travel"], measure: "force" },
      "force as an expression in travel",
      "8 kN/m * travel",
      {
        notYet: true,
      },
    ),
    detail(
      "curve",
      {
        is: "table",
        columns: [
          { name: "travel", measure: "travel" },
          { name: "force", measure: "force" },
        ],
        orFile: true,
      },
      "measured points of travel and force, rows or a file",
      "2 mm  180 N",
      { notYet: true },
    ),
    amount("rated_travel", "travel", "travel that one may see; more is warned of", "8 mm", {
      positive: true,
    }),
    amount("preload", "force", "force at zero travel, positive pulls together", "1.2 kN", {
      standard: "0 N",
    }),
    amount("mass", "inertance", "its own mass, shared consistently between the ends", "3.5 kg", {
      standard: "0 kg",
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "Pulls its ends together in proportion to travel.",
  text: "",
  example: "",
  snippet: "spring $1 between $2 and $3 = $4 N/mm",
  assemble: (values, builder) => {
    const { name, motion, count } = values;
    const [a, b] = [values.end("a"), values.end("b")];
    const stiffness = values.number("stiffness") ?? 0;
    const ratio = values.at("damping_ratio");
    builder.element(name, motion, a, b, {
      keyword: "spring",
      stiffness,
      damping: ratio && (ratio.value * stiffness) / (Math.PI * ratio.atHz),
      lossFactor: values.number("loss_factor"),
      preload: values.number("preload"),
      ratedTravel: values.number("rated_travel"),
      count,
    });
    const mass = values.number("mass") ?? 0;
    if (mass !== 0) builder.sharedMass(name, a, b, mass * count);
  },
});
