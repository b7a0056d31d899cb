/**
 * Which details make which shape. The first of `MARKS` that is given decides; details of another shape beside it
 * are an error, since a drive has one shape.
 */
export type ShapeName =
  | "chirp"
  | "unbalance"
  | "pulse"
  | "step"
  | "impulse"
  | "law"
  | "curve"
  | "record"
  | "density"
  | "sine";

export interface ShapeRule {
  readonly shape: ShapeName;
  /** In a sentence: "a steady sine". */
  readonly says: string;
  /** The detail that makes it this shape; any of several for a sine. */
  readonly marks: readonly string[];
  readonly takes: readonly string[];
  readonly needs: readonly string[];
}

export const SHAPES: readonly ShapeRule[] = [
  rule("chirp", "a chirp", ["chirp"], ["amplitude", "unbalance", "lasting", "phase"], ["lasting"]),
  rule("unbalance", "a rotating unbalance", ["unbalance"], ["speed", "phase", "turning"], []),
  rule("pulse", "a pulse", ["pulse"], ["peak", "duration", "rise", "fall", "start"], ["peak", "duration"]),
  rule("step", "a step", ["step"], ["start", "rise"], []),
  rule("impulse", "an impulse", ["impulse"], ["start"], []),
  rule("law", "a law", ["law"], [], []),
  rule("curve", "a curve of torque over speed", ["curve"], [], []),
  rule("record", "a record", ["record"], ["column", "time_column", "sampled_at", "unit", "scale"], ["unit"]),
  rule("density", "a density", ["density"], [], []),
  rule("sine", "a steady sine", ["amplitude", "frequency", "speed", "order", "phase"], [], []),
];

function rule(
  shape: ShapeName,
  says: string,
  marks: readonly string[],
  takes: readonly string[],
  needs: readonly string[],
): ShapeRule {
  return { shape, says, marks, takes: [...marks, ...takes], needs };
}

/** The shape that the given details make; undefined: none is given, and the drive is 1 unit in a sweep. */
export function shapeOf(keys: ReadonlySet<string>): ShapeRule | undefined {
  return SHAPES.find(({ marks }) => marks.some((mark) => keys.has(mark)));
}

/** The shape to which a detail belongs, for the message about one that is out of place. */
export function ownerOf(key: string): ShapeRule | undefined {
  return SHAPES.find(({ marks }) => marks.includes(key)) ?? SHAPES.find(({ takes }) => takes.includes(key));
}
