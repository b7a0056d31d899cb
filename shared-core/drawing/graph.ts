/** What of a model can be drawn and what hangs on what: names and joints only, in file order. */
import type { Expression, SlotValue, StatementNode } from "../syntax/tree.ts";

/** Something that moves or stands: a box, a disc, a support. */
export interface GraphNode {
  readonly name: string;
  readonly keyword: string;
  readonly statement: StatementNode;
  /** Points on a body, in file order. */
  readonly points: string[];
}

/** Something between nodes, or on one of them. */
export interface GraphLink {
  readonly name: string;
  readonly keyword: string;
  readonly statement: StatementNode;
  readonly ends: readonly LinkEnd[];
  /** It has an end at ground. */
  readonly grounded: boolean;
  /** It is twisted, not stretched. */
  readonly turning: boolean;
}

type Joined = Omit<GraphLink, "turning">;

export interface LinkEnd {
  /** Index of the node. */
  readonly node: number;
  /** `z` of `genset.z`, or the name of a point. */
  readonly at: string;
  readonly isPoint: boolean;
}

export interface SystemGraph {
  readonly nodes: readonly GraphNode[];
  readonly links: readonly GraphLink[];
}

const NODES: ReadonlySet<string> = new Set([
  "mass",
  "inertia",
  "junction",
  "body",
  "pendulum",
  "loop",
  "support",
]);

/** Slots that hold the ends of what joins and drives. */
const END_SLOTS = ["a", "b", "in", "from", "to", "on", "of"];

/** Statements of every kind that can be seen; a name that is defined twice is taken once. */
export function systemGraph(statements: readonly StatementNode[]): SystemGraph {
  const builder = new GraphBuilder();
  for (const statement of statements) builder.addNode(statement);
  for (const statement of statements) builder.addPoint(statement);
  const links = withTurning(
    builder.nodes,
    statements.flatMap((statement) => builder.link(statement) ?? []),
  );
  const used = new Set(
    links.filter(({ keyword }) => keyword !== "point").flatMap(({ ends }) => ends.map(({ at }) => at)),
  );
  // A point that something stands on is named where it stands; one by itself hangs there as a mark.
  const seen = links.filter(({ keyword, name }) => keyword !== "point" || !used.has(name));
  return { nodes: builder.nodes, links: seen };
}

/** What stands on an inertia or on a rotation of a body turns, and so do junctions and what is joined to them. */
function withTurning(nodes: readonly GraphNode[], links: readonly Joined[]): GraphLink[] {
  const turning = new Set(nodes.flatMap(({ keyword }, i) => (keyword === "inertia" ? [i] : [])));
  const turns = ({ ends }: Joined): boolean =>
    ends.some(({ node, at, isPoint }) => turning.has(node) || (!isPoint && ROTATIONS.has(at)));
  // Each round reaches one junction further.
  for (let round = 0, size = -1; round < nodes.length && size !== turning.size; round++) {
    size = turning.size;
    for (const { node } of links.filter(turns).flatMap(({ ends }) => ends))
      if (nodes[node].keyword === "junction") turning.add(node);
  }
  return links.map((link) => ({ ...link, turning: turns(link) }));
}

const ROTATIONS: ReadonlySet<string> = new Set(["rx", "ry", "rz"]);

/** `genset.z` of a slot; empty where it could not be read. */
export function slotText(slot: SlotValue | undefined): string {
  if (slot?.kind === "name") return slot.text;
  return slot?.kind === "path" ? slot.names.map(({ text }) => text).join(".") : "";
}

class GraphBuilder {
  readonly nodes: GraphNode[] = [];
  readonly #byName = new Map<string, number>();
  readonly #points = new Map<string, number>();

  addNode(statement: StatementNode): void {
    const name = slotText(statement.slots.name);
    if (!NODES.has(statement.keyword.text) || name === "" || this.#byName.has(name)) return;
    this.#byName.set(name, this.nodes.length);
    this.nodes.push({ name, keyword: statement.keyword.text, statement, points: [] });
  }

  addPoint(statement: StatementNode): void {
    const name = slotText(statement.slots.name);
    if (statement.keyword.text !== "point" || name === "" || this.#byName.has(name)) return;
    const body = this.#byName.get(slotText(statement.slots.on).split(".")[0]);
    if (body === undefined || this.#points.has(name)) return;
    this.#points.set(name, body);
    this.nodes[body].points.push(name);
  }

  link(statement: StatementNode): Joined | undefined {
    const keyword = statement.keyword.text;
    if (keyword === "bind") return this.#bind(statement);
    if (keyword === "point") return this.#link(statement, [slotText(statement.slots.name)]);
    if (keyword === "pendulum") return this.#pivot(statement);
    if (keyword === "kit" || keyword === "group" || NODES.has(keyword)) return undefined;
    return this.#link(
      statement,
      END_SLOTS.map((slot) => slotText(statement.slots[slot])).filter((text) => text !== ""),
    );
  }

  /** Links that stand on nothing known cannot be drawn. */
  #link(statement: StatementNode, places: readonly string[]): Joined | undefined {
    const name = slotText(statement.slots.name);
    const ends = places.flatMap((place) => this.#end(place) ?? []);
    if (name === "" || ends.length === 0) return undefined;
    // What lies in a loop meets it on both sides.
    if (statement.slots.in !== undefined) ends.push(ends[0]);
    const grounded = places.some((place) => place.split(".")[0] === "ground");
    return { name, keyword: statement.keyword.text, statement, ends, grounded };
  }

  #end(place: string): LinkEnd | undefined {
    const [head, direction = ""] = place.split(".");
    const body = this.#points.get(head);
    if (body !== undefined) return { node: body, at: head, isPoint: true };
    const node = this.#byName.get(head);
    return node === undefined ? undefined : { node, at: direction, isPoint: false };
  }

  #bind(statement: StatementNode): Joined | undefined {
    const name = slotText(statement.slots.coordinate);
    const item = statement.value?.[0];
    const others = item?.kind === "value" ? pathsIn(item.expression) : [];
    const ends = [name, ...new Set(others)].flatMap((place) => this.#end(place) ?? []);
    const different = ends.filter(({ node }, i) => ends.findIndex((end) => end.node === node) === i);
    if (name === "" || different.length === 0 || this.#end(name) === undefined) return undefined;
    return { name, keyword: "bind", statement, ends: different, grounded: different.length === 1 };
  }

  #pivot(statement: StatementNode): Joined | undefined {
    const name = slotText(statement.slots.name);
    const own = this.#byName.get(name);
    if (own === undefined || this.nodes[own].statement !== statement) return undefined;
    const on = statement.details.find(({ key }) => key.text === "on")?.items[0];
    const place = on?.kind === "value" ? (pathsIn(on.expression)[0] ?? "") : "";
    const carrier = this.#end(place);
    const end: LinkEnd = { node: own, at: "", isPoint: false };
    const ends = carrier === undefined || carrier.node === own ? [end] : [end, carrier];
    return { name, keyword: "pendulum", statement, ends, grounded: ends.length === 1 };
  }
}

/** Every path in an expression. */
function pathsIn(expression: Expression): string[] {
  switch (expression.kind) {
    case "path":
      return [expression.names.map(({ text }) => text).join(".")];
    case "unary":
    case "as":
      return pathsIn(expression.operand);
    case "binary":
      return [...pathsIn(expression.left), ...pathsIn(expression.right)];
    case "parenthesis":
      return pathsIn(expression.inner);
    default:
      return [];
  }
}
