/** What people do less often, in a real workbench: tables pasted, tests that run by themselves, a server that keeps falling. */
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { Editor } from "./editor.ts";
import { eventually } from "./eventually.ts";
import { UNIT, UNIT_FREQUENCY } from "./models.ts";

let editor: Editor;

beforeAll(async () => {
  editor = await Editor.open({
    files: { "paste.thrum": UNIT, "watched.thrum": UNIT, "falls.thrum": UNIT },
    settings: { "files.autoSave": "off" },
  });
  await editor.page.context().grantPermissions(["clipboard-read", "clipboard-write"]);
}, 240_000);

afterAll(() => editor?.close());

describe("rows from a table", () => {
  it("become statements when they are pasted, with the units of the header", async () => {
    await editor.openFile("paste.thrum");
    await editor.verdict.filter({ hasText: "holds" }).waitFor();
    await editor.goTo(17);
    await editor.page.evaluate(() =>
      navigator.clipboard.writeText("name\tmass [kg]\npump\t120\nframe\t1.4e3\n"),
    );
    await editor.page.keyboard.press("Control+v");
    await eventually(editor.lines.bind(editor), (lines) => lines.join().includes("frame"));
    expect(await editor.saved("paste.thrum")).toContain("mass pump = 120 kg\nmass frame = 1.4e3 kg\n");
  });
});

describe("a run that goes on", () => {
  const row = (text: string) =>
    editor.page.locator(".test-explorer .monaco-list-row").filter({ hasText: text }).first();
  const state = async (text: string) => (await row(text).getAttribute("aria-label")) ?? "";

  it("judges again after an edit, without being asked", async () => {
    await editor.openFile("watched.thrum");
    await editor.command("Testing: Focus on Test Explorer View");
    await row("watched.thrum").click();
    await editor.page.keyboard.press("ArrowRight");
    await row("soft").waitFor();
    await editor.command("Test: Start Continuous Run");
    await editor.openFile("watched.thrum");
    // 400 kN/m on 100 kg is 10.07 Hz, on 130 kg 8.83 Hz.
    await editor.goTo(5, 17);
    for (const key of ["Delete", "Delete", "1", "3"]) await editor.page.keyboard.press(key);
    expect(await editor.saved("watched.thrum")).toContain("unit_mass = 130 kg");
    expect(
      await eventually(
        () => state("soft"),
        (found) => found.includes("(Passed)"),
      ),
    ).toContain("(Passed)");
    await editor.page.keyboard.press("Control+z");
    for (let i = 0; i < 6; i++) await editor.page.keyboard.press("Control+z");
    expect(await editor.saved("watched.thrum")).toContain("unit_mass = 100 kg");
    expect(
      await eventually(
        () => state("soft"),
        (found) => found.includes("(Failed)"),
      ),
    ).toContain("(Failed)");
  });

  it("leaves the value and the limit beside each other", async () => {
    await row("soft").click();
    await editor.command("Test: Peek Output");
    const peek = editor.page.locator(".test-output-peek");
    await peek.waitFor();
    const words = async () => ((await peek.textContent()) ?? "").replaceAll("\u00a0", " ");
    const found = await eventually(words, (text) => text.includes("9 HzExpected"));
    expect(found).toMatch(/Expected.*Actual/s);
    expect(found).toContain(`${UNIT_FREQUENCY.toPrecision(4)} Hz`);
    expect(found).toMatch(/[^<=]≤ 9 HzExpected/);
    await editor.page.keyboard.press("Escape");
  });
});

describe("a server that keeps falling", () => {
  it("is started anew until it is too often, then once more by a click", async () => {
    await editor.openFile("falls.thrum");
    await editor.verdict.filter({ hasText: "holds" }).waitFor();
    const message = editor.page.locator(".notification-toast", { hasText: "ended 6 times" });
    for (let i = 0; i < 6; i++) {
      const [server] = await eventually(
        async () => editor.servers(),
        (found) => found.length === 1,
      );
      process.kill(server, "SIGKILL");
      await eventually(
        async () => editor.servers(),
        (found) => !found.includes(server),
      );
    }
    await message.waitFor();
    expect(editor.servers()).toEqual([]);
    await message.getByRole("button", { name: "Restart" }).click();
    expect(
      await eventually(
        async () => editor.servers(),
        (found) => found.length === 1,
      ),
    ).toHaveLength(1);
    await editor.goTo(9, 13);
    await editor.page.keyboard.type("x");
    await editor.page.locator(".squiggly-error").first().waitFor();
    const toasts = await editor.page
      .locator(".notification-toast .notification-list-item-message")
      .allTextContents();
    expect(toasts.filter((text) => !text.includes("ended 6 times"))).toEqual([]);
  });
});
