/**
 * Steady drives as phasors: the value is Re(V exp(i 2 pi f t)).
 *
 * Drives of one ask are swept together. The axis is the frequency of the first; each other one keeps its ratio
 * to it: that of the written frequencies, else that of the bands they run through, else that of their orders.
 */
import type { DriveInfo } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";

/** Drives that answer at one and the same multiple of the axis frequency; their phasors add. */
export interface DriveGroup {
  readonly ratio: number;
  /** Indices of drives. */
  readonly drives: readonly number[];
}

/** Ratios closer than this are one: written speeds carry some ten digits. */
const SAME_RATIO = 1e-9;

/** The drives of an ask in groups of one ratio, the first drive's group (ratio 1) first. */
export function driveGroups(drives: readonly DriveInfo[], by: readonly number[]): Outcome<DriveGroup[]> {
  if (by.length === 0) return fail("no drive acts in it");
  const groups: { ratio: number; drives: number[] }[] = [];
  for (const index of by) {
    const drive = drives[index];
    if (!isSteady(drive)) {
      return fail(
        `${drive.keyword} ${drive.name} is no steady drive, so it has no response at one frequency`,
      );
    }
    const ratio = frequencyRatio(drives[by[0]], drive);
    const group = groups.find((g) => Math.abs(g.ratio - ratio) <= SAME_RATIO * Math.abs(ratio));
    if (group) group.drives.push(index);
    else groups.push({ ratio, drives: [index] });
  }
  return succeed(groups);
}

/** True for the shapes that a sweep can take: sines, unbalances, and drives that state no shape. */
export function isSteady(drive: DriveInfo): boolean {
  return drive.shape.kind === "none" || drive.shape.kind === "sine" || drive.shape.kind === "unbalance";
}

/**
 * Phasor [re, im] of the drive at its own frequency: N (N*m), or for a motion m, m/s, m/s^2 as it is given. A
 * drive without amplitude counts as one unit.
 */
export function drivePhasor(drive: DriveInfo, frequencyHz: number): readonly [number, number] {
  const { shape } = drive;
  switch (shape.kind) {
    case "sine": {
      const amplitude = shape.amplitude ?? 1;
      return [amplitude * Math.cos(shape.phase), amplitude * Math.sin(shape.phase)];
    }
    case "unbalance": {
      const force = shape.unbalance * (2 * Math.PI * frequencyHz) ** 2;
      return [force * Math.cos(shape.phase), force * Math.sin(shape.phase)];
    }
    default:
      return [1, 0];
  }
}

function frequencyRatio(first: DriveInfo, other: DriveInfo): number {
  if (other === first) return 1;
  if (first.writtenHz !== undefined && other.writtenHz !== undefined) {
    return positiveRatio(other.writtenHz, first.writtenHz);
  }
  if (first.bandHz && other.bandHz) {
    const low = positiveRatio(other.bandHz[0], first.bandHz[0]);
    const high = positiveRatio(other.bandHz[1], first.bandHz[1]);
    if (Math.abs(low - high) <= SAME_RATIO * high) return high;
  }
  return positiveRatio(orderOf(other), orderOf(first));
}

function positiveRatio(a: number, b: number): number {
  const ratio = Math.abs(a / b);
  return Number.isFinite(ratio) && ratio > 0 ? ratio : 1;
}

function orderOf(drive: DriveInfo): number {
  return drive.shape.kind === "sine" ? drive.shape.order : 1;
}
