import type { Motion } from "../mechanics/builder.ts";
import type { PathNode } from "../syntax/tree.ts";
import { nameItem, sayUnknownName } from "./details.ts";
import type { Draft } from "./draft.ts";
import { aKeyword, type Described, nameSpan } from "./names.ts";
import { motionWord } from "./places.ts";

/** Checks `group NAME = a, b, …`: joining elements that move alike, each once. */
export function checkGroup(statement: Described, draft: Draft): void {
  const { node, name, description } = statement;
  if (description.notYet) draft.unsound.add(name ?? "");
  if (node.broken || name === undefined) {
    if (name !== undefined) draft.unsound.add(name);
    return;
  }
  const seen = new Set<string>();
  let motion: Motion | undefined;
  for (const item of node.value ?? []) {
    const member = nameItem(item);
    if (member === undefined) {
      draft.findings.say(
        "wrong-kind",
        item.span,
        "a group holds names of joining elements, as in `group feet = mounts, oil`",
      );
      draft.unsound.add(name);
      continue;
    }
    const known = memberMotion(member.text, { kind: "path", span: member.span, names: [member] }, draft);
    if (known === undefined) {
      draft.unsound.add(name);
      continue;
    }
    if (seen.has(member.text)) {
      draft.findings.say("duplicate-name", member.span, `\`${member.text}\` is in \`${name}\` already`);
      draft.unsound.add(name);
    }
    if (motion !== undefined && known !== motion) {
      draft.findings.say(
        "wrong-kind",
        member.span,
        `\`${member.text}\` ${motionWord(known)} and \`${[...seen][0]}\` ${motionWord(motion)}; forces and torques have no sum`,
      );
      draft.unsound.add(name);
    }
    motion ??= known;
    seen.add(member.text);
  }
}

function memberMotion(name: string, path: PathNode, draft: Draft): Motion | undefined {
  const entity = draft.main.names.get(name);
  if (entity === undefined) {
    sayUnknownName(path.names[0], draft.elements.keys(), draft.findings);
    return undefined;
  }
  if (draft.unsound.has(name)) return undefined;
  const planned = draft.elements.has(name) ? draft.plannedByName.get(name) : undefined;
  if (planned !== undefined) return planned.motion;
  draft.findings.say(
    "wrong-kind",
    path.span,
    `\`${name}\` is ${aKeyword(entity.keyword)}; a group holds joining elements`,
    {
      related: [{ span: nameSpan(entity.node), message: `\`${name}\` is defined here` }],
    },
  );
  return undefined;
}

/** Names of the members of a group; undefined where it has an error. */
export function memberNames(group: string, draft: Draft): readonly string[] | undefined {
  if (draft.unsound.has(group)) return undefined;
  const items = draft.byName.get(group)?.node.value ?? [];
  return items.flatMap((item) => nameItem(item)?.text ?? []);
}
