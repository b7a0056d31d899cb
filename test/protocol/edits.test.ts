/**
 * After any script of edits the editor says what the command line says of the final text, no more and no less.
 * 100,000 seeded edits; compared after every 50th with what `thrum check` would write, at the end with what it writes.
 */
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { afterAll, beforeAll, expect, it } from "vitest";
import type { Diagnostic } from "vscode-languageserver-protocol";
import { judgeSource } from "../../client/terminal/judging.ts";
import { checkJson } from "../../shared-core/index.ts";
import { Dice } from "../fuzz/random.ts";
import { root } from "../house/files.ts";
import { testHost } from "../terminal/host.ts";
import { TestClient, type TestDocument } from "./client.ts";

const SCRIPTS = 20;
const EDITS = 5000;
const EVERY = 50;
/** The last edits before a comparison often change numbers of a sound text only, so that there is something to judge. */
const CALM = 6;

/** Small models, so that many of them can be judged: text errors, units, modes, sweeps, cases, notes, CRLF. */
const TEXTS = [
  `thrum 1
title "Winch µ ° ² 𐐀"
let stiff = 5.4 N/mm +/- 10 %
> accept near-resonance: passed at once
mass drum = 8 kg
spring feet between drum and ground = stiff
damper oil between drum and ground = 40 N*s/m
force shake on drum
    amplitude = 1 N
    frequency = 4.1 Hz
ask sweep run
    of = drum.displacement
    from = 1 Hz
    to = 20 Hz
    points = 20
expect soft = natural_frequency(1) <= 4 Hz
`,
  `thrum 1
let load = 3 t
let k = 40 kN/m
case empty
    load = 0.4 t
mass hook = load # 𐐀
mass beam = 900 kg
spring rope between hook and beam = k
spring girder between beam and ground = 3 MN/m
    loss_factor = 0.02
expect slow = natural_frequency(1) <= 2 Hz
    margin = 10 %
`.replaceAll("\n", "\r\n"),
  `thrum 1
use "examples/ventilation-fan.thrum"
inertia rotor = 2 kg*m^2
inertia wheel = 0.5 kg*m^2
inertia gear = 0.1 kg*m^2
spring shaft between rotor and wheel = 4 kN*m/rad
torque ripple on rotor
    amplitude = 3 N*m
    speed = fan_speed
    order = 2
bind gear = -3 * wheel
expect clear = clear_of_modes(fan_speed, orders: (1, 2)) >= 20 %
`,
];

let client: TestClient;
beforeAll(async () => {
  client = await TestClient.start({ folder: root, settings: { numbers: { delay: 0 } } });
});
afterAll(async () => {
  expect(client.stderr).toBe("");
  expect(client.logged).toEqual([]);
  expect(await client.close()).toBe(0);
});

it("says the same as the command line after any edits", { timeout: 600_000 }, async () => {
  const tried = { edits: 0, comparisons: 0, sound: 0, withErrors: 0 };
  await Promise.all(Array.from({ length: SCRIPTS }, (_, seed) => script(seed, tried)));
  expect(tried.edits).toBe(SCRIPTS * EDITS);
  expect(tried.comparisons).toBe((SCRIPTS * EDITS) / EVERY);
  // Both kinds of text were met often, or little was tried.
  expect(tried.sound).toBeGreaterThan(tried.comparisons / 10);
  expect(tried.withErrors).toBeGreaterThan(tried.comparisons / 10);
});

async function script(
  seed: number,
  tried: { edits: number; comparisons: number; sound: number; withErrors: number },
): Promise<void> {
  const dice = new Dice(7000 + seed);
  const path = `edits-${seed}.thrum`;
  const base = TEXTS[seed % TEXTS.length];
  const document = client.open(path, base);
  let calm = false;
  for (let edit = 1; edit <= EDITS; edit++) {
    const left = (EVERY - (edit % EVERY)) % EVERY;
    if (left === CALM) calm = dice.below(3) > 0;
    if (calm && left === CALM) document.replace(0, document.text.length, base);
    else if (calm && left < CALM) changeNumber(document, dice);
    else change(document, base, dice);
    tried.edits++;
    if (edit % EVERY !== 0) continue;
    const said = (await document.settled()).map(spoken);
    const wanted = await commandLineSays(path, document.text);
    tried.comparisons++;
    if (wanted.some(({ severity }) => severity === "error")) tried.withErrors++;
    else tried.sound++;
    // Of thousands of comparisons only one that fails is worth a diff.
    if (JSON.stringify(said) !== JSON.stringify(wanted))
      expect({ seed, edit, text: document.text, said }).toEqual({
        seed,
        edit,
        text: document.text,
        said: wanted,
      });
  }
  // Half of a surrogate pair cannot go through a pipe of UTF-8.
  document.replace(0, document.text.length, document.text.replaceAll(/\p{Surrogate}/gu, "?"));
  await document.settled();
  const run = spawnSync(
    process.execPath,
    [join(root, "dist/terminal/thrum.js"), "check", "--json", "-", "--stdin-filename", path],
    { cwd: root, input: document.text, encoding: "utf8" },
  );
  const [file] = JSON.parse(run.stdout).files;
  expect(document.diagnostics().map(spoken)).toEqual(file.diagnostics.map(written));
  document.close();
}

/** One edit as somebody makes it: mostly a number or a word, now and then anything, now and then all is put back. */
function change(document: TestDocument, base: string, dice: Dice): void {
  const { text } = document;
  const way = dice.below(20);
  const words = way < 10 ? [...text.matchAll(/\d[\d.]*|[\p{L}_][\p{L}\d_]*/gu)] : [];
  const start = placeIn(text, dice.below(text.length + 1));
  if (way === 0 || text.length > 3 * base.length) document.replace(0, text.length, base);
  else if (words.length > 0) {
    const word = dice.pick(words);
    const instead = /^\d/.test(word[0]) ? String(1 + dice.below(400) / 8) : dice.pick(words)[0];
    document.replace(word.index, word.index + word[0].length, instead);
  } else if (way < 14) {
    document.replace(start, placeIn(text, Math.min(text.length, start + dice.below(8))), "");
  } else document.replace(start, start, dice.pick(PIECES));
}

/** Another value for a number that has a unit. */
function changeNumber(document: TestDocument, dice: Dice): void {
  const numbers = [...document.text.matchAll(/\d[\d.]*(?= [a-zA-Z%])/g)];
  const number = dice.pick(numbers);
  const value = String(1 + dice.below(400) / 8);
  document.replace(number.index, number.index + number[0].length, value);
}

const PIECES = [
  "\n",
  "\r\n",
  " ",
  "    ",
  "# 𐐀 µ\n",
  "µ",
  "𐐀",
  "=",
  "(",
  ")",
  "> note\n",
  "1",
  "kg",
  '"',
  "e",
];
PIECES.push(
  "mass extra = 1 kg\n",
  "let spare = 2 mm\n",
  "ask modes\n",
  "thrum 1\n",
  "\ud801",
  "+/- 5 %",
  "\t",
);

/** Nothing can be put between `\r` and `\n`. */
const placeIn = (text: string, offset: number): number =>
  text[offset - 1] === "\r" && text[offset] === "\n" ? offset - 1 : offset;

interface Spoken {
  readonly code: string;
  readonly severity: string;
  readonly range: unknown;
  readonly message: string;
}

const SEVERITIES = ["", "error", "warning", "information", "hint"];

function spoken({ code, severity, range, message }: Diagnostic): Spoken {
  return { code: String(code), severity: SEVERITIES[severity ?? 0], range, message: String(message) };
}

interface Written extends Spoken {
  readonly hint?: string;
  readonly case?: string;
}

function written({ code, severity, range, message, hint, case: of }: Written): Spoken {
  const where = of === undefined ? "" : ` (case ${of})`;
  return { code, severity, range, message: `${message}${where}${hint === undefined ? "" : `\n${hint}`}` };
}

const HOST = testHost({ cwd: root });

async function commandLineSays(path: string, text: string): Promise<Spoken[]> {
  const source = { path, content: { ok: true, text }, standardInput: false } as const;
  const { files } = checkJson([await judgeSource(source, HOST)]) as unknown as {
    files: { diagnostics: Written[] }[];
  };
  return files[0].diagnostics.map(written);
}
