/** Calls back when an element gets another width, once a frame at most; not for a height that follows from it. */
export function widthOf(element: Element, changed: (width: number) => void): void {
  let width = -1;
  new ResizeObserver(([entry]) => {
    const now = Math.round(entry.contentRect.width);
    if (now === width || now === 0) return;
    width = now;
    requestAnimationFrame(() => changed(now));
  }).observe(element);
}
