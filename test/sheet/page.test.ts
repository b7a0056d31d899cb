/** The page of the response sheet in a browser, fed with what the core says of the examples. */
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { SHEET_VERSION } from "../../shared-core/index.ts";
import { openBrowser } from "../../tools/workbench/browser.mjs";
import { EXAMPLES, example, type Revision, SheetHost } from "./harness/host.ts";
import { type Harness, type HarnessOptions, openSheet } from "./harness/page.ts";
import { THEME_KINDS } from "./harness/themes.ts";
import { violations } from "./harness/violations.ts";

let browser: Browser;
beforeAll(async () => {
  browser = await openBrowser();
});
afterAll(() => browser?.close());

async function withSheet(
  name: string,
  options: HarnessOptions,
  use: (sheet: Harness, host: SheetHost) => Promise<void>,
  revisions: readonly Revision[] = [],
): Promise<void> {
  const host = new SheetHost(`${name}.thrum`, example(name), revisions);
  const sheet = await openSheet(browser, host, options);
  try {
    await use(sheet, host);
    expect(sheet.faults).toEqual([]);
    expect(host.strange).toEqual([]);
  } finally {
    await sheet.page.close();
  }
}

describe.each(EXAMPLES)("%s", (name) => {
  it("is laid out whole and without a finding of axe", () =>
    withSheet(name, {}, async ({ page }) => {
      expect(await page.locator(".drawing [role=option]").count()).toBeGreaterThan(1);
      expect(await page.locator(".ruler .mode").count()).toBeGreaterThan(0);
      expect(await page.locator(".cards > section").count()).toBeGreaterThan(1);
      expect(await page.locator(".ledger tbody").count()).toBeGreaterThan(0);
      expect(await page.locator("footer").textContent()).toContain("licensed practice");
      for (const table of await page.locator("details.behind > summary").all()) await table.click();
      expect(await page.locator("details.behind tbody tr").count()).toBeGreaterThan(1);
      expect(await violations(page.locator("body"))).toEqual([]);
    }));
});

it.each(THEME_KINDS)("is readable in %s", (theme) =>
  withSheet("quay-generator", { theme }, async ({ page }) => {
    expect(await violations(page.locator("body"))).toEqual([]);
  }),
);

it("obeys forced colours", () =>
  withSheet("quay-generator", { forcedColors: "active" }, async ({ page }) => {
    const colours = await page.evaluate(() => {
      const probe = document.body.appendChild(document.createElement("p"));
      probe.style.color = "CanvasText";
      const ink = document.querySelector(".scene .body") as Element;
      return [getComputedStyle(probe).color, getComputedStyle(ink).stroke];
    });
    expect(colours[1]).toBe(colours[0]);
  }));

describe("a plot", () => {
  it("reads out by keys, jumps to peaks and says them politely", () =>
    withSheet("quay-generator", {}, async ({ page }) => {
      const stage = page.locator(".stage").first();
      await stage.focus();
      await stage.press("PageDown");
      const peak = await page.locator(".peaks li").first().textContent();
      // `skid.velocity up to 10.4 mm/s at 12.81 Hz`
      const [, value, at] = /up to (\S+ \S+) at (\S+ Hz)/.exec(peak ?? "") ?? [];
      const said = await page.locator("[aria-live=polite]").textContent();
      const marks = await page.locator(".stage").first().locator("text.name").allTextContents();
      expect(marks.join()).toContain(value);
      expect(said).toMatch(/^\d\S* Hz · \S+ \S+ mm\/s/);
      await stage.press("PageDown");
      expect(await page.locator("[aria-live=polite]").textContent()).toContain(
        `${at} · skid.velocity ${value}`,
      );
      await stage.press("ArrowRight");
      expect(await page.locator("[aria-live=polite]").textContent()).not.toContain(at);
    }));

  it("zooms by keys, by the wheel and by a frame, and shows all again", () =>
    withSheet("quay-generator", {}, async ({ page, state }) => {
      const stage = page.locator(".stage").first();
      const ticks = () => stage.locator("text.number").allTextContents();
      const whole = await ticks();
      await stage.focus();
      await stage.press("+");
      await expect.poll(ticks).not.toEqual(whole);
      await stage.press("0");
      await expect.poll(ticks).toEqual(whole);
      await stage.scrollIntoViewIfNeeded();
      const box = (await stage.boundingBox()) as { x: number; y: number; width: number };
      await page.mouse.move(box.x + 300, box.y + 60);
      await page.mouse.down();
      await page.mouse.move(box.x + 500, box.y + 60, { steps: 4 });
      await page.mouse.up();
      await expect.poll(ticks).not.toEqual(whole);
      const shown = async () => {
        const [from, to] = ((await state()) as { zoom: Record<string, [number, number]> }).zoom.half_run;
        return to - from;
      };
      await expect.poll(shown).toBeCloseTo(200 / (box.width - 62 - 16), 2);
      await page.mouse.dblclick(box.x + 300, box.y + 60);
      await expect.poll(ticks).toEqual(whole);
      await page.keyboard.down("Control");
      await page.mouse.wheel(0, -300);
      await page.keyboard.up("Control");
      await expect.poll(ticks).not.toEqual(whole);
    }));

  it("changes scales and phase and keeps the choice", () =>
    withSheet("quay-generator", {}, async ({ page, state }) => {
      const card = page.locator(".card", { hasText: "isolation.force" });
      await card.getByRole("button", { name: "linear amplitude" }).click();
      await card.getByRole("button", { name: "continued phase" }).click();
      expect(await card.getByRole("button", { name: "linear amplitude" }).getAttribute("aria-pressed")).toBe(
        "true",
      );
      await expect
        .poll(async () => ((await state()) as { views?: unknown }).views)
        .toEqual({ half_run: { linearY: true, continued: true } });
    }));
});

describe("a knob", () => {
  it("asks for SI values and draws the moved answer over the written one", () =>
    withSheet("quay-generator", {}, async ({ page }, host) => {
      const knob = page.locator(".knob", { hasText: "4.4 kN/mm" });
      await knob.locator("input[type=number]").fill("4.2");
      await knob.locator("input[type=number]").press("Enter");
      await page.locator(".legend", { hasText: "skid.velocity, as written" }).first().waitFor();
      expect(host.last("show")?.knobs).toEqual({ mount: expect.closeTo(4.2e6, 3) });
      await knob.getByRole("button", { name: "write to source" }).click();
      await expect
        .poll(() => host.last("write"))
        .toMatchObject({ name: "mount", value: expect.closeTo(4.2e6, 3) });
      await knob.getByRole("button", { name: "reset" }).click();
      await page.locator(".legend", { hasText: "as written" }).first().waitFor({ state: "detached" });
      expect(host.last("show")?.knobs).toEqual({});
    }));

  it("follows the arrow keys and stays in the focus", () =>
    withSheet("quay-generator", {}, async ({ page }, host) => {
      const slider = page.locator(".knob", { hasText: "4.4 kN/mm" }).locator("input[type=range]");
      await slider.focus();
      for (let i = 0; i < 5; i++) await slider.press("ArrowRight");
      await page.locator(".legend", { hasText: "as written" }).first().waitFor();
      expect(await slider.evaluate((input) => input === document.activeElement)).toBe(true);
      expect(host.last("show")?.knobs.mount).toBeGreaterThan(4.4e6);
    }));
});

describe("an earlier revision", () => {
  const text = example("quay-generator");
  const revisions = [
    { id: "4f0c", label: "3 Nov 2026, stiffer mounts", text: text.replace("4.4 kN/mm", "6.6 kN/mm") },
    { id: "91ab", label: "1 Nov 2026, first try", text: "thrum 1\nmass a = 3 m\n" },
  ];
  const open = (use: (sheet: Harness, host: SheetHost) => Promise<void>, state?: unknown) =>
    withSheet("quay-generator", { state }, use, revisions);

  it("lies under today's answer when it is chosen, and is chosen again after a reload", async () => {
    let kept: unknown;
    await open(async ({ page, state }, host) => {
      await page.getByLabel("drawn under it").selectOption({ label: "3 Nov 2026, stiffer mounts" });
      await page.locator(".legend", { hasText: "skid.velocity, earlier" }).first().waitFor();
      expect(host.last("show")?.earlier).toBe("4f0c");
      expect(await page.locator(".ruler .earlier").count()).toBeGreaterThan(2);
      expect(await page.locator("header .verdict").allTextContents()).toContainEqual(
        expect.stringMatching(/^3 Nov 2026, stiffer mounts: holds \d of 4 in this case · 3\.\d+ Hz/),
      );
      expect(await page.locator(".ledger .earlier").first().textContent()).toMatch(
        /^earlier .*(held|failed)$/,
      );
      expect(await violations(page.locator("body"))).toEqual([]);
      await expect.poll(async () => JSON.stringify(await state())).toContain("4f0c");
      kept = await state();
    });
    await open(async ({ page }) => {
      await page.locator(".legend", { hasText: "skid.velocity, earlier" }).first().waitFor();
      expect(await page.getByLabel("drawn under it").inputValue()).toBe("4f0c");
      await page.getByLabel("drawn under it").selectOption("");
      await page.locator(".legend", { hasText: "earlier" }).first().waitFor({ state: "detached" });
      expect(await page.locator(".ruler .earlier").count()).toBe(0);
    }, kept);
  });

  it("that leaves nothing to compute is said to be such", () =>
    open(async ({ page }) => {
      await page.getByLabel("drawn under it").selectOption("91ab");
      await page.locator("header .verdict", { hasText: "first try: it has errors" }).waitFor();
      expect(await page.locator(".ruler .mode").count()).toBeGreaterThan(2);
    }));

  it("is not offered where there is none", () =>
    withSheet("quay-generator", {}, async ({ page }) => {
      expect(await page.getByLabel("drawn under it").isVisible()).toBe(false);
    }));
});

describe("motion", () => {
  const transform = ".drawing .scene path[transform]";

  it("starts when a mode is chosen and stops when told", () =>
    withSheet("quay-generator", {}, async ({ page }) => {
      await page
        .locator(".ruler")
        .getByRole("option", { name: /^mode 3/ })
        .click();
      const look = () => page.locator(transform).first().getAttribute("transform");
      const first = await look();
      await expect.poll(look).not.toBe(first);
      await page.getByRole("button", { name: "pause" }).click();
      const still = await look();
      await page.waitForTimeout(200);
      expect(await look()).toBe(still);
      await page.getByLabel("place in the motion").fill("0.25");
      expect(await page.locator(".controls output").textContent()).toBe("90°");
    }));

  it("shows the extreme and keeps still where motion is unwelcome", () =>
    withSheet("quay-generator", { reducedMotion: "reduce" }, async ({ page }) => {
      await page
        .locator(".ruler")
        .getByRole("option", { name: /^mode 3/ })
        .click();
      const look = () => page.locator(transform).first().getAttribute("transform");
      const first = await look();
      await page.waitForTimeout(200);
      expect(await look()).toBe(first);
      expect(await page.getByRole("button", { name: "play" }).count()).toBe(1);
    }));

  it("runs through a history", () =>
    withSheet("transport-crate", {}, async ({ page }) => {
      const motions = page.getByLabel("moving");
      const history = await motions.locator("option[value^='history:']").first().getAttribute("value");
      await motions.selectOption(history as string);
      const place = () => page.getByLabel("place in the motion").inputValue();
      await expect.poll(async () => Number(await place())).toBeGreaterThan(0);
    }));
});

describe("what comes in", () => {
  it("is text, whatever it holds", () =>
    withSheet("quay-generator", {}, async ({ page }, host) => {
      const title = "<img src=x onerror=alert(1)> & <b>bold</b>";
      await host.edit(example("quay-generator").replace(/title ".*"/, `title "${title}"`));
      await page.locator("h1", { hasText: title }).waitFor();
      expect(await page.locator("h1 *").count()).toBe(0);
    }));

  it("is dropped when it is no message, and reported when it cannot be read", () =>
    withSheet("quay-generator", {}, async ({ page }, host) => {
      for (const odd of [null, 7, {}, { type: "erase" }]) await host.post(odd as never);
      expect(await page.locator(".notice:visible").count()).toBe(0);
      await host.post({ type: "content", protocol: SHEET_VERSION, uri: "", version: 1, content: "{" });
      await page.locator(".notice", { hasText: "cannot be read" }).waitFor();
      await host.show({});
      await page.locator(".notice").waitFor({ state: "hidden" });
      await host.post({ type: "content", protocol: SHEET_VERSION + 1, uri: "", version: 1, content: "{}" });
      await page.locator(".notice", { hasText: "another version" }).waitFor();
    }));

  it("of a broken text leaves the last picture and marks it", () =>
    withSheet("quay-generator", {}, async ({ page }, host) => {
      const text = example("quay-generator");
      await host.edit(text.replace("mass skid = 780 kg", "mass skid = 780 kN"));
      await page.locator("main.stale .notice:visible").waitFor();
      expect(await page.locator(".ruler .mode").count()).toBeGreaterThan(0);
      await host.edit(text);
      await page.locator("main:not(.stale)").waitFor();
    }));

  it("lights up what the cursor stands in, and says what the pointer is over", () =>
    withSheet("quay-generator", {}, async ({ page }, host) => {
      await host.post({ type: "highlight", protocol: SHEET_VERSION, names: ["mounts", "skid_smooth"] });
      await page.locator(".scene .item.lit", { hasText: "mounts" }).waitFor();
      expect(await page.locator(".ledger tbody.lit").textContent()).toContain("skid_smooth");
      await page.getByRole("option", { name: /^spring mounts/ }).click();
      await expect.poll(() => host.last("reveal")?.name).toBe("mounts");
      expect(host.last("point")?.name).toBe("mounts");
    }));
});

describe("a reader's place", () => {
  it("is the same after a reload", async () => {
    let kept: unknown;
    let ticks: readonly string[] = [];
    await withSheet("quay-generator", {}, async ({ page, state }) => {
      await page.getByLabel("case", { exact: true }).selectOption("soft_mounts");
      await page.getByLabel("units", { exact: true }).selectOption("inch");
      await page.locator(".ledger tr.shown .case", { hasText: "soft_mounts" }).first().waitFor();
      await page.locator(".ledger td.number", { hasText: "in/s" }).first().waitFor();
      await page.locator(".stage").first().press("+");
      await expect.poll(async () => JSON.stringify(await state()), { timeout: 10_000 }).toContain("half_run");
      kept = await state();
      ticks = await page.locator(".stage").first().locator("text.number").allTextContents();
    });
    expect(JSON.stringify(kept).length).toBeLessThan(1000);
    await withSheet("quay-generator", { state: kept }, async ({ page }, host) => {
      await page.locator(".ledger tr.shown .case", { hasText: "soft_mounts" }).first().waitFor();
      expect(host.last("show")).toMatchObject({ case: "soft_mounts", units: "inch" });
      expect(await page.locator(".stage").first().locator("text.number").allTextContents()).toEqual(ticks);
      await page.waitForTimeout(300);
    });
  });

  it("is left alone by a state that is none", async () => {
    for (const state of [7, "x", { zoom: { half_run: [2, 1] }, knobs: 3, units: "miles", scroll: "far" }]) {
      await withSheet("quay-generator", { state }, async ({ page }) => {
        expect(await page.locator(".stage").count()).toBe(2);
      });
    }
  });
});

it("pictures and numbers can be taken away", () =>
  withSheet("quay-generator", {}, async ({ page }, host) => {
    for (const each of await page.locator("details.take > summary").all()) await each.click();
    for (const name of ["save SVG", "save PNG"]) {
      for (const button of await page.getByRole("button", { name }).all()) await button.click();
    }
    const pictures = () => host.said.filter((message) => message.type === "picture");
    await expect.poll(() => pictures().length).toBe(8);
    for (const { name, format, data } of pictures()) {
      if (format === "svg") expect(data, name).toMatch(/^<svg[^>]* xmlns="http:\/\/www.w3.org\/2000\/svg"/);
      // The first bytes of every PNG (ISO/IEC 15948, 5.2).
      else
        expect(Buffer.from(data, "base64").subarray(0, 8), name).toEqual(
          Buffer.from("89504e470d0a1a0a", "hex"),
        );
    }
    await page
      .locator(".card", { hasText: "isolation.force" })
      .getByRole("button", { name: "save CSV" })
      .click();
    await expect.poll(() => host.last("csv")).toMatchObject({ ask: "half_run", case: "as written" });
  }));
