/** From what a drive does to its signal in time: newtons for a force, metres (radians) of travel for a motion. */
import type { DriveInfo, DriveShape } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { pulseSignal, standingValue, stepSignal } from "./drive-pulses.ts";
import { recordSignal } from "./drive-record.ts";
import { integrated, type Signal, signalFrom } from "./drive-signal.ts";
import { smoothSignal } from "./drive-smooth.ts";

export interface DriveSignal {
  /** A force in N (N*m), or the displacement in m (rad) that a motion gives its support. */
  readonly signal: Signal;
  /** What a force already holds just before t = 0. */
  readonly standing: number;
  /** True where the signal is an interpolation (a chirp or a law) and not exact. */
  readonly interpolated: boolean;
}

export interface DriveSignalOptions {
  /** s */
  readonly lasting: number;
  /** Wanted error of interpolated drives as a share of their largest value. */
  readonly tolerance: number;
  /** 1, or more to look at interpolated drives that many times closer. */
  readonly finer: number;
}

/** The drive from t = 0 on. Fails, with the drive's name, where it says too little or is not of a kind for time. */
export function driveSignal(drive: DriveInfo, options: DriveSignalOptions): Outcome<DriveSignal> {
  const made = shapeSignal(drive, options);
  if (!made.ok) return fail(`${drive.keyword} ${drive.name}: ${made.reason}`);
  let signal = made.value;
  const motion = drive.on.kind === "support";
  if (motion) for (let d = 0; d < drive.derivative; d++) signal = integrated(signal);
  const standing = !motion && drive.shape.kind === "step" ? standingValue(drive.shape) : 0;
  const interpolated = drive.shape.kind === "chirp" || drive.shape.kind === "law";
  return succeed({ signal, standing, interpolated });
}

function shapeSignal(drive: DriveInfo, options: DriveSignalOptions): Outcome<Signal> {
  const { shape } = drive;
  const motion = drive.on.kind === "support";
  switch (shape.kind) {
    case "none":
      return fail("it says nothing about time; give it an amplitude and a frequency, a pulse or a step");
    case "sine":
      if (shape.amplitude === undefined) return fail("it has no amplitude, which a history needs");
      return steadySine(shape.amplitude, shape.frequencyHz ?? drive.writtenHz, shape.phase);
    case "unbalance": {
      const frequency = shape.frequencyHz ?? drive.writtenHz;
      const amplitude = shape.unbalance * (2 * Math.PI * (frequency ?? 0)) ** 2;
      return steadySine(amplitude, frequency, shape.phase);
    }
    case "pulse":
      return pulseSignal(shape);
    case "step":
      return succeed(stepSignal(shape));
    case "impulse":
      if (motion) {
        return fail("an impulse is momentum given to a mass; write a sudden change of motion as a step");
      }
      return succeed(
        signalFrom([{ start: 0, polynomial: [0] }], 0, [{ time: shape.start, size: shape.impulse }]),
      );
    case "chirp":
      return chirpSignal(shape, options);
    case "law":
      return followed((time) => shape.law.at(time), shape.law.kinks, shape.law.fastestHz, options);
    case "record":
      return recordSignal(shape.samples, motion && drive.derivative === 0 ? "hold" : "zero");
    case "speed-curve":
      return fail("its torque depends on the speed, so it is no function of time alone");
  }
}

function steadySine(amplitude: number, frequency: number | undefined, phase: number): Outcome<Signal> {
  if (frequency === undefined) {
    return fail("it has no single frequency, which a history needs; write one speed instead of a range");
  }
  if (frequency === 0) return succeed(signalFrom([{ start: 0, polynomial: [amplitude * Math.cos(phase)] }]));
  const sine = [amplitude * Math.cos(phase), amplitude * Math.sin(phase)] as const;
  return succeed(signalFrom([{ start: 0, polynomial: [0], sine }], 2 * Math.PI * frequency));
}

/**
 * The rate rises linearly over `lasting` and then stays at its end: a run-up ends at its running speed. An
 * unbalance pulls with U times the square of the momentary rate.
 */
function chirpSignal(
  shape: Extract<DriveShape, { kind: "chirp" }>,
  options: DriveSignalOptions,
): Outcome<Signal> {
  const { fromHz, toHz, lasting, phase } = shape;
  if (!(lasting > 0)) return fail(`a chirp needs a duration above zero, found ${lasting} s`);
  const slope = (toHz - fromHz) / lasting;
  const cyclesAtEnd = 0.5 * (fromHz + toHz) * lasting;
  const at = (time: number) => {
    const done = time >= lasting;
    const hz = done ? toHz : fromHz + slope * time;
    const cycles = done ? cyclesAtEnd + toHz * (time - lasting) : (fromHz + 0.5 * slope * time) * time;
    const size =
      shape.unbalance === undefined ? (shape.amplitude ?? 1) : shape.unbalance * (2 * Math.PI * hz) ** 2;
    // Whole cycles are dropped first: the cosine of a large argument loses digits.
    return size * Math.cos(2 * Math.PI * (cycles - Math.round(cycles)) + phase);
  };
  return followed(at, [lasting], Math.max(Math.abs(fromHz), Math.abs(toHz)), options);
}

function followed(
  at: (time: number) => number,
  kinks: readonly number[],
  fastestHz: number,
  { lasting, tolerance, finer }: DriveSignalOptions,
): Outcome<Signal> {
  const made = smoothSignal(at, { lasting, kinks, fastestHz, tolerance, finer });
  return made.ok ? succeed(made.value.signal) : fail(made.reason);
}
