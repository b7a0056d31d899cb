import type { DriveInfo } from "../../mechanics/assembly.ts";
import { placeOf, setDetail, statementOf } from "../places.ts";
import type { Rule } from "../rule.ts";
import { inUnit } from "../wording.ts";

/** Part of the amplitude that still counts as zero. */
const ROUNDING = 1e-9;

/** A given displacement of a support that is not at zero at t = 0, in a history that it drives. */
export const startsWithJump: Rule = {
  code: "starts-with-jump",
  cost: "text",
  check({ model, assembly, instance }) {
    return assembly.drives.flatMap((drive, index) => {
      const history = instance.asks.find((ask) => ask.kind === "history" && ask.by.includes(index));
      const start = startOf(drive);
      if (history === undefined || start === 0) return [];
      const statement = statementOf(model, drive.name);
      const sine = drive.shape.kind === "sine";
      return [
        {
          span: placeOf(model, drive.name, "phase", "amplitude", "law", "record"),
          message: `\`${drive.name}\` stands at ${inUnit(start, drive.unit)} at t = 0, so its support jumps there from rest in \`${history.name}\``,
          hint: sine
            ? "with phase = -90 deg the sine starts at zero"
            : "let it start at zero, or begin the record earlier",
          fixes:
            sine && statement !== undefined
              ? [
                  setDetail(model, statement, "phase", "-90 deg", {
                    title: "Start at zero: phase = -90 deg",
                    safe: false,
                  }),
                ]
              : undefined,
          key: drive.name,
        },
      ];
    });
  },
};

/** Displacement at t = 0; 0 for what starts at zero and for steps and pulses, which jump on purpose. */
function startOf({ on, derivative, shape }: DriveInfo): number {
  if (on.kind !== "support" || derivative !== 0) return 0;
  switch (shape.kind) {
    case "sine": {
      const cosine = Math.cos(shape.phase);
      return Math.abs(cosine) > ROUNDING ? (shape.amplitude ?? 1) * cosine : 0;
    }
    case "chirp": {
      const cosine = Math.cos(shape.phase);
      return Math.abs(cosine) > ROUNDING ? (shape.amplitude ?? 1) * cosine : 0;
    }
    case "law": {
      const start = shape.law.at(0);
      return Number.isFinite(start) && Math.abs(start) > ROUNDING * lawSize(shape.law) ? start : 0;
    }
    case "record": {
      const { times, values } = shape.samples;
      const start = valueAtZero(times, values);
      const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
      return Math.abs(start) > ROUNDING * largest ? start : 0;
    }
    default:
      return 0;
  }
}

/** Size of a law over its first second, for telling zero from rounding. */
function lawSize(law: { at(time: number): number }): number {
  let largest = 0;
  for (let i = 1; i <= 16; i++) largest = Math.max(largest, Math.abs(law.at(i / 16)) || 0);
  return largest;
}

function valueAtZero(times: Float64Array, values: Float64Array): number {
  const next = times.findIndex((time) => time >= 0);
  if (next < 0) return 0;
  if (next === 0 || times[next] === 0) return times[next] === 0 ? values[next] : 0;
  const share = -times[next - 1] / (times[next] - times[next - 1]);
  return values[next - 1] + share * (values[next] - values[next - 1]);
}
