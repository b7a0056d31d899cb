import type { Model } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { uniform } from "../../shared-core/numerics/random.ts";

export function modelOf(text: string): Model {
  return understand("pier/model.thrum", text, { read: () => ({ ok: false, why: "missing", detail: "" }) });
}

/** A connected model of 5 to 30 coordinates, some sliding and some turning, with loops, supports and drives. */
export function randomModel(seed: number): string {
  let draw = 0;
  const next = (): number => uniform(seed, draw++, 0);
  const below = (count: number): number => Math.floor(next() * count);
  const lines = ["thrum 1", `title "Random ${seed}"`, "support quay"];
  const names: string[] = [];
  const count = 5 + below(26);
  const isTurning = next() < 0.3;
  for (let i = 0; i < count; i++) {
    const isJunction = i > 1 && next() < 0.1;
    const name = `${WORDS[below(WORDS.length)]}_${i}`;
    names.push(name);
    if (isJunction) lines.push(`junction ${name}`, ...(isTurning ? ["    kind = turning"] : []));
    else
      lines.push(
        isTurning ? `inertia ${name} = ${1 + below(90)} kg*m^2` : `mass ${name} = ${1 + below(900)} kg`,
      );
  }
  const joint = (i: number, a: string, b: string): string => {
    const kind = below(3);
    const turn = isTurning ? "*m/rad" : "/m";
    if (kind === 0)
      return `damper d_${i} between ${a} and ${b} = ${1 + below(99)} ${isTurning ? "N*m*s/rad" : "N*s/m"}`;
    return `spring k_${WORDS[below(WORDS.length)]}_${i} between ${a} and ${b} = ${1 + below(99)} kN${turn}`;
  };
  let k = 0;
  for (let i = 0; i < count; i++) {
    const other = i === 0 ? "ground" : names[Math.max(0, i - 1 - below(4))];
    lines.push(joint(k++, names[i], other));
  }
  const more = below(count);
  for (let i = 0; i < more; i++) {
    const a = names[below(count)];
    const b = next() < 0.25 ? (isTurning ? "ground" : ["ground", "quay"][below(2)]) : names[below(count)];
    if (a !== b) lines.push(joint(k++, a, b));
  }
  const drive = isTurning ? "torque" : "force";
  lines.push(
    `${drive} shake on ${names[below(count)]}`,
    `    amplitude = 3 ${isTurning ? "N*m" : "N"}`,
    "    frequency = 12 Hz",
  );
  return `${lines.join("\n")}\n`;
}

const WORDS = ["a", "pump", "frame", "long_crane_beam", "leaf", "winch_drum_upper", "x"];

/** Every kind of statement that can be seen. */
export const EVERY_KIND = `thrum 1
title "Every kind"
body genset = 2.4 t
    centre = (0, 0, 0.3) m
    inertia = (310, 840, 760) kg*m^2
point nozzle on genset at (1, 0, 0) m
point left_foot on genset at (-1, 0, 0) m
point right_foot on genset at (1, 0, 0) m
point lonely on genset at (1, 0, 2) m
support floor
junction knee
mass unit = 420 kg
mass arm = 20 kg
inertia motor = 0.3 kg*m^2
inertia wheel = 3 kg*m^2
loop coil
loop second
pendulum hook = 850 kg
    length = 6 m
    on = unit
pendulum upright = 10 kg
    length = 2 m
    hangs = up
bind motor = -3.2 * wheel
mount foot_a between left_foot and floor at (0, 0, 0) m
    stiffness = (100, 100, 200) N/mm
mount foot_b between right_foot and floor at (0, 0, 0) m
    stiffness = (100, 100, 200) N/mm
spring pipe between nozzle.z and unit = 26.5 N/mm
    loss_factor = 0.03
damper oil between unit and ground = 2.1 kN*s/m
spring feet between unit and ground = 26.5 N/mm
    count = 4
inerter fly between unit and ground = 12 kg
stop bumper between unit and ground = 12 kN/m
    gap = 3 mm
friction pad between unit and arm
    force = 30 N
cord rope between arm and unit = 85 kN/m
spring upper between knee and unit = 12 N/mm
damper side between knee and arm = 12 N*s/m
spring shaft between motor and ground = 12 kN*m/rad
inductor winding in coil = 2 mH
resistor load in coil = 3 ohm
capacitor store between coil and second = 10 uF
mutual core between coil and second = 0.2 mH
transducer voice between unit and coil = 4 N/A
feed push from arm to unit
    damping = 800 N*s/m
kit shoe(k) between A and B
    spring rubber between A and B = k
part left_shoe = shoe(48 N/mm) between unit and ground
force blow on arm
    step = 30 N
torque twist on wheel
    amplitude = 3 N*m
    frequency = 12 Hz
voltage mains on coil
    amplitude = 3 V
    frequency = 50 Hz
motion quake of floor
    amplitude = 3 mm
    frequency = 2 Hz
force imbalance on nozzle.z
    unbalance = 0.018 kg*m
    speed = 1180 rpm
`;
