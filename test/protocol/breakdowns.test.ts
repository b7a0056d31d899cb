/** The thread that computes may break down or hang: it is started anew, and what broke it is not tried again. */

import { afterEach, describe, expect, it } from "vitest";
import { TextDocument } from "vscode-languageserver-textdocument";
import type { Engine, FromEngine, ToEngine } from "../../server/engine.ts";
import { ThreadEngine } from "../../server/engine-thread.ts";
import { Schedule } from "../../server/schedule.ts";
import { Session } from "../../server/session.ts";
import { DEFAULTS } from "../../server/settings.ts";
import { Sources } from "../../server/sources.ts";

/** A thread that says what it was told, and breaks when it is told to judge a model called so. */
const SCRIPT = `
import { parentPort } from "node:worker_threads";
parentPort.on("message", (message) => {
  parentPort.postMessage({ say: "seen", count: 1 });
  if (message.say !== "judge") return;
  parentPort.postMessage({ say: "started", uri: message.uri, serial: message.serial });
  if (message.uri === "breaks") throw new Error("broken on purpose");
  if (message.uri === "ends") process.exit(3);
  parentPort.postMessage({ say: "stopped", uri: message.uri, serial: message.serial });
});
`;

const judge = (uri: string): ToEngine => ({ say: "judge", uri, serial: 1, open: true });

describe("a thread", () => {
  let engine: ThreadEngine;
  afterEach(() => engine.end());

  it.each([
    ["breaks", "broken on purpose"],
    ["ends", "it ended with 3"],
  ])("that %s is started anew, and what it was at is named", async (uri, why) => {
    engine = new ThreadEngine(new URL(`data:text/javascript,${encodeURIComponent(SCRIPT)}`));
    const heard: FromEngine[] = [];
    const next = (say: FromEngine["say"]) =>
      new Promise<FromEngine>((done) => {
        engine.onSaid = (message) => {
          heard.push(message);
          if (message.say === say) done(message);
        };
      });
    const restarted = next("restarted");
    engine.tell(judge(uri));
    expect(await restarted).toMatchObject({ uri, error: expect.stringContaining(why) });
    const stopped = next("stopped");
    engine.tell(judge("sound"));
    expect(await stopped).toMatchObject({ uri: "sound" });
  });
});

describe("the schedule", () => {
  it("tells a new thread everything again, and judges all but what broke the last one", async () => {
    const told: ToEngine[] = [];
    const engine: Engine = { tell: (message) => told.push(message), onSaid: () => {}, end: () => {} };
    const logged: string[] = [];
    const sources = new Sources(() => undefined, undefined, undefined);
    const schedule = new Schedule({
      sources,
      startEngine: () => engine,
      settingsOf: () => ({ ...DEFAULTS, delay: 0 }),
      changed: () => {},
      busy: () => {},
      log: (text) => logged.push(text),
    });
    const text = "thrum 1\nmass drum = 8 kg\nspring s between drum and ground = 5 N/mm\n";
    const open = (name: string) => {
      const uri = `file:///works/${name}.thrum`;
      const document = TextDocument.create(uri, "thrum", 1, text);
      const session = new Session(document, { folder: "file:///works", file: `${name}.thrum` });
      schedule.open(session);
      schedule.current(session);
      return session;
    };
    const [bad, good] = [open("bad"), open("good")];
    const settled = bad.settled();
    const question = schedule.ask(good, "hover", 10);
    await Promise.resolve();
    told.length = 0;
    engine.onSaid({ say: "restarted", uri: bad.uri, error: "out of memory" });
    expect(told.map(({ say, ...rest }) => [say, "uri" in rest && rest.uri])).toEqual([
      ["text", bad.uri],
      ["text", good.uri],
      ["judge", good.uri],
    ]);
    expect([bad.numbers, good.numbers]).toEqual(["stopped", "awaited"]);
    // Nobody waits for what will never come.
    await settled;
    expect(await question).toBeUndefined();
    expect(logged).toEqual([expect.stringContaining("out of memory")]);
    schedule.end();
  });
});
