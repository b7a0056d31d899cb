import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, NAME, prose, statement } from "./statement.ts";

export const inerter: StatementDescription = statement({
  keyword: "inerter",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "inertance",
  details: [
    amount("inertance", "inertance", "force over relative acceleration, of one", "120 kg", {
      positive: true,
      required: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "Resists the relative acceleration of its ends, as a flywheel in a screw does.",
  text: prose(
    "A force in proportion to the relative acceleration of its two ends. A flywheel on a screw or a rack",
    "does it, and so does a long thin fluid line between two chambers: a few kilograms of turning steel",
    "can stand for a tonne. Its `inertance` is a mass in kg, or a moment of inertia between turning",
    "coordinates.",
    "",
    "It differs from a mass in that it resists relative motion only. It has no weight, adds nothing to",
    "the moving mass, and between a machine and a floor that moves it couples the two: above its",
    "anti-resonance an isolator with an inerter transmits more, not less.",
  ),
  example: `thrum 1
title "Buoy tender's crane seat with a flywheel screw"

support deck
mass seat = 95 kg
spring coil between seat and deck = 9.5 N/mm
damper oil between seat and deck = 380 N*s/m
inerter screw between seat and deck = 28 kg

motion heave of deck
    amplitude = 0.3 m/s^2

ask sweep passage
    of = seat.acceleration
    by = heave
    from = 0.3 Hz
    to = 20 Hz

expect soft = natural_frequency(1) <= 1.6 Hz
expect not_too_stiff = transmissibility(passage, seat.acceleration, at: 10 Hz) <= 60 %
`,
  snippet: "inerter $1 between $2 and $3 = $4 kg",
  assemble: (values, builder) => {
    builder.element(values.name, values.motion, values.end("a"), values.end("b"), {
      keyword: "inerter",
      inertance: values.number("inertance") ?? 0,
      count: values.count,
    });
  },
});
