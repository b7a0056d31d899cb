import type { End, Motion, SystemBuilder } from "../mechanics/builder.ts";
import type { StatementGrammar } from "../syntax/grammar.ts";

/** What a statement does in a model; editors colour by it. */
export type Family = "file" | "numbers" | "moves" | "joins" | "drives" | "asks" | "holds";

/**
 * The physical sort of a number. Its dimension may depend on what moves: a stiffness is N/m between sliding
 * coordinates and N*m/rad between turning ones (see `dimensionOf` in measures.ts).
 */
export type Measure =
  | "number"
  | "share"
  | "mass"
  | "inertia"
  | "length"
  | "angle"
  | "time"
  | "rate"
  | "stiffness"
  | "damping"
  | "inertance"
  | "force"
  | "travel"
  | "speed"
  | "acceleration"
  | "momentum"
  | "unbalance"
  | "cubic"
  | "quadratic"
  | "resistance"
  | "inductance"
  | "capacitance"
  | "charge"
  | "current"
  | "voltage"
  | "force_factor"
  | "decay"
  | "pressure"
  | "area"
  | "volume"
  | "second_moment"
  | "power"
  | "energy"
  /** Any dimension: its unit says what it is (a motion's amplitude, a limit). */
  | "any";

/** What a detail holds; the understanding of a value and the completion behind `=` both follow it. */
export type DetailContent =
  | {
      readonly is: "quantity";
      readonly measure: Measure;
      readonly positive?: boolean;
      readonly orRange?: boolean;
    }
  | { readonly is: "tuple"; readonly measure: Measure; readonly components: readonly string[] }
  | { readonly is: "word"; readonly words: readonly string[] }
  /** Several of a closed list: `moves = z, rx, ry`. */
  | { readonly is: "words"; readonly words: readonly string[] }
  | { readonly is: "text"; readonly file?: boolean }
  | { readonly is: "at"; readonly measure: Measure }
  | {
      readonly is: "law";
      readonly variables: readonly ("t" | "travel" | "rate")[];
      readonly measure: Measure;
    }
  | {
      readonly is: "table";
      readonly columns: readonly { readonly name: string; readonly measure: Measure }[];
      readonly orFile?: boolean;
    }
  | { readonly is: "quantities" }
  | { readonly is: "expressions" }
  | { readonly is: "names"; readonly families: readonly Family[]; readonly keywords?: readonly string[] }
  | { readonly is: "range"; readonly measure: Measure }
  | { readonly is: "changes" }
  | { readonly is: "unit" }
  | { readonly is: "tolerance" };

export interface DetailDescription {
  readonly key: string;
  readonly content: DetailContent;
  /** One line for hover and completion. */
  readonly says: string;
  /** As it would be typed: `3 %`, `26.5 N/mm`. */
  readonly example: string;
  /** Shown where the detail is left out. */
  readonly standard?: string;
  /** Missing, it is a missing-detail. A principal detail counts as given when the head sets it. */
  readonly required?: boolean;
  /** Only for ends or coordinates that move so; absent: for all. */
  readonly whenMotion?: readonly Motion[];
  /** Parsed and checked, but what it does to the mechanics is not computed by this version. */
  readonly notYet?: boolean;
}

/** A quantity behind a dot: `unit.velocity`. */
export interface QuantityDescription {
  readonly name: string;
  readonly measure: Measure;
  readonly says: string;
  /** Only where the statement moves so; absent: always. */
  readonly whenMotion?: readonly Motion[];
}

/** Numbers of one statement, evaluated to SI (rates in Hz), as its equations need them. */
export interface StatementValues {
  readonly name: string;
  readonly motion: Motion;
  has(key: string): boolean;
  /** SI value; undefined when the detail is not there. */
  number(key: string): number | undefined;
  /** SI value and the rate behind `at`, in Hz. */
  at(key: string): { readonly value: number; readonly atHz: number } | undefined;
  word(key: string): string | undefined;
  /** A slot of the head; `end("name")` of what moves is the form of its own coordinate. */
  end(slot: string): End;
  readonly count: number;
}

/** Everything Thrum knows of a statement kind, said once. */
export interface StatementDescription {
  readonly keyword: string;
  /** The KIND of an ask; each kind has a description of its own. */
  readonly variant?: string;
  readonly family: Family;
  readonly grammar: StatementGrammar;
  /** The detail that `= VALUE` sets. */
  readonly principal?: string;
  readonly details: readonly DetailDescription[];
  /** What `= VALUE` holds for each word of the head's closed list (`assume KEY = VALUE`). */
  readonly keys?: readonly DetailDescription[];
  /** Directions behind its name: `genset.z`, `mount_a.force.x`. */
  readonly components?: readonly string[];
  readonly quantities: readonly QuantityDescription[];
  /** One sentence for hover and completion. */
  readonly says: string;
  /** Paragraphs for the reference page (Markdown). */
  readonly text: string;
  /** A whole file in which the statement does its work; runs as a test. */
  readonly example: string;
  /** Other files that the example reads, by path. */
  readonly exampleFiles?: Readonly<Record<string, string>>;
  /** What is typed when it is completed, with `$1` ... places. */
  readonly snippet: string;
  /** True while the mechanics of the whole statement are not computed by this version. */
  readonly notYet?: boolean;
  /** Puts it into the equations of motion. */
  readonly assemble?: (values: StatementValues, builder: SystemBuilder) => void;
}
