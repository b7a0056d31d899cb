import { describe, expect, it } from "vitest";
import { chainModes } from "../../shared-core/numerics/chain-quadratic.ts";
import { ehrlichAberth } from "../../shared-core/numerics/ehrlich-aberth.ts";
import { EPS } from "./helpers.ts";

/** f′/f of a polynomial given by its roots. */
function fromRoots(roots: [number, number][]) {
  return (x: number, y: number, out: Float64Array) => {
    out.fill(0);
    for (const [r, i] of roots) {
      const square = (x - r) ** 2 + (y - i) ** 2;
      out[0] += (x - r) / square;
      out[1] -= (y - i) / square;
    }
  };
}

const sorted = (re: number[], im: number[]) =>
  re.map((r, j): [number, number] => [r, im[j]]).sort((a, b) => a[1] - b[1] || a[0] - b[0]);

describe("Ehrlich-Aberth", () => {
  it.each([
    [
      "pairs",
      { re: [-1, -1, -1], im: [1, 2, 3] },
      [
        [-0.1, 1],
        [-0.2, 1.05],
        [-0.05, 9],
      ],
    ],
    [
      "pairs that start together",
      { re: [-1, -1.01], im: [1, 1] },
      [
        [-0.3, 4],
        [-0.3, 4.2],
      ],
    ],
    [
      "reals",
      { re: [-1, -2, -3], im: [0, 0, 0] },
      [
        [-0.01, 0],
        [-7, 0],
        [-7.5, 0],
      ],
    ],
    [
      "a pair that splits",
      { re: [-1, -0.1], im: [0.1, 5] },
      [
        [-0.5, 0],
        [-3, 0],
        [-0.2, 6],
      ],
    ],
    [
      "reals that join",
      { re: [-1, -1.5, -9], im: [0, 0, 0] },
      [
        [-1.2, 2],
        [-8, 0],
      ],
    ],
  ] as [string, { re: number[]; im: number[] }, [number, number][]][])("finds %s", (_, items, heads) => {
    const all = heads.flatMap(([r, i]): [number, number][] =>
      i > 0
        ? [
            [r, i],
            [r, -i],
          ]
        : [[r, 0]],
    );
    expect(ehrlichAberth(items, 0, 1e-12, fromRoots(all))).toBe(true);
    const found = sorted(items.re, items.im);
    const wanted = sorted(
      heads.map((h) => h[0]),
      heads.map((h) => h[1]),
    );
    expect(found.length).toBe(wanted.length);
    found.forEach(([r, i], j) => {
      expect(Math.hypot(r - wanted[j][0], i - wanted[j][1])).toBeLessThan(1e-10 * Math.hypot(r, i));
    });
  });

  it("leaves known zeros alone", () => {
    const items = { re: [-1], im: [1] };
    const roots: [number, number][] = [
      [0, 0],
      [0, 0],
      [-2, 3],
      [-2, -3],
    ];
    expect(ehrlichAberth(items, 2, 1e-12, fromRoots(roots))).toBe(true);
    expect(Math.hypot(items.re[0] + 2, items.im[0] - 3)).toBeLessThan(1e-10);
  });

  it("gives up within its cap where there is nothing to find", () => {
    let calls = 0;
    const items = { re: [-1, -2], im: [1, 0] };
    const nowhere = (_x: number, _y: number, out: Float64Array) => {
      calls++;
      out[0] = 1;
      out[1] = 0;
    };
    expect(ehrlichAberth(items, 0, 1e-12, nowhere)).toBe(false);
    expect(calls).toBeLessThanOrEqual(40 * 3 + 10);
  });
});

describe("damped chain", () => {
  it("gives undefined for a defective value instead of a guess", () => {
    // One mass, critically damped: λ = −1 twice with one vector.
    const none = new Float64Array(0);
    expect(
      chainModes({ c: Float64Array.of(2), cOff: none, k: Float64Array.of(1), kOff: none }),
    ).toBeUndefined();
  });

  it("meets the closed form of one mass", () => {
    const none = new Float64Array(0);
    const modes = chainModes({ c: Float64Array.of(0.2), cOff: none, k: Float64Array.of(1), kOff: none });
    expect(modes).toBeDefined();
    expect(Math.abs((modes?.re[0] ?? 0) + 0.1)).toBeLessThan(4 * EPS);
    expect(Math.abs((modes?.im[0] ?? 0) - Math.sqrt(0.99))).toBeLessThan(4 * EPS);
  });

  it("gives undefined on values that are not numbers", () => {
    const none = new Float64Array(0);
    expect(
      chainModes({ c: Float64Array.of(Number.NaN), cOff: none, k: Float64Array.of(1), kOff: none }),
    ).toBeUndefined();
  });
});
