import type { Expression, Item } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { type Given, givenDetails, hasRequired, nameItem, sayUnknownName, wordOf } from "./details.ts";
import { type Draft, sayNotYet } from "./draft.ts";
import { aKeyword, type Described, nameSpan } from "./names.ts";
import { planQuantity } from "./places.ts";
import type { PlannedAsk, PlannedDrive, PlannedNumber, PlannedQuantity, Putting } from "./plan.ts";
import { planSeries } from "./quantities.ts";

/** Understands an ask: what it wants, of what, driven by what. */
export function planAsk(statement: Described, draft: Draft): PlannedAsk | undefined {
  const { node, name, description } = statement;
  const kind = description.variant;
  if (name === undefined || kind === undefined) return undefined;
  if (description.notYet) {
    const given = givenDetails(statement, draft);
    hasRequired(statement, given, draft);
    sayNotYet(draft, nameSpan(node), `an ask of kind \`${kind}\``);
    return { name, node, kind, resolve: () => ({ kind: "later", askKind: kind, name, node }) };
  }
  const given = givenDetails(statement, draft);
  const complete = hasRequired(statement, given, draft);
  const reader = new AskReader(statement, given.details, draft);
  const resolve = resolverOf(kind, reader);
  if (!given.sound || !complete || !reader.sound) return { name, node, kind };
  return { name, node, kind, resolve };
}

type Resolve = NonNullable<PlannedAsk["resolve"]>;

function resolverOf(kind: string, reader: AskReader): Resolve | undefined {
  if (kind === "modes") return modes(reader);
  if (kind === "sweep") return sweep(reader);
  return kind === "history" ? history(reader) : undefined;
}

function modes(r: AskReader): Resolve {
  const [upTo, count] = [r.optional("up_to"), r.count("count")];
  const { name, node } = r;
  return (put) => ({ kind: "modes", name, node, upToHz: upTo?.(put), count: count?.(put) });
}

function sweep(r: AskReader): Resolve {
  const of = r.quantities("of");
  const by = r.drives("by", isHarmonic, "drive a sweep: it has no steady rate");
  const [from, to] = [r.planned("from"), r.planned("to")];
  r.ascending(from, to);
  const points = r.count("points");
  const spacing = r.word("spacing") ?? "log";
  const { name, node } = r;
  return (put, ref) => ({
    kind: "sweep",
    name,
    node,
    of: of.map(ref),
    by,
    fromHz: from ? put.number(from) : 0,
    toHz: to ? put.number(to) : 0,
    points: points?.(put) ?? STANDARD_POINTS,
    spacing: spacing === "even" ? "even" : "log",
  });
}

/** As the description of the ask says it. */
const STANDARD_POINTS = 200;
const STANDARD_ACCURACY = 1e-6;

function history(r: AskReader): Resolve {
  const of = r.quantities("of");
  const by = r.drives("by", isTimed, "drive a history: it says too little about time");
  const lasting = r.optional("lasting");
  const [step, accuracy] = [r.optional("step"), r.optional("accuracy")];
  const start = r.word("start") === "at_rest" ? "at_rest" : "as_written";
  const { name, node } = r;
  return (put, ref) => ({
    kind: "history",
    name,
    node,
    of: of.map(ref),
    by,
    lasting: lasting?.(put) ?? 0,
    step: step?.(put),
    accuracy: accuracy?.(put) ?? STANDARD_ACCURACY,
    start,
  });
}

/** A drive with a rate of its own or with none at all: the sweep gives the rate. */
export const isHarmonic = ({ shapeKind }: PlannedDrive): boolean =>
  shapeKind === "none" || shapeKind === "sine" || shapeKind === "unbalance";

/** A drive that says what it does at every time; a sine or unbalance does when it has one frequency. */
export function isTimed(drive: PlannedDrive): boolean {
  if (drive.shapeKind === "none") return false;
  return drive.shapeKind === "sine" || drive.shapeKind === "unbalance" ? drive.isSteady : true;
}

class AskReader {
  sound = true;
  readonly name: string;
  readonly node: Described["node"];
  readonly #details: ReadonlyMap<string, Given>;
  readonly #draft: Draft;

  constructor(statement: Described, details: ReadonlyMap<string, Given>, draft: Draft) {
    this.name = statement.name ?? "";
    this.node = statement.node;
    this.#details = details;
    this.#draft = draft;
  }

  planned(key: string): PlannedNumber | undefined {
    const given = this.#details.get(key);
    if (given === undefined) return undefined;
    const number = planQuantity(given, "sliding", this.name, this.#draft);
    if (number === undefined) this.sound = false;
    else this.#positive(given, number);
    return number;
  }

  /** Numbers of asks are held to their bounds as written; a case does not change what is asked. */
  #positive(given: Given, number: PlannedNumber): void {
    const { content } = given.description;
    const value = number.compute(this.#draft.lets.frame);
    if (content.is !== "quantity" || !content.positive || value > 0) return;
    this.sound = false;
    const text = this.#draft.main.tree.text.slice(number.span.start, number.span.end);
    this.#draft.findings.say(
      "not-positive",
      number.span,
      `\`${given.key}\` is to be above zero, found ${text}`,
    );
  }

  optional(key: string): ((put: Putting) => number) | undefined {
    const number = this.planned(key);
    return number && ((put) => put.number(number));
  }

  /** A whole number. */
  count(key: string): ((put: Putting) => number) | undefined {
    const number = this.planned(key);
    if (number === undefined) return undefined;
    if (!Number.isInteger(number.compute(this.#draft.lets.frame))) {
      this.sound = false;
      this.#draft.findings.say("wrong-kind", number.span, `\`${key}\` is a whole number`);
    }
    return (put) => Math.round(put.number(number));
  }

  word(key: string): string | undefined {
    const given = this.#details.get(key);
    const content = given?.description.content;
    if (given === undefined || content?.is !== "word") return undefined;
    const word = wordOf(given, content.words, this.#draft.findings);
    if (word === undefined) this.sound = false;
    return word;
  }

  ascending(low: PlannedNumber | undefined, high: PlannedNumber | undefined): void {
    const frame = this.#draft.lets.frame;
    if (low === undefined || high === undefined || low.compute(frame) < high.compute(frame)) return;
    this.sound = false;
    this.#draft.findings.say("wrong-kind", high.span, "`to` is not above `from`", {
      related: [{ span: low.span, message: "`from` is given here" }],
    });
  }

  quantities(key: string): readonly PlannedQuantity[] {
    const given = this.#details.get(key);
    if (given === undefined) return [];
    const found: PlannedQuantity[] = [];
    for (const item of given.items) {
      const expression = this.#expression(item, key);
      const quantity = expression && planSeries(expression, this.#draft);
      if (quantity === undefined) this.sound = false;
      else if (found.some((each) => each.text === quantity.text)) this.#twice(item.span, quantity.text);
      else found.push(quantity);
    }
    return found;
  }

  #twice(span: Span, text: string): void {
    this.#draft.findings.say("duplicate-name", span, `\`${text}\` is asked for twice`);
    this.sound = false;
  }

  #expression(item: Item, key: string): Expression | undefined {
    if (item.kind === "value" && !item.tolerance && !item.within) return item.expression;
    this.#draft.findings.say(
      "wrong-kind",
      item.span,
      `\`${key}\` takes quantities, as \`unit.velocity, mounts.force\``,
    );
    return undefined;
  }

  /** Drives that act together; all that fit where none are named. */
  drives(key: string, fits: (drive: PlannedDrive) => boolean, why: string): readonly number[] {
    const given = this.#details.get(key);
    const { drives } = this.#draft;
    if (given === undefined) {
      const all = drives.flatMap((drive, i) => (fits(drive) ? [i] : []));
      if (key === "by" && all.length === 0 && why.includes("sweep")) this.#undriven();
      return all;
    }
    const found: number[] = [];
    for (const item of given.items) {
      const index = this.#drive(item, fits, why);
      if (index === undefined) this.sound = false;
      else if (!found.includes(index)) found.push(index);
    }
    return found;
  }

  #undriven(): void {
    this.sound = false;
    if (!this.#draft.buildable) return;
    this.#draft.findings.say(
      "missing-detail",
      nameSpan(this.node),
      `nothing drives this sweep: the model has no force, torque or motion with a steady rate`,
      {
        hint: "a drive without any details counts as 1 unit, as in `force shaker on unit`",
      },
    );
  }

  #drive(item: Item, fits: (drive: PlannedDrive) => boolean, why: string): number | undefined {
    const draft = this.#draft;
    const name = nameItem(item);
    if (name === undefined) {
      draft.findings.say("wrong-kind", item.span, "`by` takes names of drives, as in `by = imbalance`");
      return undefined;
    }
    const index = draft.driveByName.get(name.text);
    if (index !== undefined && fits(draft.drives[index])) return index;
    if (index !== undefined) {
      draft.findings.say("wrong-kind", name.span, `\`${name.text}\` cannot ${why}`, {
        related: [{ span: nameSpan(draft.drives[index].node), message: `\`${name.text}\` is defined here` }],
      });
      return undefined;
    }
    const entity = draft.main.names.get(name.text);
    if (entity === undefined) sayUnknownName(name, draft.driveByName.keys(), draft.findings);
    else if (!draft.unsound.has(name.text)) {
      draft.findings.say(
        "wrong-kind",
        name.span,
        `\`${name.text}\` is ${aKeyword(entity.keyword)}; an ask is driven by a force, torque or motion`,
      );
    }
    return undefined;
  }
}
