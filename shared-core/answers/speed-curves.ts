/** Torques over speed as linear laws by the piece: T = intercept + slope * speed, constant outside the rows. */

export interface CurvePieces {
  /** Speeds at which the pieces meet, rad/s, ascending. */
  readonly knots: readonly number[];
  /** One more than there are knots: below the first, between each two, above the last. */
  readonly slopes: readonly number[];
  /** N*m at speed zero, of the line of each piece. */
  readonly intercepts: readonly number[];
}

/** Rows of speed (Hz, ascending) and torque (N*m). */
export function curvePieces(speedsHz: readonly number[], torques: readonly number[]): CurvePieces {
  const knots = speedsHz.map((hz) => 2 * Math.PI * hz);
  const slopes = [0];
  const intercepts = [torques[0]];
  for (let i = 1; i < knots.length; i++) {
    const slope = (torques[i] - torques[i - 1]) / (knots[i] - knots[i - 1]);
    slopes.push(slope);
    intercepts.push(torques[i] - slope * knots[i]);
  }
  slopes.push(0);
  intercepts.push(torques[torques.length - 1]);
  return { knots, slopes, intercepts };
}

/**
 * The piece for a speed: `current` as long as the speed lies in it within `slack` (rad/s), so that a speed on a
 * knot does not change pieces for rounding.
 */
export function pieceAt(
  { knots }: CurvePieces,
  speed: number,
  current: number | undefined,
  slack: number,
): number {
  if (current !== undefined) {
    const [low, high] = rangeOf({ knots }, current);
    if (low - slack <= speed && speed <= high + slack) return current;
  }
  let piece = 0;
  while (piece < knots.length && speed > knots[piece]) piece++;
  return piece;
}

/** Speeds between which a piece holds. */
export function rangeOf({ knots }: Pick<CurvePieces, "knots">, piece: number): readonly [number, number] {
  return [knots[piece - 1] ?? Number.NEGATIVE_INFINITY, knots[piece] ?? Number.POSITIVE_INFINITY];
}
