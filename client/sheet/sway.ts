import type { Scene, SceneAnchor, ScenePart, SheetMotion } from "../../shared-core/index.ts";

/** A plane map as SVG writes it: x' = a x + c y + e, y' = b x + d y + f. */
export type Matrix = readonly [a: number, b: number, c: number, d: number, e: number, f: number];

/** Values of all coordinates of a scene, largest size about 1. */
export type Pose = ArrayLike<number>;

/** How far the largest value moves a symbol, in scene pixels, and turns it, in radians; chosen by looking. */
export const REACH: { readonly shift: number; readonly turn: number } = { shift: 15, turn: 0.22 };

/**
 * Pose of a motion.
 * @param at share of a cycle for a mode, share of the whole time for a history; 0 to 1
 */
export function poseOf(motion: SheetMotion, coordinates: number, at: number): Float64Array {
  const pose = new Float64Array(coordinates);
  if (motion.kind === "mode") {
    const [cos, sin] = [Math.cos(2 * Math.PI * at), Math.sin(2 * Math.PI * at)];
    for (let i = 0; i < coordinates; i++) pose[i] = motion.re[i] * cos - motion.im[i] * sin;
    return pose;
  }
  const place = Math.max(0, Math.min(1, at)) * Math.max(0, motion.frames - 1);
  const frame = Math.min(Math.floor(place), Math.max(0, motion.frames - 2));
  const next = Math.min(frame + 1, motion.frames - 1);
  const share = place - frame;
  for (let i = 0; i < coordinates; i++) {
    const from = motion.values[frame * coordinates + i];
    pose[i] = from + share * (motion.values[next * coordinates + i] - from);
  }
  return pose;
}

/** The map that takes a part of the drawing from rest to its place in a pose; undefined where it stands still. */
export function partMatrix({ rides }: ScenePart, pose: Pose, reach = REACH.shift): Matrix | undefined {
  if (rides.on === "rest") return undefined;
  if (rides.on === "anchor") return anchorMatrix(rides.anchor, pose, reach);
  const [from, to] = [moved(rides.from, pose, reach), moved(rides.to, pose, reach)];
  return stretchMatrix([rides.from.x, rides.from.y], [rides.to.x, rides.to.y], from, to);
}

export function anchorMatrix(anchor: SceneAnchor, pose: Pose, reach = REACH.shift): Matrix | undefined {
  if (anchor.sways.length === 0) return undefined;
  let [dx, dy, turn, aboutX, aboutY] = [0, 0, 0, anchor.x, anchor.y];
  for (const sway of anchor.sways) {
    const value = pose[sway.coordinate] ?? 0;
    dx += reach * sway.dx * value;
    dy += reach * sway.dy * value;
    if (sway.turn === 0) continue;
    turn += (reach / REACH.shift) * REACH.turn * sway.turn * value;
    [aboutX, aboutY] = [sway.aboutX, sway.aboutY];
  }
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
  return [
    cos,
    sin,
    -sin,
    cos,
    aboutX - cos * aboutX + sin * aboutY + dx,
    aboutY - sin * aboutX - cos * aboutY + dy,
  ];
}

export const matrixText = (matrix: Matrix): string =>
  `matrix(${matrix.map((value) => Math.round(value * 1e4) / 1e4).join(" ")})`;

/** Whether a coordinate moves anything in the picture. */
export const canMove = (scene: Scene): boolean =>
  scene.items.some(({ parts }) =>
    parts.some(({ rides }) => rides.on === "anchor" && rides.anchor.sways.length > 0),
  );

type Point = readonly [x: number, y: number];

function moved(anchor: SceneAnchor, pose: Pose, reach: number): Point {
  const matrix = anchorMatrix(anchor, pose, reach);
  if (matrix === undefined) return [anchor.x, anchor.y];
  const [a, b, c, d, e, f] = matrix;
  return [a * anchor.x + c * anchor.y + e, b * anchor.x + d * anchor.y + f];
}

/** Takes p to p2 and q to q2, stretching along p q only. */
function stretchMatrix(p: Point, q: Point, p2: Point, q2: Point): Matrix | undefined {
  const [ux, uy] = [q[0] - p[0], q[1] - p[1]];
  const [vx, vy] = [q2[0] - p2[0], q2[1] - p2[1]];
  const [rest, now] = [Math.hypot(ux, uy), Math.hypot(vx, vy)];
  if (rest < 1e-9 || now < 1e-9) return [1, 0, 0, 1, p2[0] - p[0], p2[1] - p[1]];
  const [ex, ey, fx, fy] = [ux / rest, uy / rest, vx / now, vy / now];
  const stretch = now / rest;
  // Along e by `stretch` into f, across e unchanged.
  const a = stretch * fx * ex + fy * ey;
  const b = stretch * fy * ex - fx * ey;
  const c = stretch * fx * ey - fy * ex;
  const d = stretch * fy * ey + fx * ex;
  return [a, b, c, d, p2[0] - a * p[0] - c * p[1], p2[1] - b * p[0] - d * p[1]];
}
