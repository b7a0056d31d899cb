/** A page of its own for the sheet's bundle, under the same content security policy as in the editor. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { build } from "esbuild";
import type { Browser, BrowserContextOptions, Page } from "playwright-core";
import type { ToSheet } from "../../../shared-core/index.ts";
import { root } from "../../house/files.ts";
import type { SheetHost } from "./host.ts";
import { THEMES, type ThemeKind } from "./themes.ts";

/** A name below localhost counts as secure, as the editor's webviews do: only there is a clipboard. */
const ORIGIN = "http://sheet.localhost";
const NONCE = "harness";
const POLICY = `default-src 'none'; script-src 'nonce-${NONCE}'; style-src ${ORIGIN}; img-src data:`;

let bundle: Promise<string> | undefined;

/** The page's program as it ships; built once a process. */
export function sheetProgram(): Promise<string> {
  bundle ??= build({
    absWorkingDir: root,
    entryPoints: ["client/sheet/main.ts"],
    bundle: true,
    minify: true,
    format: "iife",
    target: "es2022",
    write: false,
    logLevel: "warning",
  }).then(({ outputFiles }) => outputFiles[0].text);
  return bundle;
}

export interface HarnessOptions extends BrowserContextOptions {
  readonly theme?: ThemeKind;
  /** What the editor kept of an earlier page. */
  readonly state?: unknown;
}

export interface Harness {
  readonly page: Page;
  /** Faults of the page: exceptions, refusals of its policy. */
  readonly faults: readonly string[];
  state(): Promise<unknown>;
  theme(kind: ThemeKind): Promise<void>;
}

/** Opens a sheet and waits for its first content. */
export async function openSheet(
  browser: Browser,
  host: SheetHost,
  options: HarnessOptions = {},
): Promise<Harness> {
  const { theme = "vscode-light", state, ...context } = options;
  const page = await browser.newPage({ viewport: { width: 960, height: 900 }, ...context });
  const faults: string[] = [];
  page.on("pageerror", (error) => faults.push(String(error)));
  page.on("console", (line) => line.type() === "error" && faults.push(line.text()));
  const files: Record<string, readonly [string, string]> = {
    "/": ["text/html", htmlOf(theme)],
    "/api.js": ["text/javascript", apiOf(state)],
    "/sheet.js": ["text/javascript", await sheetProgram()],
    "/sheet.css": ["text/css", readFileSync(join(root, "client/sheet/sheet.css"), "utf8")],
  };
  await page.route(`${ORIGIN}/**`, (route) => {
    const file = files[new URL(route.request().url()).pathname];
    if (file === undefined) return route.fulfill({ status: 404, body: "" });
    return route.fulfill({
      contentType: file[0],
      body: file[1],
      headers: { "content-security-policy": POLICY },
    });
  });
  await page.exposeFunction("toHost", (message: unknown) => host.hear(message));
  host.post = (message: ToSheet) =>
    page.evaluate((data) => {
      window.postMessage(data, "*");
    }, message);
  const harness: Harness = {
    page,
    faults,
    state: () => page.evaluate(() => (window as unknown as { kept: unknown }).kept),
    theme: (kind) =>
      page.evaluate(
        ([name, colours]) => {
          document.body.dataset.vscodeThemeKind = name;
          document.body.className = name;
          for (const [key, value] of Object.entries(colours))
            document.documentElement.style.setProperty(`--vscode-${key}`, value);
        },
        [kind, THEMES[kind]] as const,
      ),
  };
  await page.goto(`${ORIGIN}/`);
  await harness.theme(theme);
  await page.locator("main h1").waitFor();
  return harness;
}

const htmlOf = (theme: ThemeKind): string => `<!DOCTYPE html>
<html lang="en"><head><meta charset="utf-8"><title>Response sheet</title>
<link rel="stylesheet" href="/sheet.css"></head>
<body class="${theme}" data-vscode-theme-kind="${theme}">
<script nonce="${NONCE}" src="/api.js"></script><script nonce="${NONCE}" src="/sheet.js"></script></body></html>`;

/** What the editor offers to a webview, as far as the page uses it. */
const apiOf = (state: unknown): string => `
window.kept = ${JSON.stringify(state ?? null)};
window.acquireVsCodeApi = () => ({
  postMessage: (message) => void window.toHost(message),
  getState: () => window.kept ?? undefined,
  setState: (state) => { window.kept = state; },
});`;
