/** A workbench with the packed extension, and what a person does in it. */
import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Browser, Locator, Page } from "playwright-core";
import { packExtension } from "../../tools/package.mjs";
import { openBrowser } from "../../tools/workbench/browser.mjs";
import { launchWorkbench, type Workbench } from "../../tools/workbench/launch.mjs";
import { root } from "../house/files.ts";

/** How long something may take to be seen on a machine that does much else, in ms. */
export const PATIENCE = 60_000;

export interface EditorOptions {
  /** Files of the folder that is opened, beside the examples. */
  readonly files?: Readonly<Record<string, string>>;
  readonly settings?: Record<string, unknown>;
  readonly trust?: boolean;
  /** In the host that has no Node. */
  readonly browserOnly?: boolean;
  /** Called before the workbench starts. */
  readonly prepare?: (folder: string) => void;
}

export class Editor {
  readonly folder: string;
  readonly page: Page;
  readonly workbench: Workbench;
  readonly #browser: Browser;
  readonly #home: string;

  private constructor(home: string, folder: string, workbench: Workbench, browser: Browser, page: Page) {
    this.#home = home;
    this.folder = folder;
    this.workbench = workbench;
    this.#browser = browser;
    this.page = page;
  }

  static async open(options: EditorOptions = {}): Promise<Editor> {
    const home = mkdtempSync(join(tmpdir(), "thrum-editor-"));
    const folder = join(home, "works");
    cpSync(join(root, "examples"), folder, { recursive: true });
    for (const [name, text] of Object.entries(options.files ?? {})) writeFileSync(join(folder, name), text);
    options.prepare?.(folder);
    const host = options.browserOnly ? "web" : undefined;
    const vsix = await packExtension({ builds: false, to: join(home, "thrum.vsix"), host });
    const { settings, trust } = options;
    const workbench = await launchWorkbench({ folder, vsix: [vsix], settings, trust });
    const browser = await openBrowser();
    const page = await browser.newPage({ viewport: { width: 1360, height: 860 } });
    page.setDefaultTimeout(PATIENCE);
    await page.addInitScript(recordNotifications);
    const editor = new Editor(home, folder, workbench, browser, page);
    await editor.load();
    return editor;
  }

  /** Loads the page, again after a change of settings. */
  async load(): Promise<void> {
    await this.page.goto(this.workbench.url);
    await this.page.locator(".monaco-workbench .explorer-folders-view .monaco-list-row").first().waitFor();
  }

  async close(): Promise<void> {
    await this.#browser.close();
    this.workbench.stop();
    rmSync(this.#home, { recursive: true, force: true, maxRetries: 5 });
  }

  /** Runs a command by its title. */
  async command(title: string): Promise<void> {
    await this.#pick(`>${title}`);
  }

  async openFile(name: string): Promise<void> {
    await this.#pick(name);
    await this.page.locator(".tab.active", { hasText: name }).waitFor();
    await this.page.locator(".editor-instance .view-lines .view-line").first().waitFor();
  }

  /** Line and column from 1. */
  async goTo(line: number, column = 1): Promise<void> {
    await this.#pick(`:${line}:${column}`, false);
  }

  async #pick(text: string, listed = true): Promise<void> {
    const { page } = this;
    const input = page.locator(".quick-input-widget input[type=text]");
    const row = page.locator(".quick-input-widget .quick-input-list .monaco-list-row", {
      hasText: text.replace(/^>/, ""),
    });
    const end = Date.now() + PATIENCE;
    for (;;) {
      await page.keyboard.press("F1");
      // A page that has just got the focus may swallow the key.
      if (!(await input.waitFor({ timeout: 5000 }).then(yes, no))) {
        if (Date.now() > end) throw new Error(`No list opens to pick "${text}" from`);
        continue;
      }
      await input.fill(text);
      if (!listed) break;
      // A list that is open does not learn of commands that come with an extension.
      const seen = await row.first().waitFor({ timeout: 5000 }).then(yes, no);
      if (seen) break;
      if (Date.now() > end) throw new Error(`Nothing is called "${text}"`);
      await page.keyboard.press("Escape");
    }
    await page.keyboard.press("Enter");
    await input.waitFor({ state: "hidden" });
  }

  /** Saves the editor in front and returns what the file holds then. */
  async saved(name: string): Promise<string> {
    const clean = this.page.locator(".tab.active:not(.dirty)");
    const end = Date.now() + PATIENCE;
    // An edit that arrives while it saves leaves it unsaved.
    do {
      await this.page.keyboard.press("Control+s");
    } while (!(await clean.waitFor({ timeout: 2000 }).then(yes, no)) && Date.now() < end);
    return this.text(name);
  }

  text(name: string): string {
    return readFileSync(join(this.folder, name), "utf8");
  }

  write(name: string, text: string): void {
    writeFileSync(join(this.folder, name), text);
  }

  /** Errors and warnings that the status bar counts. */
  async problems(): Promise<{ errors: number; warnings: number }> {
    const label = (await this.page.locator("#status\\.problems a").getAttribute("aria-label")) ?? "";
    const count = (word: string) => Number(new RegExp(`${word}: (\\d+)`).exec(label)?.[1] ?? 0);
    return { errors: count("Errors"), warnings: count("Warnings") };
  }

  /** The verdict in the status bar. */
  get verdict(): Locator {
    return this.page.locator("#thrum\\.thrum\\.thrum\\.verdict");
  }

  /** Lines of the editor in front that are on the screen, with hints and lenses. */
  async lines(): Promise<string[]> {
    const lines = await this.page.locator(".editor-instance .view-lines .view-line").allInnerTexts();
    return lines.map((line) => line.replaceAll("\u00a0", " "));
  }

  /** Language servers of this workbench. */
  servers(): number[] {
    return readdirSync("/proc")
      .filter((name) => /^\d+$/.test(name))
      .map(Number)
      .filter((pid) => {
        try {
          const words = readFileSync(`/proc/${pid}/cmdline`, "utf8");
          return words.includes(this.workbench.extensions) && words.includes("dist/server/main.js");
        } catch {
          return false;
        }
      });
  }

  /** Every notification that was ever shown. */
  notifications(): Promise<string[]> {
    return this.page.evaluate(() => (window as unknown as { shown: string[] }).shown);
  }

  screenshot(path: string): Promise<unknown> {
    return this.page.screenshot({ path });
  }
}

const yes = () => true;
const no = () => false;

function recordNotifications(): void {
  const shown: string[] = [];
  Object.assign(window, { shown });
  new MutationObserver((changes) => {
    for (const { addedNodes } of changes) {
      for (const node of addedNodes) {
        if (!(node instanceof HTMLElement)) continue;
        const toast = node.matches(".notification-toast") ? node : node.querySelector(".notification-toast");
        if (toast) setTimeout(() => shown.push(toast.textContent ?? ""), 200);
      }
    }
  }).observe(document, { childList: true, subtree: true });
}
