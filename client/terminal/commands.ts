import type { Call } from "./call.ts";

/** One option of a command: without `value` it is a switch. */
export interface Option {
  readonly name: string;
  /** What stands behind it in the help, as `DIR`. */
  readonly value?: string;
  /** The words it takes, when only these. */
  readonly choices?: readonly string[];
  readonly says: string;
}

export interface Command {
  readonly name: string;
  /** What stands behind the name in the help: `FILE...`. */
  readonly operands: string;
  /** Fewest and most operands. */
  readonly least: number;
  readonly most: number;
  /** One sentence without a final full stop. */
  readonly says: string;
  /** Paragraphs for `thrum help COMMAND` and the documentation page. */
  readonly text: string;
  readonly options: readonly Option[];
  readonly examples: readonly string[];
  /** Loads what carries it out, so that a start costs only what it uses. */
  readonly load: () => Promise<{ readonly run: (call: Call) => Promise<number> }>;
}

const JSON_OPTION: Option = { name: "json", says: "write one JSON document instead of text" };
const CASE: Option = { name: "case", value: "NAME", says: "only this case of the model" };
const UNIT: Option = {
  name: "unit",
  value: "SYSTEM",
  choices: ["as-written", "si", "inch"],
  says: "units of the text output: those of the file, SI or inch units",
};
const WATCH: Option = { name: "watch", says: "run again whenever a file it read changes" };
const STDIN_NAME: Option = {
  name: "stdin-filename",
  value: "PATH",
  says: "the path that the text from standard input (`-`) stands for",
};

/** Every command: parsing, help and docs/command-line.md are written from this table. */
export const COMMANDS: readonly Command[] = [
  {
    name: "check",
    operands: "FILE...",
    least: 1,
    most: Number.POSITIVE_INFINITY,
    says: "Judge models: diagnostics, expectations, exit status",
    text: "Says of each file what is wrong with it and which expectations hold, in every case of the model. An expectation that could not be computed does not hold.",
    options: [JSON_OPTION, CASE, UNIT, WATCH, STDIN_NAME],
    examples: ["thrum check examples/ventilation-fan.thrum", "thrum check 'models/**/*.thrum' --json"],
    load: () => import("./check.ts"),
  },
  {
    name: "answer",
    operands: "FILE [ASK...]",
    least: 1,
    most: Number.POSITIVE_INFINITY,
    says: "Run what a model asks: tables and small plots",
    text: "Shows the mode table and the answer of each `ask` of the file, or only of those named. `modes` can always be named, asked for or not.",
    options: [
      JSON_OPTION,
      { name: "csv", value: "DIR", says: "write each answer as a CSV file into this folder" },
      {
        name: "svg",
        value: "DIR",
        says: "write the drawing, the frequency ruler and each answer as SVG pictures into this folder",
      },
      CASE,
      UNIT,
      WATCH,
      STDIN_NAME,
    ],
    examples: ["thrum answer examples/ventilation-fan.thrum", "thrum answer fan.thrum run_up --csv results"],
    load: () => import("./answer.ts"),
  },
  {
    name: "format",
    operands: "FILE...",
    least: 1,
    most: Number.POSITIVE_INFINITY,
    says: "Bring files into the canonical layout",
    text: "Rewrites the files in place; `-` reads standard input and writes standard output. Lines that cannot be read stay as they are.",
    options: [
      { name: "check", says: "write nothing; name the files that would change, exit 1 if there are any" },
      STDIN_NAME,
    ],
    examples: ["thrum format models", "thrum format --check models"],
    load: () => import("./format.ts"),
  },
  {
    name: "matrices",
    operands: "FILE",
    least: 1,
    most: 1,
    says: "Write the matrices of the equations of motion",
    text: "Writes mass, damping, stiffness and drive matrices in Matrix Market form, and the list of coordinates that names their rows. SI units.",
    options: [{ name: "to", value: "DIR", says: "the folder to write into (needed)" }, CASE, STDIN_NAME],
    examples: ["thrum matrices examples/ventilation-fan.thrum --to matrices"],
    load: () => import("./matrices.ts"),
  },
  {
    name: "outline",
    operands: "FILE",
    least: 1,
    most: 1,
    says: "Write the canonical text of a model, for diffs",
    text: "One fact a line, resolved, ordered and in canonical units: two files with the same outline mean the same.",
    options: [STDIN_NAME],
    examples: ["thrum outline examples/ventilation-fan.thrum"],
    load: () => import("./outline.ts"),
  },
  {
    name: "serve",
    operands: "",
    least: 0,
    most: 0,
    says: "Serve an editor: the language server",
    text: "Speaks the language server protocol on standard input and output until the editor ends it; docs/editors.md says how to set up an editor. Standard error carries what is logged.",
    options: [{ name: "stdio", says: "talk over standard input and output (needed)" }],
    examples: ["thrum serve --stdio"],
    load: () => import("./serve.ts"),
  },
];
