/**
 * The extension in a real workbench, as a person uses it. One workbench serves all tests of this file, in order; each
 * opens files of its own.
 */
import { execFileSync } from "node:child_process";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { Editor } from "./editor.ts";
import { eventually } from "./eventually.ts";
import { CASES, SOUND, UNIT, UNIT_FREQUENCY } from "./models.ts";

let editor: Editor;
const git = (folder: string, ...args: string[]) =>
  execFileSync("git", ["-c", "user.name=A", "-c", "user.email=a@b", ...args], { cwd: folder, stdio: "pipe" });

beforeAll(async () => {
  editor = await Editor.open({
    files: {
      "squiggle.thrum": SOUND,
      "readouts.thrum": UNIT,
      "names.thrum": UNIT,
      "fix.thrum": UNIT.replace("damper oil between unit", "damper oil between unti"),
      "layout.thrum": UNIT.replace("let mount = 400", "let mount  =   400"),
      "tests.thrum": CASES,
      "killed.thrum": UNIT,
      "typed.thrum": "",
    },
    settings: { "files.autoSave": "off" },
    prepare(folder) {
      git(folder, "init", "-q");
      git(folder, "add", ".");
      git(folder, "commit", "-q", "-m", "start");
    },
  });
}, 240_000);

afterAll(() => editor?.close());

describe("an open model", () => {
  it("shows a mistake and forgets it when it is cured", async () => {
    await editor.openFile("squiggle.thrum");
    await editor.verdict.filter({ hasText: "holds" }).waitFor();
    expect(await editor.problems()).toEqual({ errors: 0, warnings: 0 });
    await editor.goTo(9, 13);
    await editor.page.keyboard.type("x");
    await editor.page.locator(".squiggly-error").first().waitFor();
    const errors = () => editor.problems().then((all) => all.errors);
    expect(await eventually(errors, (count) => count === 1)).toBe(1);
    await editor.page.keyboard.press("Backspace");
    expect(await eventually(errors, (count) => count === 0)).toBe(0);
    expect(await editor.saved("squiggle.thrum")).toBe(SOUND);
  });

  it("says its verdict and its natural frequency in the status bar", async () => {
    const wanted = `holds 2 of 2 · ${UNIT_FREQUENCY.toPrecision(3)} Hz`;
    const said = () => editor.verdict.textContent();
    expect(await eventually(said, (text) => text === wanted)).toBe(wanted);
  });
});

describe("readouts", () => {
  it("show the natural frequency when the pointer rests on a mass", async () => {
    await editor.openFile("readouts.thrum");
    await editor.goTo(9, 7);
    await editor.command("Show or Focus Hover");
    const hover = editor.page.locator(".monaco-hover:not(.hidden)", { hasText: "Hz" });
    await hover.first().waitFor();
    expect(await hover.first().textContent()).toContain(`${UNIT_FREQUENCY.toPrecision(4)} Hz`);
    await editor.page.keyboard.press("Escape");
  });

  it("stand behind the mass and above the expectations", async () => {
    const wanted = `${UNIT_FREQUENCY.toPrecision(4)} Hz alone`;
    const line = async () => (await editor.lines()).find((text) => text.includes("mass unit")) ?? "";
    expect(await eventually(line, (text) => text.includes(wanted))).toContain(wanted);
    await editor.page.locator(".codelens-decoration", { hasText: "fails" }).first().waitFor();
    await editor.page.locator(".codelens-decoration", { hasText: "holds" }).first().waitFor();
  });
});

describe("writing", () => {
  it("offers what fits at the place", async () => {
    await editor.openFile("names.thrum");
    await editor.goTo(10, 45);
    await editor.page.keyboard.press("End");
    for (let i = 0; i < "mount".length; i++) await editor.page.keyboard.press("Backspace");
    await editor.page.keyboard.press("Control+Space");
    const rows = editor.page.locator(".suggest-widget.visible .monaco-list-row");
    await rows.first().waitFor();
    const offered = await rows.evaluateAll((all) => all.map((row) => row.getAttribute("aria-label") ?? ""));
    expect(offered.some((label) => label.startsWith("mount"))).toBe(true);
    expect(offered.some((label) => label.startsWith("unit_mass"))).toBe(false);
    await editor.page.keyboard.press("Escape");
    await editor.page.keyboard.type("mount");
    expect(await editor.saved("names.thrum")).toBe(UNIT);
  });

  it("renames a name at every place", async () => {
    await editor.goTo(7, 6);
    await editor.page.keyboard.press("F2");
    const box = editor.page.locator(".rename-box input, .rename-input");
    await box.first().waitFor();
    await box.first().fill("foot");
    await editor.page.keyboard.press("Enter");
    await box.first().waitFor({ state: "hidden" });
    await eventually(
      () => editor.lines(),
      (all) => all.some((line) => line.includes("= foot")),
    );
    expect(await editor.saved("names.thrum")).toBe(UNIT.replaceAll(/\bmount\b(?!")/g, "foot"));
  });

  it("cures a misspelt name by a quick fix", async () => {
    await editor.openFile("fix.thrum");
    await editor.page.locator(".squiggly-error").first().waitFor();
    await editor.goTo(11, 23);
    await editor.page.keyboard.press("Control+.");
    const action = editor.page.locator(".action-widget .monaco-list-row", { hasText: "unit" });
    await action.first().waitFor();
    await editor.page.keyboard.press("Enter");
    await eventually(
      () => editor.lines(),
      (all) => all.some((line) => line.includes("between unit and ground = 400 N*s")),
    );
    expect(await editor.saved("fix.thrum")).toBe(UNIT);
  });

  it("lays out the lines that were changed, and no others", async () => {
    await editor.openFile("layout.thrum");
    await editor.goTo(5, 1);
    await editor.page.keyboard.press("End");
    await editor.page.keyboard.type("   +/-   2 %");
    await editor.saved("layout.thrum");
    await editor.command("Format Modified Lines");
    const wanted = UNIT.replace("let mount = 400", "let mount  =   400").replace(
      "= 100 kg",
      "= 100 kg +/- 2 %",
    );
    expect(
      await eventually(
        () => editor.saved("layout.thrum"),
        (text) => text === wanted,
      ),
    ).toBe(wanted);
  });

  it("leaves Enter alone: an example typed line by line is that example", async () => {
    const text = editor.text("transport-crate.thrum");
    await editor.openFile("typed.thrum");
    let indent = 0;
    const lines = text.replace(/\n$/, "").split("\n");
    for (const line of lines) {
      const wanted = line.length - line.trimStart().length;
      if (line !== "") {
        for (; indent > wanted; indent -= 4) await editor.page.keyboard.press("Backspace");
        await editor.page.keyboard.type(line.slice(indent));
        indent = wanted;
      }
      await editor.page.keyboard.press("Enter");
    }
    expect(await editor.saved("typed.thrum")).toBe(text);
  }, 300_000);
});

describe("the test explorer", () => {
  const rows = () => editor.page.locator(".test-explorer .monaco-list-row");
  /** Names with what stands behind them: `soft <= 9 Hz (Failed)`. */
  const all = () =>
    rows().evaluateAll((found) =>
      found.map((row) => {
        const state = /\(.*$/.exec(row.getAttribute("aria-label") ?? "")?.[0] ?? "";
        const words = [...(row.querySelector(".label")?.childNodes ?? [])].map((each) => each.textContent);
        return `${words.join(" ").trim()} ${state}`;
      }),
    );
  const row = (text: string) => rows().filter({ hasText: text }).first();
  /** The rows of tests.thrum. */
  const inFile = async () => {
    const found = await all();
    const from = found.findIndex((each) => each.startsWith("tests.thrum"));
    const to = found.findIndex((each, i) => i > from && each.includes(".thrum"));
    return found.slice(from, to < 0 ? undefined : to);
  };

  it("finds the models of the folder", async () => {
    await editor.openFile("tests.thrum");
    await editor.command("Testing: Focus on Test Explorer View");
    const found = await eventually(all, (each) => each.some((label) => label.startsWith("pump-line")));
    expect(found).toContain("pump-line.thrum (Not yet run)");
  });

  it("runs each expectation in each case", async () => {
    await editor.command("Test: Run Tests in Current File");
    await row("tests.thrum").click();
    await editor.page.keyboard.press("ArrowRight");
    await row("stiff").waitFor();
    await row("soft").click();
    await editor.page.keyboard.press("ArrowRight");
    await row("heavy").waitFor();
    // sqrt(400 kN/m / m) / 2π is 10.07 Hz with 100 kg, 8.83 Hz with 130 kg, 11.25 Hz with 80 kg.
    const wanted = [
      "tests.thrum (Failed)",
      "stiff >= 8 Hz (Passed)",
      "soft <= 9 Hz (Failed)",
      "as written (Failed)",
      "heavy (Passed)",
      "light (Failed)",
    ];
    expect(await eventually(inFile, (found) => found.join() === wanted.join())).toEqual(wanted);
  });

  it("marks what was found as outdated after an edit, and keeps no name that is gone", async () => {
    await editor.openFile("tests.thrum");
    await editor.goTo(16, 12);
    await editor.page.keyboard.type("er");
    // Rows come and go one after the other on the screen.
    const found = await eventually(
      inFile,
      (each) =>
        each.some((label) => label.startsWith("softer")) && !each.some((label) => label.startsWith("soft ")),
    );
    expect(found).toContain("softer <= 9 Hz (Not yet run)");
    expect(found).toContain("stiff >= 8 Hz (Passed), outdated result");
    expect(found.some((label) => label.startsWith("soft "))).toBe(false);
    await editor.saved("tests.thrum");
  });
});

describe("the server", () => {
  it("is back within 3 s when it was killed, with what was written", async () => {
    await editor.openFile("killed.thrum");
    const [before, ...others] = editor.servers();
    expect(others).toEqual([]);
    process.kill(before, "SIGKILL");
    const start = Date.now();
    await editor.goTo(9, 13);
    await editor.page.keyboard.type("x");
    await editor.page.locator(".squiggly-error").first().waitFor();
    const took = Date.now() - start;
    expect(editor.servers()).not.toContain(before);
    expect(took).toBeLessThan(3000);
    await editor.page.keyboard.press("Backspace");
    await editor.saved("killed.thrum");
  });
});

describe("the whole tour", () => {
  it("showed no notification", async () => {
    expect(await editor.notifications()).toEqual([]);
  });
});
