import { type SpawnOptionsWithoutStdio, spawn, spawnSync } from "node:child_process";
import {
  cpSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  realpathSync,
  rmSync,
  writeFileSync,
} from "node:fs";
import { createRequire, isBuiltin } from "node:module";
import { tmpdir } from "node:os";
import { basename, join } from "node:path";
import { Ajv } from "ajv";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { version } from "../../package.json";
import { read, root } from "../house/files.ts";

const PROGRAM = join(root, "dist", "terminal", "thrum.js");

/** One mass on a spring and a damper: 4.135 Hz, damping ratio 0.09623 (closed form: sqrt(k/m)/(2 pi), c/(2 sqrt(k m))). */
const DRUM = `thrum 1
title "Drum"

let stiffness = 5.4 N/mm

mass drum = 8 kg
spring feet between drum and ground = stiffness
damper oil between drum and ground = 40 N*s/m

force shake on drum
    amplitude = 1 N

ask modes
ask sweep run
    of = drum.displacement
    from = 1 Hz
    to = 20 Hz

expect soft = natural_frequency(1) <= 5 Hz
`;

let folder = "";
beforeAll(() => {
  folder = realpathSync(mkdtempSync(join(tmpdir(), "thrum-command-")));
  mkdirSync(join(folder, "models"));
  put("models/drum.thrum", DRUM);
  put("models/hard.thrum", DRUM.replace("<= 5 Hz", "<= 4 Hz"));
  put("models/broken.thrum", DRUM.replace("40 N*s/m", "40 N"));
  put("crooked.thrum", DRUM.replaceAll(" = ", "="));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const put = (path: string, text: string) => writeFileSync(join(folder, path), text);
const get = (path: string) => readFileSync(join(folder, path), "utf8");

const requiredBy = (text: string): string[] =>
  [...text.matchAll(/\brequire\("([^"]+)"\)/g)].map(([, name]) => name);

function thrum(args: string[], options: SpawnOptionsWithoutStdio & { input?: string } = {}) {
  const env = { ...process.env, NO_COLOR: "", FORCE_COLOR: undefined };
  return spawnSync(process.execPath, [PROGRAM, ...args], {
    cwd: folder,
    encoding: "utf8",
    env,
    maxBuffer: 1 << 28,
    ...options,
  });
}

describe("thrum check", () => {
  it("says the verdict and ends with it", () => {
    const { status, stdout, stderr } = thrum(["check", "models/drum.thrum"]);
    expect([status, stderr]).toEqual([0, ""]);
    expect(stdout).toMatch(/holds {2}soft +4\.135 Hz +≤ 5 Hz/);
    expect(stdout).not.toContain("\u001b");
    expect(thrum(["check", "models/hard.thrum"]).status).toBe(1);
  });

  it("names places as path:line:column, counted from 1", () => {
    const { status, stdout } = thrum(["check", "models/broken.thrum"]);
    expect(status).toBe(1);
    expect(stdout).toMatch(/^models\/broken\.thrum:8:38: error unit-mismatch .*/m);
    expect(stdout).toMatch(/^models\/broken\.thrum: 1 not judged, 1 error$/m);
  });

  it("reports the others when one file cannot be read, and ends with 2", () => {
    const { status, stdout } = thrum(["check", "gone.thrum", "models/drum.thrum"]);
    expect(status).toBe(2);
    expect(stdout).toMatch(/^gone\.thrum:1:1: error file-unreadable /m);
    expect(stdout).toContain("models/drum.thrum: holds 1 of 1");
  });

  it("ends with 2 when nothing matches", () => {
    const { status, stdout, stderr } = thrum(["check", "none/**/*.thrum"]);
    expect([status, stdout]).toEqual([2, ""]);
    expect(stderr).toBe("thrum: no model matches none/**/*.thrum\n");
  });

  it("reads standard input under the path it stands for", () => {
    const { status, stdout } = thrum(["check", "-", "--stdin-filename", "models/new.thrum"], { input: DRUM });
    expect(status).toBe(0);
    expect(stdout).toContain("models/new.thrum: holds 1 of 1");
  });

  it("writes one JSON document that keeps its schema, the same bytes every time", () => {
    const args = ["check", "--json", "models", "gone.thrum"];
    const [first, second] = [thrum(args), thrum(args)];
    expect(first.status).toBe(2);
    expect(second.stdout).toBe(first.stdout);
    const validate = new Ajv({ strict: false }).compile(JSON.parse(read("docs/schema/check.json")));
    const document = JSON.parse(first.stdout);
    expect(validate(document) || validate.errors).toBe(true);
    expect(document.files.map((file: { file: string }) => file.file)).toEqual([
      "models/broken.thrum",
      "models/drum.thrum",
      "models/hard.thrum",
      "gone.thrum",
    ]);
    expect(document.files[1].cases[0].modes[0].frequencyHz).toBeCloseTo(4.134966716, 8);
    expect(document.files[1].cases[0].modes[0].dampingRatio).toBeCloseTo(0.09622504486, 8);
    expect(first.stdout).not.toContain(folder);
  });

  it("keeps the schema on every example", () => {
    const { stdout } = thrum(["check", "--json", "examples"], { cwd: root });
    const validate = new Ajv({ strict: false }).compile(JSON.parse(read("docs/schema/check.json")));
    expect(validate(JSON.parse(stdout)) || validate.errors).toBe(true);
  });

  it("ends quietly when nobody reads on", () => {
    const { status, stderr } = spawnSync(
      "sh",
      ["-c", `"${process.execPath}" "${PROGRAM}" check models | head -n 1`],
      {
        cwd: folder,
        encoding: "utf8",
      },
    );
    expect([status, stderr]).toEqual([0, ""]);
  });
});

describe("thrum answer", () => {
  it("shows modes, peaks and curves, and writes files", () => {
    const { status, stdout, stderr } = thrum(["answer", "models/drum.thrum", "--csv", "out", "--svg", "out"]);
    expect(status).toBe(0);
    expect(stdout).toMatch(/1 +4\.135 Hz +9\.62 %/);
    expect(stdout).toMatch(/[\u2801-\u28ff]/);
    expect(readdirSync(join(folder, "out")).sort()).toEqual([
      "drawing.svg",
      "modes.csv",
      "modes.svg",
      "ruler.svg",
      "run.csv",
      "run.svg",
    ]);
    expect(stderr).toContain("wrote out/run.csv");
    expect(get("out/run.svg")).toMatch(/^<svg xmlns/);
  });

  it("tells a folder from a file", () => {
    const { status, stdout, stderr } = thrum(["answer", "models"]);
    expect([status, stdout, stderr]).toEqual([2, "", "thrum: models cannot be read: it is a folder\n"]);
  });

  it("answers only what is named, and knows the nearest name", () => {
    const { stdout } = thrum(["answer", "models/drum.thrum", "run", "--json"]);
    expect(Object.keys(JSON.parse(stdout).files[0].cases[0].answers)).toEqual(["run"]);
    const wrong = thrum(["answer", "models/drum.thrum", "rum"]);
    expect([wrong.status, wrong.stderr]).toEqual([
      2,
      "thrum: models/drum.thrum asks nothing called rum; the nearest is run\n",
    ]);
  });
});

describe("thrum format", () => {
  it("says what would change, changes it, and then has nothing to change", () => {
    expect(thrum(["format", "--check", "crooked.thrum", "models/drum.thrum"])).toMatchObject({
      status: 1,
      stdout: "crooked.thrum\n",
    });
    expect(thrum(["format", "crooked.thrum"]).status).toBe(0);
    expect(get("crooked.thrum")).toBe(DRUM);
    expect(thrum(["format", "--check", "crooked.thrum"]).status).toBe(0);
  });

  it("writes standard input to standard output", () => {
    const { status, stdout } = thrum(["format", "-"], { input: DRUM.replaceAll(" = ", "=") });
    expect([status, stdout]).toEqual([0, DRUM]);
  });
});

describe("thrum matrices", () => {
  it("writes the system and names its rows", () => {
    const { status, stdout } = thrum(["matrices", "models/drum.thrum", "--to", "m"]);
    expect(status).toBe(0);
    expect(stdout.split("\n")).toContain("m/stiffness.mtx");
    expect(get("m/stiffness.mtx")).toMatch(/\n1 1 1\n1 1 5400\n$/);
    expect(get("m/mass.mtx")).toMatch(/\n1 1 8\n$/);
    expect(get("m/damping.mtx")).toMatch(/\n1 1 40\n$/);
    expect(get("m/coordinates.csv")).toContain("1,drum,m");
  });

  it("needs a folder", () => {
    expect(thrum(["matrices", "models/drum.thrum"])).toMatchObject({
      status: 2,
      stderr: "thrum: --to is needed: --to DIR\n",
    });
  });
});

describe("thrum outline", () => {
  it("does not change with order, layout and the choice of units", () => {
    const [head, ...blocks] = DRUM.replace("5.4 N/mm", "5400 N/m")
      .replace("<= 5 Hz", "<= 300 rpm")
      .split("\n\n");
    put("shuffled.thrum", [head, ...blocks.reverse()].join("\n# a remark\n\n"));
    const [one, other] = [thrum(["outline", "models/drum.thrum"]), thrum(["outline", "shuffled.thrum"])];
    expect([one.status, other.status]).toEqual([0, 0]);
    expect(other.stdout).toBe(one.stdout);
    expect(one.stdout).toContain("let stiffness = 5400 N/m\n");
  });

  it("changes in one line with one number", () => {
    put("softer.thrum", DRUM.replace("40 N*s/m", "50 N*s/m"));
    const before = thrum(["outline", "models/drum.thrum"]).stdout.split("\n");
    const after = thrum(["outline", "softer.thrum"]).stdout.split("\n");
    expect(after.filter((line) => !before.includes(line))).toEqual(["damper oil damping = 50"]);
  });

  it("is there for a file with errors", () => {
    expect(thrum(["outline", "models/broken.thrum"])).toMatchObject({ status: 0 });
  });
});

describe("the program", () => {
  it("says its version", () => expect(thrum(["--version"]).stdout).toBe(`thrum ${version}\n`));

  it("needs no package and no source map beside it", () => {
    const files = readdirSync(join(root, "dist", "terminal"), { recursive: true, encoding: "utf8" });
    expect(files.filter((file) => file.endsWith(".map"))).toEqual([]);
    const text = readFileSync(PROGRAM, "utf8");
    expect(text.startsWith("#!/usr/bin/env node\n")).toBe(true);
    const modules = files.filter((file) => /\.c?js$/.test(file));
    const imports = modules.flatMap((file) =>
      requiredBy(readFileSync(join(root, "dist/terminal", file), "utf8")),
    );
    expect(imports.length).toBeGreaterThan(5);
    expect(imports.filter((name) => !isBuiltin(name) && !files.includes(basename(name)))).toEqual([]);
  });

  it("takes its compiled form from the build, and does as well without one that fits", () => {
    const { loadProgram, compiledFile } = createRequire(import.meta.url)(join(root, "dist/terminal/load.js"));
    expect(loadProgram(join(root, "dist/terminal")).script.cachedDataRejected).toBe(false);
    const copy = join(folder, "terminal");
    cpSync(join(root, "dist/terminal"), copy, { recursive: true });
    const answer = () => {
      const args = [join(copy, "thrum.js"), "answer", "models/drum.thrum"];
      const { status, stdout, stderr } = spawnSync(process.execPath, args, { cwd: folder, encoding: "utf8" });
      return { status, stdout, stderr };
    };
    const right = answer();
    expect(right).toMatchObject({ status: 0, stderr: "", stdout: expect.stringContaining("4.135 Hz") });
    writeFileSync(compiledFile(copy), readFileSync(compiledFile(copy)).fill(0, 0, 64));
    expect(loadProgram(copy).script.cachedDataRejected).toBe(true);
    expect(answer()).toEqual(right);
    rmSync(compiledFile(copy));
    expect(answer()).toEqual(right);
  });

  it("runs again after a change, and ends with 130 when interrupted", async () => {
    put("watched.thrum", DRUM);
    const child = spawn(process.execPath, [PROGRAM, "check", "watched.thrum", "--watch"], { cwd: folder });
    const ended = new Promise<number | null>((done) => child.once("exit", done));
    let out = "";
    let err = "";
    child.stdout.on("data", (chunk) => {
      out += chunk;
    });
    child.stderr.on("data", (chunk) => {
      err += chunk;
    });
    try {
      await until(() => err.includes("watching 1 file"));
      expect(out).toContain("holds 1 of 1");
      put("watched.thrum", DRUM.replace("<= 5 Hz", "<= 4 Hz"));
      await until(() => out.includes("holds 0 of 1") && err.split("watching").length === 3);
    } finally {
      child.kill("SIGINT");
    }
    expect(await ended).toBe(130);
  });
});

/** Looks again until something is so; the test's own time limit ends it when it never is. */
async function until(condition: () => boolean): Promise<void> {
  while (!condition()) await new Promise((done) => setTimeout(done, 20));
}
