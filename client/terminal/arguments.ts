import { parseArgs } from "node:util";
import { type Call, UnknownWord, UsageError } from "./call.ts";
import type { Command, Option } from "./commands.ts";
import type { Host } from "./host.ts";

/** Finds the command that a word names. */
export function commandNamed(word: string, commands: readonly Command[]): Command {
  const found = commands.find((command) => command.name === word);
  if (found) return found;
  throw unknown(
    "command",
    word,
    commands.map((command) => command.name),
    "thrum help",
  );
}

/** Reads what stands behind the command's name; every slip is a UsageError that names a way out. */
export function readCall(command: Command, args: readonly string[], host: Host): Call {
  const values = new Map<string, string | true>();
  const operands: string[] = [];
  for (const token of tokensOf(command, args)) {
    if (token.kind === "positional") operands.push(token.value);
    else if (token.kind === "option") values.set(token.name, optionValue(command, token));
  }
  checkCount(command, operands);
  return {
    host,
    operands,
    has: (name) => values.has(name),
    value: (name) => {
      const value = values.get(name);
      return typeof value === "string" ? value : undefined;
    },
  };
}

interface OptionToken {
  readonly name: string;
  readonly rawName: string;
  readonly value: string | undefined;
  readonly inlineValue: boolean | undefined;
}

function tokensOf(command: Command, args: readonly string[]) {
  const options = Object.fromEntries(
    command.options.map((option) => [option.name, { type: option.value ? "string" : "boolean" } as const]),
  );
  return parseArgs({ args: [...args], options, allowPositionals: true, strict: false, tokens: true }).tokens;
}

function optionValue(command: Command, token: OptionToken): string | true {
  const option = command.options.find((candidate) => candidate.name === token.name);
  if (!option) {
    const names = command.options.map((candidate) => `--${candidate.name}`);
    throw unknown("option", token.rawName, names, `thrum help ${command.name}`);
  }
  if (option.value === undefined) {
    if (token.value !== undefined) throw new UsageError(`${token.rawName} takes no value`);
    return true;
  }
  return givenValue(option, token);
}

function givenValue(option: Option, token: OptionToken): string {
  const { value } = token;
  // What looks like the next option was hardly meant as a value; `--to=-x` says so on purpose.
  const missing = value === undefined || value === "" || (!token.inlineValue && /^-./.test(value));
  if (missing) throw new UsageError(`${token.rawName} needs a value: ${token.rawName} ${option.value}`);
  if (option.choices && !option.choices.includes(value))
    throw new UsageError(`${token.rawName} takes ${option.choices.join(", ")}, not ${value}`);
  return value;
}

function checkCount(command: Command, operands: readonly string[]): void {
  const usage = `thrum ${command.name} ${command.operands}`;
  if (operands.length < command.least) throw new UsageError(`${command.name} needs a file: ${usage}`);
  if (operands.length > command.most)
    throw new UsageError(`${command.name} takes one file, found ${operands.length}: ${usage}`);
}

function unknown(what: string, word: string, known: readonly string[], help: string): UnknownWord {
  return new UnknownWord(`there is no ${what} ${word}`, word, known, `${help} lists them`);
}
