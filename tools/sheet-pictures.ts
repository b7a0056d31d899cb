/**
 * Writes docs/pictures/sheet-NAME.png: a picture of each example's sheet, one in each kind of theme, one of every
 * kind of statement, and one of what follows the modes.
 */
import { mkdirSync, statSync } from "node:fs";
import { join } from "node:path";
import type { Browser } from "playwright-core";
import { EVERY_KIND } from "../test/drawing/models.ts";
import { root } from "../test/house/files.ts";
import { EXAMPLES, example, SheetHost } from "../test/sheet/harness/host.ts";
import { openSheet } from "../test/sheet/harness/page.ts";
import { THEME_KINDS, type ThemeKind } from "../test/sheet/harness/themes.ts";
import { openBrowser } from "./workbench/browser.mjs";

/** A picture in a document may be so large, in bytes. */
const MOST = 200_000;
/** The first page of a sheet: head, drawing, ruler and what follows. */
const SIZE = { width: 900, height: 1500 };

const folder = join(root, "docs", "pictures");
mkdirSync(folder, { recursive: true });
const browser = await openBrowser();
try {
  for (const name of EXAMPLES) await picture(browser, name, "vscode-light", `sheet-${name}.png`);
  for (const kind of THEME_KINDS.filter((each) => each !== "vscode-light"))
    await picture(browser, "quay-generator", kind, `sheet-${kind.replace("vscode-", "")}.png`);
  await everyKind(browser);
  await rest(browser);
} finally {
  await browser.close();
}

/** The drawing of a model that holds every kind of statement that moves, joins or drives. */
async function everyKind(of: Browser): Promise<void> {
  const host = new SheetHost("every-kind.thrum", EVERY_KIND);
  const viewport = { width: 1400, height: 900 };
  const { page, faults } = await openSheet(of, host, { viewport, reducedMotion: "reduce" });
  await take("sheet-every-kind.png", faults, (path) => page.locator(".drawing svg").screenshot({ path }));
  await page.close();
}

/** What follows the modes: plots with an earlier revision and a moved number, the ledger, the numbers to move. */
async function rest(of: Browser): Promise<void> {
  const text = example("quay-generator");
  const earlier = {
    id: "stiffer",
    label: "3 Nov 2026, Stiffer mounts",
    text: text.replace("4.4 kN/mm", "6.6 kN/mm"),
  };
  const host = new SheetHost("quay-generator.thrum", text, [earlier]);
  const { page, faults } = await openSheet(of, host, { viewport: SIZE, reducedMotion: "reduce" });
  await page.getByLabel("drawn under it").selectOption("stiffer");
  const mount = page.locator(".knob", { hasText: "4.4 kN/mm" }).locator("input[type=number]");
  await mount.fill("4.1");
  await mount.press("Enter");
  await page.locator(".legend", { hasText: "as written" }).first().waitFor();
  await page.locator("h1").click();
  await page
    .locator(".cards > section")
    .nth(1)
    .evaluate((plot) => plot.scrollIntoView({ behavior: "instant" }));
  await page.waitForTimeout(500);
  await take("sheet-answers.png", faults, (path) => page.screenshot({ path }));
  await page.close();
}

async function take(
  file: string,
  faults: readonly string[],
  shoot: (path: string) => Promise<unknown>,
): Promise<void> {
  const path = join(folder, file);
  await shoot(path);
  const { size } = statSync(path);
  console.log(`${path}, ${(size / 1e3).toFixed(0)} kB`);
  if (faults.length > 0) throw new Error(`${file}: ${faults.join("; ")}`);
  if (size > MOST) throw new Error(`${path} is larger than ${MOST / 1e3} kB`);
}

async function picture(of: Browser, name: string, theme: ThemeKind, file: string): Promise<void> {
  const host = new SheetHost(`${name}.thrum`, example(name));
  const { page, faults } = await openSheet(of, host, { theme, viewport: SIZE, reducedMotion: "reduce" });
  // Curves follow their box one frame later.
  await page.waitForTimeout(500);
  await take(file, faults, (path) => page.screenshot({ path }));
  await page.close();
}
