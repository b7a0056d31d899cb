import type { Command, Option } from "./commands.ts";

const EXIT_TEXT = [
  ["0", "all holds"],
  ["1", "an error in a model, an expectation that does not hold, a file that `format --check` would change"],
  ["2", "the command could not run: bad usage, no file matched, a file that cannot be read"],
  ["130", "interrupted"],
] as const;

/** `thrum help`. */
export function overview(commands: readonly Command[]): string {
  const width = Math.max(...commands.map((command) => callOf(command).length));
  const lines = commands.map((command) => `  ${callOf(command).padEnd(width)}  ${command.says}`);
  return [
    "Vibration models as text: checks units, stability and expectations, answers what is asked.",
    "",
    ...lines,
    `  ${"thrum help COMMAND".padEnd(width)}  Explain a command`,
    `  ${"thrum --version".padEnd(width)}  Say the version`,
    "",
    "FILE is a file, a folder, a quoted pattern such as 'models/**/*.thrum', or - for standard input.",
    "",
    "Exit status:",
    ...EXIT_TEXT.map(([status, meaning]) => `  ${status.padStart(3)}  ${meaning.replaceAll("`", "")}`),
    "",
  ].join("\n");
}

/** `thrum help COMMAND`. */
export function explain(command: Command): string {
  const width = Math.max(0, ...command.options.map((option) => spelled(option).length));
  return [
    `${callOf(command)}`,
    "",
    `${command.says}.`,
    "",
    command.text.replaceAll("`", ""),
    "",
    ...(command.options.length ? ["Options:"] : []),
    ...command.options.map((option) => `  ${spelled(option).padEnd(width)}  ${plain(option)}`),
    "",
    "Examples:",
    ...command.examples.map((example) => `  ${example}`),
    "",
  ].join("\n");
}

/** docs/command-line.md. */
export function commandLinePage(commands: readonly Command[]): string {
  return [
    "# The command line",
    "",
    "Written from the command table by `node tools/write-command-line.mjs`; change the table, not this page.",
    "",
    "`FILE` is a file, a folder (every `.thrum` file below it), a quoted pattern such as `'models/**/*.thrum'`, or `-` for",
    "standard input. Results go to standard output, everything else to standard error. Colour appears on a terminal only;",
    "`NO_COLOR`, `FORCE_COLOR` and `TERM=dumb` are obeyed.",
    "",
    "| exit status | meaning |",
    "|---|---|",
    ...EXIT_TEXT.map(([status, meaning]) => `| ${status} | ${meaning} |`),
    "",
    ...commands.flatMap(section),
  ].join("\n");
}

function section(command: Command): string[] {
  return [
    `## \`${callOf(command)}\``,
    "",
    `${command.says}. ${command.text}`,
    "",
    ...(command.options.length ? ["| option | meaning |", "|---|---|"] : []),
    ...command.options.map((option) => `| \`${spelled(option)}\` | ${described(option)} |`),
    "",
    "```",
    ...command.examples,
    "```",
    "",
  ];
}

const callOf = (command: Command) => `thrum ${command.name} ${command.operands}`;
const spelled = (option: Option) => `--${option.name}${option.value ? ` ${option.value}` : ""}`;
const described = (option: Option) =>
  option.choices ? `${option.says} (${option.choices.map((word) => `\`${word}\``).join(", ")})` : option.says;
const plain = (option: Option) => described(option).replaceAll("`", "");
