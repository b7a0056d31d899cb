/**
 * Draws docs/pictures/*.png: the editor on an example in four themes, with what it shows. Needs a build.
 * Usage: node tools/pictures.mjs [NAME…]
 */
import { mkdirSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./root.mjs";
import { withHarbour } from "./workbench/harbour.mjs";
import { writeSettings } from "./workbench/launch.mjs";

const target = join(root, "docs", "pictures");
/** A picture for a page, in bytes at most. */
const LARGEST = 200e3;
const VIEW = { width: 1280, height: 800 };
/** Text beside a drawing makes large files. */
const LOWER = { width: 1280, height: 680 };

const THEMES = {
  dark: "Default Dark Modern",
  light: "Default Light Modern",
  "high-contrast-dark": "Default High Contrast",
  "high-contrast-light": "Default High Contrast Light",
};

/** What stands on the screen when a picture is taken. */
const SCENES = {
  async editor({ page, open, goTo, command }) {
    await open("ventilation-fan.thrum");
    await page.locator("[id='thrum.thrum.thrum.verdict']", { hasText: "holds" }).waitFor();
    await goTo(47, 10);
    await command("Show or Focus Hover");
    await page.locator(".monaco-hover:not(.hidden)", { hasText: "Hz" }).first().waitFor();
  },
  async verdicts({ page, open, goTo }) {
    await open("quay-generator.thrum");
    await page.locator("[id='thrum.thrum.thrum.verdict']", { hasText: "holds" }).waitFor();
    await goTo(81, 1);
    await page.locator(".codelens-decoration", { hasText: "fails" }).first().waitFor();
  },
  async beside({ page, open, goTo, command }) {
    await open("quay-generator.thrum");
    await page.locator("[id='thrum.thrum.thrum.verdict']", { hasText: "holds" }).waitFor();
    await goTo(44, 1);
    await command("Thrum: Open sheet");
    const sheet = page.frameLocator("iframe.webview.ready").frameLocator("#active-frame");
    await sheet.locator(".ruler .mode").first().waitFor();
    await command("View: Close Primary Side Bar");
  },
  async tests({ page, open, command }) {
    await open("transport-crate.thrum");
    await page.locator("[id='thrum.thrum.thrum.verdict']", { hasText: "holds" }).waitFor();
    await command("Test: Run Tests in Current File");
    await command("Testing: Focus on Test Explorer View");
    const file = page.locator(".test-explorer .monaco-list-row", { hasText: "transport-crate" }).first();
    await file.click();
    await page.keyboard.press("ArrowRight");
  },
};

const chosen = process.argv.slice(2);
mkdirSync(target, { recursive: true });
await withHarbour(async ({ workbench, browser }) => {
  for (const [theme, name] of Object.entries(THEMES)) {
    for (const [scene, prepare] of Object.entries(SCENES)) {
      const picture = `${scene}-${theme}`;
      if (chosen.length > 0 && !chosen.includes(picture)) continue;
      writeSettings(workbench.userData, { "workbench.colorTheme": name, "editor.minimap.enabled": false });
      const page = await browser.newPage({ viewport: scene === "beside" ? LOWER : VIEW });
      page.setDefaultTimeout(60_000);
      await page.goto(workbench.url);
      await page.locator(".explorer-folders-view .monaco-list-row").first().waitFor();
      await prepare(handsOn(page));
      await page.mouse.move(VIEW.width / 2, 5);
      await page.waitForTimeout(1500);
      await save(page, picture);
      await page.close();
    }
  }
});

function handsOn(page) {
  const pick = async (text, row) => {
    await page.keyboard.press("F1");
    const input = page.locator(".quick-input-widget input[type=text]");
    await input.waitFor();
    await input.fill(text);
    if (row) await page.locator(".quick-input-list .monaco-list-row", { hasText: row }).first().waitFor();
    await page.keyboard.press("Enter");
    await input.waitFor({ state: "hidden" });
  };
  return {
    page,
    command: (title) => pick(`>${title}`, title),
    goTo: (line, column) => pick(`:${line}:${column}`),
    async open(name) {
      await pick(name, name);
      await page.locator(".tab.active", { hasText: name }).waitFor();
    },
  };
}

async function save(page, name) {
  const path = join(target, `${name}.png`);
  writeFileSync(path, await page.screenshot({ type: "png" }));
  const { size } = statSync(path);
  console.log(`${name}.png, ${(size / 1e3).toFixed(0)} kB`);
  if (size > LARGEST) throw new Error(`${path} is larger than ${LARGEST / 1e3} kB`);
}
