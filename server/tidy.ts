import { performance } from "node:perf_hooks";
import { getHeapStatistics, setFlagsFromString } from "node:v8";
import { runInNewContext } from "node:vm";

/** How often a thread looks whether it has something to give back, in ms. */
const EVERY = 4000;
/** Share of the time in which it did something, below which it counts as idle. */
const IDLE = 0.02;
/** Growth of the heap since it was last tidied that is worth the tens of milliseconds, in bytes. */
const WORTH = 6 * 2 ** 20;
/** The same while there is work, so that a long run does not pile up. */
const WORTH_BUSY = 40 * 2 ** 20;

/**
 * Gives memory back while nothing is done. The engine itself waits for its next need of memory, which in an editor
 * may come hours later: judging 500 models leaves garbage behind that is twice as large as all that is kept.
 */
export function tidyWhenIdle(): void {
  const collect = collector();
  if (collect === undefined) return;
  let before = performance.eventLoopUtilization();
  let kept = 0;
  setInterval(() => {
    const now = performance.eventLoopUtilization();
    const { utilization } = performance.eventLoopUtilization(now, before);
    before = now;
    const worth = utilization > IDLE ? WORTH_BUSY : WORTH;
    if (getHeapStatistics().used_heap_size < kept + worth) return;
    // The second time gives the emptied pages back.
    collect();
    collect();
    kept = getHeapStatistics().used_heap_size;
    before = performance.eventLoopUtilization();
  }, EVERY).unref();
}

/** The engine's own collector; undefined where it is not given out. */
function collector(): (() => void) | undefined {
  setFlagsFromString("--expose-gc");
  const collect: unknown = runInNewContext("typeof gc === 'function' ? gc : undefined");
  return typeof collect === "function" ? (collect as () => void) : undefined;
}
