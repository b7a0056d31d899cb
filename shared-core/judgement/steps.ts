/**
 * Long work as steps. At each `yield` it hands control back and is told whether to end with what is there: who
 * runs it may look at other things in between, however deep in the work it stands.
 */
export type Steps<T> = Generator<undefined, T, boolean>;

/** Runs the steps one behind the other. Once `cancelled` has answered true, it is not asked again. */
export function finish<T>(steps: Steps<T>, cancelled: () => boolean): T {
  let stop = false;
  for (;;) {
    const step = steps.next(stop);
    if (step.done) return step.value;
    stop ||= cancelled();
  }
}
