import { version } from "../../package.json";
import { commandNamed, readCall } from "./arguments.ts";
import { EXIT, UnknownWord, UsageError } from "./call.ts";
import { COMMANDS } from "./commands.ts";
import { explain, overview } from "./help.ts";
import type { Host } from "./host.ts";

/** Runs one command line and hands back its exit status. */
export async function runCommand(args: readonly string[], host: Host): Promise<number> {
  try {
    return await dispatch(args, host);
  } catch (error) {
    if (!(error instanceof UsageError)) throw error;
    host.stderr.write(`thrum: ${await told(error)}\n`);
    return EXIT.cannotRun;
  }
}

async function dispatch(args: readonly string[], host: Host): Promise<number> {
  const [word, ...rest] = args;
  if (word === undefined) {
    host.stderr.write(overview(COMMANDS));
    return EXIT.cannotRun;
  }
  if (word === "--version") return say(host, `thrum ${version}\n`);
  if (word === "--help" || word === "-h") return say(host, overview(COMMANDS));
  if (word === "help")
    return say(host, rest.length ? explain(commandNamed(rest[0], COMMANDS)) : overview(COMMANDS));
  const command = commandNamed(word, COMMANDS);
  if (asksForHelp(rest)) return say(host, explain(command));
  const { run } = await command.load();
  return run(readCall(command, rest, host));
}

/** The core is only loaded for the nearest word when somebody mistyped one. */
async function told(error: UsageError): Promise<string> {
  if (!(error instanceof UnknownWord)) return error.message;
  const { nearest } = await import("./nearest.ts");
  const { word, known, otherwise, message } = error;
  const near = nearest(word, known) ?? known.find((each) => each.startsWith(word));
  return `${message}; ${near ? `the nearest is ${near}` : otherwise}`;
}

function asksForHelp(args: readonly string[]): boolean {
  const end = args.indexOf("--");
  return (end < 0 ? args : args.slice(0, end)).some((word) => word === "--help" || word === "-h");
}

function say(host: Host, text: string): number {
  host.stdout.write(text);
  return EXIT.holds;
}
