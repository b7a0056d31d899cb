/** Resolves after what waits to be handled has had its turn. */
export function nextTurn(): Promise<void> {
  return new Promise((done) => later(done));
}

type Later = (run: () => void) => void;

/** A timer of 0 ms is held back by browsers to 4 ms and more; a message to oneself is not. */
const later: Later = ((): Later => {
  const { setImmediate: immediate } = globalThis as { setImmediate?: Later };
  if (immediate) return (run) => void immediate(run);
  const { port1, port2 } = new MessageChannel();
  const waiting: (() => void)[] = [];
  port1.onmessage = () => waiting.shift()?.();
  return (run) => {
    waiting.push(run);
    port2.postMessage(0);
  };
})();
