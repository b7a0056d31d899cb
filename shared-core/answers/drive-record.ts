/** Measured histories as pieces: linear between samples. */
import type { Samples } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { packedSignal, type Signal } from "./drive-signal.ts";

/** What a record means outside its samples. */
export type AfterRecord =
  /** The value is zero: forces, accelerations, velocities. */
  | "zero"
  /** The last value stays: displacements. */
  | "hold";

/**
 * A record as a signal of straight pieces. Before its first sample it is zero. Samples before t = 0 only set the
 * value that the line through t = 0 has. Fails on values that are not finite or times that do not ascend.
 */
export function recordSignal(samples: Samples, after: AfterRecord): Outcome<Signal> {
  const { times, values } = samples;
  const count = Math.min(times.length, values.length);
  if (count === 0) return fail("the record holds no samples");
  for (let i = 0; i < count; i++) {
    if (!Number.isFinite(times[i]) || !Number.isFinite(values[i])) {
      return fail(`sample ${i + 1} of the record is not a finite number`);
    }
    if (i > 0 && !(times[i] > times[i - 1])) {
      return fail(`the times of the record must ascend, sample ${i + 1} is at ${times[i]} s`);
    }
  }
  // Room for a zero piece in front, count - 1 lines and the piece behind.
  const starts = new Float64Array(count + 1);
  const coefficients = new Float64Array(2 * (count + 1));
  // A piece of zeros stands in front already.
  let used = times[0] > 0 ? 1 : 0;
  for (let i = 0; i + 1 < count; i++) {
    if (times[i + 1] <= 0) continue;
    const slope = (values[i + 1] - values[i]) / (times[i + 1] - times[i]);
    const cut = Math.max(0, -times[i]);
    starts[used] = times[i] + cut;
    coefficients[2 * used] = values[i] + slope * cut;
    coefficients[2 * used + 1] = slope;
    used++;
  }
  starts[used] = Math.max(0, times[count - 1]);
  coefficients[2 * used] = after === "hold" ? values[count - 1] : 0;
  used++;
  // Lines meet; only the value may jump where the record begins and where it ends.
  const jumps = new Uint8Array(used).fill(1);
  jumps[0] = 0;
  jumps[used - 1] = 0;
  if (times[0] > 0 && used > 1) jumps[1] = 0;
  return succeed(
    packedSignal(
      {
        starts: starts.subarray(0, used),
        order: 2,
        coefficients: coefficients.subarray(0, 2 * used),
        omega: 0,
        sineRe: new Float64Array(used),
        sineIm: new Float64Array(used),
      },
      jumps,
    ),
  );
}
