/** The words of a drawing: what stands beside a symbol and how much room is kept for it. */
import type { DetailNode, Item, StatementNode } from "../syntax/tree.ts";

/** Ready text for a detail of a statement in the chosen units; undefined: as it is written. */
export type ShowValue = (statement: StatementNode, key: string) => string | undefined;

export interface Words {
  readonly name: string;
  /** Cut to their room. */
  readonly values: readonly string[];
  /** The same whole, to be read out. */
  readonly whole: readonly string[];
  readonly room: WordRoom;
}

/** Room for text, in pixels. It depends on names, units and on which details there are, never on numbers. */
export interface WordRoom {
  readonly width: number;
  readonly lines: number;
}

export const LINE_HEIGHT = 14;
/** Widths of an average letter of a sans-serif face, names at 12 px and values at 11, rounded up. */
const NAME_LETTER = 7.2;
const VALUE_LETTER = 6.4;
/** So narrow it may be before a word leaves its room. */
const NARROW_LETTER = 6;
const WIDE: ReadonlySet<string> = new Set("mwMWOQGCD");
const WIDE_LETTER = 11.5;
const MOST_NAME_LETTERS = 24;
/** Longer values are cut. */
const MOST_VALUE_LETTERS = 26;
/** Letters kept for a number, whatever it is: four digits and an exponent; less where several stand beside each other. */
const NUMBER = "1.234e5";
const NUMBER_OF_MANY = "12.3";

/** Keys worth a line, the first two that are there. */
const SHOWN_KEYS: Readonly<Record<string, readonly string[]>> = {
  mass: ["mass"],
  inertia: ["inertia"],
  body: ["mass"],
  pendulum: ["mass", "length"],
  spring: ["stiffness", "damping_ratio", "loss_factor", "cubic"],
  damper: ["damping"],
  inerter: ["inertance"],
  stop: ["stiffness", "gap"],
  cord: ["stiffness", "slack"],
  friction: ["force"],
  mount: ["stiffness", "damping"],
  inductor: ["inductance"],
  resistor: ["resistance"],
  capacitor: ["capacitance"],
  mutual: ["inductance"],
  transducer: ["factor"],
  feed: ["stiffness", "damping", "inertance"],
};

/** What a number means that does not say it by its unit. */
const PREFIXES: Readonly<Record<string, string>> = {
  damping_ratio: "ζ ",
  loss_factor: "η ",
  cubic: "cubic ",
  gap: "gap ",
  slack: "slack ",
  density: "density ",
};

const DRIVE_KEYS = [
  "unbalance",
  "amplitude",
  "peak",
  "step",
  "impulse",
  "law",
  "chirp",
  "record",
  "density",
  "frequency",
  "speed",
  "duration",
];
const DRIVES: ReadonlySet<string> = new Set(["force", "torque", "voltage", "motion"]);
const MOST_VALUES = 2;

/** Keys of the details that are shown beside a symbol. */
export function shownKeys(statement: StatementNode): readonly string[] {
  const keyword = statement.keyword.text;
  if (keyword === "bind") return ["bind"];
  if (keyword === "part") return ["kit"];
  const keys = SHOWN_KEYS[keyword] ?? (DRIVES.has(keyword) ? DRIVE_KEYS : []);
  const [principal] = keys;
  const isThere = (key: string): boolean =>
    statement.details.some((detail) => detail.key.text === key) ||
    (key === principal && !DRIVES.has(keyword) && statement.value !== undefined);
  return keys.filter(isThere).slice(0, MOST_VALUES);
}

/** Letters kept for a value: those of its text with any number in the place of each number. */
function lettersOf(value: string): number {
  const numbers = value.match(ANY_NUMBER) ?? [];
  const kept = value.replace(ANY_NUMBER, numbers.length > 1 ? NUMBER_OF_MANY : NUMBER);
  return Math.min(MOST_VALUE_LETTERS, [...kept].length);
}

/** As it is written and as it is shown; not the digits of a name or a unit. */
const ANY_NUMBER = /(?<![\w^])[-+−]?\d[\d.]*(?:e[-+]?\d+)?/g;

/** Room that a bare name takes. */
export function nameWidth(name: string): number {
  const letters = [...shortened(name, MOST_NAME_LETTERS)];
  return letters.reduce((sum, letter) => sum + (WIDE.has(letter) ? WIDE_LETTER : NAME_LETTER), 0);
}

export function wordsFor(name: string, statement: StatementNode, text: string, show: ShowValue): Words {
  const whole = shownKeys(statement).map(
    (key) => prefixOf(statement, key, text) + (show(statement, key) ?? writtenValue(statement, key, text)),
  );
  const letters = whole.map(lettersOf);
  const width = Math.max(nameWidth(name), ...letters.map((count) => count * VALUE_LETTER));
  const most = Math.floor(width / NARROW_LETTER);
  return {
    name: shortened(name, MOST_NAME_LETTERS),
    values: whole.map((value) => shortened(value, most)),
    whole,
    room: { width, lines: 1 + whole.length },
  };
}

/** What stands in the text behind a key, on one line; its tolerance left out. */
export function writtenValue(statement: StatementNode, key: string, text: string): string {
  const slice = ({ start, end }: { start: number; end: number }): string =>
    text.slice(start, end).replace(/\s+/g, " ").trim();
  if (key === "kit") {
    const kit = statement.slots.kit;
    return kit === undefined ? "" : slice(kit.span);
  }
  const detail = statement.details.find((each: DetailNode) => each.key.text === key);
  const items = detail === undefined ? (statement.value ?? []) : detail.items;
  if (items.length > 0) {
    const shown = items.map((item) => slice(spanOf(item))).join(", ");
    if (key === "bind") return `= ${shown}`;
    return detail?.component === undefined ? shown : `${detail.component.text} ${shown}`;
  }
  return detail?.table === undefined ? "" : `${detail.table.length} rows`;
}

/** `4 × ` before the principal number of several in parallel, or what the number means. */
function prefixOf(statement: StatementNode, key: string, text: string): string {
  const isPrincipal = SHOWN_KEYS[statement.keyword.text]?.[0] === key;
  const count = isPrincipal ? writtenValue(statement, "count", text) : "";
  const hasCount = statement.details.some((detail) => detail.key.text === "count");
  return (hasCount && count !== "" ? `${count} × ` : "") + (PREFIXES[key] ?? "");
}

/** A number without its tolerance and range; anything else whole. */
const spanOf = (item: Item): { start: number; end: number } =>
  item.kind === "value" ? item.expression.span : item.span;

export function shortened(text: string, most: number): string {
  const letters = [...text];
  return letters.length <= most ? text : `${letters.slice(0, most - 1).join("")}…`;
}
