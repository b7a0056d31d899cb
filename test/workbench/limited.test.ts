/** The extension where it may do less: in a folder that is not trusted, and without Node. */
import { afterEach, describe, expect, it } from "vitest";
import { Editor } from "./editor.ts";
import { eventually } from "./eventually.ts";
import { SOUND, UNIT_FREQUENCY } from "./models.ts";

let editor: Editor | undefined;
afterEach(() => editor?.close());

const VERDICT = `holds 2 of 2 · ${UNIT_FREQUENCY.toPrecision(3)} Hz`;

/** The model is judged, a mistake in it is found and forgotten, and nothing is reported by a notification. */
async function works(open: Editor): Promise<void> {
  await open.openFile("unit.thrum");
  await open.verdict.filter({ hasText: VERDICT }).waitFor();
  await open.goTo(9, 13);
  await open.page.keyboard.type("x");
  await open.page.locator(".squiggly-error").first().waitFor();
  await open.page.keyboard.press("Backspace");
  const problems = await eventually(
    () => open.problems(),
    ({ errors }) => errors === 0,
  );
  expect(problems).toEqual({ errors: 0, warnings: 0 });
  await open.goTo(9, 7);
  await open.command("Show or Focus Hover");
  await open.page.locator(".monaco-hover:not(.hidden)", { hasText: "Hz" }).first().waitFor();
  expect(await open.notifications()).toEqual([]);
}

describe("a model", () => {
  it("is judged in a folder that is not trusted", async () => {
    editor = await Editor.open({ files: { "unit.thrum": SOUND }, trust: false });
    await editor.page.locator(".monaco-dialog-box .monaco-button", { hasText: "No" }).click();
    await editor.page
      .locator("[id='status.workspaceTrust'], .statusbar-item", { hasText: "Restricted Mode" })
      .waitFor();
    await works(editor);
  });

  it("is judged where there is no Node", async () => {
    editor = await Editor.open({ files: { "unit.thrum": SOUND }, browserOnly: true });
    await works(editor);
  });
});
