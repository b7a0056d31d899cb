import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { AT_POINT, amount, BETWEEN, detail, NAME, statement } from "./statement.ts";

export const mount: StatementDescription = statement({
  keyword: "mount",
  family: "joins",
  head: [NAME, ...BETWEEN, ...AT_POINT],
  value: "none",
  details: [
    detail(
      "stiffness",
      { is: "tuple", measure: "stiffness", components: ["x", "y", "z"] },
      "stiffness along its three axes, of one",
      "(180, 180, 420) N/mm",
      { required: true },
    ),
    detail(
      "damping",
      { is: "tuple", measure: "damping", components: ["x", "y", "z"] },
      "damping along its three axes, of one",
      "(0.6, 0.6, 1.4) kN*s/m",
      { standard: "(0, 0, 0) N*s/m" },
    ),
    detail(
      "damping_ratio",
      { is: "at", measure: "share" },
      "dampers 2 zeta k / omega beside its springs",
      "5 % at 12 Hz",
    ),
    amount("loss_factor", "share", "structural damping of its springs", "0.08", { standard: "0" }),
    detail(
      "turned",
      { is: "tuple", measure: "angle", components: ["x", "y", "z"] },
      "its axes turned about the drawing's x, then y, then z",
      "(0, 30, 0) deg",
      { standard: "(0, 0, 0) deg" },
    ),
    ...COUNT_AND_LIKE,
  ],
  components: ["x", "y", "z"],
  quantities: JOINT_QUANTITIES,
  says: "Three springs and dampers that hold a body at a place.",
  text: "",
  example: "",
  snippet: "mount $1 between $2 and $3 at ($4, $5, $6) m\n    stiffness = ($7, $8, $9) N/mm",
  notYet: true,
});
