import { describe, expect, it } from "vitest";
import { type Matrix, partMatrix, poseOf, REACH } from "../../client/sheet/sway.ts";
import type { SceneAnchor, SheetMotion } from "../../shared-core/index.ts";

const apply = ([a, b, c, d, e, f]: Matrix, x: number, y: number) => [a * x + c * y + e, b * x + d * y + f];
const anchor = (x: number, y: number, ...sways: SceneAnchor["sways"]): SceneAnchor => ({ x, y, sways });
const up = (coordinate: number) => ({ coordinate, dx: 0, dy: -1, turn: 0, aboutX: 0, aboutY: 0 });

describe("the pose of a mode", () => {
  // Re((re + i im) e^{i phase}): a coordinate with im = -1 lags a quarter of a cycle behind one with re = 1.
  const mode: SheetMotion = {
    kind: "mode",
    id: "mode:1",
    label: "",
    re: Float64Array.of(1, 0),
    im: Float64Array.of(0, -1),
  };

  it("keeps the phase between coordinates", () => {
    for (const [at, first, second] of [
      [0, 1, 0],
      [0.25, 0, 1],
      [0.5, -1, 0],
      [0.75, 0, -1],
    ]) {
      const pose = poseOf(mode, 2, at);
      expect(pose[0]).toBeCloseTo(first, 12);
      expect(pose[1]).toBeCloseTo(second, 12);
    }
  });
});

describe("the pose of a history", () => {
  const history: SheetMotion = {
    kind: "history",
    id: "history:stop",
    label: "",
    frames: 3,
    stepS: 0.1,
    values: Float64Array.of(0, 0, 1, -1, 0.5, 0.5),
  };

  it("runs from frame to frame", () => {
    expect([...poseOf(history, 2, 0)]).toEqual([0, 0]);
    expect([...poseOf(history, 2, 0.5)]).toEqual([1, -1]);
    expect([...poseOf(history, 2, 0.25)]).toEqual([0.5, -0.5]);
    expect([...poseOf(history, 2, 1)]).toEqual([0.5, 0.5]);
    expect([...poseOf({ ...history, frames: 1, values: Float64Array.of(3, 4) }, 2, 0.7)]).toEqual([3, 4]);
  });
});

describe("a part", () => {
  it("moves with its anchor", () => {
    const part = { path: "", style: "body", rides: { on: "anchor", anchor: anchor(5, 5, up(0)) } } as const;
    expect(apply(partMatrix(part, [0.5]) as Matrix, 7, 9)).toEqual([7, 9 - 0.5 * REACH.shift]);
    expect(partMatrix({ ...part, rides: { on: "rest" } }, [1])).toBeUndefined();
  });

  it("turns about its pivot", () => {
    const turn = { coordinate: 0, dx: 0, dy: 0, turn: 1, aboutX: 10, aboutY: 20 };
    const part = { path: "", style: "body", rides: { on: "anchor", anchor: anchor(0, 0, turn) } } as const;
    const matrix = partMatrix(part, [1]) as Matrix;
    expect(apply(matrix, 10, 20)).toEqual([10, 20]);
    // y downwards: a clockwise turn takes what is right of the pivot down.
    const [x, y] = apply(matrix, 11, 20);
    expect(x).toBeCloseTo(10 + Math.cos(REACH.turn), 12);
    expect(y).toBeCloseTo(20 + Math.sin(REACH.turn), 12);
  });

  it("stretches between its anchors and keeps its width", () => {
    const rides = { on: "stretch", from: anchor(3, 40, up(0)), to: anchor(9, 10, up(1)) } as const;
    const part = { path: "", style: "line", rides } as const;
    const pose = [0.3, -0.8];
    const matrix = partMatrix(part, pose) as Matrix;
    const ends = [
      [3, 40 - 0.3 * REACH.shift],
      [9, 10 + 0.8 * REACH.shift],
    ];
    [apply(matrix, 3, 40), apply(matrix, 9, 10)].forEach(([x, y], i) => {
      expect(x).toBeCloseTo(ends[i][0], 9);
      expect(y).toBeCloseTo(ends[i][1], 9);
    });
    // A point one pixel beside the line stays one pixel beside it.
    const [ux, uy] = [6 / Math.hypot(6, 30), -30 / Math.hypot(6, 30)];
    const [px, py] = apply(matrix, 3 - uy, 40 + ux);
    expect(Math.hypot(px - ends[0][0], py - ends[0][1])).toBeCloseTo(1, 9);
  });
});
