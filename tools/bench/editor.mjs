/**
 * Speed of the extension in a real workbench: size of the package, activation, from opening a model to its verdict,
 * from a keystroke to its squiggle. Medians of several runs, in ms. Needs a build.
 * Usage: node tools/bench/editor.mjs
 */
import { statSync } from "node:fs";
import { withHarbour } from "../workbench/harbour.mjs";

const RUNS = 5;
const MODEL = "transport-crate.thrum";
/** How long a workbench that has just been loaded takes until its host of extensions is there and idle, in ms. */
const HOST = 6000;

await withHarbour(
  async ({ workbench, browser, vsix }) => {
    const activations = [];
    const openings = [];
    let squiggles = [];
    for (let i = 0; i < RUNS; i++) {
      const page = await browser.newPage({ viewport: { width: 1280, height: 800 } });
      page.setDefaultTimeout(60_000);
      await page.goto(workbench.url);
      openings.push(await openModel(page));
      activations.push(await activation(page));
      if (i === RUNS - 1) squiggles = await mistakes(page);
      await page.close();
    }
    console.log(`package ${(statSync(vsix).size / 1e3).toFixed(0)} kB (aim 1000)`);
    console.log(`activation ${median(activations)} ms (aim 100)`);
    console.log(`open to verdict ${median(openings)} ms (aim 1000)`);
    console.log(`keystroke to squiggle ${median(squiggles)} ms (aim 150)`);
  },
  { "files.autoSave": "off" },
);

/**
 * From the double click on a model to its verdict, with the extension not active before. The host of extensions is
 * there: what it takes to start is not ours.
 */
async function openModel(page) {
  const row = page.locator(".explorer-folders-view .monaco-list-row", { hasText: MODEL });
  await row.waitFor();
  await page.waitForTimeout(HOST);
  const start = performance.now();
  await row.dblclick();
  await page.locator("[id='thrum.thrum.thrum.verdict']", { hasText: "holds" }).waitFor();
  return performance.now() - start;
}

/** As the editor itself has measured it. */
async function activation(page) {
  await page.keyboard.press("F1");
  const input = page.locator(".quick-input-widget input[type=text]");
  await input.fill(">Developer: Show Running Extensions");
  await page.locator(".quick-input-list .monaco-list-row", { hasText: "Show Running" }).first().waitFor();
  await page.keyboard.press("Enter");
  const row = page.locator(".runtime-extensions-editor .monaco-list-row", { hasText: "Thrum" }).first();
  await row.waitFor();
  const time = /Activation: (\d+)ms/.exec((await row.textContent()) ?? "")?.[1];
  if (time === undefined) throw new Error("The editor shows no time of activation");
  return Number(time);
}

/** From a letter that makes a name unknown to the squiggle below it; the letter is taken back each time. */
async function mistakes(page) {
  await page.locator(".tab", { hasText: MODEL }).click();
  const times = [];
  await page
    .locator(".view-line", { hasText: /mass.crate/ })
    .first()
    .click();
  await page.keyboard.press("End");
  for (let i = 0; i < RUNS; i++) {
    const start = performance.now();
    await page.keyboard.press("x");
    await page.locator(".squiggly-error").first().waitFor();
    times.push(performance.now() - start);
    await page.keyboard.press("Backspace");
    await page.locator(".squiggly-error").first().waitFor({ state: "detached" });
  }
  return times;
}

function median(values) {
  return Math.round([...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]);
}
