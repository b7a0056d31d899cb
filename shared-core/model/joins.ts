import type { Motion } from "../mechanics/builder.ts";
import type { PathNode } from "../syntax/tree.ts";
import { RATE } from "../units/quantity.ts";
import { unitsOf } from "../vocabulary/measures.ts";
import { detailOf } from "../vocabulary/registry.ts";
import { compile } from "./code.ts";
import {
  type Given,
  type GivenDetails,
  givenDetails,
  hasRequired,
  itemWords,
  sayMissing,
  wordOf,
} from "./details.ts";
import { addPlanned, type Draft, sayNotYet, spoil } from "./draft.ts";
import type { Described } from "./names.ts";
import { planExpression, planNumber } from "./number.ts";
import { motionWord, pathText, placeOfSlot, planQuantity } from "./places.ts";
import type { Place, PlannedNumber, PlannedStatement } from "./plan.ts";
import { wantedOf } from "./typed.ts";

/** Takes a joining element into the draft. */
export function planJoin(statement: Described, draft: Draft): void {
  const { node, name, description } = statement;
  if (description.notYet || description.assemble === undefined) {
    sayNotYet(draft, node.keyword.span, `\`${node.keyword.text}\``);
    spoil(draft, name);
    return;
  }
  const a = placeOfSlot(node, "a", draft);
  const b = placeOfSlot(node, "b", draft);
  const given = givenDetails(statement, draft);
  const complete = hasRequired(statement, given, draft) && hasLaw(statement, given, draft);
  const motion = a && b ? commonMotion(statement, a, b, draft) : undefined;
  if (name === undefined || !given.sound || !complete || motion === undefined || !a || !b) {
    spoil(draft, name);
    if (name === undefined || motion === undefined || !a || !b) return;
  }
  const planned = planElement(statement, name, motion, { a, b }, given, draft);
  draft.elements.set(name, draft.elements.size);
  addPlanned(draft, planned);
}

/** A spring needs its stiffness, a damper its damping, unless another law stands in its place. */
function hasLaw(statement: Described, given: GivenDetails, draft: Draft): boolean {
  const { description, node } = statement;
  const principal = description.principal && detailOf(description, description.principal);
  if (!principal || principal.required || given.details.has(principal.key)) return true;
  const laws = description.details.filter((detail) => detail.notYet).map((detail) => detail.key);
  const tried = node.details.some(
    (detail) => laws.includes(detail.key.text) || detail.key.text === principal.key,
  );
  if (tried || !given.sound || node.broken) return true;
  sayMissing(statement, principal, draft.findings);
  return false;
}

/** Both ends slide or both turn, and they are two ends. */
function commonMotion(statement: Described, a: Place, b: Place, draft: Draft): Motion | undefined {
  const { node } = statement;
  const [pathA, pathB] = [node.slots.a as PathNode, node.slots.b as PathNode];
  const keyword = node.keyword.text;
  if (a.is === "ground" && b.is === "ground") {
    draft.findings.say(
      "wrong-kind",
      pathB.span,
      `both ends of this ${keyword} are ground, so it never moves`,
    );
    return undefined;
  }
  if (a.is !== "ground" && b.is !== "ground" && a.is === b.is && a.index === b.index) {
    draft.findings.say(
      "wrong-kind",
      pathB.span,
      `both ends of this ${keyword} are \`${pathText(pathA)}\`, so it never moves`,
    );
    return undefined;
  }
  if (a.is === "ground" || b.is === "ground")
    return a.is === "ground" ? (b as { motion: Motion }).motion : a.motion;
  if (a.motion === b.motion) return a.motion;
  const [textA, textB] = [pathText(pathA), pathText(pathB)];
  draft.findings.say(
    "wrong-kind",
    pathB.span,
    `\`${textA}\` ${motionWord(a.motion)} and \`${textB}\` ${motionWord(b.motion)}; a ${keyword} joins like with like`,
    { hint: "a lever or a rack is a `bind`, which says how far one moves for the other" },
  );
  return undefined;
}

function planElement(
  statement: Described,
  name: string,
  motion: Motion,
  ends: PlannedStatement["ends"],
  { details }: GivenDetails,
  draft: Draft,
): PlannedStatement {
  const { node, description } = statement;
  const numbers = new Map<string, PlannedNumber>();
  let ats = NO_ATS;
  let words = NO_WORDS;
  const positive = new Set<string>();
  const countGiven = details.get("count");
  const count = countGiven && planQuantity(countGiven, motion, name, draft);
  const copies = count ? Math.max(1, Math.round(compile(count.code)(draft.lets.frame))) : 1;
  for (const [key, given] of details) {
    const { content, whenMotion } = given.description;
    if (whenMotion !== undefined && !whenMotion.includes(motion)) {
      draft.findings.say(
        "wrong-kind",
        given.span,
        `\`${key}\` is for what ${motionWord(whenMotion[0])}, and this ${motionWord(motion)}`,
      );
      spoil(draft, name);
    } else if (content.is === "quantity") {
      const hint = turningHint(statement, given, motion);
      const number = key === "count" ? count : planQuantity(given, motion, name, draft, { copies, hint });
      if (number === undefined) spoil(draft, name);
      else numbers.set(key, number);
      if (content.positive) positive.add(key);
    } else if (content.is === "at") {
      const at = planAt(given, motion, name, copies, draft);
      if (at === undefined) spoil(draft, name);
      else ats = new Map([...ats, [key, at]]);
    } else if (content.is === "word") {
      const word = wordOf(given, content.words, draft.findings);
      if (word === undefined) spoil(draft, name);
      else words = new Map([...words, [key, word]]);
    }
  }
  return { name, node, description, motion, ends, numbers, ats, words, positive };
}

/** Shared by the many elements that have none. */
const NO_ATS: PlannedStatement["ats"] = new Map();
const NO_WORDS: PlannedStatement["words"] = new Map();

/** Why N/m does not fit between things that turn. */
function turningHint({ node }: Described, given: Given, motion: Motion): string | undefined {
  const { content } = given.description;
  if (motion !== "turning" || content.is !== "quantity") return undefined;
  const [a, b] = [node.slots.a, node.slots.b].map((slot) => (slot?.kind === "path" ? pathText(slot) : ""));
  const turning = [a, b].filter((end) => end !== "ground").map((end) => `\`${end}\``);
  const [unit] = unitsOf(content.measure, motion);
  const verb = turning.length > 1 ? "turn" : "turns";
  return `${turning.join(" and ")} ${verb}: a torsional ${node.keyword.text} between angles needs ${unit}`;
}

/** `5 % at 12 Hz`. */
function planAt(given: Given, motion: Motion, owner: string, copies: number, draft: Draft) {
  const { content } = given.description;
  const [item] = given.items;
  if (content.is !== "at") return undefined;
  if (item?.kind !== "at" || given.items.length !== 1) {
    draft.findings.say(
      "wrong-kind",
      item?.span ?? given.span,
      `\`${given.key}\` takes a value at a rate, found ${itemWords(item)}`,
      {
        hint: `as in \`${given.key} = ${given.description.example}\``,
      },
    );
    return undefined;
  }
  const wanted = wantedOf(content.measure, motion);
  const value = planNumber(item.value, draft.numbers, wanted, `${owner}.${given.key}`, copies);
  const at = planExpression(item.at, draft.numbers, {
    kinds: [RATE],
    says: "a rate",
    units: unitsOf("rate"),
  });
  return value && at && { value, at };
}
