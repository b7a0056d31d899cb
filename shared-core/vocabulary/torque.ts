import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, prose, statement, wordAndPlace } from "./statement.ts";

export const torque: StatementDescription = statement({
  keyword: "torque",
  family: "drives",
  head: [NAME, ...wordAndPlace("on")],
  value: "none",
  details: driveDetails("torque"),
  quantities: [],
  says: "A torque on a turning coordinate.",
  text: prose(
    "A torque on a turning coordinate, positive the way the angle is positive, with the shapes that a",
    "force has. Two more belong to machines: a `law` may also hold `rate`, the angular rate of what it",
    "acts on as a plain 1/s, and `curve` gives torque over speed in rows, as a motor's data sheet does:",
    "straight between the rows, and held at the first and last torque outside them. Both make the torque",
    "part of the dynamics: a falling curve damps, a rising one may hunt. A history follows a curve exactly,",
    "several at once too, switched on at t = 0; modes and sweeps leave it out, because its slope at",
    "standstill is not the one at speed. What a curve acts on needs an inertia of its own.",
    "",
    "The orders of a reciprocating engine are one drive each, tied to one speed with its own `order` and",
    "`phase`.",
  ),
  example: `thrum 1
title "Slipway winch: second order of its engine"

inertia engine = 1.4 kg*m^2
inertia drum = 9.5 kg*m^2
spring coupling between engine and drum = 26 kN*m/rad
    loss_factor = 0.15
damper load between drum and ground = 40 N*m*s/rad

torque firing on engine
    amplitude = 65 N*m
    speed = 900 rpm
    order = 2

ask sweep engine_range
    of = coupling.torque
    by = firing
    from = 5 Hz
    to = 60 Hz

expect coupling_safe = value(engine_range, coupling.torque, at: 30 Hz) <= 120 N*m
`,
  snippet: "torque $1 on $2\n    amplitude = $3 N*m\n    frequency = $4 Hz",
});
