/** Starts and ends a workbench of its own: fresh user data, fresh extensions, one port. */
import { spawn, spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { ensureWorkbench, workbenchProgram } from "./install.mjs";

/**
 * @typedef {object} LaunchOptions
 * @property {string} folder  the folder to open
 * @property {string[]} vsix  packaged extensions to install
 * @property {Record<string, unknown>} [settings]  user settings
 * @property {boolean} [trust]  false: the workspace-trust dialog is left on
 * @property {number} [port]
 */

/**
 * @param {LaunchOptions} options
 * @returns {Promise<{url: string, userData: string, extensions: string, stop(): void}>}
 */
export async function launchWorkbench(options) {
  ensureWorkbench();
  const home = mkdtempSync(join(tmpdir(), "thrum-workbench-"));
  const [userData, extensions] = [join(home, "user"), join(home, "extensions")];
  mkdirSync(join(userData, "User"), { recursive: true });
  mkdirSync(extensions);
  writeSettings(userData, options.settings ?? {});
  const folders = ["--extensions-dir", extensions, "--user-data-dir", userData];
  for (const vsix of options.vsix) install(vsix, folders);
  const port = options.port ?? (await freePort());
  const args = [
    "--auth",
    "none",
    "--bind-addr",
    `127.0.0.1:${port}`,
    "--disable-telemetry",
    "--disable-update-check",
  ];
  if (options.trust !== false) args.push("--disable-workspace-trust");
  // A process group of its own: the launcher alone would leave its children running.
  const child = spawn(process.execPath, [workbenchProgram, ...folders, ...args, options.folder], {
    detached: true,
    stdio: "ignore",
    env: { ...process.env, VSCODE_PROXY_URI: "" },
  });
  const stop = () => {
    try {
      process.kill(-child.pid, "SIGKILL");
    } catch {
      // It has ended already.
    }
    rmSync(home, { recursive: true, force: true, maxRetries: 5 });
  };
  const url = `http://127.0.0.1:${port}`;
  try {
    await answering(`${url}/healthz`);
  } catch (error) {
    stop();
    throw error;
  }
  return { url: `${url}/?folder=${encodeURIComponent(options.folder)}`, userData, extensions, stop };
}

/** Settings that keep the first screen free of what has nothing to do with the test. */
export function writeSettings(userData, settings) {
  const quiet = {
    "workbench.startupEditor": "none",
    "workbench.tips.enabled": false,
    "chat.commandCenter.enabled": false,
    "workbench.secondarySideBar.defaultVisibility": "hidden",
    "git.openRepositoryInParentFolders": "never",
    "extensions.ignoreRecommendations": true,
    "window.commandCenter": false,
    "editor.accessibilitySupport": "off",
  };
  writeFileSync(join(userData, "User", "settings.json"), JSON.stringify({ ...quiet, ...settings }, null, 2));
}

function install(vsix, folders) {
  const run = spawnSync(process.execPath, [workbenchProgram, ...folders, "--install-extension", vsix], {
    encoding: "utf8",
  });
  if (run.status !== 0) throw new Error(`The extension did not install:\n${run.stdout}\n${run.stderr}`);
}

function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.on("error", reject);
    probe.listen(0, "127.0.0.1", () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

async function answering(url) {
  for (let i = 0; i < 120; i++) {
    try {
      if ((await fetch(url)).ok) return;
    } catch {
      // Not up yet.
    }
    await new Promise((resolve) => setTimeout(resolve, 250));
  }
  throw new Error(`The workbench did not answer at ${url} within 30 s`);
}
