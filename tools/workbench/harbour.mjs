/** A workbench with the packed extension on a copy of the examples, and a browser to look at it. */
import { cpSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { packExtension } from "../package.mjs";
import { root } from "../root.mjs";
import { openBrowser } from "./browser.mjs";
import { launchWorkbench } from "./launch.mjs";

/**
 * Needs a build. Everything is put away when `use` ends, however it ends.
 * @param {(of: { workbench: { url: string, userData: string }, browser: import("playwright-core").Browser, vsix: string }) => Promise<void>} use
 * @param {Record<string, unknown>} [settings]
 */
export async function withHarbour(use, settings) {
  const home = mkdtempSync(join(tmpdir(), "thrum-harbour-"));
  const folder = join(home, "harbour");
  cpSync(join(root, "examples"), folder, { recursive: true });
  const vsix = await packExtension({ builds: false, to: join(home, "thrum.vsix") });
  const workbench = await launchWorkbench({ folder, vsix: [vsix], settings });
  const browser = await openBrowser();
  try {
    await use({ workbench, browser, vsix });
  } finally {
    await browser.close();
    workbench.stop();
    rmSync(home, { recursive: true, force: true, maxRetries: 5 });
  }
}
