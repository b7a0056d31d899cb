/** Builds everything that ships into dist/. */
import { spawnSync } from "node:child_process";
import { readdirSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { basename, join } from "node:path";
import { fileURLToPath } from "node:url";
import { ensureInstalled } from "./install.mjs";
import { root } from "./root.mjs";

/** An extension host loads CommonJS and hands out `vscode` itself. */
const EXTENSION = {
  target: "es2022",
  format: "cjs",
  outExtension: { ".js": ".cjs" },
  external: ["vscode"],
  mainFields: ["module", "main"],
};

const REQUIRE = 'import{createRequire}from"node:module";const require=createRequire(import.meta.url);';

/** Node starts a CommonJS program sooner, and can be handed its compiled form. */
const TERMINAL = { outdir: "dist/terminal", platform: "node", target: "node20", format: "cjs" };

/** Bundles that the terminal program loads only when it needs them, by the end of the path of their source. */
const RARE = { units: "shared-core/units/mathjs.ts", patterns: "client/terminal/patterns.ts" };

/** What ships: one entry a program. */
const PROGRAMS = [
  { ...TERMINAL, entryPoints: { thrum: "client/terminal/main.ts", load: "client/terminal/load.ts" } },
  {
    ...TERMINAL,
    entryPoints: { program: "client/terminal/program.ts" },
    outExtension: { ".js": ".cjs" },
    supported: { "dynamic-import": false },
    banner: { js: "(function(require,module,exports){" },
    footer: { js: "})" },
    plugins: [rareBeside()],
  },
  {
    ...TERMINAL,
    entryPoints: RARE,
    outExtension: { ".js": ".cjs" },
    define: { "import.meta.url": "__filename" },
  },
  {
    entryPoints: { core: "server/core.ts" },
    outdir: "dist/server",
    platform: "browser",
    target: "es2022",
    format: "iife",
    globalName: "thrumCore",
    outExtension: { ".js": ".cjs" },
    footer: { js: 'if(typeof module==="object")module.exports=thrumCore;' },
    plugins: [partsOfMathjs()],
  },
  {
    entryPoints: { main: "server/main.ts", thread: "server/thread.ts" },
    outdir: "dist/server",
    platform: "node",
    target: "node20",
    format: "esm",
    // The protocol's library is CommonJS, and asks for parts of Node as such.
    banner: { js: REQUIRE },
    plugins: [coreBeside()],
  },
  {
    entryPoints: [
      { in: "client/sheet/main.ts", out: "sheet" },
      { in: "client/sheet/sheet.css", out: "sheet" },
    ],
    outdir: "dist/sheet",
    platform: "browser",
    target: "es2022",
    format: "iife",
  },
  {
    entryPoints: { main: "client/extension/node/main.ts" },
    outdir: "dist/extension",
    platform: "node",
    ...EXTENSION,
  },
  {
    entryPoints: { browser: "client/extension/browser/main.ts" },
    outdir: "dist/extension-browser",
    platform: "browser",
    ...EXTENSION,
    // A browser's extension host knows no other ending.
    outExtension: {},
  },
];

function rareBeside() {
  return {
    name: "rare beside",
    setup({ onResolve }) {
      for (const [name, source] of Object.entries(RARE)) {
        const filter = new RegExp(`/${basename(source).replace(".", "\\.")}$`);
        onResolve({ filter }, ({ kind }) =>
          kind === "dynamic-import" ? { path: `./${name}.cjs`, external: true } : undefined,
        );
      }
    },
  };
}

/** The core stands once in the package: a server on Node takes it from the program that browsers run. */
function coreBeside() {
  return {
    name: "core beside",
    setup(bundle) {
      const outside = { path: "core", namespace: "core" };
      bundle.onResolve({ filter: /shared-core\/index\.ts$/ }, () => outside);
      bundle.onLoad({ filter: /./, namespace: "core" }, () => ({
        contents: 'module.exports = require("./core.cjs");',
      }));
      bundle.onResolve({ filter: /^\.\/core\.cjs$/ }, ({ path }) => ({ path, external: true }));
    },
  };
}

/** Where nothing is loaded later, a module that would be is taken whole; made first, it has only what is used. */
function partsOfMathjs() {
  return {
    name: "parts of mathjs",
    setup({ onLoad, esbuild }) {
      onLoad({ filter: /units[\\/]mathjs\.ts$/ }, async ({ path }) => {
        const options = { ...COMMON, entryPoints: [path], format: "esm", write: false };
        const { outputFiles } = await esbuild.build(options);
        return { contents: outputFiles[0].text, loader: "js" };
      });
    },
  };
}

const COMMON = { bundle: true, minify: true, legalComments: "none", logLevel: "warning" };

/**
 * Builds all programs; throws when one does not build. What stood there is replaced at once and only by something
 * whole, for others may be running it.
 * @param {string} [into]  folder whose dist/ is written
 */
export async function build(into = root) {
  ensureInstalled("build");
  const esbuild = await import("esbuild");
  const fresh = join(into, "dist", `.fresh-${process.pid}`);
  try {
    for (const program of PROGRAMS) {
      const outdir = join(fresh, basename(program.outdir));
      await esbuild.build({ absWorkingDir: root, ...COMMON, ...program, outdir });
    }
    finishTerminal(join(fresh, basename(TERMINAL.outdir)));
    for (const name of readdirSync(fresh)) {
      rmSync(join(into, "dist", name), { recursive: true, force: true });
      renameSync(join(fresh, name), join(into, "dist", name));
    }
  } finally {
    rmSync(fresh, { recursive: true, force: true });
  }
}

/** Says that its files are CommonJS, and compiles them: without that they run as well, only later. */
function finishTerminal(folder) {
  writeFileSync(join(folder, "package.json"), '{ "type": "commonjs" }\n');
  const { status } = spawnSync(process.execPath, [join(root, "tools/compile.mjs"), folder], {
    stdio: "inherit",
  });
  if (status !== 0) throw new Error("the terminal program could not be compiled");
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  await build().catch(() => process.exit(1));
}
