/** Which names of a file fit a place: what moves, what joins, what has quantities. */
import type { Motion } from "../mechanics/builder.ts";
import { motionOf } from "../model/inspect.ts";
import type { Entity, Model } from "../model/model.ts";
import type { StatementNode } from "../syntax/tree.ts";
import { DIRECTIONS } from "../vocabulary/coordinate-quantities.ts";
import type { Family, QuantityDescription } from "../vocabulary/description.ts";
import { describe } from "../vocabulary/registry.ts";

/** A name that may stand at a place. */
export interface Candidate {
  readonly label: string;
  readonly keyword: string;
  readonly family: Family;
  readonly motion?: Motion;
  readonly node?: StatementNode;
  readonly file?: string;
}

/** The names that a place sees: those of the file, and inside a kit its own in front of them. */
export interface Names {
  readonly model: Model;
  readonly kit?: StatementNode;
}

/** Everything that can be named, in order of the file; what a kit hides left out. */
export function visible({ model, kit }: Names): readonly Candidate[] {
  const inner = kit ? kitNames(kit) : [];
  const hidden = new Set(inner.map(({ label }) => label));
  return [...inner, ...[...model.entities.values()].filter(({ name }) => !hidden.has(name)).map(candidateOf)];
}

/** Coordinates, with their direction where a thing has several. */
export function coordinates(names: Names): readonly Candidate[] {
  return visible(names).flatMap((each) => {
    if (each.family !== "moves" || each.keyword === "support" || each.keyword === "bind") return [];
    if (each.keyword !== "body" && each.keyword !== "point") return [withMotion(each, names.model)];
    return directionsOf(each);
  });
}

/** Supports whose motion is given, with their direction where they have several; without ground. */
export function supports(names: Names): readonly Candidate[] {
  return visible(names).flatMap((each) => {
    if (each.keyword !== "support") return [];
    return isBodySupport(each.node) ? directionsOf(each) : [withMotion(each, names.model)];
  });
}

export const GROUND: Candidate = { label: "ground", keyword: "support", family: "moves" };

/** What may stand in a slot of a head. */
export function placesFor(
  keyword: string,
  slot: string,
  names: Names,
  head: StatementNode | undefined,
): readonly Candidate[] {
  const loops = () => coordinates(names).filter(({ motion }) => motion === "charge");
  const mechanical = () => coordinates(names).filter(({ motion }) => motion !== "charge");
  const moving = (motion: Motion) =>
    mechanical().filter((each) => each.motion === undefined || each.motion === motion);
  const bodies = () => visible(names).filter(({ keyword: of }) => of === "body");
  switch (keyword) {
    case "force":
      return moving("sliding");
    case "torque":
      return moving("turning");
    case "motion":
      return supports(names);
    case "point":
      return bodies();
    case "bind":
    case "feed":
      return mechanical();
    case "mount": {
      if (slot === "a") return bodies();
      const held = visible(names).filter((each) => each.keyword === "support" && isBodySupport(each.node));
      return [...bodies(), ...held, GROUND].filter(({ label }) => label !== pathIn(head, "a"));
    }
    case "part":
      return [
        ...visible(names).filter(({ family, keyword: of }) => family === "moves" && of !== "bind"),
        GROUND,
      ];
    case "voltage":
    case "inductor":
    case "resistor":
    case "capacitor":
    case "mutual":
      return loops().filter(({ label }) => label !== pathIn(head, slot === "b" ? "a" : "b"));
    case "transducer":
      return slot === "a" ? mechanical() : loops();
    default:
      return joined(slot, mechanical(), names, head);
  }
}

/** Ends of an element: both move alike, and they are two. */
function joined(
  slot: string,
  mechanical: readonly Candidate[],
  names: Names,
  head: StatementNode | undefined,
): readonly Candidate[] {
  const other = pathIn(head, slot === "b" ? "a" : "b");
  const motion = other === undefined || other === "ground" ? undefined : motionOfName(names, other);
  const all = [...mechanical, ...supports(names)];
  const fitting = all.filter(
    (each) =>
      each.label !== other && (motion === undefined || each.motion === undefined || each.motion === motion),
  );
  return other === "ground" ? fitting : [...fitting, GROUND];
}

/** How a name of the file or kit moves; undefined where that is not known. */
export function motionOfName(names: Names, name: string): Motion | undefined {
  const known = [...coordinates(names), ...supports(names)].find(({ label }) => label === name);
  return known ? known.motion : names.kit ? undefined : motionOf(names.model, name);
}

/** How what a statement moves or joins moves: by its keyword, or by what stands in its head. */
export function motionsOf(node: StatementNode | undefined, names: Names): readonly Motion[] {
  const keyword = node?.keyword.text ?? "";
  const own = OWN_MOTION.get(keyword);
  if (own) return [own];
  if (keyword === "torque") return ["turning"];
  const ends = ["a", "b", "on", "of", "in", "to"].map((slot) => pathIn(node, slot));
  const known = ends.flatMap((end) =>
    end === undefined || end === "ground" ? [] : [motionOfName(names, end)],
  );
  const motion = known.find((each) => each !== undefined);
  if (motion) return [motion];
  if (keyword === "junction" || keyword === "support")
    return [kindWord(node) === "turning" ? "turning" : "sliding"];
  return known.length > 0 ? BOTH : ["sliding"];
}

const BOTH: readonly Motion[] = ["sliding", "turning"];

const OWN_MOTION: ReadonlyMap<string, Motion> = new Map([
  ["mass", "sliding"],
  ["inertia", "turning"],
  ["pendulum", "turning"],
  ["loop", "charge"],
  ["mount", "sliding"],
]);

/** Names that have quantities behind a dot. */
export function withQuantities(names: Names): readonly Candidate[] {
  const known = visible(names).filter(({ keyword, family }) => {
    if (keyword === "part") return true;
    return (family === "moves" && keyword !== "bind") || family === "joins";
  });
  return [...known, GROUND];
}

/** Joining elements and groups. */
export const elements = (names: Names): readonly Candidate[] =>
  visible(names).filter(({ family, keyword }) => family === "joins" && keyword !== "part");

export interface Members {
  readonly components: readonly string[];
  readonly quantities: readonly QuantityDescription[];
  /** Inner names of a part. */
  readonly inner: readonly Candidate[];
  readonly motion?: Motion;
}

const NO_MEMBERS: Members = { components: [], quantities: [], inner: [] };
const REACTION = describe("support")?.quantities.filter(({ name }) => name === "reaction") ?? [];

/** What may stand behind the dot of a path. */
export function membersOf(path: readonly string[], names: Names): Members {
  const [first, second, third] = path;
  if (first === "ground") return path.length === 1 ? { ...NO_MEMBERS, quantities: REACTION } : NO_MEMBERS;
  const found = visible(names).find(({ label }) => label === first);
  if (found === undefined) return NO_MEMBERS;
  if (found.keyword === "part") return partMembers(path, found, names);
  const description = describe(found.keyword);
  if (description === undefined) return NO_MEMBERS;
  const all = found.keyword === "group" ? groupQuantities(found, names) : description.quantities;
  const several = description.components && (found.keyword !== "support" || isBodySupport(found.node));
  if (found.keyword === "mount") {
    if (second === undefined)
      return { ...NO_MEMBERS, quantities: fitting(all, "sliding"), motion: "sliding" };
    return third === undefined ? { ...NO_MEMBERS, components: description.components ?? [] } : NO_MEMBERS;
  }
  if (!several) {
    const motion = withMotion(found, names.model).motion ?? elementMotion(found, names);
    return second === undefined ? { ...NO_MEMBERS, quantities: fitting(all, motion), motion } : NO_MEMBERS;
  }
  if (second === undefined) return { ...NO_MEMBERS, components: movesOf(found.node) };
  if (third !== undefined || !DIRECTIONS.includes(second)) return NO_MEMBERS;
  const motion = directionMotion(second);
  return { ...NO_MEMBERS, quantities: fitting(all, motion), motion };
}

function partMembers(path: readonly string[], part: Candidate, names: Names): Members {
  const call = part.node?.slots.kit;
  const kit = call?.kind === "call" ? names.model.entities.get(call.callee.text)?.node : undefined;
  if (kit === undefined) return NO_MEMBERS;
  if (path.length > 1) return membersOf(path.slice(1), { model: names.model, kit });
  return { ...NO_MEMBERS, inner: kitNames(kit).filter(({ node }) => node !== undefined) };
}

/** A group sums forces; where its members lie between the same ends they have one travel. */
function groupQuantities(group: Candidate, names: Names): readonly QuantityDescription[] {
  const own = describe("group")?.quantities ?? [];
  const [first] = group.node?.value ?? [];
  const name =
    first?.kind === "value" && first.expression.kind === "path" ? first.expression.names[0]?.text : undefined;
  const member = visible(names).find(({ label }) => label === name);
  const extra = (member && describe(member.keyword)?.quantities) ?? [];
  return [...own, ...extra.filter((each) => GROUP_EXTRAS.has(each.name))];
}

const GROUP_EXTRAS: ReadonlySet<string> = new Set(["travel", "twist", "rate", "power", "energy"]);

function elementMotion(found: Candidate, names: Names): Motion | undefined {
  if (found.keyword === "group") {
    const [first] = found.node?.value ?? [];
    const path = first?.kind === "value" && first.expression.kind === "path" ? first.expression : undefined;
    const member = visible(names).find(({ label }) => label === path?.names[0]?.text);
    return member && member.keyword !== "group" ? motionsOf(member.node, names)[0] : undefined;
  }
  return found.family === "joins" ? motionsOf(found.node, names)[0] : undefined;
}

function fitting(
  all: readonly QuantityDescription[],
  motion: Motion | undefined,
): readonly QuantityDescription[] {
  return all.filter(({ whenMotion }) => !whenMotion || motion === undefined || whenMotion.includes(motion));
}

function candidateOf({ name, keyword, description, node, file }: Entity): Candidate {
  return { label: name, keyword, family: description.family, node, file };
}

function withMotion(each: Candidate, model: Model): Candidate {
  const own = OWN_MOTION.get(each.keyword);
  const word = kindWord(each.node);
  if (own) return { ...each, motion: own };
  if (each.keyword === "junction" || each.keyword === "support") {
    return { ...each, motion: word === "turning" ? "turning" : "sliding" };
  }
  return { ...each, motion: each.node ? motionOf(model, each.label) : undefined };
}

const directionMotion = (direction: string): Motion => (direction.startsWith("r") ? "turning" : "sliding");

const directionsOf = (each: Candidate): Candidate[] =>
  movesOf(each.node).map((direction) => ({
    ...each,
    label: `${each.label}.${direction}`,
    motion: directionMotion(direction),
  }));

/** The directions in which a body may move. */
function movesOf(node: StatementNode | undefined): readonly string[] {
  const moves = node?.details.find(({ key }) => key.text === "moves");
  const words = (moves?.items ?? []).flatMap((item) =>
    item.kind === "value" && item.expression.kind === "path"
      ? item.expression.names.map(({ text }) => text)
      : [],
  );
  return words.length > 0 ? DIRECTIONS.filter((each) => words.includes(each)) : DIRECTIONS;
}

/** The word behind `kind =` of a junction or support. */
function kindWord(node: StatementNode | undefined): string | undefined {
  const item = node?.details.find(({ key }) => key.text === "kind")?.items[0];
  return item?.kind === "value" && item.expression.kind === "path"
    ? item.expression.names[0]?.text
    : undefined;
}

const isBodySupport = (node: StatementNode | undefined): boolean => kindWord(node) === "body";

/** The path in a slot of a head, as text. */
export function pathIn(node: StatementNode | undefined, slot: string): string | undefined {
  const value = node?.slots[slot];
  return value?.kind === "path" && value.names.length > 0
    ? value.names.map(({ text }) => text).join(".")
    : undefined;
}

/** Names that a kit defines: its two places, its parameters, its statements. */
function kitNames(kit: StatementNode): readonly Candidate[] {
  const places = [kit.slots.a, kit.slots.b].flatMap((slot) =>
    slot?.kind === "name" ? [{ label: slot.text, keyword: "place", family: "moves" as const }] : [],
  );
  const { parameters } = kit.slots;
  const numbers = parameters?.kind === "parameters" ? parameters.items : [];
  const inner = kit.inner.flatMap((node): Candidate[] => {
    const { name } = node.slots;
    const description = describe(node.keyword.text);
    return name?.kind === "name" && description
      ? [{ label: name.text, keyword: node.keyword.text, family: description.family, node }]
      : [];
  });
  const given = numbers.map(({ text }) => ({ label: text, keyword: "let", family: "numbers" as const }));
  return [...places, ...given, ...inner];
}
