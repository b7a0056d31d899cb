/** Phasors of everything at any frequency of the axis, drive group by drive group. */
import type { Assembly, DriveInfo } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { LANES } from "../numerics/tridiagonal-many.ts";
import { type DriveGroup, driveGroups, drivePhasor } from "./drive-phasor.ts";
import type { BlockSolver, StateBlock } from "./frequency-block.ts";
import type { GroupState } from "./frequency-quantity.ts";
import type { SteadySystem } from "./frequency-system.ts";
import type { Transfer } from "./frequency-transfer.ts";

export interface SteadySolution {
  readonly groups: readonly DriveGroup[];
  /** Solves all groups at an axis frequency, Hz; the states are overwritten by the next call. */
  at(axisHz: number): Outcome<readonly GroupState[]>;
  /** The same for searches and tables: by superposition where that is quicker and agrees with `at`. */
  quick(axisHz: number): Outcome<readonly GroupState[]>;
  /** The same for many points of an axis at once, where all drives have one frequency and there is such a way. */
  blocks(): BlockSolver | undefined;
  /** The states with their frequency and supports set, for motions taken out of a block. */
  still(axisHz: number): Outcome<readonly GroupState[]>;
}

/** Largest relative difference at which superposition is trusted. */
const AGREES = 1e-9;

/** A quick way to all coordinates, and the frequencies (Hz on the axis) at which it has to prove itself. */
export interface Superposition {
  readonly transfer: Transfer;
  readonly checkHz: readonly number[];
}

/** Fails where a drive asked for is no steady one. The first superposition that agrees is taken, when a search needs one. */
export function steadySolution(
  assembly: Assembly,
  system: SteadySystem,
  by: readonly number[],
  superpositions: () => Iterable<Superposition> = () => [],
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
  const each = (solve: (group: DriveGroup, state: GroupState) => string | undefined) => {
    for (let g = 0; g < states.length; g++) {
      const trouble = solve(groups.value[g], states[g]);
      if (trouble !== undefined) return fail<readonly GroupState[]>(trouble);
    }
    return solved;
  };
  const at = (axisHz: number) => each((group, state) => solveGroup(assembly, system, group, axisHz, state));
  const still = (axisHz: number) => each((group, state) => loadGroup(assembly, group, axisHz, state));
  const laneBlocks = (): BlockSolver | undefined =>
    states.length === 1 ? laneSolution(assembly, system, groups.value[0], states[0]) : undefined;
  let chosen: Pick<SteadySolution, "quick" | "blocks"> | undefined;
  const choose = () => {
    for (const { transfer, checkHz } of superpositions()) {
      const superposed = superposedSolution(assembly, by, groups.value, states, transfer, at);
      if (!agrees(at, superposed, states, checkHz)) continue;
      return { quick: superposed, blocks: () => superposedBlocks(assembly, by, groups.value, transfer) };
    }
    return { quick: at, blocks: laneBlocks };
  };
  const quick = (axisHz: number) => {
    chosen ??= choose();
    return chosen.quick(axisHz);
  };
  const blocks = () => {
    chosen ??= choose();
    return chosen.blocks();
  };
  return succeed({ groups: groups.value, at, quick, blocks, still });
}

/** A chain's own way: elimination of many frequencies side by side. */
function laneSolution(
  assembly: Assembly,
  system: SteadySystem,
  group: DriveGroup,
  state: GroupState,
): BlockSolver | undefined {
  const { lanes, free } = system;
  if (lanes === undefined) return undefined;
  const { row, solve } = lanes;
  const block: StateBlock = {
    lanes: LANES,
    stride: LANES,
    omega: new Float64Array(LANES),
    row,
    re: new Float64Array(free * LANES),
    im: new Float64Array(free * LANES),
    good: new Uint8Array(LANES),
  };
  const loaded = new Uint8Array(LANES).fill(1);
  const forces = group.drives.every((index) => assembly.drives[index].on.kind === "form");
  return (axisHz, from) => {
    block.re.fill(0);
    block.im.fill(0);
    for (let lane = 0; lane < LANES; lane++) {
      const hz = axisHz[Math.min(from + lane, axisHz.length - 1)];
      block.omega[lane] = 2 * Math.PI * (hz * group.ratio);
      if (forces) {
        loadForces(assembly, group, hz * group.ratio, block, lane);
        continue;
      }
      loaded[lane] = loadAll(assembly, system, group, hz, state) === undefined ? 1 : 0;
      for (let i = 0; i < free; i++) {
        block.re[row[i] * LANES + lane] = state.xRe[i];
        block.im[row[i] * LANES + lane] = state.xIm[i];
      }
    }
    solve(block.omega, block.re, block.im, block.good);
    for (let lane = 0; lane < LANES; lane++) block.good[lane] &= loaded[lane];
    return block;
  };
}

/** Puts forces into the few rows that they act on. */
function loadForces(
  assembly: Assembly,
  group: DriveGroup,
  frequency: number,
  { row, re, im, stride }: StateBlock,
  lane: number,
): void {
  for (const index of group.drives) {
    const { on } = assembly.drives[index];
    if (on.kind !== "form") continue;
    const [a, b] = drivePhasor(assembly.drives[index], frequency);
    const { coordinates, factors } = on.form;
    for (let k = 0; k < coordinates.length; k++) {
      const at = row[coordinates[k]] * stride + lane;
      re[at] += factors[k] * a;
      im[at] += factors[k] * b;
    }
  }
}

/** Superposition of roots at many frequencies as one product; for drives of one frequency. */
function superposedBlocks(
  assembly: Assembly,
  by: readonly number[],
  groups: readonly DriveGroup[],
  transfer: Transfer,
): BlockSolver | undefined {
  if (groups.length !== 1 || transfer.many === undefined) return undefined;
  const { block, solve } = transfer.many;
  const { lanes } = block;
  const uRe = new Float64Array(by.length * lanes);
  const uIm = new Float64Array(by.length * lanes);
  return (axisHz, from) => {
    for (let lane = 0; lane < lanes; lane++) {
      const hz = axisHz[Math.min(from + lane, axisHz.length - 1)];
      block.omega[lane] = 2 * Math.PI * hz * groups[0].ratio;
      inputPhasors(assembly, by, groups[0], hz, uRe, uIm, lane * by.length);
    }
    solve(uRe, uIm);
    // A motion given as a speed has no displacement at 0 Hz.
    for (let at = 0; at < uRe.length; at++) {
      if (!Number.isFinite(uRe[at] + uIm[at])) block.good[Math.floor(at / by.length)] = 0;
    }
    return block;
  };
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
      if (!transfer.at(states[g].omega, uRe, uIm, states[g].xRe, states[g].xIm)) return otherwise(axisHz);
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

/** Phasors of the drives of one group, as forces or as displacements of supports, from `at` on; the others are zero. */
function inputPhasors(
  assembly: Assembly,
  by: readonly number[],
  group: DriveGroup,
  axisHz: number,
  uRe: Float64Array,
  uIm: Float64Array,
  at = 0,
): void {
  const frequency = axisHz * group.ratio;
  const omega = 2 * Math.PI * frequency;
  for (let j = 0; j < by.length; j++) {
    const acts = group.drives.includes(by[j]);
    const [re, im] = acts ? displacementPhasor(assembly.drives[by[j]], frequency, omega) : NOTHING;
    uRe[at + j] = re;
    uIm[at + j] = im;
  }
}

const NOTHING = [0, 0] as const;

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

/** The same with what the supports' motions load the coordinates with. */
function loadAll(
  assembly: Assembly,
  system: SteadySystem,
  group: DriveGroup,
  axisHz: number,
  state: GroupState,
): string | undefined {
  const trouble = loadGroup(assembly, group, axisHz, state);
  if (trouble !== undefined) return trouble;
  for (let s = 0; s < system.supports; s++) {
    if (state.sRe[s] === 0 && state.sIm[s] === 0) continue;
    system.addSupportLoad(0, state.omega, s, state.sRe[s], state.sIm[s], state.xRe, state.xIm);
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
  const trouble = loadAll(assembly, system, group, axisHz, state);
  if (trouble !== undefined) return trouble;
  const { omega } = state;
  const frequency = axisHz * group.ratio;
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
