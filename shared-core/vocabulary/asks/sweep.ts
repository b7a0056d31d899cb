import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, choice, prose, statement } from "../statement.ts";

export const sweep: StatementDescription = statement({
  keyword: "ask",
  variant: "sweep",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("from", "rate", "lowest frequency", "2 Hz", { positive: true, required: true }),
    amount("to", "rate", "highest frequency", "80 Hz", { positive: true, required: true }),
    amount("points", "number", "points at least; more are put around resonances", "400", {
      positive: true,
      standard: "200",
    }),
    choice("spacing", ["log", "even"], "how its own points are spread"),
  ],
  quantities: [],
  says: "The steady response to harmonic drives over a range of frequencies.",
  text: prose(
    "The steady response X in x = Re(X e^(+i w t)) from one frequency to another. The drives of the ask",
    "are swept together, in their written speed ratio: a second order stays at twice the first. A drive",
    "without amplitude counts as one unit of what it is, so a sweep by such a force is the receptance,",
    "mobility or inertance of the model.",
    "",
    "The points asked for are kept exactly and more are put around every resonance and anti-resonance, so",
    "that no peak falls between two points. `peak`, `bandwidth` and `peak_at` are found between points",
    "too; `value` and `phase` are computed at that very frequency. A band with an undamped mode in it has",
    "no peak: the answer there is null, and `not-damped` says which mode.",
  ),
  example: `thrum 1
title "Air compressor on the quay: run-up"

mass compressor = 720 kg
mass plinth = 5.4 t
spring mounts between compressor and plinth = 380 N/mm
    loss_factor = 0.08
spring soil between plinth and ground = 150 MN/m
    loss_factor = 0.12

force imbalance on compressor
    unbalance = 0.03 kg*m

ask sweep run_up
    of = compressor.velocity, plinth.velocity, mounts.force
    by = imbalance
    from = 1 Hz
    to = 60 Hz
    points = 300

expect quiet_plinth = peak(run_up, plinth.velocity) <= 5 mm/s
expect isolated = transmissibility(run_up, mounts, at: 24.5 Hz) <= 10 %
`,
  snippet: "ask sweep $1\n    of = $2\n    by = $3\n    from = $4 Hz\n    to = $5 Hz",
});
