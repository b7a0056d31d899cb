/** Path data moved to (`x`, `y`); `lying`: turned a quarter first, so that what stood above stands at the left. */
export function placedPath(path: string, x: number, y: number, isLying = false): string {
  const out: string[] = [];
  let [atX, atY] = [0, 0];
  const put = (px: number, py: number): string =>
    isLying ? `${round(x + py)},${round(y - px)}` : `${round(x + px)},${round(y + py)}`;
  for (const [, command, text] of path.matchAll(/([A-Za-z])([^A-Za-z]*)/g)) {
    const numbers = (text.match(/-?[\d.]+/g) ?? []).map(Number);
    const absolute = command === command.toUpperCase();
    const [fromX, fromY] = absolute ? [0, 0] : [atX, atY];
    const kind = command.toUpperCase();
    const size = SIZES[kind] ?? 0;
    if (size === 0) out.push(command);
    for (let i = 0; size > 0 && i + size <= numbers.length; i += size) {
      const part = numbers.slice(i, i + size);
      if (kind === "H" || kind === "V") {
        if (kind === "H") atX = fromX + part[0];
        else atY = fromY + part[0];
        out.push(`L${put(atX, atY)}`);
        continue;
      }
      const points: string[] = [];
      for (let k = kind === "A" ? 5 : 0; k < size; k += 2) {
        [atX, atY] = [fromX + part[k], fromY + part[k + 1]];
        points.push(put(atX, atY));
      }
      // Arcs here are parts of circles: a turn leaves their radius alone.
      out.push(kind === "A" ? `A${part.slice(0, 5).join(" ")} ${points[0]}` : kind + points.join(" "));
    }
  }
  return out.join("");
}

const SIZES: Readonly<Record<string, number>> = { M: 2, L: 2, H: 1, V: 1, C: 6, S: 4, Q: 4, A: 7 };

export const round = (value: number): number => Math.round(value * 10) / 10;

export const rectangle = (x: number, y: number, width: number, height: number, corner = 0): string => {
  const [right, bottom] = [round(x + width), round(y + height)];
  const [left, top, r] = [round(x), round(y), Math.min(corner, width / 2, height / 2)];
  if (r === 0) return `M${left},${top}H${right}V${bottom}H${left}Z`;
  const [a, b, c, d] = [round(left + r), round(right - r), round(top + r), round(bottom - r)];
  return `M${a},${top}H${b}A${r} ${r} 0 0 1 ${right},${c}V${d}A${r} ${r} 0 0 1 ${b},${bottom}H${a}A${r} ${r} 0 0 1 ${left},${d}V${c}A${r} ${r} 0 0 1 ${a},${top}Z`;
};

export const circle = (x: number, y: number, r: number): string =>
  `M${round(x - r)},${round(y)}a${r},${r} 0 1 0 ${2 * r},0a${r},${r} 0 1 0 ${-2 * r},0Z`;

/** A line with strokes under it: what stands still. */
export function hatched(from: number, to: number, y: number): { line: string; strokes: string } {
  const strokes: string[] = [];
  for (let x = from + 5; x <= to + 0.01; x += 6) strokes.push(`M${round(x)},${round(y)}l-5,6`);
  return { line: `M${round(from)},${round(y)}H${round(to)}`, strokes: strokes.join("") };
}
