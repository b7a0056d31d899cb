import type { Assembly, LinearForm } from "../../mechanics/assembly.ts";
import { span } from "../../text/span.ts";
import { nameSpan, statementOf } from "../places.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";
import { list, quoted } from "../wording.ts";

/** Left-overs: what nothing joins and nothing drives, and what no drive reaches although others are driven. */
export const unreached: Rule = {
  code: "unreached",
  cost: "text",
  check(context) {
    const lonely = lonelyCoordinates(context.assembly);
    return [
      ...lonely.map((name) =>
        at(
          context,
          name,
          `nothing joins \`${name}\` and nothing drives it`,
          "join it, drive it or take it out",
        ),
      ),
      ...unmovedIslands(context, new Set(lonely)),
    ];
  },
};

/** Named coordinates that no element, no bind, no drive and no start touches. */
export function lonelyCoordinates(assembly: Assembly): readonly string[] {
  const touched = new Set<number>();
  const touch = (form: LinearForm): void => {
    for (const coordinate of form.coordinates) touched.add(coordinate);
  };
  for (const element of assembly.elements) touch(element.form);
  for (const drive of assembly.drives) if (drive.on.kind === "form") touch(drive.on.form);
  for (const inertia of assembly.inertias) {
    if (inertia.form.coordinates.length > 1) touch(inertia.form);
  }
  for (const coordinate of assembly.coordinates) {
    const bound = coordinate.form.coordinates.length !== 1 || coordinate.form.factors[0] !== 1;
    const starts = coordinate.startsAt !== 0 || coordinate.startsMoving !== 0;
    if (bound || starts || coordinate.weight !== 0) touch(coordinate.form);
  }
  return assembly.coordinates
    .filter(({ form }) => form.coordinates.length > 0 && form.coordinates.every((i) => !touched.has(i)))
    .map((coordinate) => coordinate.name);
}

/** Coordinates joined to each other but to nothing that is driven, in a model where a steady or timed ask drives. */
function unmovedIslands(context: RuleContext, lonely: ReadonlySet<string>): readonly Finding[] {
  const { assembly, instance } = context;
  const asked = instance.asks.some((ask) => ask.kind === "sweep" || ask.kind === "history");
  if (!asked || assembly.drives.length === 0) return [];
  const island = islands(assembly);
  const moved = movedIslands(assembly, island);
  const still = new Map<number, string[]>();
  for (const { name, form } of assembly.coordinates) {
    const root = form.coordinates.length > 0 ? island(form.coordinates[0]) : undefined;
    if (root === undefined || moved.has(root) || lonely.has(name)) continue;
    still.set(root, [...(still.get(root) ?? []), name]);
  }
  return [...still.values()].map((names) =>
    at(
      context,
      names[0],
      `no drive reaches ${list(names.map(quoted))}: every sweep and history leaves ${names.length === 1 ? "it" : "them"} at rest`,
      "join it to what is driven or drive it",
    ),
  );
}

function at(context: RuleContext, coordinate: string, message: string, hint: string): Finding {
  const owner = context.assembly.coordinates.find(({ name }) => name === coordinate)?.owner ?? coordinate;
  const statement = statementOf(context.model, owner);
  return {
    span: statement === undefined ? span(0, 0) : nameSpan(statement),
    message,
    hint,
    tag: "unnecessary",
    key: coordinate,
  };
}

/** For each free coordinate the representative of all that it is joined to. */
function islands(assembly: Assembly): (coordinate: number) => number {
  const parent = Int32Array.from({ length: assembly.free }, (_, i) => i);
  const find = (i: number): number => {
    let root = i;
    while (parent[root] !== root) root = parent[root];
    return root;
  };
  const join = (form: LinearForm): void => {
    for (const other of form.coordinates.slice(1)) parent[find(other)] = find(form.coordinates[0]);
  };
  for (const element of assembly.elements) join(element.form);
  for (const inertia of assembly.inertias) join(inertia.form);
  return find;
}

function movedIslands(assembly: Assembly, island: (i: number) => number): ReadonlySet<number> {
  const moved = new Set<number>();
  const mark = (form: LinearForm): void => {
    for (const coordinate of form.coordinates) moved.add(island(coordinate));
  };
  for (const drive of assembly.drives) {
    if (drive.on.kind === "form") mark(drive.on.form);
    else {
      const { support } = drive.on;
      for (const element of assembly.elements)
        if (element.form.supports.includes(support)) mark(element.form);
      for (const coordinate of assembly.coordinates) {
        if (coordinate.form.supports.includes(support)) mark(coordinate.form);
      }
    }
  }
  for (const coordinate of assembly.coordinates) {
    if (coordinate.startsAt !== 0 || coordinate.startsMoving !== 0 || coordinate.weight !== 0)
      mark(coordinate.form);
  }
  for (const element of assembly.elements) if (element.preload !== 0) mark(element.form);
  return moved;
}
