import type { NameNode, Tree } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { FIRST_FREE_SLOT, type Frame, slotsRead } from "./code.ts";
import type { Findings } from "./findings.ts";
import type { Draw, Entity } from "./model.ts";
import { aKeyword, nameSpan } from "./names.ts";
import { type NumberContext, planNumber } from "./number.ts";
import type { PlannedLet } from "./plan.ts";
import type { Checked, NameMeaning, Scope } from "./typed.ts";

/** A file whose statements are understood: the model's own, or one that it uses. */
export interface FileContext {
  /** Path of a used file; undefined for the model's own. */
  readonly file?: string;
  readonly tree: Tree;
  readonly findings: Findings;
  readonly names: ReadonlyMap<string, Entity>;
  /** Entities of used files belong to the context of their file. */
  readonly contextOf: (entity: Entity) => FileContext;
}

/** Chains are cut short by `understandLets`, so that only a circle can be as long. */
const LONGEST_CHAIN = 300;
/** Names shown of a circle. */
const MOST_SHOWN = 8;

interface LetState {
  readonly state: "busy" | "done";
  readonly slot: number;
  readonly checked: Checked;
  readonly planned?: PlannedLet;
}

/**
 * Understands lets at their first use, so that their order in the file does not matter, and keeps their values
 * as written. Also counts what is used, and gives out slots and draws.
 */
export class LetTable {
  readonly #states = new Map<Entity, LetState>();
  /** In the order in which they can be computed. */
  readonly planned: PlannedLet[] = [];
  readonly draws: Draw[] = [];
  readonly used = new Set<Entity>();
  #frame: Frame = new Float64Array(64);
  #slots = FIRST_FREE_SLOT;
  /** Lets that are being understood, for the chain in circular-definition. */
  readonly #open: Entity[] = [];
  readonly #visible: ReadonlySet<Entity>;

  /** `visible`: the lets that the model's own file sees by their names. */
  constructor(visible: ReadonlySet<Entity>) {
    this.#visible = visible;
  }

  get slots(): number {
    return this.#slots;
  }

  get frame(): Frame {
    return this.#frame;
  }

  readonly newDraw = (draw: Omit<Draw, "id">): number => {
    this.draws.push({ ...draw, id: this.draws.length });
    return this.draws.length - 1;
  };

  newSlot(value = 0): number {
    const slot = this.#slots++;
    if (slot >= this.#frame.length) {
      const longer = new Float64Array(2 * this.#frame.length);
      longer.set(this.#frame);
      this.#frame = longer;
    }
    this.#frame[slot] = value;
    return slot;
  }

  /** What a let is; `from` is where it is named, for the message of a circle. */
  typed(
    entity: Entity,
    file: FileContext,
    from?: { readonly name: NameNode; readonly file: FileContext },
  ): Checked {
    const known = this.#states.get(entity);
    if (known?.state === "done") return known.checked;
    if (known?.state === "busy" || this.#open.length > LONGEST_CHAIN) {
      if (from !== undefined) this.#sayCircle(entity, from);
      return undefined;
    }
    const slot = this.newSlot();
    this.#states.set(entity, { state: "busy", slot, checked: undefined });
    this.#open.push(entity);
    const planned = this.#understand(entity, file, slot);
    this.#open.pop();
    if (planned === undefined) {
      this.#states.set(entity, { state: "done", slot, checked: undefined });
      return undefined;
    }
    this.#frame[slot] = planned.compute(this.#frame);
    this.planned.push(planned);
    const code = { op: "slot", slot, span: planned.span } as const;
    const zero = planned.code.op === "constant" && planned.code.value === 0 && planned.unitNode === undefined;
    const checked: Checked = { code, kind: planned.kind, ...(zero ? { zero } : {}) };
    this.#states.set(entity, { state: "done", slot, checked, planned });
    return checked;
  }

  plannedOf(entity: Entity): PlannedLet | undefined {
    return this.#states.get(entity)?.planned;
  }

  #understand(entity: Entity, file: FileContext, slot: number): PlannedLet | undefined {
    const [value, second] = entity.node.value ?? [];
    if (entity.node.broken || value?.kind !== "value" || second !== undefined) {
      const wrong = value?.kind === "value" ? second : value;
      if (!entity.node.broken && wrong !== undefined) sayNoNumber(wrong.span, file.findings);
      return undefined;
    }
    const number = planNumber(value, this.contextFor(file), undefined, entity.name);
    if (number === undefined) return undefined;
    const written = file.tree.text.slice(value.expression.span.start, value.expression.span.end);
    return {
      ...number,
      name: entity.name,
      slot,
      written,
      file: file.file,
      visible: this.#visible.has(entity),
      reads: slotsRead(number.code),
    };
  }

  /** Where numbers of a file are understood. */
  contextFor(file: FileContext): NumberContext {
    return {
      scope: new FileScope(this, file),
      findings: file.findings,
      tree: file.tree,
      nominal: () => this.#frame,
      newDraw: this.newDraw,
      file: file.file,
    };
  }

  #sayCircle(entity: Entity, from: { readonly name: NameNode; readonly file: FileContext }): void {
    const circle = this.#open.slice(Math.max(0, this.#open.indexOf(entity))).slice(0, MOST_SHOWN);
    const chain = [...circle, entity].map(({ name }) => name).join(" -> ");
    const related = circle.map((each) => ({
      span: nameSpan(each.node),
      message: `\`${each.name}\` is defined here`,
      ...(each.file === undefined ? {} : { file: each.file }),
    }));
    const message =
      circle.length === 1
        ? `\`${entity.name}\` is defined by itself`
        : `\`${entity.name}\` is defined by itself: ${chain}`;
    from.file.findings.say("circular-definition", from.name.span, message, {
      hint: "one of them has to be a number that does not depend on the others",
      related,
    });
  }
}

function sayNoNumber(span: Span, findings: Findings): void {
  findings.say("wrong-kind", span, "a `let` holds one number", { hint: "as in `let mount = 26.5 N/mm`" });
}

/** The names of a file where numbers are wanted. */
export class FileScope implements Scope {
  constructor(
    readonly lets: LetTable,
    readonly file: FileContext,
  ) {}

  find(name: NameNode): NameMeaning | undefined {
    const entity = this.file.names.get(name.text);
    if (entity === undefined) return name.text === "ground" ? { is: "other", says: "a support" } : undefined;
    if (entity.keyword !== "let") return { is: "other", says: aKeyword(entity.keyword) };
    this.lets.used.add(entity);
    const typed = this.lets.typed(entity, this.file.contextOf(entity), { name, file: this.file });
    return { is: "number", typed };
  }

  holdsNumber(name: string): boolean {
    return this.file.names.get(name)?.keyword === "let";
  }

  *numberNames(): Iterable<string> {
    for (const [name, entity] of this.file.names) if (entity.keyword === "let") yield name;
  }
}

/** A scope with the variables of a law in front of the names of the file. */
export class LawScope implements Scope {
  constructor(
    readonly outer: Scope,
    readonly variables: ReadonlyMap<string, Checked>,
  ) {}

  find(name: NameNode): NameMeaning | undefined {
    const typed = this.variables.get(name.text);
    return typed ? { is: "number", typed } : this.outer.find(name);
  }

  holdsNumber(name: string): boolean {
    return this.variables.has(name) || this.outer.holdsNumber(name);
  }

  *numberNames(): Iterable<string> {
    yield* this.variables.keys();
    yield* this.outer.numberNames();
  }
}
