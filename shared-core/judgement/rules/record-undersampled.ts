import { excitesMode } from "../drives.ts";
import { placeOf } from "../places.ts";
import type { Rule } from "../rule.ts";
import { elasticModes } from "../shapes.ts";
import { number, rate } from "../wording.ts";

/**
 * Samples a cycle below which straight lines between samples no longer carry a motion: at ten a cycle the
 * amplitude of a sine is 3 % short. Common practice, no source.
 */
const SAMPLES_A_CYCLE = 10;

/** A measured history with too few samples for a mode that it excites. */
export const recordUndersampled: Rule = {
  code: "record-undersampled",
  cost: "modes",
  check({ model, assembly, analysis, modes }) {
    if (!modes.ok) return [];
    const table = modes.value;
    return assembly.drives.flatMap((drive) => {
      if (drive.shape.kind !== "record") return [];
      const spacing = widestSpacing(drive.shape.samples.times);
      if (!(spacing > 0)) return [];
      const sampledHz = 1 / spacing;
      const short = elasticModes(table).find(
        (mode) =>
          mode.frequencyHz * SAMPLES_A_CYCLE > sampledHz * (1 + 1e-9) &&
          excitesMode(analysis, assembly, drive, table.modes.indexOf(mode)),
      );
      if (short === undefined) return [];
      return [
        {
          span: placeOf(model, drive.name, "record"),
          message: `\`${drive.name}\` is sampled at ${rate(sampledHz)}, ${number(sampledHz / short.frequencyHz)} samples a cycle of mode ${short.number} at ${rate(short.frequencyHz)}, which it excites`,
          hint: `${SAMPLES_A_CYCLE} samples a cycle, ${rate(SAMPLES_A_CYCLE * short.frequencyHz)} here, carry its peaks`,
        },
      ];
    });
  },
};

function widestSpacing(times: Float64Array): number {
  let widest = 0;
  for (let i = 1; i < times.length; i++) widest = Math.max(widest, times[i] - times[i - 1]);
  return widest;
}
