import type { SweepAsk } from "../../model/model.ts";
import { excitesMode } from "../drives.ts";
import { elasticModes } from "../shapes.ts";
import type { Trial } from "../trial.ts";
import { list, rate } from "../wording.ts";

/** A damping ratio below this is rounding: nothing damps the mode. */
export const UNDAMPED = 1e-9;

/** Says which undamped mode of the band keeps a peak from being bounded. */
export function remarkUndamped(trial: Trial, ask: SweepAsk): void {
  const modes = undampedInBand(trial, ask);
  if (modes.length === 0) return;
  trial.remark({ code: "not-damped", ask, ...undampedWords(ask, modes) });
}

export interface UndampedMode {
  readonly number: number;
  readonly frequencyHz: number;
}

/** Undamped elastic modes that the drives of a sweep excite inside its band. */
export function undampedInBand(
  trial: Pick<Trial, "modes" | "analysis" | "instance">,
  ask: SweepAsk,
): readonly UndampedMode[] {
  const table = trial.modes();
  if (!table.ok) return [];
  const { assembly } = trial.instance;
  const all = table.value.modes;
  return elasticModes(table.value).filter(
    (mode) =>
      ask.fromHz <= mode.frequencyHz &&
      mode.frequencyHz <= ask.toHz &&
      Math.abs(mode.dampingRatio ?? 0) < UNDAMPED &&
      ask.by.some((drive) =>
        excitesMode(trial.analysis, assembly, assembly.drives[drive], all.indexOf(mode)),
      ),
  );
}

export function undampedWords(
  ask: SweepAsk,
  modes: readonly UndampedMode[],
): { readonly message: string; readonly hint: string } {
  const which = list(modes.map((mode) => `mode ${mode.number} at ${rate(mode.frequencyHz)}`));
  return {
    message: `\`${ask.name}\` runs through ${which}, which nothing damps, so its peaks there have no bound`,
    hint: "give a loss_factor, a damper or assume modal_damping, or end the sweep before it",
  };
}
