import { spawnSync } from "node:child_process";
import { describe, expect, it } from "vitest";
import { DEFAULTS, readSettings } from "../../server/settings.ts";
import { TOKEN_MODIFIERS, TOKEN_TYPES } from "../../shared-core/index.ts";
import { projectFiles, read } from "../house/files.ts";
import { manifest, texts } from "./manifest.ts";

const { contributes } = manifest;
const settings = Object.entries(contributes.configuration.properties);
const client = projectFiles()
  .filter((file) => /^client\/extension\/.*\.ts$/.test(file))
  .map(read)
  .join("\n");

/** What the editor defines by itself (LSP specification 3.17, SemanticTokenTypes and SemanticTokenModifiers). */
const STANDARD = new Set(
  "keyword parameter function property number operator string comment definition readonly".split(" "),
);

/** `{ inlayHints: { values: false } }` of `thrum.inlayHints.values`, as clients send it. */
function sent(key: string, value: unknown): unknown {
  const [, area, name] = key.split(".");
  return { [area]: { [name]: value } };
}

const another = (value: unknown): unknown =>
  typeof value === "boolean" ? !value : typeof value === "number" ? value + 100 : "si";

describe("settings", () => {
  it("are few, have a scope and say what they do", () => {
    expect(settings.length).toBeGreaterThan(0);
    expect(settings.length).toBeLessThan(30);
    for (const [key, { scope, description }] of settings) {
      expect(key).toMatch(/^thrum\.[a-z][A-Za-z]*\.[a-z][A-Za-z]*$/);
      expect(scope, key).toBe("resource");
      expect(description, key).toMatch(/^%.+%$/);
    }
  });

  it("are each obeyed by the server", () => {
    for (const [key, { default: standard }] of settings) {
      expect(readSettings(sent(key, standard)), key).toEqual(DEFAULTS);
      expect(readSettings(sent(key, another(standard))), key).not.toEqual(DEFAULTS);
    }
  });

  it("hold all that the server reads", () => {
    const named = [...read("server/settings.ts").matchAll(/`(thrum\.\w+\.\w+)`/g)].map(([, key]) => key);
    expect(named.sort()).toEqual(settings.map(([key]) => key).sort());
    const changed = settings.map(([key, { default: standard }]) =>
      readSettings(sent(key, another(standard))),
    );
    const leaves = (value: object): unknown[] =>
      Object.values(value).flatMap((each) => (typeof each === "object" ? leaves(each) : [each]));
    const untouched = leaves(DEFAULTS).filter((value, i) =>
      changed.every((each) => leaves(each)[i] === value),
    );
    expect(untouched).toEqual([]);
  });
});

describe("commands", () => {
  const contributed = contributes.commands.map(({ command }) => command).sort();

  it("are those that the extension registers", () => {
    const registered = [...client.matchAll(/\badd\(\s*"(thrum\.\w+)"/g)].map(([, command]) => command);
    expect(registered.sort()).toEqual(contributed);
  });

  it("say a verb and a noun and show only where they make sense", () => {
    const palette = new Map(contributes.menus.commandPalette.map(({ command, when }) => [command, when]));
    for (const { command, title, category } of contributes.commands) {
      expect(category).toBe("Thrum");
      expect(texts[title.slice(1, -1)], command).toMatch(/^[A-Z][a-z]+ [A-Za-z ]+$/);
      if (command !== "thrum.newModel") expect(palette.get(command), command).toBeTruthy();
    }
  });

  it("are the only ones that menus and the client call", () => {
    const called = [...client.matchAll(/command: "(thrum\.\w+)"/g)].map(([, command]) => command);
    const shown = Object.values(contributes.menus).flatMap((menu) => menu.map(({ command }) => command));
    for (const command of [...called, ...shown]) expect(contributed).toContain(command);
  });

  it("take no key away from the editor", () => {
    expect(contributes.keybindings ?? []).toEqual([]);
  });
});

describe("texts", () => {
  it("are there for every key, and for no other", () => {
    const keys = [...read("package.json").matchAll(/"%([\w.]+)%"/g)].map(([, key]) => key);
    expect([...new Set(keys)].sort()).toEqual(Object.keys(texts).sort());
  });
});

describe("semantic tokens", () => {
  const { scopes } = contributes.semanticTokenScopes[0];

  it("have a scope each, for themes that do not know them", () => {
    expect(Object.keys(scopes).sort()).toEqual([...TOKEN_TYPES].sort());
    for (const [type, list] of Object.entries(scopes)) expect(list.length, type).toBeGreaterThan(0);
  });

  it("are contributed where the editor does not define them", () => {
    const own = (ids: readonly string[]) => ids.filter((id) => !STANDARD.has(id)).sort();
    expect(contributes.semanticTokenTypes.map(({ id }) => id).sort()).toEqual(own(TOKEN_TYPES));
    expect(contributes.semanticTokenModifiers.map(({ id }) => id).sort()).toEqual(own(TOKEN_MODIFIERS));
  });
});

describe("the language", () => {
  it("has a configuration and activates the extension", () => {
    expect(contributes.languages[0].configuration).toBe("./syntaxes/language-configuration.json");
    expect(manifest.activationEvents).toContain("onLanguage:thrum");
  });

  it("works in part without trust and in virtual folders", () => {
    for (const { supported } of Object.values(manifest.capabilities)) expect(supported).toBe("limited");
  });
});

describe("files that a script writes", () => {
  for (const script of ["make-grammar", "make-snippets", "make-l10n", "write-settings"]) {
    it(`are what tools/${script}.mjs would write`, () => {
      const run = spawnSync(process.execPath, [`tools/${script}.mjs`, "--check"], { encoding: "utf8" });
      expect(run.stderr).toBe("");
      expect(run.status).toBe(0);
    });
  }
});
