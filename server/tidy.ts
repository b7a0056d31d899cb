import { type EventLoopUtilization, performance } from "node:perf_hooks";
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

/** Between two keystrokes lies less than this, in ms: who types is not to wait for it. */
const CALM = 600;
/** How often it waits for calm before it is done all the same. */
const MOST_POSTPONED = 5;

/**
 * Gives memory back while nothing is done. The engine itself waits for its next need of memory, which in an editor
 * may come hours later: judging 500 models leaves garbage behind that is twice as large as all that is kept.
 */
export function tidyWhenIdle(): void {
  const collect = collector();
  if (collect === undefined) return;
  let before = performance.eventLoopUtilization();
  let kept = 0;
  let postponed = 0;
  const tidy = (): void => {
    // The second time gives the emptied pages back.
    collect();
    collect();
    kept = getHeapStatistics().used_heap_size;
    postponed = 0;
    before = performance.eventLoopUtilization();
  };
  setInterval(() => {
    const now = performance.eventLoopUtilization();
    const { utilization } = performance.eventLoopUtilization(now, before);
    before = now;
    const idle = utilization <= IDLE;
    if (getHeapStatistics().used_heap_size < kept + (idle ? WORTH : WORTH_BUSY)) return;
    if (idle || ++postponed > MOST_POSTPONED) tidy();
    else setTimeout(() => isCalm(now) && tidy(), CALM).unref();
  }, EVERY).unref();
}

/** Nobody types just now. */
const isCalm = (since: EventLoopUtilization): boolean =>
  performance.eventLoopUtilization(since).utilization <= IDLE;

/** The engine's own collector; undefined where it is not given out. */
function collector(): (() => void) | undefined {
  setFlagsFromString("--expose-gc");
  const collect: unknown = runInNewContext("typeof gc === 'function' ? gc : undefined");
  return typeof collect === "function" ? (collect as () => void) : undefined;
}
