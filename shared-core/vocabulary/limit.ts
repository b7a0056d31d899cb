import type { StatementDescription } from "./description.ts";
import { choice, detail, NAME, prose, statement } from "./statement.ts";

export const limit: StatementDescription = statement({
  keyword: "limit",
  family: "numbers",
  head: [NAME],
  value: "optional",
  details: [
    detail(
      "rows",
      {
        is: "table",
        columns: [
          { name: "frequency", measure: "rate" },
          { name: "value", measure: "any" },
        ],
      },
      "points of the limit curve, frequency and value",
      "8 Hz  4.5 mm/s",
    ),
    choice("between_points", ["log_log", "straight"], "how the curve runs between its points"),
    choice("of", ["peak", "rms"], "what the value limits: the amplitude, or the root mean square"),
    choice(
      "bands",
      ["none", "octave", "third_octave"],
      "bands in which a random answer is summed before it is judged",
    ),
  ],
  quantities: [],
  says: "A limit, one value or a curve over frequency, with the note as its source.",
  text: prose(
    "A level that an answer is held against: one value for all frequencies, or a curve given by rows of",
    "frequency and value. Between its points a curve runs straight on log-log paper, as most standards",
    "draw them; `between_points = straight` draws it on plain paper. Outside its ends it does not judge.",
    "",
    "`of` says what kind of number the level is. A sweep holds peak amplitudes, so with `of = rms` it is",
    "divided by the square root of 2 before it is compared. A random answer is compared as a density, or",
    "summed in octave or third-octave bands first when `bands` says so.",
    "",
    "The note of a limit is the place for its source: standard, edition, table and class. `below(ask,",
    "quantity, limit)` gives the largest ratio of answer to limit, and at most 1 holds.",
  ),
  example: `thrum 1
title "Gauge room floor against its limit"

> source: tenant's agreement KW-L-02, annex B
limit quiet_floor
    of = rms
    rows =
        4 Hz   0.2 mm/s
        8 Hz   0.1 mm/s
        80 Hz  0.1 mm/s

mass floor_bay = 5.2 t
spring beams between floor_bay and ground = 30 MN/m
    loss_factor = 0.06

force compressor on floor_bay
    amplitude = 2 N

ask sweep running
    of = floor_bay.velocity
    by = compressor
    from = 4 Hz
    to = 80 Hz

expect quiet = below(running, floor_bay.velocity, quiet_floor) <= 1
`,
  snippet: "limit $1 = $2 mm/s",
});
