import { describe, expect, it } from "vitest";
import { LANES, tridiagonalLanes } from "../../shared-core/numerics/tridiagonal-many.ts";
import { difference, EPS, largest, product, seeded } from "./helpers.ts";

/** Bands of a chain with masses, dampers, springs and loss factors by chance, and rates from far below to far above. */
function chain(n: number, seed: number) {
  const next = seeded(seed);
  const band = (diagonal: () => number, off: () => number) =>
    Float64Array.from({ length: 2 * n }, (_, p) => (p % 2 === 1 ? diagonal() : p === 0 ? 0 : off()));
  return {
    n,
    m: band(
      () => 2 + next(),
      () => 0.2 * next(),
    ),
    c: band(
      () => 0.3 + 0.1 * next(),
      () => 0.1 * next(),
    ),
    k: band(
      () => 40 + 10 * next(),
      () => -15 + 5 * next(),
    ),
    h: band(
      () => 0.5 * (1 + next()),
      () => 0,
    ),
  };
}

const omegas = Float64Array.from({ length: LANES }, (_, l) => 0.05 * 1.6 ** l);

/** Z(i omega) in full. */
function dense({ n, m, c, k, h }: ReturnType<typeof chain>, omega: number) {
  const re = new Float64Array(n * n);
  const im = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = Math.max(0, i - 1); j <= i; j++) {
      const p = 2 * i + 1 - (i - j);
      re[i * n + j] = re[j * n + i] = k[p] - omega * omega * m[p];
      im[i * n + j] = im[j * n + i] = h[p] + omega * c[p];
    }
  }
  return { re, im };
}

const lane = (all: Float64Array, l: number) => all.filter((_, p) => p % LANES === l);

describe("many frequencies side by side", () => {
  // Check: the residual of each lane's own full matrix; the bound is that of elimination with growth up to 10.
  it.each([1, 2, 7, 60])("solves every lane of a chain of %d", (n) => {
    const bands = chain(n, 31 + n);
    const next = seeded(5);
    const b = [0, 1].map(() => Float64Array.from({ length: n * LANES }, next));
    const [re, im] = b.map((v) => Float64Array.from(v));
    const good = new Uint8Array(LANES);
    tridiagonalLanes(bands)(omegas, re, im, good);
    expect([...good]).toEqual(new Array(LANES).fill(1));
    for (let l = 0; l < LANES; l++) {
      const z = dense(bands, omegas[l]);
      const [xr, xi] = [lane(re, l), lane(im, l)];
      const times = (a: Float64Array, x: Float64Array) => product(a, x, n, n, 1);
      const [rr, ii, ri, ir] = [times(z.re, xr), times(z.im, xi), times(z.re, xi), times(z.im, xr)];
      const off = Math.max(
        difference(
          rr.map((v, p) => v - ii[p]),
          lane(b[0], l),
        ),
        difference(
          ri.map((v, p) => v + ir[p]),
          lane(b[1], l),
        ),
      );
      const size = (largest(z.re) + largest(z.im)) * (largest(xr) + largest(xi));
      expect(off).toBeLessThan(40 * EPS * size);
    }
  });

  it("marks the lanes that need pivoting, and no others", () => {
    // k - omega^2 m vanishes at the first place of lane 3.
    const zeros = new Float64Array(4);
    const k = Float64Array.of(0, omegas[3] ** 2, -7, 50);
    const bands = { n: 2, m: Float64Array.of(0, 1, 0, 1), c: zeros, k, h: zeros };
    const good = new Uint8Array(LANES);
    tridiagonalLanes(bands)(omegas, new Float64Array(2 * LANES).fill(1), new Float64Array(2 * LANES), good);
    expect([...good].flatMap((g, l) => (g === 0 ? [l] : []))).toEqual([3]);
  });
});
