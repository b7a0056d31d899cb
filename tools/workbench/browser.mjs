/** A Chromium of the system, driven by playwright-core. THRUM_BROWSER names another one. */
import { existsSync } from "node:fs";
import { chromium } from "playwright-core";

const USUAL = ["/usr/bin/chromium", "/usr/bin/chromium-browser", "/usr/bin/google-chrome"];

/** @param {import("playwright-core").LaunchOptions} [options] */
export function openBrowser(options = {}) {
  const program = process.env.THRUM_BROWSER ?? USUAL.find((path) => existsSync(path));
  if (!program) throw new Error("No Chromium found: apt-get install -y chromium, or set THRUM_BROWSER");
  return chromium.launch({
    executablePath: program,
    args: [
      "--no-sandbox",
      "--disable-gpu",
      "--disable-quic",
      "--no-first-run",
      "--disable-background-networking",
      "--disable-component-update",
      "--disable-sync",
    ],
    ...options,
  });
}
