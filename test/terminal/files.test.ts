import { mkdirSync, mkdtempSync, realpathSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { commandNamed, readCall } from "../../client/terminal/arguments.ts";
import { COMMANDS } from "../../client/terminal/commands.ts";
import { select } from "../../client/terminal/files.ts";
import { Changes } from "../../client/terminal/watch.ts";
import { workspaceReader } from "../../client/terminal/workspace.ts";
import { testHost } from "./host.ts";

let folder = "";
const at = (...parts: string[]) => join(folder, ...parts);

beforeAll(() => {
  folder = realpathSync(mkdtempSync(join(tmpdir(), "thrum-files-")));
  for (const each of ["work/.git", "work/models/deep", "work/node_modules/x", "outside"])
    mkdirSync(at(each), { recursive: true });
  const files = ["work/models/b.thrum", "work/models/deep/a.thrum", "work/kit.thrum", "outside/far.thrum"];
  for (const each of [...files, "work/node_modules/x/n.thrum", "work/models/notes.txt"])
    writeFileSync(at(each), `${each}\n`);
  writeFileSync(at("work/models/latin.thrum"), Buffer.from([0x6d, 0xfc, 0x0a]));
  writeFileSync(at("work/models/marked.thrum"), "\ufeffthrum 1\n");
  symlinkSync(at("outside/far.thrum"), at("work/models/link.thrum"));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function chosen(operands: string[], stdin?: string) {
  const host = testHost({ cwd: at("work"), stdin });
  const selection = await select(readCall(commandNamed("check", COMMANDS), operands, host));
  return { ...selection, paths: selection.sources.map((source) => source.path) };
}

describe("operands", () => {
  it("are files in their order, each once", async () => {
    const { paths } = await chosen(["models/deep/a.thrum", "kit.thrum", "./kit.thrum"]);
    expect(paths).toEqual(["models/deep/a.thrum", "kit.thrum"]);
  });

  it("are folders: every model below, in order, foreign folders left out", async () => {
    const { paths } = await chosen(["."]);
    expect(paths).toEqual([
      "kit.thrum",
      "models/b.thrum",
      "models/deep/a.thrum",
      "models/latin.thrum",
      "models/link.thrum",
      "models/marked.thrum",
    ]);
  });

  it("are patterns; one that matches nothing is told", async () => {
    const { paths, unmatched } = await chosen(["models/**/[ab].thrum", "nothing/*.thrum"]);
    expect(paths).toEqual(["models/b.thrum", "models/deep/a.thrum"]);
    expect(unmatched).toEqual(["nothing/*.thrum"]);
  });

  it("are standard input under the path it stands for", async () => {
    const { sources } = await chosen(["-", "--stdin-filename", "models/new.thrum"], "thrum 1\n");
    expect(sources).toEqual([
      { path: "models/new.thrum", content: { ok: true, text: "thrum 1\n" }, standardInput: true },
    ]);
  });

  it("that cannot be read say why", async () => {
    const { sources } = await chosen(["gone.thrum", "models/latin.thrum", "kit.thrum/x.thrum"]);
    expect(sources.map((source) => source.content)).toEqual([
      { ok: false, why: "missing", detail: "there is no such file" },
      { ok: false, why: "unreadable", detail: "it is not UTF-8 text" },
      { ok: false, why: "missing", detail: "there is no such file" },
    ]);
  });

  it("lose their byte order mark", async () => {
    const { sources } = await chosen(["models/marked.thrum"]);
    expect(sources[0].content).toEqual({ ok: true, text: "thrum 1\n" });
  });
});

describe("a model's reader", () => {
  const reader = () => workspaceReader("models/b.thrum", at("work"));

  it("reads inside the workspace, the nearest folder with .git", () => {
    expect(reader().read("kit.thrum")).toEqual({ ok: true, text: "work/kit.thrum\n" });
    expect(reader().read("models/../kit.thrum")).toMatchObject({ ok: true });
  });

  it("reads nothing outside, and follows links before it judges", () => {
    expect(reader().read("../outside/far.thrum")).toMatchObject({ ok: false, why: "outside" });
    expect(reader().read("models/link.thrum")).toMatchObject({ ok: false, why: "outside" });
    expect(reader().read("../outside/none.thrum")).toMatchObject({ ok: false, why: "outside" });
  });

  it("tells a missing file and a folder apart", () => {
    expect(reader().read("models/none.thrum")).toMatchObject({ ok: false, why: "missing" });
    expect(reader().read("models/deep")).toMatchObject({
      ok: false,
      why: "unreadable",
      detail: "it is a folder",
    });
  });
});

describe("watching", () => {
  it.each([false, true])("tells a change of a followed file (polling: %s)", async (polls) => {
    const path = at(`watched-${polls}.thrum`);
    writeFileSync(path, "a");
    const changes = new Changes(folder, { polls });
    changes.follow([path]);
    const next = changes.next();
    writeFileSync(path, "longer");
    await next;
    changes.end();
  });

  it("tells at once what changed while nobody waited", async () => {
    const path = at("early.thrum");
    writeFileSync(path, "a");
    const changes = new Changes(folder);
    changes.follow([path]);
    writeFileSync(path, "longer");
    await new Promise((done) => setTimeout(done, 400));
    await changes.next();
    changes.end();
  });
});
