/**
 * Small plots for a terminal, in braille: each character holds 2 x 4 dots. Between neighbouring columns the
 * curve is joined; within a column every sample between its lowest and highest is covered, so that a resonance
 * narrower than a dot still stands at its full height.
 */
import { keepExtremes } from "./decimate.ts";
import type { Scale } from "./scales.ts";

export interface PlotCurve {
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
}

export interface PlotFrame {
  readonly x: Scale;
  readonly y: Scale;
  /** Characters of the whole plot, labels included. */
  readonly width: number;
  /** Lines of the plot, the axis below not counted. */
  readonly height: number;
  /** Stands at the right end below the axis: `Hz`. */
  readonly xUnit: string;
}

/** Lines of text, without line endings and without trailing blanks. */
export function terminalPlot(curve: PlotCurve, frame: PlotFrame): string[] {
  const yTicks = rowLabels(frame);
  const margin = Math.max(0, ...[...yTicks.values()].map((label) => label.length)) + 1;
  const columns = Math.max(10, frame.width - margin - 1);
  const cells = drawCurve(curve, frame, columns);
  const lines = cells.map((row, i) => {
    const label = yTicks.get(i);
    return `${(label ?? "").padStart(margin)}${label === undefined ? "│" : "┤"}${row}`.trimEnd();
  });
  return [...lines, ...axisBelow(frame, columns, margin)];
}

const DOTS_X = 2;
const DOTS_Y = 4;
const BRAILLE = 0x2800;
/** Bits of the dots of a braille cell by [row][column], as Unicode numbers them. */
const BITS = [
  [0x01, 0x08],
  [0x02, 0x10],
  [0x04, 0x20],
  [0x40, 0x80],
] as const;

function rowLabels({ y, height }: PlotFrame): Map<number, string> {
  const labels = new Map<number, string>();
  for (const tick of y.ticks(Math.max(3, Math.floor(height * 0.6)))) {
    const row = Math.min(height - 1, Math.floor((1 - y.place(tick.value)) * height));
    if (row >= 0 && !labels.has(row)) labels.set(row, tick.label);
  }
  return labels;
}

function drawCurve(curve: PlotCurve, { x, y, height }: PlotFrame, columns: number): string[] {
  const width = columns * DOTS_X;
  const tall = height * DOTS_Y;
  const dots = new Uint8Array(columns * height);
  const mark = (column: number, row: number): void => {
    const cell = Math.floor(row / DOTS_Y) * columns + Math.floor(column / DOTS_X);
    dots[cell] |= BITS[row % DOTS_Y][column % DOTS_X];
  };
  const heights = Float64Array.from(curve.y, (value) => y.place(value));
  const dot = (share: number, size: number) => Math.max(0, Math.min(size - 1, Math.floor(share * size)));
  let before: readonly [number, number] | undefined;
  for (const i of keepExtremes((index) => x.place(curve.x[index]) * width, heights, width)) {
    if (!Number.isFinite(heights[i])) {
      before = undefined;
      continue;
    }
    const column = dot(x.place(curve.x[i]), width);
    const row = dot(1 - heights[i], tall);
    join(before ?? [column, row], [column, row], mark);
    before = [column, row];
  }
  return Array.from({ length: height }, (_, row) =>
    Array.from(dots.subarray(row * columns, (row + 1) * columns), (bits) =>
      bits === 0 ? " " : String.fromCharCode(BRAILLE + bits),
    ).join(""),
  );
}

/** Marks the dots of a straight line between two dots. */
function join(
  [fromColumn, fromRow]: readonly [number, number],
  [toColumn, toRow]: readonly [number, number],
  mark: (column: number, row: number) => void,
): void {
  const steps = Math.max(Math.abs(toColumn - fromColumn), Math.abs(toRow - fromRow), 1);
  for (let step = 0; step <= steps; step++) {
    const share = step / steps;
    mark(
      Math.round(fromColumn + (toColumn - fromColumn) * share),
      Math.round(fromRow + (toRow - fromRow) * share),
    );
  }
}

function axisBelow({ x, xUnit }: PlotFrame, columns: number, margin: number): [string, string] {
  const line = Array.from({ length: columns }, () => "─");
  const labels = Array.from({ length: margin + 1 + columns }, () => " ");
  let free = 0;
  const unitStart = labels.length - xUnit.length;
  for (const tick of x.ticks(Math.max(2, Math.floor(columns / 8)))) {
    const column = Math.min(columns - 1, Math.floor(x.place(tick.value) * columns));
    line[column] = "┬";
    const start = Math.max(0, margin + 1 + column - Math.floor(tick.label.length / 2));
    if (start < free || start + tick.label.length >= unitStart) continue;
    labels.splice(start, tick.label.length, ...tick.label);
    free = start + tick.label.length + 1;
  }
  labels.splice(unitStart, xUnit.length, ...xUnit);
  return [`${" ".repeat(margin)}└${line.join("")}`, labels.join("").trimEnd()];
}
