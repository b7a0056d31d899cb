import { performance } from "node:perf_hooks";
import { type FileReader, judge, NEW_MODELS, newModel, understand } from "../shared-core/index.ts";

/** Work after which the engine has compiled what a text of a thousand lines runs through, in ms; found by trial. */
const ENOUGH = 300;
/** Longest work at one go, in ms: whoever asks something meanwhile hardly waits. */
const SLICE = 8;
/** How often it is tried, in ms. */
const EVERY = 25;
/** Share of that time with other work, above which it is left for later. */
const BUSY = 0.1;

/**
 * Runs through small models while nothing else is to be done, so that keystrokes are answered by compiled code: the
 * first ones take five times as long without.
 */
export function warmUp(): void {
  const work = models();
  let spent = 0;
  let before = performance.eventLoopUtilization();
  const timer = setInterval(() => {
    const { utilization } = performance.eventLoopUtilization(before);
    const start = performance.now();
    while (utilization < BUSY && performance.now() - start < SLICE) work.next();
    spent += performance.now() - start;
    if (spent > ENOUGH) clearInterval(timer);
    before = performance.eventLoopUtilization();
  }, EVERY).unref();
}

/** Without end. */
function* models(): Generator<void> {
  for (;;) {
    for (const { kind } of NEW_MODELS) {
      const model = understand("warm-up.thrum", newModel(kind), NO_FILES);
      yield;
      judge(model, { upTo: "text" });
      yield;
    }
  }
}

const NO_FILES: FileReader = { read: () => ({ ok: false, why: "missing", detail: "" }) };
