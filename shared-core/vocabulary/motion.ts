import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, prose, statement, wordAndPlace } from "./statement.ts";

export const motion: StatementDescription = statement({
  keyword: "motion",
  family: "drives",
  head: [NAME, ...wordAndPlace("of")],
  value: "none",
  details: driveDetails("motion"),
  quantities: [],
  says: "Moves a support; the unit of its values says whether they are displacement, velocity or acceleration.",
  text: prose(
    "Moves a support: the floor under a machine, the bed under a crate, the table of a shaker. The unit",
    "of its values says what they are: mm a displacement, mm/s a velocity, m/s^2 or gn an acceleration.",
    "`g` is gram; standard gravity is `gn`.",
    "",
    "Measured accelerations and velocities start from rest at zero, so a drift in the record is a drift",
    "in the model; take the mean out before. A displacement that is not zero at t = 0 jumps there, which",
    "`starts-with-jump` hints at: a cosine with `phase = -90 deg` starts smoothly. In sweeps only",
    "amplitude and phase matter, and a transmissibility sets like against like: acceleration over",
    "acceleration, displacement over displacement.",
  ),
  example: `thrum 1
title "Instrument crate on the barge"

support barge
mass crate = 86 kg
spring foam between crate and barge = 62 N/mm
    loss_factor = 0.2

motion slam of barge
    pulse = half_sine
    peak = 4 gn
    duration = 30 ms

ask history blow
    of = crate.acceleration, foam.travel
    by = slam
    lasting = 2 s

expect crate_safe = peak(blow, crate.acceleration) <= 5 gn
expect foam_deep_enough = peak(blow, foam.travel) <= 60 mm
`,
  snippet: "motion $1 of $2\n    amplitude = $3 mm\n    frequency = $4 Hz",
});
