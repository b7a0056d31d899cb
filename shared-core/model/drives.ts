import type { Motion } from "../mechanics/builder.ts";
import type { PathNode, StatementNode } from "../syntax/tree.ts";
import type { Kind } from "../units/dimension.ts";
import {
  isNumber,
  isPlainPerTime,
  kindOf,
  NUMBER,
  PER_TIME,
  powerOfDimension,
  RATE,
} from "../units/quantity.ts";
import { dimensionOf, unitsOf } from "../vocabulary/measures.ts";
import { detailOf } from "../vocabulary/registry.ts";
import { type Given, givenDetails, sayMissing } from "./details.ts";
import { type Draft, sayNotYet, spoil } from "./draft.ts";
import { ownerOf, type ShapeRule, shapeOf } from "./drive-shapes.ts";
import { shapePlan } from "./drive-values.ts";
import { replaceFix } from "./findings.ts";
import type { Described } from "./names.ts";
import { pathText, placeOfSlot } from "./places.ts";
import type { Place } from "./plan.ts";
import { type Wanted, wantedOf } from "./typed.ts";

export type DriveKeyword = "force" | "torque" | "motion";

/** What the values of a drive are: a force, or a motion whose unit says which derivative it gives. */
export interface DriveValues {
  readonly keyword: DriveKeyword;
  readonly motion: Motion;
  readonly wanted: Wanted;
}

/** Takes a drive into the draft. */
export function planDrive(statement: Described, draft: Draft): void {
  const { node, name, description } = statement;
  if (description.notYet) {
    sayNotYet(draft, node.keyword.span, `\`${node.keyword.text}\``);
    spoil(draft, name);
    return;
  }
  const keyword = node.keyword.text as DriveKeyword;
  const place = drivenPlace(node, keyword, draft);
  const { details, sound } = givenDetails(statement, draft);
  if (!sound || place === undefined || name === undefined) spoil(draft, name);
  if (place === undefined || name === undefined) return;
  const motion = place.is === "ground" ? "sliding" : place.motion;
  const rule = shapeOf(new Set([...details.keys(), ...node.details.map((detail) => detail.key.text)]));
  if (!isOneShape(statement, rule, details, draft) || !hasNeeds(statement, rule, details, draft)) {
    spoil(draft, name);
    return;
  }
  const values: DriveValues = { keyword, motion, wanted: valuesWanted(keyword, motion) };
  const plan = sound ? shapePlan(statement, rule, details, values, draft) : undefined;
  if (plan === undefined) {
    spoil(draft, name);
    return;
  }
  draft.driveByName.set(name, draft.drives.length);
  draft.drives.push({ name, node, keyword, place, ...plan });
}

function drivenPlace(node: StatementNode, keyword: DriveKeyword, draft: Draft): Place | undefined {
  const slot = keyword === "motion" ? "of" : "on";
  const what = { force: "a force acts on", torque: "a torque acts on", motion: "a motion moves" }[keyword];
  const place = placeOfSlot(node, slot, draft, `what ${what}`);
  const path = node.slots[slot] as PathNode | undefined;
  if (place === undefined || path === undefined) return undefined;
  const text = pathText(path);
  if (keyword === "motion") return movedPlace(place, path, text, draft);
  if (place.is !== "coordinate") {
    const reason =
      place.is === "ground" ? "ground stands still" : `\`${text}\` is a support, whose motion is given`;
    const hint = "the coordinates are those of `mass`, `inertia` and `junction`";
    draft.findings.say("wrong-kind", path.span, `${reason}; ${what} a coordinate`, { hint });
    return undefined;
  }
  const fits = keyword === "force" ? "sliding" : "turning";
  if (place.motion === fits) return place;
  const other = keyword === "force" ? "torque" : "force";
  const does = place.motion === "turning" ? "turns" : "slides";
  draft.findings.say(
    "wrong-kind",
    path.span,
    `\`${text}\` ${does}, and ${what} what ${keyword === "force" ? "slides" : "turns"}`,
    {
      fixes: [replaceFix(`Write \`${other}\``, node.keyword.span, other)],
    },
  );
  return undefined;
}

function movedPlace(place: Place, path: PathNode, text: string, draft: Draft): Place | undefined {
  if (place.is === "support") return place;
  const message =
    place.is === "ground"
      ? "ground stands still; a motion moves a support"
      : `\`${text}\` moves by itself; a motion moves a support`;
  const hint =
    place.is === "ground"
      ? "define one, `support floor`, and join to it what is now joined to ground"
      : "a given motion belongs to a `support` to which things are joined";
  draft.findings.say("wrong-kind", path.span, message, { hint });
  return undefined;
}

/** No detail of another shape beside those of the one there is. */
function isOneShape(
  { node }: Described,
  rule: ShapeRule | undefined,
  details: ReadonlyMap<string, Given>,
  draft: Draft,
): boolean {
  if (rule === undefined) return true;
  const mark = [...details.values()].find((given) => rule.marks.includes(given.key));
  let single = true;
  for (const given of details.values()) {
    if (rule.takes.includes(given.key)) continue;
    single = false;
    const other = ownerOf(given.key);
    const belongs = other === undefined ? "does not belong to it" : `belongs to ${other.says}`;
    draft.findings.say(
      "wrong-kind",
      given.span,
      `this ${node.keyword.text} is ${rule.says}, and \`${given.key}\` ${belongs}`,
      {
        hint: "a drive has one shape; two of them are two drives",
        related:
          mark === undefined ? [] : [{ span: mark.span, message: `\`${mark.key}\` makes it ${rule.says}` }],
      },
    );
  }
  return single && frequencyOnce(details, draft) && rampsFit(rule, details, draft);
}

function frequencyOnce(details: ReadonlyMap<string, Given>, draft: Draft): boolean {
  const [frequency, speed, order] = ["frequency", "speed", "order"].map((key) => details.get(key));
  if (frequency === undefined || (speed === undefined && order === undefined)) return true;
  const second = (speed ?? order) as Given;
  draft.findings.say(
    "wrong-kind",
    second.span,
    `\`${second.key}\` and \`frequency\` both say how fast it is`,
    {
      hint: "a sine has a `frequency`, or a `speed` with an `order`",
      related: [{ span: frequency.span, message: "its frequency is given here" }],
    },
  );
  return false;
}

function rampsFit(rule: ShapeRule, details: ReadonlyMap<string, Given>, draft: Draft): boolean {
  const pulse = details.get("pulse");
  if (rule.shape !== "pulse" || pulse === undefined) return true;
  const [item] = pulse.items;
  const isTrapezoid =
    item?.kind === "value" && draft.main.tree.text.slice(item.span.start, item.span.end) === "trapezoid";
  const ramp = details.get("rise") ?? details.get("fall");
  if (isTrapezoid || ramp === undefined) return true;
  draft.findings.say(
    "wrong-kind",
    ramp.span,
    `\`${ramp.key}\` belongs to a trapezoid; the other pulses have their rise in their shape`,
    {
      related: [{ span: pulse.span, message: "its shape is given here" }],
    },
  );
  return false;
}

function hasNeeds(
  statement: Described,
  rule: ShapeRule | undefined,
  details: ReadonlyMap<string, Given>,
  draft: Draft,
): boolean {
  const needs = [...(rule?.needs ?? [])];
  if (rule?.shape === "sine" && details.has("order")) needs.push("speed");
  if (rule?.shape === "chirp" && !details.has("unbalance")) needs.push("amplitude");
  let complete = true;
  for (const key of needs) {
    const broken = statement.node.details.some((detail) => detail.key.text === key);
    const description = detailOf(statement.description, key);
    if (details.has(key) || broken || description === undefined) continue;
    complete = false;
    sayMissing(statement, description, draft.findings);
  }
  return complete;
}

function valuesWanted(keyword: DriveKeyword, motion: Motion): Wanted {
  if (keyword !== "motion") {
    return wantedOf("force", motion) ?? { kinds: [NUMBER], says: "a number", units: [] };
  }
  const hint = "the unit says what the motion gives";
  if (motion === "turning") {
    const kinds = [NUMBER, RATE, ANGULAR_ACCELERATION];
    return {
      kinds,
      says: "an angle, a turning speed or an angular acceleration",
      units: ["deg", "rpm", "rad/s^2"],
      hint,
    };
  }
  const kinds = (["travel", "speed", "acceleration"] as const).map((measure) => dimensionOf(measure) as Kind);
  const units = (["travel", "speed", "acceleration"] as const).map((measure) => unitsOf(measure)[0]);
  return { kinds, says: "a displacement, a velocity or an acceleration", units, hint };
}

const ANGULAR_ACCELERATION = kindOf(powerOfDimension(PER_TIME, 2));

/** Which derivative of the motion values of a kind are, and their SI unit. */
export function derivativeOf(
  kind: Kind,
  { keyword, motion }: DriveValues,
): { derivative: 0 | 1 | 2; unit: string } {
  if (keyword !== "motion") return { derivative: 0, unit: keyword === "force" ? "N" : "N*m" };
  const units = motion === "turning" ? ["rad", "rad/s", "rad/s^2"] : ["m", "m/s", "m/s^2"];
  const derivative = motion === "turning" ? turningDerivative(kind) : ((0 - kind.dimension[2]) as 0 | 1 | 2);
  return { derivative, unit: units[derivative] };
}

function turningDerivative(kind: Kind): 0 | 1 | 2 {
  if (isNumber(kind)) return 0;
  return kind.rate || isPlainPerTime(kind) ? 1 : 2;
}
