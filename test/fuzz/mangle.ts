import { Dice } from "./random.ts";

/**
 * Text that somebody or something broke: one to four seeded mutations of a text, the same for the same seed.
 * Most results still hold much of the model, which is where parsers and judges go wrong.
 */
export function mangle(text: string, seed: number): string {
  const dice = new Dice(seed);
  let mangled = text;
  for (let left = 1 + dice.below(4); left > 0; left--) mangled = dice.pick(MUTATIONS)(mangled, dice);
  return mangled;
}

/** How many mangled texts a suite tries: `base`, or ten times as many when asked for by THRUM_FUZZ_TIMES=10. */
export function tries(base: number): number {
  return base * Number(process.env.THRUM_FUZZ_TIMES ?? 1);
}

type Mutation = (text: string, dice: Dice) => string;

const SIGNS = [
  ..."+-*/^()=<>,.:%±·#\">_!$&;?@[]{}|~'µ°²Ω𐐀 \t\n\r\0",
  "\r\n",
  "\ufeff",
  "\ud800",
  "\u00a0",
  "\u2028",
];
const PIECES = [
  "+/-",
  "within",
  " to ",
  " from ",
  " as rad/s",
  " at ",
  "and",
  "not ",
  "if(",
  "1/s",
  "1e999",
  "0",
  "-",
  "thrum 1\n",
  "thrum 2\n",
  "mass a = 1 kg\n",
  "spring k between a and ground = 1 N/m\n",
  "kit k(p) between a and b\n",
  "    part p = k(1) between a and ground\n",
  "ask modes\n",
  "expect x = 1 <= 2\n",
  "> note\n",
  "    > note\n",
  "# comment\n",
  "    rows =\n        1 Hz 2 mm\n",
  "normal",
  "ground",
  "pi",
  "\n\n\n",
  "    ",
  `\n${"<".repeat(7)} ours\n`,
  `\n${"=".repeat(7)}\n`,
  `\n${">".repeat(7)} theirs\n`,
  "(".repeat(300),
  "-".repeat(300),
  " + 1".repeat(1500),
];

const MUTATIONS: readonly Mutation[] = [
  // A stretch is lost.
  (text, dice) => {
    const start = dice.below(text.length + 1);
    return text.slice(0, start) + text.slice(start + 1 + dice.below(30));
  },
  // One character is lost, or put in.
  (text, dice) => spliced(text, dice.below(text.length + 1), 1, ""),
  (text, dice) => spliced(text, dice.below(text.length + 1), 0, dice.pick(SIGNS)),
  (text, dice) => spliced(text, dice.below(text.length + 1), 1, dice.pick(SIGNS)),
  (text, dice) => spliced(text, dice.below(text.length + 1), 0, dice.pick(PIECES)),
  // The file ends here.
  (text, dice) => text.slice(0, dice.below(text.length + 1)),
  // Lines are lost, doubled, swapped, shifted, joined.
  (text, dice) => withLines(text, (lines) => lines.splice(dice.below(lines.length), 1 + dice.below(3))),
  (text, dice) =>
    withLines(text, (lines) => lines.splice(dice.below(lines.length), 0, lines[dice.below(lines.length)])),
  (text, dice) =>
    withLines(text, (lines) => {
      const [i, j] = [dice.below(lines.length), dice.below(lines.length)];
      [lines[i], lines[j]] = [lines[j], lines[i]];
    }),
  (text, dice) =>
    withLines(text, (lines) => {
      const i = dice.below(lines.length);
      lines[i] = dice.pick(["", " ", "  ", "    ", "        ", "\t"]) + lines[i].trimStart();
    }),
  (text, dice) =>
    withLines(text, (lines) => {
      const i = dice.below(lines.length);
      lines.splice(i, 2, lines.slice(i, i + 2).join(" "));
    }),
  // A word takes the place of another.
  (text, dice) => {
    const words = [...text.matchAll(/[\w.]+/g)];
    if (words.length === 0) return text;
    const [out, instead] = [dice.pick(words), dice.pick(words)];
    return spliced(text, out.index, out[0].length, instead[0]);
  },
  // Another machine's line endings.
  (text) => text.replaceAll("\n", "\r\n"),
];

function spliced(text: string, start: number, count: number, put: string): string {
  return text.slice(0, start) + put + text.slice(start + count);
}

function withLines(text: string, change: (lines: string[]) => void): string {
  const lines = text.split("\n");
  change(lines);
  return lines.join("\n");
}
