import { COORDINATE_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { choice, NAME, prose, statement } from "./statement.ts";

export const junction: StatementDescription = statement({
  keyword: "junction",
  family: "moves",
  head: [NAME],
  value: "none",
  details: [choice("kind", ["sliding", "turning"], "whether it is displaced or turns")],
  quantities: COORDINATE_QUANTITIES,
  says: "A point without mass in which elements meet.",
  text: prose(
    "A place where elements meet and that has no mass of its own: the rod end between spring and dashpot",
    "in series, the tip of a bracket, the middle of two springs. Its motion follows from the balance of",
    "forces. Giving such a place a token mass would put a mode at some very high frequency into every",
    "answer; a junction does not.",
    "",
    "A spring and a damper in series over a junction is the classical relaxation element: soft to slow",
    "motion, stiff to fast. Such a place brings a root without a partner in the undamped problem; it",
    "stands at the end of the mode table with its decay and no number. A junction that nothing holds has",
    "no equation, and `no-inertia` says so.",
  ),
  example: `thrum 1
title "Relaxation mount under the tide recorder"

support quay
mass recorder = 46 kg
junction rod_end

spring main between recorder and quay = 14 N/mm
spring side between recorder and rod_end = 42 N/mm
damper oil between rod_end and quay = 0.45 kN*s/m

motion traffic of quay
    amplitude = 0.5 mm/s

ask sweep working_day
    of = recorder.velocity
    by = traffic
    from = 1 Hz
    to = 50 Hz

expect damped_enough = damping_ratio(1) >= 5 %
expect isolated = transmissibility(working_day, recorder.velocity, at: 20 Hz) <= 10 %
`,
  snippet: "junction $1",
  assemble: () => {},
});
