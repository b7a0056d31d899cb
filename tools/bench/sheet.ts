/**
 * Speed of the response sheet's page in a browser, without editor and server: `node tools/run-harness.mjs
 * tools/bench/sheet.ts`. Times in ms; medians and 95 % quantiles of one run on this machine.
 */
import { gzipSync } from "node:zlib";
import type { Page } from "playwright-core";
import type { SheetContent, ToSheet } from "../../shared-core/index.ts";
import { packContent, unpackContent } from "../../shared-core/index.ts";
import { EXAMPLES, example, SheetHost } from "../../test/sheet/harness/host.ts";
import { openSheet, sheetProgram } from "../../test/sheet/harness/page.ts";
import { openBrowser } from "../workbench/browser.mjs";
import { benchModel, modelText } from "./model.mjs";

const EDITS = 20;
const FRAMES = 120;
const LONG = 100_000;

const ask = (n: number) => `
ask modes
ask sweep run
    of = m${n}.velocity, m1.displacement
    by = push
    from = 1 Hz
    to = 100 Hz
force push on m1
    amplitude = 10 N
    frequency = 20 Hz
let tune = 1e5 N/m +/- 10 %
spring extra between m1 and ground = tune
`;

const quantile = (list: readonly number[], share: number): number =>
  [...list].sort((a, b) => a - b)[Math.min(list.length - 1, Math.floor(share * list.length))];
const row = (what: string, list: readonly number[]) =>
  console.log(`| ${what} | ${quantile(list, 0.5).toFixed(1)} | ${quantile(list, 0.95).toFixed(1)} |`);

const browser = await openBrowser();
try {
  const program = await sheetProgram();
  console.log(
    `bundle ${(program.length / 1e3).toFixed(0)} kB, ${(gzipSync(program).length / 1e3).toFixed(0)} kB compressed\n`,
  );
  console.log("| what | median | 95 % |\n|---|---|---|");
  for (const n of [10, 100, 300]) await edits(n);
  for (const name of EXAMPLES) await knobs(name);
  await frames();
  await memory();
} finally {
  await browser.close();
}

/** From an edit to the painted page: judging, content, message, layout, next frame. */
async function edits(n: number): Promise<void> {
  const text = modelText(benchModel("chain", n), { ask: ask(n) });
  const host = new SheetHost("chain.thrum", text);
  const { page } = await openSheet(browser, host);
  row(`first paint after the page began, ${n} coordinates`, [await firstPaint(page)]);
  const whole: number[] = [];
  const painted: number[] = [];
  for (let i = 0; i < (n > 100 ? EDITS / 4 : EDITS); i++) {
    const start = performance.now();
    const before = await page.evaluate(() => performance.getEntriesByName("thrum-painted").length);
    await host.edit(text.replace("tune = 1e5", `tune = ${1e5 + 100 * (i + 1)}`));
    await page.waitForFunction(
      (count) => performance.getEntriesByName("thrum-painted").length > count,
      before,
      { polling: "raf" },
    );
    whole.push(performance.now() - start);
    painted.push(await repaint(page, host.message({})));
  }
  row(`edit to repainted, judged in this process, ${n} coordinates`, whole);
  row(`message to repainted, ${n} coordinates`, painted);
  const shows: number[] = [];
  for (let i = 0; i < 5; i++) {
    const start = performance.now();
    const message = host.message({ knobs: { tune: 1.02e5 + 100 * i } });
    const computed = performance.now() - start;
    shows.push(computed + (await repaint(page, message)));
  }
  row(`knob to repainted, ${n} coordinates`, shows);
  await page.close();
}

/** A knob of an example, as it is dragged: the core's answer and the page's work. */
async function knobs(name: string): Promise<void> {
  const host = new SheetHost(`${name}.thrum`, example(name));
  const { page } = await openSheet(browser, host);
  const [knob] = unpackContent((host.message({}) as Extract<ToSheet, { type: "content" }>).content).knobs;
  const times: number[] = [];
  for (let i = 1; i <= EDITS; i++) {
    const value = knob.from + ((knob.to - knob.from) * i) / (EDITS + 1);
    const start = performance.now();
    const message = host.message({ knobs: { [knob.name]: value } });
    const computed = performance.now() - start;
    times.push(computed + (await repaint(page, message)));
  }
  row(`knob to repainted, ${name}`, times);
  await page.close();
}

function firstPaint(page: Page): Promise<number> {
  return page.evaluate(() => performance.getEntriesByName("thrum-painted")[0].startTime);
}

/** In the page: from the message to the frame after its layout. */
function repaint(page: Page, message: ToSheet): Promise<number> {
  return page.evaluate(async (data) => {
    const count = () => performance.getEntriesByName("thrum-painted").length;
    const before = count();
    const start = performance.now();
    window.postMessage(data, "*");
    while (count() === before) await new Promise((done) => requestAnimationFrame(done));
    document.body.getBoundingClientRect();
    return performance.now() - start;
  }, message);
}

/** Time of the scripts of one frame: moving a drawing, and panning eight long series. */
async function frames(): Promise<void> {
  const host = new SheetHost("quay-generator.thrum", example("quay-generator"));
  const { page } = await openSheet(browser, host);
  await page.getByLabel("moving").selectOption("mode:3");
  row("frame to frame while a mode moves (9 coordinates)", await frameTimes(page, false));
  await page.close();
  const long = new SheetHost("transport-crate.thrum", example("transport-crate"));
  const sheet = await openSheet(browser, long);
  for (const series of [1, 8]) {
    await repaint(sheet.page, longHistory(long.message({}), series));
    row(`frame to frame while panning, ${series} × ${LONG} points`, await frameTimes(sheet.page, true));
  }
  await sheet.page.close();
}

function frameTimes(page: Page, pans: boolean): Promise<number[]> {
  return page.evaluate(
    async ([count, moves]) => {
      const stage = document.querySelector(".stage") as HTMLElement;
      const press = (key: string, shiftKey = false) =>
        stage.dispatchEvent(new KeyboardEvent("keydown", { key, shiftKey }));
      if (moves) for (let i = 0; i < 3; i++) press("+");
      const times: number[] = [];
      let last = performance.now();
      for (let i = 0; i < count; i++) {
        if (moves) press(i % 20 < 10 ? "ArrowRight" : "ArrowLeft", true);
        await new Promise((done) => requestAnimationFrame(done));
        const now = performance.now();
        times.push(now - last);
        last = now;
      }
      if (moves) press("0");
      return times.slice(5);
    },
    [FRAMES, pans] as const,
  );
}

/** The first plot of a sheet with long rows in it. */
function longHistory(message: ToSheet, series: number): ToSheet {
  if (message.type !== "content") return message;
  const content = unpackContent(message.content);
  const x = Float64Array.from({ length: LONG }, (_, i) => i / 1000);
  const curves = Array.from({ length: series }, (_, s) => ({
    name: `series ${s + 1}`,
    style: s,
    x,
    y: Float64Array.from(x, (t) => Math.sin(40 * t + s) * Math.exp(-t / 80) + 0.3 * Math.sin(711 * t)),
  }));
  const panel = {
    kind: "curves" as const,
    x: { label: "time", unit: "s", scale: "linear" as const },
    y: { label: "value", unit: "mm", scale: "linear" as const },
    share: 2,
    curves,
    marks: [],
  };
  const cards = content.cards.map((card) =>
    card.kind === "history" || card.kind === "sweep" ? { ...card, phase: undefined, panels: [panel] } : card,
  );
  return { ...message, content: packContent({ ...content, cards } as SheetContent) };
}

/** Memory of the page after many edits beside that after few. */
async function memory(): Promise<void> {
  const text = example("quay-generator");
  const host = new SheetHost("quay-generator.thrum", text);
  const { page } = await openSheet(browser, host);
  const session = await page.context().newCDPSession(page);
  const used = async () => {
    await session.send("HeapProfiler.collectGarbage");
    return ((await session.send("Runtime.getHeapUsage")) as { usedSize: number }).usedSize / 1e6;
  };
  const messages = [host.message({}), host.message({ knobs: { mount: 4.2e6 } })];
  for (let i = 0; i < 20; i++) await repaint(page, messages[i % 2]);
  const before = await used();
  for (let i = 0; i < 500; i++) await repaint(page, messages[i % 2]);
  console.log(
    `\nmemory of the page: ${before.toFixed(1)} MB after 20 repaints, ${(await used()).toFixed(1)} MB after 520`,
  );
  await page.close();
}
