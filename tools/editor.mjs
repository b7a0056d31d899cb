/** `npm run editor [-- FOLDER]`: a real workbench with the extension on examples/, at a local address. */
import { resolve } from "node:path";
import { ensureInstalled } from "./install.mjs";
import { root } from "./root.mjs";

ensureInstalled();
const { packExtension } = await import("./package.mjs");
const { launchWorkbench } = await import("./workbench/launch.mjs");

const folder = resolve(process.argv[2] ?? `${root}/examples`);
const workbench = await launchWorkbench({ folder, vsix: [await packExtension()], port: 8931 });
console.log(`The editor is open at ${workbench.url}`);
console.log("Ctrl+C ends it.");
for (const signal of ["SIGINT", "SIGTERM"]) {
  process.on(signal, () => {
    workbench.stop();
    process.exit(0);
  });
}
setInterval(() => undefined, 60_000);
