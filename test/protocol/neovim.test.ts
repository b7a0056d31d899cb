import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, realpathSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, expect, it } from "vitest";
import { format } from "../../shared-core/index.ts";
import { read, root } from "../house/files.ts";

/** sqrt(5400/8)/(2 pi) = 4.135 Hz, more than the expectation allows. */
const DRUM = `thrum 1
title "Winch µ ° ² 𐐀"
let drum_mass = 8 kg  # 𐐀
let stiff=5.4 N/mm
mass drum = drum_mass
mass 𐐀plate = 2 lbf  # 𐐀
spring feet between drum and ground = stiff
spring foot between 𐐀plate and ground = 60 N/mm
expect soft = natural_frequency(1) <= 4 Hz
`;

interface Found {
  readonly pushed: boolean;
  readonly diagnostics: readonly { code: string; words: string; message: string }[];
  readonly action: string;
  readonly cured: boolean;
  readonly judged: boolean;
  readonly after: readonly { code: string; words: string; message: string }[];
  readonly hover: string;
  readonly completion: readonly string[];
  readonly renamed: string;
  readonly formatted: string;
  readonly failed?: string;
}

let folder = "";
beforeEach(() => {
  folder = realpathSync(mkdtempSync(join(tmpdir(), "thrum-neovim-")));
  writeFileSync(join(folder, "drum.thrum"), DRUM);
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

/** Without anybody's settings, and without leaving anything behind. */
function neovim(script: string, env: Record<string, string>) {
  return spawnSync("nvim", ["--headless", "-u", "NONE", "-i", "NONE", "-n", "-c", `luafile ${script}`], {
    cwd: folder,
    encoding: "utf8",
    timeout: 120_000,
    env: { ...process.env, XDG_STATE_HOME: folder, XDG_CACHE_HOME: folder, XDG_DATA_HOME: folder, ...env },
  });
}

it("works in Neovim 0.7 as it comes: diagnostics, hover, completion, rename, formatting, code actions", () => {
  const result = join(folder, "found.json");
  const program = join(root, "dist/terminal/thrum.js");
  const test = [process.execPath, program, folder, result].join("\n");
  const run = neovim(join(root, "test/protocol/neovim.lua"), { THRUM_TEST: test });
  expect(run.status, `${run.error?.message ?? ""}${run.stderr}`).toBe(0);
  const found = JSON.parse(readFileSync(result, "utf8")) as Found;
  expect(found.failed).toBeUndefined();
  expect([found.pushed, found.cured, found.judged]).toEqual([true, true, true]);
  expect(found.diagnostics.find(({ code }) => code === "weight-as-mass")?.words).toBe("lbf");
  expect(found.action).toContain("lbm");
  expect(found.after).toEqual([
    expect.objectContaining({ code: "expectation-fails", words: "natural_frequency(1) <= 4 Hz" }),
  ]);
  expect(found.hover).toContain("4.135 Hz");
  // 8 kg / 0.45359237 kg/lbm (NIST SP 811): the units that the settings want.
  expect(found.hover).toContain("17.64 lbm");
  expect(found.completion).toContain("N/mm");
  const cured = DRUM.replace("2 lbf", "2 lbm");
  expect(found.renamed).toBe(cured.replaceAll("drum_mass", "load"));
  expect(found.formatted).toBe(format(found.renamed));
});

it("is set up as docs/editors.md says", () => {
  const [, setup] = /```lua\n(.*?)```/s.exec(read("docs/editors.md")) ?? [];
  const script = join(folder, "setup.lua");
  const said = join(folder, "said.txt");
  writeFileSync(
    script,
    `${setup}
vim.cmd("filetype on")
vim.cmd("edit drum.thrum")
local pushed = vim.wait(30000, function() return #vim.diagnostic.get(0) > 0 end, 20)
local file = assert(io.open("${said}", "w"))
file:write(pushed and vim.diagnostic.get(0)[1].code or "nothing")
file:close()
vim.cmd("qa!")
`,
  );
  const program = join(root, "dist/terminal/thrum.js");
  const command = join(folder, "thrum");
  writeFileSync(command, `#!/bin/sh\nexec "${process.execPath}" "${program}" "$@"\n`, { mode: 0o755 });
  const run = neovim(script, { PATH: `${folder}:${process.env.PATH}` });
  expect(run.status, run.stderr).toBe(0);
  expect(readFileSync(said, "utf8")).toBe("weight-as-mass");
});
