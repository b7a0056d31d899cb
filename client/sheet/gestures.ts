import type { Part } from "./plot-layout.ts";
import { between, panned, WHOLE, zoomed } from "./plot-zoom.ts";

export interface GestureHost {
  readonly part: Part;
  setPart(part: Part): void;
  /** Share of the shown axis under a pixel; outside 0 to 1 beside it. */
  shareAt(clientX: number): number;
  /** The pointer stands there; undefined: it has left. */
  point(share: number | undefined): void;
  /** What would be shown when the pointer were let go; undefined: nothing. */
  frame(range: readonly [number, number] | undefined): void;
  /** A click stands there. */
  pick?(share: number): void;
}

/** A wheel notch of 100 pixels zooms by about a fifth; chosen by trial. */
const WHEEL = 0.002;
/** A shorter drag is a click, in shares of the axis. */
const CLICK = 0.01;

/**
 * Mouse and touch on a plot: drag frames a part, Shift drags it along, two fingers or Ctrl and wheel zoom.
 * @param active false: what stands there now is no plot
 */
export function followGestures(
  target: HTMLElement,
  host: GestureHost,
  active: () => boolean = () => true,
): void {
  const touches = new Map<number, number>();
  let drag: { readonly from: number; readonly pans: boolean; last: number } | undefined;

  target.addEventListener("pointerdown", (event) => {
    const share = host.shareAt(event.clientX);
    if (!active() || (event.button !== 0 && event.button !== 1)) return;
    if (event.pointerType === "touch") touches.set(event.pointerId, event.clientX);
    target.setPointerCapture(event.pointerId);
    const pans = event.shiftKey || event.button === 1 || event.pointerType === "touch";
    drag = { from: share, pans, last: event.clientX };
  });
  target.addEventListener("pointermove", (event) => {
    if (!active()) return;
    if (touches.size === 2 && touches.has(event.pointerId)) return pinch(event);
    const share = host.shareAt(event.clientX);
    if (drag === undefined) return host.point(share);
    if (drag.pans) {
      const by = host.shareAt(drag.last) - share;
      drag.last = event.clientX;
      host.setPart(panned(host.part, by));
      if (event.pointerType === "touch") host.point(share);
    } else host.frame([drag.from, share]);
  });
  const end = (event: PointerEvent, accepts: boolean) => {
    touches.delete(event.pointerId);
    host.frame(undefined);
    if (drag === undefined) return;
    const { from, pans } = drag;
    drag = undefined;
    const to = host.shareAt(event.clientX);
    if (accepts && Math.abs(to - from) < CLICK) host.pick?.(to);
    if (!accepts || pans || Math.abs(to - from) < CLICK) return host.point(to);
    const part = between(host.part, from, to);
    if (part) host.setPart(part);
  };
  target.addEventListener("pointerup", (event) => end(event, true));
  target.addEventListener("pointercancel", (event) => end(event, false));
  target.addEventListener("pointerleave", () => drag === undefined && host.point(undefined));
  target.addEventListener("dblclick", () => active() && host.setPart(WHOLE));
  target.addEventListener("wheel", (event) => wheel(event), { passive: false });

  function pinch(event: PointerEvent): void {
    const [other] = [...touches].filter(([id]) => id !== event.pointerId).map(([, x]) => x);
    const before = Math.abs((touches.get(event.pointerId) as number) - other);
    const now = Math.abs(event.clientX - other);
    touches.set(event.pointerId, event.clientX);
    if (now > 1 && before > 1)
      host.setPart(zoomed(host.part, host.shareAt((event.clientX + other) / 2), before / now));
  }

  /** The plain wheel scrolls the page, as it does everywhere else. */
  function wheel(event: WheelEvent): void {
    if (!active()) return;
    if (event.ctrlKey || event.metaKey) {
      const about = Math.max(0, Math.min(1, host.shareAt(event.clientX)));
      host.setPart(zoomed(host.part, about, Math.exp(WHEEL * event.deltaY)));
    } else if (Math.abs(event.deltaX) > Math.abs(event.deltaY) || event.shiftKey) {
      const by = (event.deltaX || event.deltaY) * WHEEL * 0.5;
      host.setPart(panned(host.part, by));
    } else return;
    event.preventDefault();
  }
}
