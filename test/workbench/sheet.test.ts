/** The response sheet in a real workbench, as a person uses it. One workbench serves all tests, in order. */
import { execFileSync } from "node:child_process";
import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import type { FrameLocator } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { writeSettings } from "../../tools/workbench/launch.mjs";
import { violations } from "../sheet/harness/violations.ts";
import { Editor } from "./editor.ts";
import { eventually } from "./eventually.ts";
import { UNIT } from "./models.ts";

let editor: Editor;

/** A history of one revision; what stands in the folder is newer. */
function commitStifferMounts(folder: string): void {
  const file = join(folder, "quay-generator.thrum");
  const text = readFileSync(file, "utf8");
  const git = (...args: string[]) =>
    execFileSync("git", ["-c", "user.name=Works", "-c", "user.email=works@harbour.example", ...args], {
      cwd: folder,
      env: {
        ...process.env,
        GIT_AUTHOR_DATE: "2026-11-03T12:00:00Z",
        GIT_COMMITTER_DATE: "2026-11-03T12:00:00Z",
      },
    });
  git("init", "--quiet");
  writeFileSync(file, text.replace("4.4 kN/mm", "6.6 kN/mm"));
  git("add", "quay-generator.thrum");
  git("commit", "--quiet", "--message", "Stiffer mounts");
  writeFileSync(file, text);
}

/** Themes of the editor, one of each kind. */
const THEMES = [
  ["vscode-light", "Default Light Modern"],
  ["vscode-dark", "Default Dark Modern"],
  ["vscode-high-contrast", "Default High Contrast"],
  ["vscode-high-contrast-light", "Default High Contrast Light"],
] as const;

beforeAll(async () => {
  editor = await Editor.open({
    files: { "unit.thrum": UNIT },
    settings: { "files.autoSave": "off" },
    prepare: commitStifferMounts,
  });
}, 240_000);

afterAll(() => editor?.close());

/** Inside of the sheet that is in front in its column. */
const sheet = (nth = 0): FrameLocator =>
  editor.page.frameLocator("iframe.webview.ready").nth(nth).frameLocator("#active-frame");

/** The text to the left, with the focus. */
const text = (name: string) =>
  editor.page.locator(".editor-group-container").first().locator(".tab", { hasText: name }).click();

/** What the file holds once it has been saved with this in it. */
async function savedWith(name: string, part: string): Promise<string> {
  await editor.page.keyboard.press("Control+s");
  return eventually(
    async () => editor.text(name),
    (now) => now.includes(part),
  );
}

/** Where the moving parts of the drawing stand now. */
const transforms = () =>
  sheet()
    .locator(".drawing .scene path[transform]")
    .evaluateAll((paths) => paths.map((path) => path.getAttribute("transform")).join(" "));

const option = (name: RegExp) => sheet().locator(".drawing").getByRole("option", { name });

describe("a sheet", () => {
  it("opens beside the source and leaves it the focus", async () => {
    await editor.openFile("quay-generator.thrum");
    await editor.command("Thrum: Open sheet");
    await sheet().locator("h1", { hasText: "Standby generator" }).waitFor();
    await sheet().locator(".verdict", { hasText: "holds 7 of 8" }).waitFor();
    expect(await editor.page.locator(".editor-group-container").count()).toBe(2);
    const group = editor.page.locator(".editor-group-container.active");
    expect(await group.locator(".tab.active").textContent()).toContain("quay-generator.thrum");
  });

  it("follows the model in front, and its edits", async () => {
    await editor.openFile("unit.thrum");
    await sheet().locator("h1", { hasText: "Unit on a mount" }).waitFor();
    await sheet().locator(".verdict", { hasText: "holds 1 of 2" }).waitFor();
    await editor.goTo(7, 13);
    await editor.page.keyboard.press("Shift+End");
    await editor.page.keyboard.type("300 N/mm");
    // sqrt(300 kN/m / 100 kg) / 2π = 8.717 Hz (closed form)
    await sheet().locator(".modes .label", { hasText: "8.717 Hz" }).waitFor();
    await sheet().locator(".verdict", { hasText: "holds 2 of 2" }).waitFor();
  });

  it("keeps its picture while the text is broken, and says so", async () => {
    await editor.goTo(9, 1);
    await editor.page.keyboard.type("x");
    await sheet().locator(".notice:visible").waitFor();
    expect(await sheet().locator("main.stale .modes .label").count()).toBeGreaterThan(0);
    await editor.page.keyboard.press("Backspace");
    await sheet().locator("main:not(.stale)").waitFor();
  });

  it("shows the line of a symbol, and the symbol of a line", async () => {
    await option(/^damper oil/).click();
    const line = () => editor.page.locator("#status\\.editor\\.selection a").textContent();
    expect(await eventually(line, (text) => text?.includes("Ln 11") === true)).toContain("Ln 11");
    await text("unit.thrum");
    await editor.goTo(10, 8);
    await sheet().locator(".scene .item.lit", { hasText: "feet" }).waitFor();
    await option(/^mass unit/).hover();
    await editor.page.locator(".editor-instance .cdr[class*=ced-]").first().waitFor();
  });

  it("moves a mode and stops it", async () => {
    await sheet()
      .locator(".ruler")
      .getByRole("option", { name: /^mode 1/ })
      .click();
    const first = await eventually(transforms, (text) => text !== "");
    expect(await eventually(transforms, (text) => text !== first)).not.toBe(first);
    await sheet().getByRole("button", { name: "pause" }).click();
    const still = await transforms();
    await editor.page.waitForTimeout(300);
    expect(await transforms()).toBe(still);
  });
});

describe("a number", () => {
  it("is moved over the written answer and written into the text as one edit", async () => {
    await text("unit.thrum");
    await editor.openFile("quay-generator.thrum");
    await sheet().locator("h1", { hasText: "Standby generator" }).waitFor();
    const before = editor.text("quay-generator.thrum");
    const knob = sheet().locator(".knob", { hasText: "4.4 kN/mm" });
    await knob.locator("input[type=number]").fill("4.1");
    await knob.locator("input[type=number]").press("Enter");
    await sheet().locator(".legend", { hasText: "as written" }).first().waitFor();
    await knob.getByRole("button", { name: "write to source" }).click();
    await sheet().locator(".knob .written", { hasText: "4.1 kN/mm +/- 10 %" }).waitFor();
    expect(await knob.getByRole("button", { name: "write to source" }).count()).toBe(0);
    await text("quay-generator.thrum");
    const written = before.replace("4.4 kN/mm", "4.1 kN/mm");
    expect(await savedWith("quay-generator.thrum", "4.1 kN/mm")).toBe(written);
    await editor.page.keyboard.press("Control+z");
    expect(await savedWith("quay-generator.thrum", "4.4 kN/mm")).toBe(before);
    await sheet().locator(".knob .written", { hasText: "4.4 kN/mm +/- 10 %" }).waitFor();
  });

  it("is shown in other units", async () => {
    await sheet().getByLabel("units", { exact: true }).selectOption("inch");
    await sheet().locator(".ledger td.number", { hasText: "in/s" }).first().waitFor();
    await sheet().getByLabel("units", { exact: true }).selectOption("as-written");
    await sheet().locator(".ledger td.number", { hasText: "mm/s" }).first().waitFor();
  });
});

describe("an answer", () => {
  it("is saved beside the model, as numbers and as a picture", async () => {
    const card = sheet().locator(".card", { hasText: "isolation.force" });
    await card.locator("details.take > summary").click();
    const dialog = editor.page.locator(".quick-input-widget input[type=text]");
    for (const [word, file, start] of [
      ["save CSV", "half_run.csv", /^frequency/],
      ["save SVG", "half_run.svg", /^<svg /],
    ] as const) {
      await card.getByRole("button", { name: word }).click();
      await dialog.waitFor();
      const offered = await eventually(
        () => dialog.inputValue(),
        (path) => path.endsWith(`/${file}`),
      );
      expect(offered).toBe(join(editor.folder, file));
      await editor.page.keyboard.press("Enter");
      const saved = await eventually(
        async () => (existsSync(join(editor.folder, file)) ? editor.text(file) : ""),
        (found) => found !== "",
      );
      expect(saved).toMatch(start);
      expect(saved.split("\n").length).toBeGreaterThan(20);
    }
  });
});

describe("a revision", () => {
  const under = () => sheet().getByLabel("drawn under it");

  it("that is committed can be drawn under today's answer", async () => {
    await under().selectOption({
      label: await eventually(
        async () => (await labels())[1] ?? "",
        (it) => it !== "",
      ),
    });
    expect(await labels()).toEqual(["nothing", expect.stringMatching(/2026, Stiffer mounts$/)]);
    await sheet().locator(".legend", { hasText: "skid.velocity, earlier" }).first().waitFor();
    await sheet().locator("header .verdict", { hasText: "Stiffer mounts: holds" }).waitFor();
    expect(await sheet().locator(".ruler .earlier").count()).toBeGreaterThan(2);
  });

  const labels = () => under().locator("option").allTextContents();
});

describe("after a reload", () => {
  it("a sheet is back with its zoom, its motion and its place", async () => {
    const stage = sheet().locator(".stage").first();
    const ticks = () => stage.locator("text.number").allTextContents();
    const whole = await ticks();
    await stage.focus();
    await stage.press("+");
    const zoomed = await eventually(ticks, (now) => now.join() !== whole.join());
    expect(zoomed).not.toEqual(whole);
    // What a webview keeps is written behind.
    await editor.page.waitForTimeout(9_000);
    await editor.load();
    await sheet().locator("h1", { hasText: "Standby generator" }).waitFor();
    await sheet().locator(".legend", { hasText: "skid.velocity, earlier" }).first().waitFor();
    expect(await eventually(ticks, (now) => now.join() === zoomed.join())).toEqual(zoomed);
  });
});

describe("two sheets", () => {
  it("stand beside each other, one pinned and one that follows", async () => {
    await editor.page.locator(".tab", { hasText: "Sheet of quay-generator" }).click();
    await editor.command("Thrum: Pin sheet");
    await editor.page.locator(".tab", { hasText: "Sheet of quay-generator, pinned" }).waitFor();
    await text("quay-generator.thrum");
    await editor.openFile("unit.thrum");
    await editor.command("Thrum: Open sheet");
    await editor.page.locator(".tab", { hasText: "Sheet of unit" }).waitFor();
    expect(await editor.page.locator(".tab", { hasText: "Sheet of quay-generator, pinned" }).count()).toBe(1);
    await sheet().locator("h1", { hasText: "Unit on a mount" }).waitFor();
  });

  it("showed no notification on the way", async () => {
    expect(await editor.notifications()).toEqual([]);
  });
});

describe.each(THEMES)("in a theme of the kind %s", (kind, theme) => {
  it("everything is readable and labelled", async () => {
    writeSettings(editor.workbench.userData, { "files.autoSave": "off", "workbench.colorTheme": theme });
    await editor.load();
    await sheet().locator(`body[data-vscode-theme-kind=${kind}]`).waitFor();
    await sheet().locator(".modes .label").first().waitFor();
    expect(await violations(sheet().locator("body"))).toEqual([]);
  });
});
