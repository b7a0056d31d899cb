/** Texts to start from: small whole models of an invented harbour works, each with a verdict. */

export interface NewModelKind {
  readonly kind: "machine" | "shaft" | "floor";
  readonly title: string;
  /** One line for a list. */
  readonly says: string;
}

export const NEW_MODELS: readonly NewModelKind[] = [
  { kind: "machine", title: "Machine on mounts", says: "one mass on springs, shaken by its unbalance" },
  { kind: "shaft", title: "Drive line", says: "inertias on shafts, shaken by a torque" },
  { kind: "floor", title: "Machine on a floor", says: "two masses in a row, a shock in time" },
];

/** The text of a small model that is whole, holds its expectations and can be changed line by line. */
export function newModel(kind: NewModelKind["kind"]): string {
  return TEXTS[kind];
}

const TEXTS: Readonly<Record<NewModelKind["kind"], string>> = {
  machine: `thrum 1
title "Bilge pump on rubber feet"

> source: weighbridge ticket KW-0417
let pump_mass = 310 kg +/- 3 %
> One foot, dynamic value.
> source: catalogue sheet KW-R-04
let foot = 62 N/mm +/- 10 %
> source: motor nameplate
let pump_speed = 1180 rpm

mass pump = pump_mass
spring feet between pump and ground = foot
    count = 4
    loss_factor = 0.08

force imbalance on pump
    unbalance = 6e-3 kg*m
    speed = pump_speed

ask modes
ask sweep run_up
    of = pump.velocity, feet.force
    by = imbalance
    from = 1 Hz
    to = 40 Hz

expect soft_enough = natural_frequency(1) <= 0.35 * pump_speed
expect smooth = value(run_up, pump.velocity, at: pump_speed) <= 4.5 mm/s
`,
  shaft: `thrum 1
title "Winch drive: motor, coupling, drum"

> source: motor data sheet KW-M-12
let motor_inertia = 0.9 kg*m^2 +/- 3 %
> Rubber coupling at rated torque.
> source: coupling maker's test sheet KW-T-08
let coupling = 4.2 kN*m/rad +/- 15 %
let motor_speed = 980 rpm

inertia motor = motor_inertia
inertia drum = 14 kg*m^2 +/- 5 %
spring coupling_rubber between motor and drum = coupling
    loss_factor = 0.15
damper brake_drag between drum and ground = 6 N*m*s

> Torque ripple, six per turn.
torque ripple on motor
    amplitude = 12 N*m
    speed = motor_speed
    order = 6

ask modes
ask sweep ripple_run
    of = coupling_rubber.torque
    by = ripple
    from = 2 Hz
    to = 150 Hz

expect clear = clear_of_modes(motor_speed, orders: (1, 6)) >= 15 %
expect coupling_holds = peak(ripple_run, coupling_rubber.torque) <= 400 N*m
`,
  floor: `thrum 1
title "Punch press on the workshop floor"

> source: machine data sheet KW-P-31
let press_mass = 2.4 t +/- 2 %
> source: structural note KW-S-07
let beams = 38 MN/m +/- 20 %
let mount = 1.1 kN/mm +/- 10 %

mass press = press_mass
mass floor_bay = 9.5 t
spring mounts between press and floor_bay = mount
    count = 4
damper oil between press and floor_bay = 14 kN*s/m
spring slab_beams between floor_bay and ground = beams
damper slab_loss between floor_bay and ground = 30 kN*s/m

> One stroke.
force blow on press
    pulse = half_sine
    peak = 24 kN
    duration = 12 ms

ask modes
ask history stroke
    of = floor_bay.velocity, mounts.force
    by = blow
    lasting = 1.5 s

expect apart = natural_frequency(2) / natural_frequency(1) >= 1.5
expect floor_quiet = peak(stroke, floor_bay.velocity) <= 20 mm/s
`,
};
