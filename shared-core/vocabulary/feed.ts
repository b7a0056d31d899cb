import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE } from "./joining.ts";
import { amount, NAME, prose, statement, wordAndPlace } from "./statement.ts";

export const feed: StatementDescription = statement({
  keyword: "feed",
  family: "joins",
  head: [NAME, ...wordAndPlace("from"), ...wordAndPlace("to")],
  value: "none",
  details: [
    amount("stiffness", "stiffness", "force on B for each displacement of A", "12 kN/m", {
      standard: "0 N/m",
    }),
    amount("damping", "damping", "force on B for each velocity of A", "800 N*s/m", { standard: "0 N*s/m" }),
    amount("inertance", "inertance", "force on B for each acceleration of A", "15 kg", { standard: "0 kg" }),
    ...COUNT_AND_LIKE,
  ],
  quantities: [{ name: "force", measure: "force", says: "force on B" }],
  says: "A force on one place from the motion of another, with none back.",
  text: prose(
    "A force on B that depends on the motion of A, with none back on A: a controller with its sensor at A",
    "and its actuator at B, the friction that couples a brake pad's two directions, a fluid film under a",
    "turning journal. Positive pushes B the way A moves.",
    "",
    "Such a coupling makes the matrices unsymmetric and can feed energy into the system, so flutter and",
    "squeal are written with it. The undamped modes leave its damping out; the eigenvalues and",
    "`stability_margin` hold all of it.",
  ),
  example: `thrum 1
title "Levelling control of the crane cab"

mass cab = 1.2 t
mass frame = 6.5 t
spring isolators between cab and frame = 60 kN/m
damper oil between cab and frame = 0.8 kN*s/m
spring boom between frame and ground = 4.2 MN/m
damper joints between frame and ground = 6 kN*s/m

feed sky_hook from cab to cab
    damping = -3 kN*s/m

expect stable = stability_margin() >= 0.3 1/s
`,
  snippet: "feed $1 from $2 to $3\n    damping = $4 N*s/m",
  notYet: true,
});
