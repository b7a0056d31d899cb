import { styleText } from "node:util";
import { type Ink, PLAIN } from "../../shared-core/index.ts";
import type { Host } from "./host.ts";

type Style = Parameters<typeof styleText>[0];

const paint = (style: Style) => (text: string) => styleText(style, text);

const COLOUR: Ink = {
  strong: paint("bold"),
  quiet: paint("dim"),
  good: paint("green"),
  bad: paint(["bold", "red"]),
  warn: paint("yellow"),
  hint: paint("cyan"),
};

/**
 * Colour on a terminal only. `NO_COLOR` (any value but the empty one) forbids it, `FORCE_COLOR` asks for it unless
 * it is 0 or false, `TERM=dumb` is a terminal without.
 */
export function inkOf(host: Host): Ink {
  return wantsColour(host) ? COLOUR : PLAIN;
}

function wantsColour({ env, stdout }: Host): boolean {
  if (env.NO_COLOR) return false;
  if (env.FORCE_COLOR !== undefined) return env.FORCE_COLOR !== "0" && env.FORCE_COLOR !== "false";
  return stdout.isTerminal && env.TERM !== "dumb";
}
