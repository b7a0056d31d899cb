import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, detail, NAME, prose, statement } from "./statement.ts";

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
  text: prose(
    "Anything that pushes back in proportion to how far it is drawn out or pressed together: a coil, a",
    "rubber mount, a beam, a shaft, a length of rope under preload. Travel is the displacement of A minus",
    "that of B, and a positive force pulls the two together. Between turning coordinates the same",
    "statement is a torsional spring in N*m/rad.",
    "",
    "Damping that belongs to the spring can be said in three ways. `loss_factor` is structural damping, k",
    "(1 + i eta), right for rubber and steel in sweeps and random answers; in a history it stands as the",
    "modal damping of the mode table, because a loss factor has no meaning in time. `damping_ratio = 5 %",
    "at 12 Hz` puts a damper 2 zeta k / omega beside it. A damper of its own says it in N*s/m.",
    "",
    "Stiffness may be negative, as that of a buckled strut or a magnetic pull is; `static-instability`",
    "speaks when the whole is no longer held. `preload` is the force at zero travel. `mass` is the",
    "spring's own, shared between its ends as a uniform spring shares it, which gives the one-third rule",
    "for a spring to ground. `count` springs are side by side, and rated values are for one.",
  ),
  example: `thrum 1
title "Ventilation fan in the pump hall"

mass fan = 210 kg
spring mounts between fan and ground = 34 N/mm +/- 10 %
    count = 4
    loss_factor = 0.08
    rated_travel = 6 mm

force imbalance on fan
    unbalance = 0.012 kg*m
    speed = 1470 rpm

ask sweep run_up
    of = fan.displacement, mounts.force
    by = imbalance
    from = 1 Hz
    to = 40 Hz

expect soft_enough = natural_frequency(1) <= 0.35 * 1470 rpm
expect isolated = transmissibility(run_up, mounts, at: 1470 rpm) <= 5 %
`,
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
