import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, prose, statement, wordAndPlace } from "./statement.ts";

export const force: StatementDescription = statement({
  keyword: "force",
  family: "drives",
  head: [NAME, ...wordAndPlace("on")],
  value: "none",
  details: driveDetails("force"),
  quantities: [],
  says: "A force on a coordinate.",
  text: prose(
    "A force along the coordinate it stands on, positive the way the coordinate is positive. It has one",
    "shape: a steady sine with `amplitude`, `frequency` and `phase`; the same tied to a running speed by",
    "its `order`; a rotating `unbalance`, whose amplitude grows with the square of the speed; a single",
    "`pulse`, a `step`, an `impulse`; a `law` in t; a `chirp`; a `record`; or a random `density`.",
    "",
    "Amplitude is the peak, not the effective value, and a phase is that of a cosine: `phase = -90 deg`",
    "starts like a sine. In a sweep the drives of the ask are swept together; what is written as",
    "frequency or speed is then only their ratio, and it is also where the drive runs in service, which",
    "`near-resonance` judges. A speed may be a range for that purpose: `speed = 600 rpm to 1500 rpm`.",
    "",
    "An unbalance is mass times eccentricity: 10 g at 120 mm are 1.2e-3 kg*m. A balance grade G gives G",
    "times the rotor's mass over the angular rate.",
  ),
  example: `thrum 1
title "Dredge pump: run-up through its mounts"

mass pump = 540 kg
spring mounts between pump and ground = 88 N/mm
    count = 4
    loss_factor = 0.1

force imbalance on pump
    unbalance = 0.02 kg*m
    speed = 980 rpm

ask sweep run_up
    of = pump.velocity
    by = imbalance
    from = 1 Hz
    to = 30 Hz

expect smooth = peak(run_up, pump.velocity) <= 12 mm/s
expect clear = clear_of_modes(980 rpm) >= 30 %
`,
  snippet: "force $1 on $2\n    amplitude = $3 N\n    frequency = $4 Hz",
});
