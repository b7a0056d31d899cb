/** Draws client/extension/icons/thrum.png (256 by 256) from the SVG beside it. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./root.mjs";
import { openBrowser } from "./workbench/browser.mjs";

const icons = join(root, "client", "extension", "icons");
const browser = await openBrowser();
const page = await browser.newPage({ viewport: { width: 256, height: 256 } });
const svg = readFileSync(join(icons, "thrum.svg"), "utf8");
await page.setContent(`<style>body{margin:0}svg{display:block;width:256px;height:256px}</style>${svg}`);
await page.screenshot({ path: join(icons, "thrum.png"), omitBackground: true });
await browser.close();
