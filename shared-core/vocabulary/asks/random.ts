import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, choice, prose, statement } from "../statement.ts";

export const random: StatementDescription = statement({
  keyword: "ask",
  variant: "random",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("from", "rate", "lowest frequency", "5 Hz", { positive: true }),
    amount("to", "rate", "highest frequency", "500 Hz", { positive: true }),
    amount("duration", "time", "time for which the expected peak is given", "10 min", { positive: true }),
    choice("bands", ["none", "octave", "third_octave"], "bands in which the response is summed"),
  ],
  quantities: [],
  says: "The response to stationary random drives: density, rms and expected peak.",
  text: prose(
    "The response to stationary random drives: one-sided density per Hz, root mean square, three-sigma",
    "value, rate of upward zero crossings, and the expected peak in the `duration`. Several drives are",
    "uncorrelated. A density is zero outside its rows and straight on log-log paper between them.",
    "",
    "Loss factors are k (1 + i eta) here. A band with an undamped mode in it has no root mean square, and",
    "the answer is null.",
  ),
  example: `thrum 1
title "Gauge mast in the wash of passing boats"

support pier
mass mast_head = 35 kg
spring mast between mast_head and pier = 21 N/mm
    loss_factor = 0.05

motion wash of pier
    density =
        0.5 Hz  2e-3 (m/s^2)^2/Hz
        4 Hz    6e-3 (m/s^2)^2/Hz
        40 Hz   1e-4 (m/s^2)^2/Hz

ask random an_hour
    of = mast_head.acceleration
    by = wash
    duration = 60 min

expect lamp_safe = expected_peak(an_hour, mast_head.acceleration) <= 8 m/s^2
`,
  snippet: "ask random $1\n    of = $2\n    by = $3\n    duration = $4 min",
  notYet: true,
});
