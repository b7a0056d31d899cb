/** What hands do on the page: fingers on a plot, the clipboard, the chart of a system too large to draw. */
import type { Browser, CDPSession } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { benchModel, modelText } from "../../tools/bench/model.mjs";
import { openBrowser } from "../../tools/workbench/browser.mjs";
import { example, SheetHost } from "./harness/host.ts";
import { type Harness, type HarnessOptions, openSheet } from "./harness/page.ts";
import { violations } from "./harness/violations.ts";

let browser: Browser;
beforeAll(async () => {
  browser = await openBrowser();
});
afterAll(() => browser?.close());

async function withSheet(
  host: SheetHost,
  options: HarnessOptions,
  use: (sheet: Harness) => Promise<void>,
): Promise<void> {
  const sheet = await openSheet(browser, host, options);
  try {
    await use(sheet);
    expect(sheet.faults).toEqual([]);
    expect(host.strange).toEqual([]);
  } finally {
    await sheet.page.close();
  }
}

const generator = () => new SheetHost("quay-generator.thrum", example("quay-generator"));

/** Fingers at places of the page, as the browser reports them. */
const touch = (
  session: CDPSession,
  type: "touchStart" | "touchMove" | "touchEnd",
  points: [number, number][],
) =>
  session.send("Input.dispatchTouchEvent", { type, touchPoints: points.map(([x, y], id) => ({ x, y, id })) });

describe("fingers on a plot", () => {
  it("zoom with two, move with one, and leave the page its scrolling", () =>
    withSheet(generator(), { hasTouch: true }, async ({ page, state }) => {
      const session = await page.context().newCDPSession(page);
      const stage = page.locator(".stage").first();
      await stage.scrollIntoViewIfNeeded();
      const box = (await stage.boundingBox()) as { x: number; y: number; width: number };
      const y = box.y + 60;
      const part = async () =>
        ((await state()) as { zoom?: Record<string, number[]> } | null)?.zoom?.half_run;
      await touch(session, "touchStart", [[box.x + 350, y]]);
      await touch(session, "touchStart", [
        [box.x + 350, y],
        [box.x + 450, y],
      ]);
      for (let i = 1; i <= 10; i++) {
        await touch(session, "touchMove", [
          [box.x + 350 - 10 * i, y],
          [box.x + 450 + 10 * i, y],
        ]);
      }
      await touch(session, "touchEnd", []);
      // Fingers three times as far apart show a third of the axis.
      const size = async () => {
        const [from, to] = (await part()) ?? [0, 1];
        return to - from;
      };
      await expect.poll(size).toBeCloseTo(1 / 3, 2);
      const [before] = (await part()) as number[];
      await touch(session, "touchStart", [[box.x + 500, y]]);
      for (let i = 1; i <= 5; i++) await touch(session, "touchMove", [[box.x + 500 - 20 * i, y]]);
      await touch(session, "touchEnd", []);
      // A hundred pixels of the axis, which is a third of the whole.
      const moved = async () => (((await part()) as number[])[0] - before) * (box.width - 62 - 16);
      await expect.poll(moved).toBeCloseTo(100 / 3, 0);
      expect(await stage.evaluate((element) => getComputedStyle(element).touchAction)).toBe("pan-y");
    }));
});

it("pictures go to the clipboard as text and as an image", () =>
  withSheet(generator(), { permissions: ["clipboard-read", "clipboard-write"] }, async ({ page }) => {
    const card = page.locator(".card", { hasText: "isolation.force" });
    await card.locator("details.take > summary").click();
    await card.getByRole("button", { name: "copy SVG" }).click();
    await card.getByRole("status").filter({ hasText: "copied" }).waitFor();
    expect(await page.evaluate(() => navigator.clipboard.readText())).toMatch(/^<svg.*skid\.velocity/s);
    await card.getByRole("button", { name: "copy PNG" }).click();
    const types = () =>
      page.evaluate(async () => (await navigator.clipboard.read()).flatMap((item) => item.types));
    await expect.poll(types).toEqual(["image/png"]);
  }));

it("a clipboard that is closed is said to be", () =>
  withSheet(generator(), { permissions: [] }, async ({ page }) => {
    await page.evaluate(() => {
      navigator.clipboard.writeText = () => Promise.reject(new Error("it is locked"));
    });
    const card = page.locator(".card", { hasText: "isolation.force" });
    await card.locator("details.take > summary").click();
    await card.getByRole("button", { name: "copy SVG" }).click();
    await card.getByRole("status").filter({ hasText: "not done: it is locked" }).waitFor();
  }));

describe("a chart of 300 coordinates", () => {
  const host = () =>
    new SheetHost("chain.thrum", modelText(benchModel("chain", 300), { ask: "ask modes\n" }));

  it("stands in for the drawing, zooms and moves by keys, and reads out", () =>
    withSheet(host(), {}, async ({ page, state }) => {
      const chart = page.getByRole("listbox", { name: /300 × mass/ });
      const names = () => chart.locator("text").allTextContents();
      expect((await names())[0]).toBe("m1");
      // It is not empty at rest.
      expect((await chart.locator(".bars").getAttribute("d"))?.length).toBeGreaterThan(1000);
      await chart.focus();
      for (let i = 0; i < 6; i++) await chart.press("+");
      await expect.poll(async () => (await names())[0]).toMatch(/^m14\d$/);
      const count = await chart.getByRole("option").count();
      // 0.6 to the sixth of 300; every bar has room for its name now.
      expect(count).toBeLessThan(17);
      expect(await names()).toHaveLength(count);
      await chart.press("Shift+ArrowRight");
      await chart.press("ArrowRight");
      const shown = await page.locator(".drawing .readout").textContent();
      expect(shown).toMatch(/^m\d+, −?-?\d\S* of the largest$/);
      await expect.poll(async () => JSON.stringify(await state())).toContain('"the system"');
      await chart.press("0");
      await expect.poll(async () => (await names())[0]).toBe("m1");
      expect(await violations(page.locator("body"))).toEqual([]);
    }));

  it("is framed by the mouse, leads to the line, and shows a motion", () => {
    const side = host();
    return withSheet(side, {}, async ({ page }) => {
      const chart = page.getByRole("listbox", { name: /300 × mass/ });
      const box = (await chart.boundingBox()) as { x: number; y: number; width: number };
      await page.mouse.move(box.x + box.width / 2, box.y + 40);
      await page.mouse.down();
      await page.mouse.move(box.x + box.width / 2 + 60, box.y + 40, { steps: 3 });
      await page.mouse.up();
      await expect.poll(() => chart.locator("text").first().textContent()).toMatch(/^m15\d$/);
      await page.mouse.click(box.x + 5, box.y + 40);
      await expect.poll(() => side.last("reveal")?.name).toMatch(/^m15\d$/);
      const bars = () => chart.locator(".bars").getAttribute("d");
      const rest = await bars();
      await page.getByLabel("moving").selectOption("mode:3");
      await expect.poll(bars).not.toBe(rest);
    });
  });
});
