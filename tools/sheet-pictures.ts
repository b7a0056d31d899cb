/** Writes docs/pictures/sheet-NAME.png, a picture of each example's sheet, and one in each kind of theme. */
import { mkdirSync, statSync } from "node:fs";
import { join } from "node:path";
import type { Browser } from "playwright-core";
import { root } from "../test/house/files.ts";
import { example, SheetHost } from "../test/sheet/harness/host.ts";
import { openSheet } from "../test/sheet/harness/page.ts";
import { THEME_KINDS, type ThemeKind } from "../test/sheet/harness/themes.ts";
import { openBrowser } from "./workbench/browser.mjs";

const EXAMPLES = [
  "gate-actuator",
  "instrument-bench",
  "pump-line",
  "quay-generator",
  "transport-crate",
  "ventilation-fan",
];
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
} finally {
  await browser.close();
}

async function picture(of: Browser, name: string, theme: ThemeKind, file: string): Promise<void> {
  const host = new SheetHost(`${name}.thrum`, example(name));
  const { page, faults } = await openSheet(of, host, { theme, viewport: SIZE, reducedMotion: "reduce" });
  const path = join(folder, file);
  // Curves follow their box one frame later.
  await page.waitForTimeout(500);
  await page.screenshot({ path });
  await page.close();
  const { size } = statSync(path);
  console.log(`${path}, ${(size / 1e3).toFixed(0)} kB`);
  if (faults.length > 0) throw new Error(`${name}: ${faults.join("; ")}`);
  if (size > MOST) throw new Error(`${path} is larger than ${MOST / 1e3} kB`);
}
