import type { Analysis } from "../answers/analysis.ts";
import type { Mode, ModeTable } from "../answers/answer.ts";
import type { Assembly, DriveInfo, LinearForm } from "../mechanics/assembly.ts";

/**
 * Smallest participation (cosine between push and mode, 0 to 1) with which a drive counts as exciting a mode; below
 * it the drive sits on a node for all that matters. Common practice, no source.
 */
export const EXCITED = 1e-3;

/**
 * Direction in which a drive pushes the free coordinates. A motion pushes through whatever joins its support:
 * stiffness times travel of each of those elements, dampers where there is no stiffness.
 */
export function pushOf(assembly: Assembly, drive: DriveInfo): LinearForm {
  if (drive.on.kind === "form") return drive.on.form;
  const { support } = drive.on;
  const through = (weight: (element: Assembly["elements"][number]) => number): Float64Array => {
    const push = new Float64Array(assembly.free);
    for (const element of assembly.elements) {
      const at = element.form.supports.indexOf(support);
      if (at < 0) continue;
      const pull = weight(element) * element.form.supportFactors[at];
      element.form.coordinates.forEach((coordinate, i) => {
        push[coordinate] -= pull * element.form.factors[i];
      });
    }
    return push;
  };
  let push = through((element) => element.stiffness);
  if (push.every((value) => value === 0)) push = through((element) => element.damping);
  if (push.every((value) => value === 0)) push = through((element) => element.inertance);
  const coordinates = [...push.keys()].filter((i) => push[i] !== 0);
  return { coordinates, factors: coordinates.map((i) => push[i]), supports: [], supportFactors: [] };
}

/** Whether a drive excites the mode that stands at `index` of the table. */
export function excitesMode(
  analysis: Analysis,
  assembly: Assembly,
  drive: DriveInfo,
  index: number,
): boolean {
  const push = pushOf(assembly, drive);
  return push.coordinates.length > 0 && analysis.excites(push, index) > EXCITED;
}

/** Elastic modes that at least one of the drives excites; all of them when there are no drives. */
export function excitedModes(
  analysis: Analysis,
  assembly: Assembly,
  table: ModeTable,
  drives: readonly DriveInfo[],
): readonly Mode[] {
  return table.modes.filter(
    (mode, index) =>
      mode.number !== null &&
      mode.number > 0 &&
      (drives.length === 0 || drives.some((drive) => excitesMode(analysis, assembly, drive, index))),
  );
}

/** Distance of a mode from a band of rates, as a share of the mode's frequency; 0 inside the band. */
export function separationFrom(band: readonly [number, number], modeHz: number): number {
  const [low, high] = band[0] <= band[1] ? band : [band[1], band[0]];
  if (low <= modeHz && modeHz <= high) return 0;
  return Math.min(Math.abs(low / modeHz - 1), Math.abs(high / modeHz - 1));
}

/** Steady magnification of one oscillator at the frequency ratio r. Closed form, any vibration textbook. */
export function magnification(r: number, dampingRatio: number): number {
  return 1 / Math.hypot(1 - r * r, 2 * dampingRatio * r);
}
