/**
 * The single pulses, steps and ramps as pieces. All shapes are those of the usual shock-testing practice:
 * half sine, haversine (versed sine), triangle, rectangle, the two sawteeth and the trapezoid.
 */
import type { DriveShape } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type Piece, type Signal, signalFrom } from "./drive-signal.ts";

type Pulse = Extract<DriveShape, { kind: "pulse" }>;
type Step = Extract<DriveShape, { kind: "step" }>;

/** The pulse as a signal; it is zero before `start` and after `start + duration`. */
export function pulseSignal(pulse: Pulse): Outcome<Signal> {
  const { start, duration, peak } = pulse;
  if (!(duration > 0)) return fail(`a pulse needs a duration above zero, found ${duration} s`);
  const end = start + duration;
  const after: Piece = { start: end, polynomial: [0] };
  switch (pulse.shape) {
    case "half_sine":
      return succeed(signalFrom([{ start, polynomial: [0], sine: [0, -peak] }, after], Math.PI / duration));
    case "haversine": {
      const half = peak / 2;
      return succeed(
        signalFrom([{ start, polynomial: [half], sine: [-half, 0] }, after], (2 * Math.PI) / duration),
      );
    }
    case "rectangle":
      return succeed(signalFrom([{ start, polynomial: [peak] }, after]));
    case "triangle":
      return succeed(signalFrom([...trapezoid(start, peak, duration / 2, 0, duration / 2), after]));
    case "rising_sawtooth":
      return succeed(signalFrom([{ start, polynomial: [0, peak / duration] }, after]));
    case "falling_sawtooth":
      return succeed(signalFrom([{ start, polynomial: [peak, -peak / duration] }, after]));
    case "trapezoid": {
      const { rise, fall } = pulse;
      const dwell = duration - rise - fall;
      if (!(rise >= 0 && fall >= 0 && dwell >= -1e-12 * duration)) {
        return fail(
          `a trapezoid's rise and fall must fit into its duration, found ${rise} s and ${fall} s in ${duration} s`,
        );
      }
      return succeed(signalFrom([...trapezoid(start, peak, rise, Math.max(dwell, 0), fall), after]));
    }
  }
}

/** A step, or a ramp over `rise` that then stays. */
export function stepSignal({ step, start, rise }: Step): Signal {
  if (!(rise > 0)) return signalFrom([{ start, polynomial: [step] }]);
  return signalFrom([
    { start, polynomial: [0, step / rise] },
    { start: start + rise, polynomial: [step] },
  ]);
}

/** What a step already holds just before t = 0: a load that stands since long. */
export function standingValue({ step, start, rise }: Step): number {
  if (!(start < 0)) return 0;
  return rise > 0 ? step * Math.min(1, -start / rise) : step;
}

function trapezoid(start: number, peak: number, rise: number, dwell: number, fall: number): Piece[] {
  const pieces: Piece[] = [];
  if (rise > 0) pieces.push({ start, polynomial: [0, peak / rise] });
  if (dwell > 0) pieces.push({ start: start + rise, polynomial: [peak] });
  if (fall > 0) pieces.push({ start: start + rise + dwell, polynomial: [peak, -peak / fall] });
  return pieces;
}
