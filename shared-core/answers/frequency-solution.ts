/** Phasors of everything at any frequency of the axis, drive group by drive group. */
import type { Assembly, DriveInfo } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type DriveGroup, driveGroups, drivePhasor } from "./drive-phasor.ts";
import type { Transfer } from "./frequency-modal.ts";
import type { GroupState } from "./frequency-quantity.ts";
import type { SteadySystem } from "./frequency-system.ts";

export interface SteadySolution {
  readonly groups: readonly DriveGroup[];
  /** Solves all groups at an axis frequency, Hz; the states are overwritten by the next call. */
  at(axisHz: number): Outcome<readonly GroupState[]>;
  /** The same for searches and tables: by superposition where that is quicker and agrees with `at`. */
  quick(axisHz: number): Outcome<readonly GroupState[]>;
}

/** Largest relative difference at which superposition is trusted. */
const AGREES = 1e-9;

/** A quick way to all coordinates, and the frequencies (Hz on the axis) at which it has to prove itself. */
export interface Superposition {
  readonly transfer: Transfer;
  readonly checkHz: readonly number[];
}

/** Fails where a drive asked for is no steady one. `superposition` is made when a search first needs it. */
export function steadySolution(
  assembly: Assembly,
  system: SteadySystem,
  by: readonly number[],
  superposition: () => Superposition | undefined = () => undefined,
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
  const at = (axisHz: number) => {
    for (let g = 0; g < states.length; g++) {
      const trouble = solveGroup(assembly, system, groups.value[g], axisHz, states[g]);
      if (trouble !== undefined) return fail<readonly GroupState[]>(trouble);
    }
    return solved;
  };
  let chosen: SteadySolution["quick"] | undefined;
  const quick = (axisHz: number) => {
    if (chosen === undefined) {
      const made = superposition();
      const superposed = made && superposedSolution(assembly, by, groups.value, states, made.transfer, at);
      chosen = made && superposed && agrees(at, superposed, states, made.checkHz) ? superposed : at;
    }
    return chosen(axisHz);
  };
  return succeed({ groups: groups.value, at, quick });
}

function superposedSolution(
  assembly: Assembly,
  by: readonly number[],
  groups: readonly DriveGroup[],
  states: readonly GroupState[],
  transfer: Transfer,
  otherwise: SteadySolution["at"],
): SteadySolution["quick"] {
  const uRe = new Float64Array(by.length);
  const uIm = new Float64Array(by.length);
  const solved = succeed(states);
  return (axisHz) => {
    for (let g = 0; g < states.length; g++) {
      const trouble = loadGroup(assembly, groups[g], axisHz, states[g]);
      if (trouble !== undefined) return fail(trouble);
      inputPhasors(assembly, by, groups[g], axisHz, uRe, uIm);
      if (!transfer(states[g].omega, uRe, uIm, states[g].xRe, states[g].xIm)) return otherwise(axisHz);
    }
    return solved;
  };
}

/** Whether two ways give the same states at all check frequencies. */
function agrees(
  exact: SteadySolution["at"],
  quick: SteadySolution["quick"],
  states: readonly GroupState[],
  checkHz: readonly number[],
): boolean {
  return checkHz.every((hz) => {
    if (!exact(hz).ok) return false;
    const kept = states.map(({ xRe, xIm }) => [Float64Array.from(xRe), Float64Array.from(xIm)] as const);
    if (!quick(hz).ok) return false;
    return states.every(({ xRe, xIm }, g) => {
      let size = 0;
      let apart = 0;
      for (let i = 0; i < xRe.length; i++) {
        size = Math.max(size, Math.hypot(kept[g][0][i], kept[g][1][i]));
        apart = Math.max(apart, Math.hypot(xRe[i] - kept[g][0][i], xIm[i] - kept[g][1][i]));
      }
      return apart <= AGREES * size;
    });
  });
}

/** Phasors of the drives of one group, as forces or as displacements of supports; the others are zero. */
function inputPhasors(
  assembly: Assembly,
  by: readonly number[],
  group: DriveGroup,
  axisHz: number,
  uRe: Float64Array,
  uIm: Float64Array,
): void {
  const frequency = axisHz * group.ratio;
  const omega = 2 * Math.PI * frequency;
  for (let j = 0; j < by.length; j++) {
    uRe[j] = 0;
    uIm[j] = 0;
    if (!group.drives.includes(by[j])) continue;
    const drive = assembly.drives[by[j]];
    const [re, im] = displacementPhasor(drive, frequency, omega);
    uRe[j] = re;
    uIm[j] = im;
  }
}

/** A force's own phasor; a motion's integrated to a displacement, one division by i omega each. */
function displacementPhasor(drive: DriveInfo, frequency: number, omega: number): readonly [number, number] {
  let [re, im] = drivePhasor(drive, frequency);
  if (drive.on.kind === "form") return [re, im];
  for (let d = 0; d < drive.derivative; d++) {
    const kept = re;
    re = im / omega;
    im = -kept / omega;
  }
  return [re, im];
}

/** Puts the group's loads into the coordinates' places and its motions into the supports'. */
function loadGroup(
  assembly: Assembly,
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
    const { on } = drive;
    if (on.kind === "support" && drive.derivative > 0 && omega === 0) {
      return `motion ${drive.name} has no displacement at 0 Hz`;
    }
    const [re, im] = displacementPhasor(drive, frequency, omega);
    if (on.kind === "support") {
      state.sRe[on.support] += re;
      state.sIm[on.support] += im;
      continue;
    }
    const { coordinates, factors } = on.form;
    for (let k = 0; k < coordinates.length; k++) {
      state.xRe[coordinates[k]] += factors[k] * re;
      state.xIm[coordinates[k]] += factors[k] * im;
    }
  }
  return undefined;
}

function solveGroup(
  assembly: Assembly,
  system: SteadySystem,
  group: DriveGroup,
  axisHz: number,
  state: GroupState,
): string | undefined {
  const trouble = loadGroup(assembly, group, axisHz, state);
  if (trouble !== undefined) return trouble;
  const { omega } = state;
  const frequency = axisHz * group.ratio;
  for (let s = 0; s < system.supports; s++) {
    if (state.sRe[s] === 0 && state.sIm[s] === 0) continue;
    system.addSupportLoad(0, omega, s, state.sRe[s], state.sIm[s], state.xRe, state.xIm);
  }
  if (system.free === 0) return undefined;
  const factored = system.factor(0, omega);
  if (!factored.ok) return `there is no steady response at ${frequency} Hz: nothing holds the motion there`;
  system.solve(state.xRe, state.xIm);
  let sum = 0;
  for (let i = 0; i < system.free; i++) sum += state.xRe[i] - state.xRe[i] + (state.xIm[i] - state.xIm[i]);
  // x - x is zero for numbers and nothing else.
  if (sum !== 0) return `there is no steady response at ${frequency} Hz: it has no bound there`;
  return undefined;
}
