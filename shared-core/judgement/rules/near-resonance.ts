import type { Mode } from "../../answers/answer.ts";
import { isSteady } from "../../answers/drive-phasor.ts";
import type { DriveInfo } from "../../mechanics/assembly.ts";
import { excitesMode, magnification, separationFrom } from "../drives.ts";
import { placeOf, relatedTo } from "../places.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";
import { elasticModes, stiffestShare } from "../shapes.ts";
import { factor, percent, rate } from "../wording.ts";

/** From this damping ratio on, 1/sqrt(2), the displacement of one oscillator has no resonance peak. */
const NO_PEAK = Math.SQRT1_2;

/** A steady drive whose frequency, order or speed range lies inside the resonance band of a mode it excites. */
export const nearResonance: Rule = {
  code: "near-resonance",
  cost: "modes",
  check(context) {
    if (!context.modes.ok) return [];
    const { modes } = context.modes.value;
    const elastic = elasticModes(context.modes.value);
    return context.assembly.drives.flatMap((drive) => {
      const band = drive.bandHz;
      if (band === undefined || !isSteady(drive)) return [];
      return elastic
        .filter((mode) => separationFrom(band, mode.frequencyHz) <= context.assembly.resonanceBand)
        .filter((mode) => (mode.dampingRatio ?? 0) < NO_PEAK)
        .filter((mode) => excitesMode(context.analysis, context.assembly, drive, modes.indexOf(mode)))
        .map((mode) => finding(context, drive, band, mode));
    });
  },
};

function finding(
  context: RuleContext,
  drive: DriveInfo,
  band: readonly [number, number],
  mode: Mode & { number: number; frequencyHz: number },
): Finding {
  const { resonanceBand } = context.assembly;
  const modeHz = mode.frequencyHz;
  const held = stiffestShare(mode);
  return {
    span: placeOf(context.model, drive.name, "frequency", "speed"),
    message: `\`${drive.name}\` ${whereItRuns(band, modeHz)} mode ${mode.number} at ${rate(modeHz)}, which it excites${gain(band, mode)}`,
    hint: `keep it more than ${percent(resonanceBand)} away: below ${rate(modeHz * (1 - resonanceBand))} or above ${rate(modeHz * (1 + resonanceBand))}, by speed, stiffness or mass, or accept it with a reason`,
    related: relatedTo(
      context.model,
      held,
      `holds ${percent(mode.energyShare[held ?? ""] ?? 0)} of the strain energy of mode ${mode.number}`,
    ),
  };
}

function whereItRuns(band: readonly [number, number], modeHz: number): string {
  const [low, high] = band;
  if (low !== high) {
    const across = low <= modeHz && modeHz <= high;
    return `between ${rate(low)} and ${rate(high)} ${across ? "runs through" : "comes close to"}`;
  }
  const apart = Math.abs(low / modeHz - 1);
  if (apart < 5e-4) return `at ${rate(low)} runs on`;
  return `at ${rate(low)} runs ${percent(apart)} ${low < modeHz ? "below" : "above"}`;
}

function gain(band: readonly [number, number], mode: Mode & { frequencyHz: number }): string {
  const [low, high] = band;
  const closest = Math.min(Math.max(mode.frequencyHz, low), high);
  const times = magnification(closest / mode.frequencyHz, mode.dampingRatio ?? 0);
  if (times < 1000) return `: ${factor(times)} times the static response`;
  return mode.dampingRatio !== null && mode.dampingRatio > 1e-9
    ? `: more than 1000 times the static response`
    : " and nothing damps";
}
