/** Phasors of everything at any frequency of the axis, drive group by drive group. */
import type { Assembly } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type DriveGroup, driveGroups, drivePhasor } from "./drive-phasor.ts";
import type { GroupState } from "./frequency-quantity.ts";
import type { SteadySystem } from "./frequency-system.ts";

export interface SteadySolution {
  readonly groups: readonly DriveGroup[];
  /** Solves all groups at an axis frequency, Hz; the states are overwritten by the next call. */
  at(axisHz: number): Outcome<readonly GroupState[]>;
}

/** Fails where a drive asked for is no steady one. */
export function steadySolution(
  assembly: Assembly,
  system: SteadySystem,
  by: readonly number[],
): Outcome<SteadySolution> {
  const groups = driveGroups(assembly.drives, by);
  if (!groups.ok) return fail(groups.reason);
  const states = groups.value.map(
    (): GroupState => ({
      omega: 0,
      xRe: new Float64Array(system.free),
      xIm: new Float64Array(system.free),
      sRe: new Float64Array(system.supports),
      sIm: new Float64Array(system.supports),
    }),
  );
  const solved = succeed(states as readonly GroupState[]);
  return succeed({
    groups: groups.value,
    at(axisHz) {
      for (let g = 0; g < states.length; g++) {
        const trouble = solveGroup(assembly, system, groups.value[g], axisHz, states[g]);
        if (trouble !== undefined) return fail(trouble);
      }
      return solved;
    },
  });
}

function solveGroup(
  assembly: Assembly,
  system: SteadySystem,
  group: DriveGroup,
  axisHz: number,
  state: GroupState,
): string | undefined {
  const frequency = axisHz * group.ratio;
  const omega = 2 * Math.PI * frequency;
  state.omega = omega;
  state.xRe.fill(0);
  state.xIm.fill(0);
  state.sRe.fill(0);
  state.sIm.fill(0);
  for (const index of group.drives) {
    const drive = assembly.drives[index];
    let [re, im] = drivePhasor(drive, frequency);
    if (drive.on.kind === "form") {
      const { coordinates, factors } = drive.on.form;
      for (let k = 0; k < coordinates.length; k++) {
        state.xRe[coordinates[k]] += factors[k] * re;
        state.xIm[coordinates[k]] += factors[k] * im;
      }
      continue;
    }
    for (let d = 0; d < drive.derivative; d++) {
      if (omega === 0) return `motion ${drive.name} has no displacement at 0 Hz`;
      // One integration divides by i omega.
      const kept = re;
      re = im / omega;
      im = -kept / omega;
    }
    state.sRe[drive.on.support] += re;
    state.sIm[drive.on.support] += im;
  }
  for (let s = 0; s < system.supports; s++) {
    if (state.sRe[s] === 0 && state.sIm[s] === 0) continue;
    system.addSupportLoad(0, omega, s, state.sRe[s], state.sIm[s], state.xRe, state.xIm);
  }
  if (system.free === 0) return undefined;
  const factored = system.factor(0, omega);
  if (!factored.ok) return `there is no steady response at ${frequency} Hz: nothing holds the motion there`;
  system.solve(state.xRe, state.xIm);
  for (let i = 0; i < system.free; i++) {
    if (!Number.isFinite(state.xRe[i] + state.xIm[i])) {
      return `there is no steady response at ${frequency} Hz: it has no bound there`;
    }
  }
  return undefined;
}
