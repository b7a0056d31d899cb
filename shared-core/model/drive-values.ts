/**
 * The numbers of a drive's shape: planned once, put in for every instance. Longer than other files because it is
 * one short function a shape of the language's table.
 */
import type { DriveShape, PulseShape, Samples } from "../mechanics/assembly.ts";
import type { Item, RangeNode } from "../syntax/tree.ts";
import type { Kind } from "../units/dimension.ts";
import { isFault } from "../units/fault.ts";
import { RATE } from "../units/quantity.ts";
import { slipIn } from "../units/slips.ts";
import { type UnitMeaning, unitOf } from "../units/unit-of.ts";
import { unitsOf } from "../vocabulary/measures.ts";
import { type Code, numberFault, reads, VARIABLE_SLOTS } from "./code.ts";
import { type Given, itemWords, singleValue, wordOf } from "./details.ts";
import { type Draft, sayNotYet } from "./draft.ts";
import { speedCurve } from "./drive-curve.ts";
import type { ShapeRule } from "./drive-shapes.ts";
import { type DriveValues, derivativeOf } from "./drives.ts";
import { replaceFix } from "./findings.ts";
import { timeFunction } from "./law.ts";
import { LawScope } from "./lets.ts";
import type { Described } from "./names.ts";
import { type NumberContext, planExpression, planNumber, sayRangeReversed } from "./number.ts";
import { planQuantity } from "./places.ts";
import type { PlannedDrive, PlannedNumber, Putting } from "./plan.ts";
import { readRecord } from "./record-drive.ts";
import { type Checked, wantedKind, wantedOf } from "./typed.ts";
import { writtenUnitOf } from "./unit-detail.ts";

type Plan = Pick<
  PlannedDrive,
  "derivative" | "unit" | "shapeKind" | "isSteady" | "positive" | "shape" | "writtenHz" | "bandHz"
>;

/** What a shape is made of; undefined where something is wrong, which has been said. */
export function shapePlan(
  statement: Described,
  rule: ShapeRule | undefined,
  details: ReadonlyMap<string, Given>,
  values: DriveValues,
  draft: Draft,
): Plan | undefined {
  const reader = new ShapeReader(statement, details, values, draft);
  switch (rule?.shape) {
    case undefined:
      return reader.finish("none", () => ({ kind: "none" }));
    case "sine":
      return sine(reader);
    case "unbalance":
      return unbalance(reader);
    case "pulse":
      return pulse(reader);
    case "step":
      return step(reader);
    case "impulse":
      return impulse(reader);
    case "chirp":
      return chirp(reader);
    case "law":
      return law(reader);
    case "record":
      return record(reader);
    case "curve":
      return curve(reader);
    case "density":
      return undefined;
  }
}

type Put = (put: Putting) => number;
type Optional = ((put: Putting) => number) | undefined;

class ShapeReader {
  sound = true;
  kind: Kind | undefined;
  readonly positive: { key: string; number: PlannedNumber }[] = [];

  constructor(
    readonly statement: Described,
    readonly details: ReadonlyMap<string, Given>,
    readonly values: DriveValues,
    readonly draft: Draft,
  ) {}

  get owner(): string {
    return this.statement.name ?? "";
  }

  /** A number of the drive's own measure (a time, a phase ...); undefined where it is not given. */
  optional(key: string): Optional {
    const given = this.details.get(key);
    if (given === undefined) return undefined;
    const number = planQuantity(given, this.values.motion, this.owner, this.draft);
    if (number === undefined) return this.lost();
    if (given.description.content.is === "quantity" && given.description.content.positive) {
      this.positive.push({ key, number });
    }
    return (put) => put.number(number);
  }

  number(key: string, standard = 0): Put {
    return this.optional(key) ?? (() => standard);
  }

  /** A value of the drive: a force, or a motion whose unit decides what it is. */
  value(key: string): Optional {
    const given = this.details.get(key);
    if (given === undefined) return undefined;
    const node = singleValue(given, this.draft.findings);
    const number = node && planNumber(node, this.draft.numbers, this.values.wanted, `${this.owner}.${key}`);
    if (number === undefined) return this.lost();
    return this.valueOf(number);
  }

  valueOf(number: PlannedNumber): Put {
    this.kind = number.kind;
    const factor = number.kind.rate ? 2 * Math.PI : 1;
    return (put) => factor * put.number(number);
  }

  /** A rate or a range of rates. */
  rate(key: string): { at: Optional; range: ((put: Putting) => readonly [number, number]) | undefined } {
    const given = this.details.get(key);
    const [item] = given?.items ?? [];
    if (given === undefined || item?.kind !== "range") return { at: this.optional(key), range: undefined };
    const range = this.range(given, item);
    return { at: undefined, range };
  }

  range(
    given: Given,
    item: RangeNode,
    ordered = true,
  ): ((put: Putting) => readonly [number, number]) | undefined {
    const wanted = { kinds: [RATE], says: "a rate", units: unitsOf("rate") };
    const [from, to] = [item.from, item.to].map((node) => planExpression(node, this.draft.numbers, wanted));
    if (from === undefined || to === undefined) return this.lost();
    this.positive.push({ key: given.key, number: from }, { key: given.key, number: to });
    const frame = this.draft.lets.frame;
    if (ordered && !(from.compute(frame) < to.compute(frame))) {
      sayRangeReversed(item, { findings: this.draft.findings, tree: this.draft.main.tree });
      return this.lost();
    }
    return (put) => [put.number(from), put.number(to)];
  }

  lost(): undefined {
    this.sound = false;
    return undefined;
  }

  finish(
    shapeKind: DriveShape["kind"],
    shape: (put: Putting) => DriveShape,
    speed: Pick<Plan, "writtenHz" | "bandHz"> = { writtenHz: () => undefined, bandHz: () => undefined },
  ): Plan | undefined {
    if (!this.sound) return undefined;
    const fallback = this.values.wanted.kinds[0];
    const { derivative, unit } = derivativeOf(this.kind ?? fallback, this.values);
    const isSteady =
      (this.details.has("amplitude") || this.details.has("unbalance")) &&
      ["frequency", "speed"].some(
        (key) => this.details.has(key) && this.details.get(key)?.items[0]?.kind !== "range",
      );
    return { derivative, unit, shapeKind, isSteady, positive: this.positive, shape, ...speed };
  }
}

function speedPlan(
  at: Optional,
  range: ((put: Putting) => readonly [number, number]) | undefined,
  order: Put,
): Pick<Plan, "writtenHz" | "bandHz"> {
  return {
    writtenHz: (put) => (at === undefined ? undefined : order(put) * at(put)),
    bandHz: (put) => {
      const ends = range?.(put) ?? (at === undefined ? undefined : [at(put), at(put)]);
      return ends && [order(put) * ends[0], order(put) * ends[1]];
    },
  };
}

function sine(r: ShapeReader): Plan | undefined {
  const amplitude = r.value("amplitude");
  const phase = r.number("phase");
  const isSpeed = r.details.has("speed");
  const order = r.number("order", 1);
  const { at, range } = r.rate(isSpeed ? "speed" : "frequency");
  const speeds =
    range ?? (isSpeed && at ? (put: Putting): readonly [number, number] => [at(put), at(put)] : undefined);
  return r.finish(
    "sine",
    (put) => ({
      kind: "sine",
      amplitude: amplitude?.(put),
      frequencyHz: at === undefined ? undefined : order(put) * at(put),
      phase: phase(put),
      order: order(put),
      speed: speeds?.(put),
    }),
    speedPlan(at, range, order),
  );
}

function unbalance(r: ShapeReader): Plan | undefined {
  const size = r.number("unbalance");
  const phase = r.number("phase");
  const { at, range } = r.rate("speed");
  return r.finish(
    "unbalance",
    (put) => ({
      kind: "unbalance",
      unbalance: size(put),
      frequencyHz: at?.(put),
      phase: phase(put),
      speed: range?.(put) ?? (at && [at(put), at(put)]),
    }),
    speedPlan(at, range, () => 1),
  );
}

function pulse(r: ShapeReader): Plan | undefined {
  const given = r.details.get("pulse") as Given;
  const content = given.description.content;
  const word = wordOf(given, content.is === "word" ? content.words : [], r.draft.findings);
  if (word === undefined) r.lost();
  const [peak, duration] = [r.value("peak"), r.number("duration")];
  const [rise, fall, start] = [r.number("rise"), r.number("fall"), r.number("start")];
  return r.finish("pulse", (put) => {
    const shape = {
      kind: "pulse" as const,
      shape: word as PulseShape,
      peak: peak?.(put) ?? 0,
      duration: duration(put),
      rise: rise(put),
      fall: fall(put),
      start: start(put),
    };
    if (word === "trapezoid" && shape.rise + shape.fall > shape.duration * (1 + 1e-12)) {
      put.wrong(
        given.span,
        `rise and fall take ${shape.rise + shape.fall} s together, and the pulse lasts ${shape.duration} s`,
      );
    }
    return shape;
  });
}

function step(r: ShapeReader): Plan | undefined {
  const [height, start, rise] = [r.value("step"), r.number("start"), r.number("rise")];
  return r.finish("step", (put) => ({
    kind: "step",
    step: height?.(put) ?? 0,
    start: start(put),
    rise: rise(put),
  }));
}

function impulse(r: ShapeReader): Plan | undefined {
  const [size, start] = [r.number("impulse"), r.number("start")];
  return r.finish("impulse", (put) => ({ kind: "impulse", impulse: size(put), start: start(put) }));
}

function chirp(r: ShapeReader): Plan | undefined {
  const given = r.details.get("chirp") as Given;
  const [item] = given.items;
  if (item?.kind !== "range" || given.items.length !== 1) {
    r.draft.findings.say(
      "wrong-kind",
      item?.span ?? given.span,
      `\`chirp\` takes two rates, found ${itemWords(item)}`,
      {
        hint: "as in `chirp = from 2 Hz to 40 Hz`",
      },
    );
    return undefined;
  }
  const range = r.range(given, item, false);
  const [amplitude, unbalanceSize] = [r.value("amplitude"), r.optional("unbalance")];
  const [lasting, phase] = [r.number("lasting"), r.number("phase")];
  const ends = (put: Putting): readonly [number, number] => range?.(put) ?? [0, 0];
  return r.finish(
    "chirp",
    (put) => {
      const [fromHz, toHz] = ends(put);
      return {
        kind: "chirp",
        fromHz,
        toHz,
        amplitude: amplitude?.(put),
        unbalance: unbalanceSize?.(put),
        lasting: lasting(put),
        phase: phase(put),
      };
    },
    {
      writtenHz: () => undefined,
      bandHz: (put) => {
        const [a, b] = ends(put);
        return [Math.min(a, b), Math.max(a, b)];
      },
    },
  );
}

function law(r: ShapeReader): Plan | undefined {
  const given = r.details.get("law") as Given;
  const node = singleValue(given, r.draft.findings);
  if (node === undefined) return undefined;
  if (node.tolerance !== undefined || node.within !== undefined) {
    const span = node.tolerance?.span ?? node.within?.span ?? node.span;
    r.draft.findings.say("wrong-kind", span, "a law takes no tolerance and no range", {
      hint: "numbers in it may have them: give them names with `let`",
    });
    return undefined;
  }
  const content = given.description.content;
  const names = content.is === "law" ? content.variables : [];
  const context = lawContext(names, node.span.start, r);
  const number = planExpression(node.expression, context, r.values.wanted);
  if (number === undefined) return undefined;
  if (reads(number.code, (slot) => slot === VARIABLE_SLOTS.rate)) {
    sayNotYet(r.draft, node.span, "a torque that depends on `rate`");
    return undefined;
  }
  const fault = numberFault(number.code, frameAt(r.draft.lets.frame, 0));
  if (fault !== undefined) {
    r.draft.findings.say("not-positive", fault.span, `at t = 0 ${fault.message}`);
    return undefined;
  }
  const factor = number.kind.rate ? 2 * Math.PI : 1;
  r.kind = number.kind;
  const code: Code =
    factor === 1
      ? number.code
      : {
          op: "multiply",
          a: number.code,
          b: { op: "constant", value: factor, span: node.span },
          span: node.span,
        };
  return r.finish("law", (put) => ({ kind: "law", law: timeFunction(code, put.frame) }));
}

const frameAt = (frame: Float64Array, time: number): Float64Array => {
  const own = frame.slice();
  own[VARIABLE_SLOTS.t] = time;
  return own;
};

function lawContext(names: readonly ("t" | "travel" | "rate")[], at: number, r: ShapeReader): NumberContext {
  const span = { start: at, end: at };
  const kinds = { t: wantedOf("time"), travel: wantedOf("travel", r.values.motion), rate: undefined };
  const variables = new Map<string, Checked>(
    names.map((name) => [
      name,
      {
        code: { op: "slot", slot: VARIABLE_SLOTS[name], span },
        kind: kinds[name]?.kinds[0] ?? { dimension: [0, 0, -1, 0, 0, 0, 0], rate: false },
      },
    ]),
  );
  const scope = new LawScope(r.draft.numbers.scope, variables);
  return { ...r.draft.numbers, scope, variables: new Set(names) };
}

function record(r: ShapeReader): Plan | undefined {
  const given = r.details.get("record") as Given;
  const [file] = given.items;
  if (file?.kind !== "text" || given.items.length !== 1) {
    r.draft.findings.say(
      "wrong-kind",
      file?.span ?? given.span,
      "`record` takes the name of a file in quotes",
      {
        hint: 'as in `record = "quay-wall.csv"`',
      },
    );
    return undefined;
  }
  const unit = recordUnit(r);
  const [scale, sampledAt] = [r.number("scale", 1), r.optional("sampled_at")];
  const columnGiven = (key: string) => {
    const item: Item | undefined = r.details.get(key)?.items[0];
    return item && { item, span: item.span };
  };
  const samples = readRecord(
    {
      file,
      column: columnGiven("column"),
      timeColumn: columnGiven("time_column"),
      isSampled: sampledAt !== undefined,
    },
    r.draft,
  );
  if (samples === undefined || unit === undefined) return undefined;
  r.kind = unit.kind;
  const factor = unit.factor * (unit.kind.rate ? 2 * Math.PI : 1);
  return r.finish("record", (put) => ({
    kind: "record",
    samples: scaledSamples(samples, factor * scale(put), sampledAt?.(put)),
  }));
}

function scaledSamples(samples: Samples, factor: number, sampledAtHz: number | undefined): Samples {
  const values = factor === 1 ? samples.values : samples.values.map((value) => value * factor);
  if (sampledAtHz === undefined) return { times: samples.times, values };
  return { times: Float64Array.from(values, (_, i) => i / sampledAtHz), values };
}

function recordUnit(r: ShapeReader): UnitMeaning | undefined {
  const given = r.details.get("unit") as Given;
  const unit = writtenUnitOf(given, r.draft);
  if (unit === undefined) return undefined;
  const meaning = unitOf(unit);
  if (isFault(meaning)) return undefined;
  const fits = r.values.wanted.kinds.some((kind) => sameAs(kind, meaning.kind));
  if (fits) return meaning;
  const { says, units, kinds } = r.values.wanted;
  const slip = kinds.map((kind) => slipIn(unit, kind)).find((each) => each !== undefined);
  if (slip !== undefined) {
    const place = unit.factors[slip.factorIndex].span;
    r.draft.findings.say(
      slip.code,
      place,
      `expected the unit of ${says}, found ${unit.text}: ${slip.message}`,
      {
        fixes: slip.ratio === 1 ? [replaceFix(`Write \`${slip.to}\``, place, slip.to)] : [],
      },
    );
    return undefined;
  }
  r.draft.findings.say(
    "unit-mismatch",
    unit.span,
    `expected the unit of ${says} such as ${units.slice(0, 3).join(", ")}, found ${unit.text}, the unit of ${wantedKind(meaning.kind).says}`,
  );
  return undefined;
}

const sameAs = (a: Kind, b: Kind): boolean =>
  a.rate === b.rate && a.dimension.every((exponent, i) => Math.abs(exponent - b.dimension[i]) < 1e-9);

/** Torque over speed, in rows. */
function curve(r: ShapeReader): Plan | undefined {
  const read = speedCurve(r.details.get("curve") as Given, r.values.wanted, r.draft);
  return read && r.finish("speed-curve", () => ({ kind: "speed-curve", ...read }));
}
