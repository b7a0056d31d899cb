import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { AT_POINT, amount, BETWEEN, detail, NAME, prose, statement } from "./statement.ts";

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
  text: prose(
    "Holds a body at a place with three springs and three dampers, one along each axis of the drawing, or",
    "along axes of its own when it is `turned`. The rotations of the body load it through its arm, so a",
    "mount low under a heavy machine couples sway and rock without being told to.",
    "",
    "B is another body, a support of kind `body`, or `ground`. `turned` gives three angles, applied about",
    "the drawing's x, then y, then z: `(0, 30, 0) deg` is the inclined mount of an engine whose elastic",
    "centre is to lie near its centre of gravity. `.force.x` is one component, plain `.force` the",
    "resultant.",
  ),
  example: `thrum 1
title "Compressor skid on inclined mounts"

body skid = 640 kg
    inertia = (52, 95, 88) kg*m^2

mount port_fore between skid and ground at (0.5, 0.35, -0.25) m
    stiffness = (120, 120, 260) N/mm
    damping_ratio = 5 % at 10 Hz
    turned = (30, 0, 0) deg
mount port_aft between skid and ground at (-0.5, 0.35, -0.25) m
    like = port_fore
mount board_fore between skid and ground at (0.5, -0.35, -0.25) m
    like = port_fore
    turned = (-30, 0, 0) deg
mount board_aft between skid and ground at (-0.5, -0.35, -0.25) m
    like = port_fore
    turned = (-30, 0, 0) deg

expect below_running_speed = natural_frequency(6) <= 20 Hz
`,
  snippet: "mount $1 between $2 and $3 at ($4, $5, $6) m\n    stiffness = ($7, $8, $9) N/mm",
  notYet: true,
});
