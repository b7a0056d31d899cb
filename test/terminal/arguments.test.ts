import { describe, expect, it } from "vitest";
import { commandNamed, readCall } from "../../client/terminal/arguments.ts";
import { inkOf } from "../../client/terminal/colour.ts";
import { COMMANDS } from "../../client/terminal/commands.ts";
import { explain, overview } from "../../client/terminal/help.ts";
import { runCommand } from "../../client/terminal/run.ts";
import { testHost } from "./host.ts";

const call = (name: string, ...args: string[]) => readCall(commandNamed(name, COMMANDS), args, testHost());

describe("a call", () => {
  it("holds operands in order and options by name, wherever they stand", () => {
    const read = call("answer", "a.thrum", "--csv", "out", "run_up", "--json", "--unit=inch", "--", "--odd");
    expect(read.operands).toEqual(["a.thrum", "run_up", "--odd"]);
    expect([read.has("json"), read.has("svg")]).toEqual([true, false]);
    expect([read.value("csv"), read.value("unit"), read.value("json")]).toEqual(["out", "inch", undefined]);
  });

  it("takes - as an operand", () => expect(call("check", "-").operands).toEqual(["-"]));

  it.each([
    [["check"], "check needs a file: thrum check FILE..."],
    [["outline", "a", "b"], "outline takes one file, found 2: thrum outline FILE"],
    [["check", "a", "--jsn"], "there is no option --jsn; the nearest is --json"],
    [["check", "a", "--frobnicate"], "there is no option --frobnicate; thrum help check lists them"],
    [["check", "a", "-x"], "there is no option -x; thrum help check lists them"],
    [["check", "a", "--json=1"], "--json takes no value"],
    [["check", "a", "--case"], "--case needs a value: --case NAME"],
    [["check", "a", "--case", "--json"], "--case needs a value: --case NAME"],
    [["check", "a", "--unit", "imperial"], "--unit takes as-written, si, inch, not imperial"],
    [["chek", "a"], "there is no command chek; the nearest is check"],
    [["solve", "a"], "there is no command solve; thrum help lists them"],
  ])("%j is told what would be right", async (args, message) => {
    const host = testHost();
    expect(await runCommand(args, host)).toBe(2);
    expect([host.out(), host.err()]).toEqual(["", `thrum: ${message}\n`]);
  });
});

describe("the front door", () => {
  it.each([[["--help"]], [["help"]], [["-h"]]])("%j lists every command on standard output", async (args) => {
    const host = testHost();
    expect(await runCommand(args, host)).toBe(0);
    for (const { name } of COMMANDS) expect(host.out()).toContain(`thrum ${name} `);
  });

  it("explains a command with all its options", async () => {
    for (const command of COMMANDS) {
      const host = testHost();
      expect(await runCommand([command.name, "--help"], host)).toBe(0);
      expect(host.out()).toBe(explain(command));
      for (const option of command.options) expect(host.out()).toContain(`--${option.name}`);
    }
  });

  it("is as wide as a terminal", () => {
    const lines = [overview(COMMANDS), ...COMMANDS.map(explain)].join("\n").split("\n");
    const long = lines.filter((line) => line.length > 120 && line.startsWith("  "));
    expect(long).toEqual([]);
  });
});

describe("colour", () => {
  it.each([
    [true, {}, true],
    [false, {}, false],
    [true, { NO_COLOR: "1" }, false],
    [true, { NO_COLOR: "" }, true],
    [false, { FORCE_COLOR: "1" }, true],
    [true, { FORCE_COLOR: "0" }, false],
    [true, { NO_COLOR: "1", FORCE_COLOR: "1" }, false],
    [true, { TERM: "dumb" }, false],
  ])("terminal %s with %j: %s", (isTerminal, env, coloured) => {
    const text = inkOf(testHost({ isTerminal, env })).bad("x");
    expect(text.includes("\u001b[")).toBe(coloured);
  });
});
