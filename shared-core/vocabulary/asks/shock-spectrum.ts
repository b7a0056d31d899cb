import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, prose, statement } from "../statement.ts";

export const shockSpectrum: StatementDescription = statement({
  keyword: "ask",
  variant: "shock_spectrum",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("q_factor", "number", "quality factor of the oscillators", "20", {
      positive: true,
      standard: "10",
    }),
    amount("from", "rate", "lowest frequency", "5 Hz", { positive: true, required: true }),
    amount("to", "rate", "highest frequency", "2 kHz", { positive: true, required: true }),
  ],
  quantities: [],
  says: "Peak acceleration of a row of oscillators that ride on a motion.",
  text: prose(
    "What a motion would do to a row of single oscillators that ride on it, one at each frequency, all",
    "with the same quality factor: their largest absolute acceleration. It compares shocks by what they",
    "damage rather than by their shape, and two shocks with one spectrum are equally severe to whatever",
    "behaves like a single oscillator.",
    "",
    "The answer holds the maximax of both signs, the positive and negative ones, and the primary and",
    "residual spectra, during and after the pulse. A quality factor of 10, 5 % of critical damping, is",
    "the usual one.",
  ),
  example: `thrum 1
title "Berthing blow as the radio cabinet sees it"

support quay
mass cabinet = 130 kg
spring rail between cabinet and quay = 1.6 MN/m
    loss_factor = 0.06

motion berthing of quay
    pulse = half_sine
    peak = 3 gn
    duration = 40 ms

ask shock_spectrum blow
    of = cabinet.acceleration
    by = berthing
    from = 2 Hz
    to = 500 Hz

expect radio_safe = value(blow, cabinet.acceleration, at: 60 Hz) <= 9 gn
`,
  snippet: "ask shock_spectrum $1\n    of = $2\n    by = $3\n    from = $4 Hz\n    to = $5 kHz",
  notYet: true,
});
