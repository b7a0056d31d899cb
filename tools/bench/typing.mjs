/**
 * From a key to its letter on the screen in a real workbench, without a sheet and with one beside the text: on the
 * largest example, a number that is typed again and again, so that every edit is computed and drawn. Medians and 95 %
 * quantiles in ms, and their ratio (aim 1.2). Needs a build. Usage: node tools/bench/typing.mjs
 */
import { withHarbour } from "../workbench/harbour.mjs";

const MODEL = "ventilation-fan.thrum";
/** Letters typed in each state, in rounds that take turns, and the pause between two, in ms: a fast typist. */
const LETTERS = 60;
const ROUNDS = 3;
const PAUSE = 90;

await withHarbour(
  async ({ workbench, browser }) => {
    const page = await browser.newPage({ viewport: { width: 1360, height: 860 } });
    page.setDefaultTimeout(60_000);
    await page.goto(workbench.url);
    await page.locator(".explorer-folders-view .monaco-list-row", { hasText: MODEL }).dblclick();
    await page.locator("[id='thrum.thrum.thrum.verdict']", { hasText: "holds" }).waitFor();
    const times = { closed: [], open: [] };
    for (let round = 0; round < ROUNDS; round++) {
      times.closed.push(...(await typed(page)));
      await openSheet(page);
      times.open.push(...(await typed(page)));
      await closeSheet(page);
    }
    for (const [state, list] of Object.entries(times))
      console.log(`sheet ${state}: median ${quantile(list, 0.5)} ms, 95 % ${quantile(list, 0.95)} ms`);
    const ratio = quantile(times.open, 0.95) / quantile(times.closed, 0.95);
    console.log(`ratio of the 95 % quantiles ${ratio.toFixed(2)} (aim 1.2)`);
  },
  { "files.autoSave": "off" },
);

/** Types digits behind the mass of the rotor and takes them back; each time until the line shows another text. */
async function typed(page) {
  await page
    .locator(".view-line", { hasText: /mass.rotor/ })
    .first()
    .click();
  await page.keyboard.press("Home");
  for (let i = 0; i < "mass rotor = 8".length; i++) await page.keyboard.press("ArrowRight");
  await page.evaluate(() => {
    const line = () =>
      [...document.querySelectorAll(".view-line")].find((each) => /mass.rotor/.test(each.textContent ?? ""));
    window.glyphs = [];
    window.stopWatching?.();
    let start;
    let before = line()?.textContent;
    const keys = () => {
      start = performance.now();
      before = line()?.textContent;
    };
    const observer = new MutationObserver(() => {
      if (start === undefined || line()?.textContent === before) return;
      const from = start;
      start = undefined;
      requestAnimationFrame(() => window.glyphs.push(performance.now() - from));
    });
    addEventListener("keydown", keys, true);
    observer.observe(document.querySelector(".view-lines"), {
      subtree: true,
      childList: true,
      characterData: true,
    });
    window.stopWatching = () => {
      removeEventListener("keydown", keys, true);
      observer.disconnect();
    };
  });
  for (let i = 0; i < LETTERS; i++) {
    await page.keyboard.press(i % 2 === 0 ? "1" : "Backspace");
    await page.waitForTimeout(PAUSE);
  }
  const found = await page.evaluate(() => window.glyphs);
  if (found.length < LETTERS * 0.9) throw new Error(`Only ${found.length} of ${LETTERS} letters were seen`);
  return found;
}

async function openSheet(page) {
  await command(page, "Thrum: Open sheet");
  const sheet = page.frameLocator("iframe.webview.ready").frameLocator("#active-frame");
  await sheet.locator(".ruler .mode").first().waitFor();
}

async function closeSheet(page) {
  await page.locator(".tab", { hasText: "Sheet of" }).click();
  await page.locator(".tab.active", { hasText: "Sheet of" }).locator(".action-label").first().click();
  await page.locator(".tab", { hasText: "Sheet of" }).waitFor({ state: "detached" });
}

async function command(page, title) {
  await page.keyboard.press("F1");
  const input = page.locator(".quick-input-widget input[type=text]");
  await input.fill(`>${title}`);
  await page.locator(".quick-input-list .monaco-list-row", { hasText: title }).first().waitFor();
  await page.keyboard.press("Enter");
  await input.waitFor({ state: "hidden" });
}

function quantile(list, share) {
  return Math.round(
    [...list].sort((a, b) => a - b)[Math.min(list.length - 1, Math.floor(share * list.length))],
  );
}
