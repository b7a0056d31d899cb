import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, prose, statement, wordAndPlace } from "./statement.ts";

export const voltage: StatementDescription = statement({
  keyword: "voltage",
  family: "drives",
  head: [NAME, ...wordAndPlace("on")],
  value: "none",
  details: driveDetails("voltage"),
  quantities: [],
  says: "A source in a loop.",
  text: prose(
    "A source in a loop, positive the way the current of the loop is positive, with the shapes that a",
    "force has: a sine, a step, a pulse, a law in t, a record, a density. An ideal source has no",
    "resistance of its own; write the one it has as a resistor in the same loop. A source that stands",
    "still at zero is a short circuit, and that is how it looks to a transducer.",
  ),
  example: `thrum 1
title "Foghorn coil on its amplifier"

mass diaphragm = 42 g
spring rim between diaphragm and ground = 19 N/mm
damper air between diaphragm and ground = 2.4 N*s/m
loop amplifier
resistor winding in amplifier = 5.6 ohm
inductor coil in amplifier = 0.5 mH
transducer magnet between diaphragm and amplifier = 6 N/A

voltage signal on amplifier
    amplitude = 18 V
    frequency = 107 Hz

ask sweep tone
    of = diaphragm.velocity
    by = signal
    from = 20 Hz
    to = 1 kHz

expect on_tone = 90 Hz <= natural_frequency(1) <= 125 Hz
`,
  snippet: "voltage $1 on $2\n    amplitude = $3 V\n    frequency = $4 Hz",
  notYet: true,
});
